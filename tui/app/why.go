package app

import (
	"fmt"

	"afterbeat/data"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/layout"
)

// cause is why a stage cannot be shown.
type cause struct {
	stage tui.Stage
	words string // empty where it can be shown
	hint  string
	ended bool // nothing is computed that would change that
}

// await is a stage that the status line says is being computed.
type await struct {
	stage tui.Stage
	said  data.Text
}

// why tells apart a stage that never comes, one whose computing runs, failed,
// or was stopped.
func (m Model) why(s tui.Stage) cause {
	c := cause{stage: s, words: s.Missing(m.study)}
	switch {
	case c.words == "":
	case m.defect != nil:
		c.words, c.hint, c.ended = m.defect.text.String(), m.defect.hint.String(), true
		if s != tui.Intake && m.defect.atStart == "" {
			c.words = "1 Intake: " + c.words
		}
	case m.job.running:
		c.words = "still being computed"
	default:
		c.words, c.ended = fmt.Sprintf("stopped: press %d to go on", s), true
	}
	return c
}

// rows are the page of a stage that nothing is computed for any more; nil for
// one that has a page of its own.
func (c cause) rows(m Model) []string {
	if !c.ended || m.screens[c.stage].Typing() || c.stage == tui.Intake {
		return nil
	}
	rows := []string{"", fmt.Sprintf("%s: nothing to show yet", c.stage)}
	for _, words := range []string{c.words, c.hint, m.cure()} {
		if words != "" {
			rows = append(rows, layout.Wrap(layout.Clean(words, m.theme), m.area().Width)...)
		}
	}
	return rows
}

// cure is what helps beside the hint: undo where a change led to a failure, or
// another choice at the start.
func (m Model) cure() string {
	switch {
	case m.defect == nil:
		return ""
	case len(m.past) > 0:
		return "u takes the last change back"
	case m.defect.atStart != "":
		return "it is chosen at the start, by " + m.defect.atStart + " or in the case file: q leaves"
	}
	return ""
}

// saying says why a stage cannot be shown, and no longer than that is true.
func (m Model) saying(s tui.Stage, lead string) Model {
	m.said = data.Clean(lead + m.why(s).words)
	m.await = await{s, m.said}
	return m
}

// arrived takes the word away that a stage is still being computed.
func (m Model) arrived() Model {
	if w := m.await; w.stage != 0 && w.said == m.said && w.stage.Missing(m.study) == "" {
		m.said, m.await = data.Text{}, await{}
	}
	return m
}

// idle tells that something is to be computed, and nothing is.
func (m Model) idle() bool { return !m.job.running && m.study.Pending() != study.StageDone }
