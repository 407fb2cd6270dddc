package data

import (
	"testing"

	"pgregory.net/rapid"
)

func TestDistance(t *testing.T) {
	// "kitten" to "sitting" is the example of the literature.
	for _, c := range []struct {
		a, b string
		want int
	}{{"kitten", "sitting", 3}, {"", "abc", 3}, {"abc", "abc", 0}, {"flaw", "lawn", 2}} {
		if got := distance(c.a, c.b); got != c.want {
			t.Errorf("distance(%q, %q) = %d, want %d", c.a, c.b, got, c.want)
		}
	}
	rapid.Check(t, func(t *rapid.T) {
		word := rapid.StringMatching(`[ab]{0,8}`)
		a, b, c := word.Draw(t, "a"), word.Draw(t, "b"), word.Draw(t, "c")
		if distance(a, b) != distance(b, a) || distance(a, c) > distance(a, b)+distance(b, c) {
			t.Fatalf("no metric: %q %q %q", a, b, c)
		}
	})
}

func TestFindPrefersTheExactName(t *testing.T) {
	in := titles(headings([]string{"abp", "abp_mmHg", "ABP_kPa", "Flow_mL_s"}))
	for name, want := range map[string]int{"abp": 0, "abp_mmHg": 1, "ABP": 2, "abp_kpa": 2, "flow": 3, " Flow ": 3} {
		if i, err := find(name, in, "--pressure NAME"); err != nil || i != want {
			t.Errorf("find(%q) = %d, %v; want %d", name, i, err, want)
		}
	}
	if i, err := find("Abp", in, "--pressure NAME"); err != nil || i != 0 {
		t.Errorf("a whole header in another case gives %d, %v", i, err)
	}
}

func TestShellWord(t *testing.T) {
	for s, want := range map[string]string{
		"abp_mmHg": "abp_mmHg", "P [kPa]": "'P [kPa]'", "": "''", "it's": `'it'\''s'`, "\x1b": `'\x1b'`, "$(x)": "'$(x)'", "a.csv": "a.csv",
	} {
		if got := shellWord(s); got != want {
			t.Errorf("shellWord(%q) = %s, want %s", s, got, want)
		}
	}
}
