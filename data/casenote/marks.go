package casenote

import (
	"fmt"
	"slices"
	"strings"
)

// marks is what the numbers of a table have in common, and the footnotes of
// those that differ.
type marks struct {
	origins  []string // in the order of appearance
	reasons  []string // footnotes [1], [2], ...
	brackets bool     // some number has an interval
	alike    bool     // no number has an interval, all for one reason
}

// markNumbers looks through the numbers of a table.
func markNumbers(t Table) *marks {
	m := &marks{alike: true}
	for _, row := range t.Rows {
		for _, c := range row {
			if c.Number == nil {
				continue
			}
			n := *c.Number
			if !n.undefined() {
				m.origins = include(m.origins, n.origin())
			}
			if reason := n.footnote(); reason != "" {
				m.reasons = include(m.reasons, reason)
			}
			m.brackets = m.brackets || n.Total.Defined() && !n.exact()
			m.alike = m.alike && n.inColumns() && !n.Total.Defined()
		}
	}
	m.alike = m.alike && len(m.reasons) == 1
	return m
}

// footnote says why a number has no value or no interval; empty where it has both.
func (n Number) footnote() string {
	switch {
	case n.undefined(), !n.Identified:
		return n.reason()
	case n.Total.Defined():
		return ""
	case n.Why == "":
		return "no interval"
	}
	return "no interval: " + n.Why
}

// cell writes a cell: words, or a number with its interval in brackets, the
// number of its footnote, and the first letter of its origin where a table
// mixes them.
func (m *marks) cell(c Cell) string {
	if c.Number == nil {
		return c.Words.String()
	}
	n := *c.Number
	var s string
	switch {
	case n.undefined():
		s = "undefined"
	case !n.Identified:
		s = "not identified"
	default:
		s = Format(n.Value, n.Total)
	}
	if n.Total.Defined() && !n.exact() {
		s += " (" + FormatRange(n.Value, n.Total) + ")"
	}
	if reason := n.footnote(); reason != "" && !m.alike {
		s += fmt.Sprintf(" [%d]", 1+slices.Index(m.reasons, reason))
	}
	if len(m.origins) > 1 && !n.undefined() {
		s += " " + n.origin()[:1]
	}
	return s
}

// foot gives the lines below a table.
func (m *marks) foot(own string) []string {
	var lines []string
	say := func(s string) { lines = append(lines, s) }
	if m.brackets {
		say("In brackets: 95 % interval.")
	}
	switch len(m.origins) {
	case 0:
	case 1:
		say("All numbers are " + m.origins[0] + ".")
	default:
		say("Origin by first letter: " + strings.Join(m.origins, ", ") + ".")
	}
	for i, reason := range m.reasons {
		if m.alike {
			say("No number has an interval" + strings.TrimPrefix(reason, "no interval") + ".")
		} else {
			say(fmt.Sprintf("[%d] %s", i+1, reason))
		}
	}
	if own != "" {
		say(own)
	}
	return lines
}

// include appends s unless it is there already.
func include(list []string, s string) []string {
	if slices.Contains(list, s) {
		return list
	}
	return append(list, s)
}
