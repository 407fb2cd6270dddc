package app

import (
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/layout"
)

// missing is the screen of a stage that the program does not have yet.
type missing struct {
	stage tui.Stage
	words string
	area  tui.Area
	theme tui.Theme
}

func (m missing) Update(tea.Msg) (tui.Screen, tea.Cmd) { return m, nil }

func (m missing) Show(s study.Study) (tui.Screen, tea.Cmd) {
	if m.words = m.stage.Missing(s); m.words == "" {
		m.words = "this program has no screen for it; the note has its numbers"
	}
	return m, nil
}

func (m missing) Resize(a tui.Area, t tui.Theme) (tui.Screen, tea.Cmd) {
	m.area, m.theme = a, t
	return m, nil
}

func (m missing) View() string {
	rows := append([]string{"", m.stage.String()}, layout.Wrap(layout.Clean(m.words, m.theme), m.area.Width)...)
	return strings.Join(rows[:min(len(rows), m.area.Height)], "\n")
}

func (m missing) Keys() []key.Binding { return nil }

func (m missing) Typing() bool { return false }

var _ tui.Screen = missing{}
