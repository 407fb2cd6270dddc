package app

import (
	"fmt"
	"slices"

	"afterbeat/data"
	"afterbeat/tui/layout"
)

// complain adds an error, unless it waits to be answered already.
func (m Model) complain(n notice) Model {
	if len(m.errors) < most && !slices.Contains(m.errors, n) {
		m.errors = append(slices.Clip(m.errors), n)
	}
	return m
}

// status is the last row but one: a question, what the last key did, or
// progress. Errors lie above it.
func (m Model) status(width int) string {
	switch {
	case m.naming:
		return m.nameRow(width)
	case m.leaving == asks:
		return "Unsaved choices: s save a note first, y discard them, esc stay"
	case m.offer != nil && !m.typing():
		return m.offer.question()
	}
	said := layout.Clean(m.said.String(), m.theme)
	if m.job.shown == "" && said.Width() > width {
		return said.Cut(width-len(wholeInHelp)).String() + wholeInHelp
	} else if m.job.shown == "" {
		return said.String()
	}
	if said.Width() > 0 {
		said = data.Clean(said.Cut(max(width-len(m.job.shown)-2, 0)).String() + ";")
	}
	return data.Clean(said.String() + " " + m.job.shown).String()
}

// wholeInHelp ends a line that was cut: the help shows it in full.
const wholeInHelp = " (? all)"

// nameRow is the field of the name, behind why the last one was not taken.
func (m Model) nameRow(width int) string {
	if m.writing {
		return layout.Clean("saving "+m.name.Value(), m.theme).Cut(width).String()
	}
	prompt := "save the note as: "
	if why := layout.Clean(m.refused.String(), m.theme); why.Width() > 0 {
		prompt = why.Cut(width*2/3).String() + ": "
	}
	return prompt + m.name.View(max(width-len(prompt), 10), m.theme)
}

// errorRows is the oldest error in full, over the last rows of a stage.
func (m Model) errorRows(width int) []string {
	if len(m.errors) == 0 {
		return nil
	}
	n := m.errors[0]
	count := ""
	if len(m.errors) > 1 {
		count = fmt.Sprintf(" (1 of %d)", len(m.errors))
	}
	rows := layout.Wrap(layout.Clean("Error"+count+": "+n.text.String(), m.theme), width)
	if n.hint.Width() > 0 {
		rows = append(rows, layout.Wrap(layout.Clean("Hint: "+n.hint.String(), m.theme), width)...)
	}
	return rows
}
