package data

import (
	"strings"
	"testing"
	"unicode"

	"pgregory.net/rapid"
)

func TestCleanShowsWhatATerminalWouldObey(t *testing.T) {
	for _, c := range []struct{ in, want string }{
		{"abp_mmHg", "abp_mmHg"},
		{"  two \t\r\n words ", "two words"},
		{"\x1b[31mred", `\x1b[31mred`},
		{"a\u202eb", `a\u{202e}b`},
		{"\xff\xfe", `\xff\xfe`},
		{"bell\a", `bell\x07`},
		{"csi\u009b2J", `csi\x9b2J`},
		{"e\u0301\u0302\u0303", "e\u0301\u0302" + `\u{303}`},
		{"Größe µ", "Größe µ"},
		{"", ""},
	} {
		if got := Clean(c.in).String(); got != c.want {
			t.Errorf("Clean(%q) = %q, want %q", c.in, got, c.want)
		}
	}
}

func TestCutKeepsWithinCells(t *testing.T) {
	for _, c := range []struct {
		in   string
		n    int
		want string
	}{{"abcdef", 6, "abcdef"}, {"abcdef", 5, "abcd~"}, {"血圧血圧", 5, "血圧~"}, {"abc", 0, ""}} {
		if got := Clean(c.in).Cut(c.n).String(); got != c.want {
			t.Errorf("Cut(%q, %d) = %q, want %q", c.in, c.n, got, c.want)
		}
	}
}

func TestCleanIsSafeAndStable(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := rapid.OneOf(rapid.String(), rapid.Map(rapid.SliceOf(rapid.Byte()), func(b []byte) string { return string(b) })).Draw(t, "s")
		got := Clean(s)
		for _, r := range got.String() {
			if !unicode.IsPrint(r) {
				t.Fatalf("Clean(%q) lets %U through", s, r)
			}
		}
		if again := Clean(got.String()); again != got {
			t.Fatalf("not stable: %q then %q", got, again)
		}
		if n := rapid.IntRange(0, 12).Draw(t, "n"); got.Cut(n).Width() > n {
			t.Fatalf("%q cut to %d takes %d cells", got, n, got.Cut(n).Width())
		}
		if strings.Contains(got.String(), "  ") {
			t.Fatalf("double space in %q", got)
		}
	})
}

func FuzzClean(f *testing.F) {
	for _, s := range []string{"a\u202eb", "\x1b]52;c;x\a", "\xff", " x "} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		got := Clean(s)
		for _, r := range got.String() {
			if !unicode.IsPrint(r) {
				t.Fatalf("Clean(%q) lets %U through", s, r)
			}
		}
		if Clean(got.String()) != got {
			t.Fatalf("not stable: %q", got)
		}
	})
}
