package explain

import (
	"fmt"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tui"
	"afterbeat/tui/layout"
)

// Number is a number with what stands behind it.
type Number struct {
	Name   string // on the list: "Zc"
	Of     string // what it belongs to: "wk3, systemic load"; may be empty
	Value  casenote.Number
	Method string // how its intervals came about
	// RandomOnly tells that no systematic error is in the interval.
	RandomOnly bool
	Leads      []string // what its doubt comes from, the largest part first
	Notes      []string // what else to know
	data.Account
}

// short is the value without its unit, as the list shows it.
func (n Number) short() string {
	if !n.Value.Identified {
		return "not identified"
	}
	return casenote.Format(n.Value.Value, n.Value.Total)
}

// hang is the width of the labels.
const hang = 12

// Lines are what is known of a number, at most width cells wide.
func (n Number) Lines(width int, t tui.Theme) []string {
	w := writing{width: width, theme: t}
	w.head(n)
	w.value(n)
	for i, lead := range n.Leads {
		w.say(first(i, "doubt from"), lead)
	}
	for i, note := range n.Notes {
		w.say(first(i, "mind"), note)
	}
	for i, e := range n.Equation {
		w.say(first(i, "equation"), e)
	}
	w.say("source", n.Source)
	for i, p := range n.Published {
		if i == 0 {
			w.plain("Published; a patient may well lie outside:")
		}
		w.say(p.Group, p.String())
	}
	if len(n.Published) == 0 {
		w.say("published", "no range at hand, neither of healthy people nor on support")
	}
	return w.lines
}

// first is the label of the first of several lines.
func first(i int, label string) string {
	if i > 0 {
		return ""
	}
	return label
}

// writing puts labelled lines together, wrapped and cleaned.
type writing struct {
	width int
	theme tui.Theme
	lines []string
}

func (w *writing) plain(text string) {
	w.lines = append(w.lines, layout.Wrap(layout.Clean(text, w.theme), w.width)...)
}

// say is text beside its label; nothing where there is no text.
func (w *writing) say(label, text string) {
	if text == "" {
		return
	}
	for k, line := range layout.Wrap(layout.Clean(text, w.theme), max(w.width-hang, 1)) {
		w.lines = append(w.lines, layout.Pad(layout.Clean(first(k, label), w.theme), hang)+line)
	}
}

func (w *writing) head(n Number) {
	title := n.Name
	if n.Of != "" {
		title += " of " + n.Of
	}
	if n.Meaning != "" {
		title += ": " + n.Meaning
	}
	w.plain(title)
}

// value is the number with its intervals, each on a line of its own; one that is
// not identified, or undefined, is a sentence.
func (w *writing) value(n Number) {
	v := n.Value
	if !v.Identified || !v.Total.Defined() || v.Total.Low == v.Total.High {
		w.say("value", v.String())
		w.say("interval", n.Method)
		return
	}
	w.say("value", fmt.Sprintf("%s, %s", strings.TrimSpace(n.short()+" "+v.Unit), v.Origin))
	if n.RandomOnly {
		w.say("random 95 %", casenote.FormatRange(v.Value, v.Total)+"; no systematic error is in it")
		w.say("interval", n.Method)
		return
	}
	w.say("total 95 %", casenote.FormatRange(v.Value, v.Total)+", every kind of error")
	random := "none known"
	if v.Random.Defined() {
		random = casenote.Format(v.Random.Low, v.Total) + " to " + casenote.Format(v.Random.High, v.Total)
	}
	if share := dominance(v.Estimate); share != "" {
		random += "; " + share
	}
	w.say("random", random)
	w.say("interval", n.Method)
}

// dominance tells which kind of error makes the interval; empty where that is
// not known.
func dominance(e data.Estimate) string {
	if !(e.Total.Width() > 0) || !e.Random.Defined() {
		return ""
	}
	share := e.Random.Width() / e.Total.Width()
	switch {
	case share < 0.5:
		return fmt.Sprintf("%.0f %% of the total, so mostly systematic", 100*share)
	case share > 0.9:
		return "about the total, so mostly random"
	}
	return fmt.Sprintf("%.0f %% of the total, so both kinds count", 100*share)
}
