package tui

import (
	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	_ "afterbeat/tui/background"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree/study"
)

// Area is a size in cells.
type Area struct{ Width, Height int }

// Screen is the screen of one stage. It is a value: every method that changes
// it returns the changed one.
type Screen interface {
	// Update answers a key, or the result of one of its own commands. It is
	// never given a key while another screen is open, nor the root's keys,
	// unless Typing.
	Update(msg tea.Msg) (Screen, tea.Cmd)
	// Show takes over what has been computed, which may be less than before
	// after a change. A command may prepare what View needs.
	Show(s study.Study) (Screen, tea.Cmd)
	// Resize takes over size and theme.
	Resize(a Area, t Theme) (Screen, tea.Cmd)
	// View is at most Area.Height lines of at most Area.Width cells.
	View() string
	// Keys are the bindings that work now, the most useful first.
	Keys() []key.Binding
	// Typing tells that a text field has the focus, so that every key is text.
	Typing() bool
}

// ChangeMsg asks the root to change the case. It becomes one step of undo, and
// what depends on it is computed again.
type ChangeMsg struct {
	Said data.Text // what was done, for the status line: "aortic_pressure inverted"
	Case casefile.Case
}

// SayMsg puts a message on the status line. An error stays until answered.
type SayMsg struct {
	Text  data.Text
	Error bool
}

// GoMsg opens a stage.
type GoMsg struct{ Stage Stage }

// Say makes a command of a message for the status line.
func Say(words string) tea.Cmd {
	return func() tea.Msg { return SayMsg{Text: data.Clean(words)} }
}

// Change makes a command of a change of the case.
func Change(said string, c casefile.Case) tea.Cmd {
	return func() tea.Msg { return ChangeMsg{Said: data.Clean(said), Case: c} }
}
