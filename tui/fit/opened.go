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
	say := func(label, text string) {
		const hang = 10
		for k, line := range layout.Wrap(layout.Clean(text, m.theme), p.width-hang) {
			if k > 0 {
				label = ""
			}
			lines = append(lines, fmt.Sprintf("%-*s", hang, label)+line)
		}
	}
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

// sentence begins with a capital, unless its first word is a name with a digit.
func sentence(s string) string {
	first, _, _ := strings.Cut(s, " ")
	if s == "" || strings.ContainsAny(first, "0123456789_") {
		return s
	}
	return strings.ToUpper(s[:1]) + s[1:]
}
