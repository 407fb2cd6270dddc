package app

import (
	"slices"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree/study"
)

// step is a case that was left, and what was done to leave it.
type step struct {
	from casefile.Case
	said data.Text
}

// change makes a change of the case one step of undo. What had been undone is
// forgotten.
func (m Model) change(said data.Text, c casefile.Case) (Model, tea.Cmd) {
	if same(c, m.present) {
		m.said = said
		return m, nil
	}
	m.past = append(slices.Clip(m.past), step{m.present, said})
	m.future = nil
	return m.become(c, said)
}

func (m Model) undo() (Model, tea.Cmd) {
	n := len(m.past)
	if n == 0 {
		m.said = data.Clean("nothing to undo")
		return m, nil
	}
	last := m.past[n-1]
	m.past = m.past[:n-1]
	m.future = append(slices.Clip(m.future), step{m.present, last.said})
	return m.become(last.from, data.Clean("undone: "+last.said.String()))
}

func (m Model) redo() (Model, tea.Cmd) {
	n := len(m.future)
	if n == 0 {
		m.said = data.Clean("nothing to redo")
		return m, nil
	}
	next := m.future[n-1]
	m.future = m.future[:n-1]
	m.past = append(slices.Clip(m.past), step{m.present, next.said})
	return m.become(next.from, data.Clean("done again: "+next.said.String()))
}

// become makes c the present case, shows what the change leaves of the study,
// and computes the rest. Errors of the case before no longer stand.
func (m Model) become(c casefile.Case, said data.Text) (Model, tea.Cmd) {
	m.present, m.said = c, said
	m.changes++
	m.defect = nil
	m.errors = slices.DeleteFunc(slices.Clone(m.errors), func(n notice) bool { return n.computing })
	if m.reading.fits(c) {
		m.study = m.study.With(c)
	} else {
		in := m.study.Inputs
		in.Case = c
		m.study = study.Study{Inputs: in}
	}
	m, kept := m.keepSoon()
	m, shown := m.show()
	m, cmd := m.compute()
	return m, tea.Batch(shown, cmd, kept)
}
