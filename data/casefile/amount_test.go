package casefile

import "testing"

func TestAmount(t *testing.T) {
	for _, c := range []struct {
		s        string
		value    float64
		relative bool
	}{{"10%", 0.1, true}, {" 2.5 % ", 0.025, true}, {"0.01", 0.01, false}, {"-3", -3, false}} {
		value, relative, err := Amount(c.s)
		if err != nil || value != c.value || relative != c.relative {
			t.Errorf("Amount(%q) = %v, %v, %v", c.s, value, relative, err)
		}
	}
	for _, s := range []string{"", "%", "ten", "10%%", "inf", "nan%", "1e999"} {
		if v, _, err := Amount(s); err == nil {
			t.Errorf("Amount(%q) = %v", s, v)
		}
	}
}
