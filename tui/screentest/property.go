package screentest

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/charmbracelet/x/ansi"
	"pgregory.net/rapid"

	"afterbeat/tree/study"
	"afterbeat/tui"
)

// Survives checks, with random keys, sizes, themes and studies, and results of
// commands that come late or never, that a screen does not panic, and that its
// view stays in its area. keys are pressed beside those that it lists.
func Survives(t *testing.T, fresh func() tui.Screen, studies []study.Study, keys ...string) {
	rapid.Check(t, func(t *rapid.T) {
		s := fresh()
		var pending []tea.Cmd
		keep := func(next tui.Screen, cmd tea.Cmd) {
			s = next
			if cmd != nil {
				pending = append(pending, cmd)
			}
		}
		var area tui.Area
		var theme tui.Theme
		for range rapid.IntRange(1, 40).Draw(t, "steps") {
			switch rapid.IntRange(0, 7).Draw(t, "what") {
			case 0:
				area = tui.Area{Width: rapid.IntRange(1, 250).Draw(t, "width"), Height: rapid.IntRange(1, 80).Draw(t, "height")}
				theme = tui.Theme{ASCII: rapid.Bool().Draw(t, "ascii"), Colours: rapid.SampledFrom([]int{0, 16, 256}).Draw(t, "colours")}
				keep(s.Resize(area, theme))
			case 1:
				keep(s.Show(rapid.SampledFrom(studies).Draw(t, "study")))
			case 2, 3:
				if n := len(pending); n > 0 {
					i := rapid.IntRange(0, n-1).Draw(t, "late")
					msg := pending[i]()
					pending = append(pending[:i], pending[i+1:]...)
					keep(s.Update(msg))
				}
			default:
				keep(s.Update(anyKey(t, s, keys)))
			}
			if complaint := leaves(s.View(), area, theme); complaint != "" {
				t.Fatal(complaint)
			}
		}
	})
}

// NamesAll checks that the help of every key that a screen lists names each way
// to press it, and that no two say the same.
func NamesAll(t testing.TB, s tui.Screen) {
	t.Helper()
	words := strings.NewReplacer("pgdn", "pgdown", "hjkl", "h/j/k/l", "arrows", "left/right/up/down")
	of := map[string]string{}
	for _, b := range s.Keys() {
		shown := strings.Split(words.Replace(b.Help().Key), "/")
		if b.Help().Key == "/" {
			shown = []string{"/"}
		}
		for _, k := range b.Keys() {
			if k == " " {
				k = "space"
			}
			if !slices.Contains(shown, k) {
				t.Errorf("%q is not named in %q %s", k, b.Help().Key, b.Help().Desc)
			}
		}
		if was, twice := of[b.Help().Desc]; twice {
			t.Errorf("%q and %q both are %q", was, b.Help().Key, b.Help().Desc)
		}
		of[b.Help().Desc] = b.Help().Key
	}
}

// anyKey is a key that the screen lists, one of others, or one that means nothing.
func anyKey(t *rapid.T, s tui.Screen, others []string) tea.KeyMsg {
	names := []string{"Q", "z", "esc", "enter", " ", "\u00e9"}
	names = append(names, others...)
	for _, b := range s.Keys() {
		names = append(names, b.Keys()...)
	}
	msg := Key(rapid.SampledFrom(names).Draw(t, "key"))
	msg.Paste = msg.Type == tea.KeyRunes && rapid.IntRange(0, 9).Draw(t, "paste") == 0
	return msg
}

// leaves says how a view leaves its area or its theme; empty where it does not.
func leaves(view string, a tui.Area, theme tui.Theme) string {
	lines := 1
	for _, r := range ansi.Strip(view) {
		switch {
		case r == '\n':
			lines++
		case r < ' ' || r == 0x7f || theme.ASCII && r >= 0x80:
			return fmt.Sprintf("%q in the view:\n%s", r, view)
		}
	}
	if lines > max(a.Height, 1) {
		return fmt.Sprintf("%d lines in an area of %d:\n%s", lines, a.Height, view)
	}
	for line := range strings.SplitSeq(view, "\n") {
		if w := ansi.StringWidth(line); w > a.Width {
			return fmt.Sprintf("%d cells in an area of %d: %q", w, a.Width, line)
		}
	}
	return ""
}
