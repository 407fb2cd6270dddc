package casefile

import "testing"

func TestCheckLabel(t *testing.T) {
	for _, s := range []string{"", "pilot-07", "LVAD.12_b", "a1", "S12345", "abcdefghijklmnopqrstuvwxyz-12345"} {
		if err := CheckLabel(s); err != nil {
			t.Errorf("%q: %v", s, err)
		}
	}
	for _, s := range []string{
		"Mary", "Mary Smith 7", "Smith,Mary1", "1954-03-12", "b19540312", "b-12.3.1954", "4711", "Jörg-1", "a1/b",
		"-", "a123456", "abcdefghijklmnopqrstuvwxyz-123456", "a1\n",
	} {
		if CheckLabel(s) == nil {
			t.Errorf("%q passes", s)
		}
	}
}
