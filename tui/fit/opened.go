package fit

import (
	"fmt"
	"math"
	"strings"

	"afterbeat/tui/layout"
)

// opened is the number under the cursor with all that is known of it.
func (m Model) opened(p plan) []string {
	r := m.rows()[m.cursor]
	var lines []string
	say := func(label, text string) { lines = append(lines, m.labelled(label, text, p.width)...) }
	model := ""
	if m.count() > 0 {
		model = " of " + m.result().Model.Name
	}
	lines = append(lines, r.name+model+": "+r.meaning)
	say("value", r.number.String())
	for i, e := range r.equation {
		label := ""
		if i == 0 {
			label = "equation"
		}
		say(label, e)
	}
	say("source", r.source)
	say("interval", r.method)
	for _, n := range r.notes {
		say("", n)
	}
	if r.known != "" {
		say("published", r.known)
	}
	if m.count() > 0 && math.IsNaN(m.result().AICc) {
		say("AICc", "none: "+m.result().CriterionReason)
	}
	return lines
}

// labelled is text wrapped beside its label.
func (m Model) labelled(label, text string, width int) []string {
	const hang = 10
	var lines []string
	for k, line := range layout.Wrap(layout.Clean(text, m.theme), width-hang) {
		if k > 0 {
			label = ""
		}
		lines = append(lines, fmt.Sprintf("%-*s", hang, label)+line)
	}
	return lines
}

// advised is the recommendation in full, and what is not identified, of every
// model.
func (m Model) advised(p plan) []string {
	lines := layout.Wrap(layout.Clean(m.advice(), m.theme), p.width)
	for i, s := range m.sheets {
		label := ""
		if i < m.count() {
			label = m.fit.Results[i].Model.Name
		}
		for _, r := range s.rows {
			if r.broken() {
				lines = append(lines, m.labelled(label, r.name+" "+r.number.String(), p.width)...)
			}
		}
	}
	for _, r := range m.fit.Results {
		if math.IsNaN(r.AICc) {
			lines = append(lines, m.labelled(r.Model.Name, "AICc: none, "+r.CriterionReason, p.width)...)
		}
	}
	return lines
}

// sentence begins with a capital, unless its first word is a name with a digit.
func sentence(s string) string {
	first, _, _ := strings.Cut(s, " ")
	if s == "" || strings.ContainsAny(first, "0123456789_") {
		return s
	}
	return strings.ToUpper(s[:1]) + s[1:]
}
