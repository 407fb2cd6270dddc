package layout

import (
	"strings"
	"testing"

	"pgregory.net/rapid"

	"afterbeat/data"
	"afterbeat/tui"
)

func TestCleanInASCII(t *testing.T) {
	for in, want := range map[string]string{
		"abp µV · 10⁻³": "abp uV 10\\u{207b}3",
		"Größe":         `Gr\u{f6}\u{df}e`,
		"a\x1b[31mb":    `a\x1b[31mb`,
		"\u202eabc":     `\u{202e}abc`,
		"±2 °":          "+-2 deg",
	} {
		if got := Clean(in, tui.Theme{ASCII: true}).String(); got != want {
			t.Errorf("Clean(%q) is %q, not %q", in, got, want)
		}
	}
	if got := Clean("µ", tui.Theme{}).String(); got != "µ" {
		t.Errorf("in Unicode, µ became %q", got)
	}
}

func TestWrapKeepsEveryWord(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := data.Clean(rapid.String().Draw(t, "text"))
		width := rapid.IntRange(2, 40).Draw(t, "width")
		lines := Wrap(text, width)
		for _, line := range lines {
			if w := data.Clean(line).Width(); w > width {
				t.Fatalf("%q takes %d cells of %d", line, w, width)
			}
		}
		whole := strings.ReplaceAll(text.String(), " ", "")
		if got := strings.ReplaceAll(strings.Join(lines, ""), " ", ""); got != whole {
			t.Fatalf("%q became %q", whole, got)
		}
	})
}

func TestWrapOfWordsWithoutWidth(t *testing.T) {
	got := strings.Join(Wrap(data.Clean("\u0300 abcd"), 2), "|")
	if want := "\u0300|ab|cd"; got != want {
		t.Errorf("%q, not %q", got, want)
	}
}

func TestPad(t *testing.T) {
	for _, c := range []struct{ got, want string }{
		{Pad(data.Clean("ab"), 4), "ab  "},
		{Pad(data.Clean("abcdef"), 4), "abc~"},
		{PadLeft(data.Clean("ab"), 4), "  ab"},
		{Pad(data.Clean("心"), 4), "心  "},
	} {
		if c.got != c.want {
			t.Errorf("%q, not %q", c.got, c.want)
		}
	}
}

func TestFitCutsFromBelowAndRight(t *testing.T) {
	got := Fit([]string{"caution", "\x1b[91mred\x1b[0m and more   ", "lost"}, tui.Area{Width: 7, Height: 2})
	if want := "caution\n\x1b[91mred\x1b[0m and"; strings.ReplaceAll(got, " \x1b", "\x1b") != want {
		t.Errorf("%q, not %q", got, want)
	}
}

func TestBeside(t *testing.T) {
	got := Beside([]string{"a", "\x1b[94mb\x1b[0m"}, []string{"1", "2", "3"}, 4)
	want := []string{"a   1", "\x1b[94mb\x1b[0m   2", "    3"}
	for i := range want {
		if got[i] != want[i] {
			t.Errorf("line %d: %q, not %q", i, got[i], want[i])
		}
	}
}
