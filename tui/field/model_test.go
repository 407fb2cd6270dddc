package field

import (
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/charmbracelet/x/ansi"
	"pgregory.net/rapid"

	"afterbeat/tui"
)

func typed(s string) tea.KeyMsg { return tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune(s)} }

func TestEditing(t *testing.T) {
	m := New("ab c")
	for _, step := range []struct {
		key  tea.KeyMsg
		want string
	}{
		{typed("d"), "ab cd|"},
		{tea.KeyMsg{Type: tea.KeyLeft}, "ab c|d"},
		{tea.KeyMsg{Type: tea.KeyBackspace}, "ab |d"},
		{tea.KeyMsg{Type: tea.KeySpace, Runes: []rune{' '}}, "ab  |d"},
		{tea.KeyMsg{Type: tea.KeyDelete}, "ab  |"},
		{tea.KeyMsg{Type: tea.KeyHome}, "|ab  "},
		{tea.KeyMsg{Type: tea.KeyDelete}, "|b  "},
		{tea.KeyMsg{Type: tea.KeyEnd}, "b  |"},
		{tea.KeyMsg{Type: tea.KeyCtrlV}, "b  |"},
		{tea.KeyMsg{Type: tea.KeyTab}, "b  |"},
		{tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune("x"), Alt: true}, "b  |"},
		{tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune("1\n2\t3\x1b[31m\u202e"), Paste: true}, `b  1 2 3[31m\u{202e}|`},
		{tea.KeyMsg{Type: tea.KeyCtrlU}, "|"},
		{tea.KeyMsg{Type: tea.KeyBackspace}, "|"},
	} {
		m = m.Update(step.key)
		if got := m.View(40, tui.Theme{}); got != step.want {
			t.Errorf("after %q: %q, want %q", step.key, got, step.want)
		}
	}
}

func TestALongValueIsCutAwayFromThePlace(t *testing.T) {
	m := New("abcdefghijklmnop")
	for _, c := range []struct {
		left int
		want string
	}{{0, "~ijklmnop|"}, {4, "~hijkl|mn~"}, {8, "abcd|efgh~"}, {4, "|abcdefgh~"}} {
		for range c.left {
			m = m.Update(tea.KeyMsg{Type: tea.KeyLeft})
		}
		if got := m.View(10, tui.Theme{}); got != c.want {
			t.Errorf("%q, want %q", got, c.want)
		}
	}
}

func TestNeverWiderAndNeverRaw(t *testing.T) {
	keys := []tea.KeyType{tea.KeyLeft, tea.KeyRight, tea.KeyHome, tea.KeyEnd, tea.KeyBackspace, tea.KeyDelete}
	rapid.Check(t, func(t *rapid.T) {
		m := New(rapid.String().Draw(t, "value"))
		for range rapid.IntRange(0, 20).Draw(t, "keys") {
			m = m.Update(tea.KeyMsg{Type: rapid.SampledFrom(keys).Draw(t, "key")})
			m = m.Update(typed(rapid.StringN(0, 3, -1).Draw(t, "letters")))
		}
		width, ascii := rapid.IntRange(0, 30).Draw(t, "width"), rapid.Bool().Draw(t, "ascii")
		view := m.View(width, tui.Theme{ASCII: ascii})
		if w := ansi.StringWidth(view); w > width {
			t.Fatalf("%d cells of %d: %q", w, width, view)
		}
		for _, r := range view {
			if r < ' ' || r == 0x7f || ascii && r >= 0x80 {
				t.Fatalf("%q in %q", r, view)
			}
		}
	})
}
