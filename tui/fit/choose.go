package fit

import (
	"fmt"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tui"
)

// choose takes the fit shown to the next stages, or gives the choice back where
// it was made already.
func (m Model) choose() (tui.Screen, tea.Cmd) {
	c := m.study.Inputs.Case
	m.kept = m.item().title()
	if m.takesBack() {
		c.Model, c.Basis = "", ""
		return m, tui.Change(fmt.Sprintf("%s is no longer chosen: the recommended fit is used", m.kept), c)
	}
	c.Model, c.Basis = m.item().name, m.item().group
	return m, tui.Change(fmt.Sprintf("%s chosen for the next stages; c again takes it back, u undoes", m.kept), c)
}

// takesBack tells that the fit shown is the one that a person chose.
func (m Model) takesBack() bool {
	c, one := m.study.Inputs.Case, m.item()
	return one.fitted() && c.Model == one.name && (c.Basis == one.group || c.Basis == "" && one.result == m.fit.Chosen)
}
