package screentest

import (
	"testing"

	"afterbeat/tui"
)

// The check of a view finds what it is for.
func TestLeaves(t *testing.T) {
	area := tui.Area{Width: 4, Height: 2}
	for _, c := range []struct {
		view  string
		theme tui.Theme
		fits  bool
	}{
		{"abcd\nü", tui.Theme{}, true},
		{"\x1b[94mabcd\x1b[0m", tui.Theme{}, true},
		{"abcde", tui.Theme{}, false},
		{"a\nb\nc", tui.Theme{}, false},
		{"a\rb", tui.Theme{}, false},
		{"ü", tui.Theme{ASCII: true}, false},
	} {
		if got := leaves(c.view, area, c.theme) == ""; got != c.fits {
			t.Errorf("%q: %v", c.view, got)
		}
	}
}

func TestDemoIsComputedToItsEnd(t *testing.T) {
	if s := Demo(t, nil); s.Comparison == nil || len(s.Comparison.Answers) == 0 {
		t.Error("no comparison")
	}
}
