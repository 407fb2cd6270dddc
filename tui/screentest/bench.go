package screentest

import (
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tree/study"
	"afterbeat/tui"
	_ "afterbeat/tui/background"
)

// Bench holds a screen, and what it told the root.
type Bench struct {
	Screen tui.Screen
	Told   []tea.Msg // changes, words for the status line, stages to go to
}

// New shows a study on a screen.
func New(screen tui.Screen, s study.Study, a tui.Area, t tui.Theme) *Bench {
	b := &Bench{Screen: screen}
	b.take(b.Screen.Resize(a, t))
	b.Show(s)
	return b
}

// Show hands a study over.
func (b *Bench) Show(s study.Study) { b.take(b.Screen.Show(s)) }

// Resize changes size and theme.
func (b *Bench) Resize(a tui.Area, t tui.Theme) { b.take(b.Screen.Resize(a, t)) }

// take runs a command, and those that follow from it, to the end.
func (b *Bench) take(s tui.Screen, cmd tea.Cmd) {
	b.Screen = s
	if cmd == nil {
		return
	}
	switch msg := cmd().(type) {
	case tui.ChangeMsg, tui.SayMsg, tui.GoMsg:
		b.Told = append(b.Told, msg)
	case tea.BatchMsg:
		for _, one := range msg {
			b.take(b.Screen, one)
		}
	default:
		b.take(b.Screen.Update(msg))
	}
}

// Press presses keys, one after another, by the names of package bubbletea.
func (b *Bench) Press(keys ...string) *Bench {
	for _, k := range keys {
		b.take(b.Screen.Update(Key(k)))
	}
	return b
}

// Type types text rune by rune.
func (b *Bench) Type(text string) {
	for _, r := range text {
		b.Press(string(r))
	}
}

// Paste pastes text.
func (b *Bench) Paste(text string) {
	b.take(b.Screen.Update(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune(text), Paste: true}))
}

// View is what the screen shows.
func (b *Bench) View() string { return b.Screen.View() }

// Key is the message of a key.
func Key(name string) tea.KeyMsg {
	for _, t := range []tea.KeyType{
		tea.KeyUp, tea.KeyDown, tea.KeyLeft, tea.KeyRight, tea.KeyEnter, tea.KeyEsc, tea.KeyPgUp, tea.KeyPgDown,
		tea.KeyHome, tea.KeyEnd, tea.KeyBackspace, tea.KeyDelete, tea.KeyCtrlU, tea.KeyTab,
	} {
		if t.String() == name {
			return tea.KeyMsg{Type: t}
		}
	}
	if name == " " {
		return tea.KeyMsg{Type: tea.KeySpace, Runes: []rune{' '}}
	}
	return tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune(name)}
}

// Fits fails the test where a view leaves its area, or holds a byte that its
// theme cannot show.
func Fits(t failer, view string, a tui.Area, theme tui.Theme) {
	t.Helper()
	if complaint := leaves(view, a, theme); complaint != "" {
		t.Fatal(complaint)
	}
}

// failer is a test, of this library or of another.
type failer interface {
	Helper()
	Fatal(args ...any)
}
