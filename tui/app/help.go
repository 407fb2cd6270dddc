package app

import (
	"fmt"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/tui"
	"afterbeat/tui/layout"
)

// helpRows is the help, made from the keys that work now.
func (m Model) helpRows() []string {
	var rows []string
	if m.said.Width() > 0 {
		rows = append(m.paragraph("The last message", m.said.String())[1:], "")
	}
	rows = append(rows, fmt.Sprintf("Keys of %d %s", m.open, m.open))
	rows = append(rows, keyRows(m.ofScreen(), m.theme)...)
	rows = append(rows, "", "Keys on every stage")
	most, others := m.everywhere()
	rows = append(rows, keyRows(append(most, others...), m.theme)...)
	if words := assumed(m.study); words != m.said {
		rows = append(rows, m.paragraph("What is used, and what was assumed", words.String())...)
	}
	for _, s := range tui.Stages() {
		rows = append(rows, m.paragraph(fmt.Sprintf("Why (%d %s) is not possible yet", s, s), m.why(s).words)...)
	}
	return rows
}

// paragraph is a heading with words below it; nothing without words.
func (m Model) paragraph(heading, words string) []string {
	if words == "" {
		return nil
	}
	rows := []string{"", heading}
	for _, line := range layout.Wrap(layout.Clean(words, m.theme), m.area().Width-2) {
		rows = append(rows, "  "+line)
	}
	return rows
}

func keyRows(bindings []key.Binding, t tui.Theme) []string {
	var rows []string
	for _, b := range bindings {
		if h := b.Help(); b.Enabled() && h.Key != "" {
			rows = append(rows, "  "+layout.Pad(data.Clean(h.Key), 18)+layout.Clean(h.Desc, t).String())
		}
	}
	return rows
}

// helpKey scrolls the help, or closes it.
func (m Model) helpKey(msg tea.KeyMsg) Model {
	page := max(m.area().Height-1, 1)
	last := max(len(m.helpRows())-m.area().Height, 0)
	switch {
	case key.Matches(msg, keys.close):
		m.helping = false
	case key.Matches(msg, keys.up):
		m.scroll--
	case key.Matches(msg, keys.down):
		m.scroll++
	case key.Matches(msg, keys.pageUp):
		m.scroll -= page
	case key.Matches(msg, keys.pageDown):
		m.scroll += page
	case key.Matches(msg, keys.top):
		m.scroll = 0
	case key.Matches(msg, keys.bottom):
		m.scroll = last
	}
	m.scroll = min(max(m.scroll, 0), last)
	return m
}
