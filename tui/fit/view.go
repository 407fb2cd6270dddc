package fit

import (
	"fmt"
	"slices"
	"strings"

	"afterbeat/data"
	"afterbeat/tui"
	"afterbeat/tui/chart"
	"afterbeat/tui/layout"
	"afterbeat/tui/warnlist"
)

const noFlow = data.CodeNoFlow

// View puts together what is there.
func (m Model) View() string {
	switch {
	case m.warnings.Open():
		return m.warnings.View()
	case m.fit == nil, len(m.items) == 0:
		return layout.Fit(m.absent(), m.area)
	case m.numbers.Open():
		return m.numbers.View()
	case m.view == tabled:
		return layout.Fit(strings.Split(m.table(), "\n"), m.area)
	case m.view == advised:
		foot := m.read.Position()
		if m.read.Longer() {
			foot += "   space and pgup read on"
		}
		return layout.Fit(append(slices.Clone(m.read.Window()), foot), m.area)
	}
	p := m.plan()
	lines := layout.Lines(m.drawnNow(), p.plot)
	lines = append(lines, m.below(p)...)
	return layout.Fit(lines, m.area)
}

// drawnNow is the picture above the numbers.
func (m Model) drawnNow() string {
	w := m.weighed[m.shown]
	switch {
	case m.picture == ofFlow:
		return m.pictures.flow
	case m.picture == ofWaves:
		return m.pictures.waves
	case m.picture == ofImpedance && m.shown < len(m.pictures.impedances):
		return m.pictures.impedances[m.shown]
	case m.moved > 0 && m.moved <= len(w.pictures):
		return w.pictures[m.moved-1]
	case m.shown < len(m.pictures.items):
		return m.pictures.items[m.shown]
	}
	return ""
}

// table is the curves as numbers, in words.
func (m Model) table() string {
	b, one := m.fit.Beats, m.item()
	p := chart.Plot{X: timeAxis(b.Pressure.Period), Y: chart.Axis{Unit: "mmHg"}}
	p.Series = []chart.Series{{Name: "measured", Values: b.Pressure.Period.Samples}}
	switch {
	case m.picture == ofFlow:
		p = chart.Plot{X: timeAxis(b.Flow.Period), Y: chart.Axis{Unit: flowUnit(*m.fit)}}
		p.Series = []chart.Series{{Name: "flow", Values: b.Flow.Period.Samples}}
	case one.fitted():
		r, name := m.fit.Results[one.result], one.name
		p.Title = one.title() + ", " + one.load
		if w, ok := m.whatIf(); ok {
			r, name = w.Result, "if so"
			p.Title = "WHAT IF " + assumption(w.Sensitivity) + ": " + one.title()
		}
		p.Series = append(
			p.Series,
			chart.Series{Name: name, Values: r.Modelled.Samples},
			chart.Series{Name: "difference", Values: r.Residual},
		)
	}
	return p.Table(m.area.Width, m.area.Height, m.theme.Chart())
}

// below is the numbers and what speaks of them.
func (m Model) below(p plan) []string {
	lines := m.numberLines(p)
	if p.beside {
		lines = layout.Beside(lines, m.comparison(p), p.numbersWidth())
	}
	lines = layout.Lines(strings.Join(lines, "\n"), p.numbers)
	if p.compare > 0 {
		lines = append(lines, layout.Lines(strings.Join(m.comparison(p), "\n"), p.compare)...)
	}
	lines = append(lines, m.assumptions(p)...)
	if p.advice > 0 {
		lines = append(lines, layout.Lines(strings.Join(m.wrapped(m.advice(), p.width, p.advice, "r: in full"), "\n"), p.advice)...)
	}
	return append(lines, m.status(p))
}

// advice is the recommendation and its reason.
func (m Model) advice() string {
	if m.fits() == 0 {
		return turning(m.fit.Warnings)
	}
	r := m.fit.Recommended
	switch {
	case r.Model == "" && m.fit.Chosen < 0:
		return "None is recommended, and none in use before c chooses one: " + r.Why + "."
	case r.Model == "":
		return "None is recommended: " + r.Why + "."
	}
	return fmt.Sprintf("Recommended: %s.", strings.TrimSuffix(r.Why, "."))
}

// turning says what would turn a time constant into R and C.
func turning(warnings []warning) string {
	for _, w := range warnings {
		if w.Code == noFlow {
			return "R and C are not known from pressure alone: " + w.Cure + "."
		}
	}
	return ""
}

// status is the line of what is moved, or of what is in use, and the count of
// warnings.
func (m Model) status(p plan) string {
	count := m.warnings.Count()
	words := layout.Clean(m.state(), m.theme)
	return layout.Pad(words, max(p.width-len(count)-2, 0)) + "  " + count
}

// state says what is moved; else what speaks for the fit shown, and which one
// goes to the next stages.
func (m Model) state() string {
	one := m.item()
	w, ok := m.whatIf()
	switch failed := m.weighed[m.shown].failed; {
	case m.fits() == 0:
		return ""
	case ok:
		return fmt.Sprintf("What if %s (%d of %d): not kept, esc ends it", assumption(w.Sensitivity), m.moved, m.moves())
	case m.moved > 0 && failed != "":
		return "What if: " + failed
	case m.moved > 0:
		return "What if: computing, esc ends it"
	case !one.fitted():
		return "in use " + m.used() + "; this stands beside it"
	}
	return judged(m.fit.Results[one.result]) + "; in use " + m.used()
}

// absent says why there is nothing, and what cures it.
func (m Model) absent() []string {
	if m.fit == nil {
		why := tui.Fit.Missing(m.study)
		return []string{sentence(why) + "."}
	}
	var lines []string
	say := func(indent, text string) {
		for _, line := range layout.Wrap(layout.Clean(text, m.theme), m.area.Width-len(indent)) {
			lines = append(lines, indent+line)
		}
	}
	say("", "Nothing could be fitted: "+m.fit.Reason+".")
	lines = append(lines, "")
	say("", "What cures it is chosen on Intake (1): channels (enter), units (e), sites (o), the span ([ and ]), what was measured beside (m). Beats (2) shows which beats are used, and why the others are not.")
	lines = append(lines, "")
	here := warnlist.Elsewhere(nil)
	for _, w := range upToFit(m.study) {
		say("", strings.TrimPrefix(w.Channel.String()+": "+w.Text, ": "))
		if keys := here[w.Code]; keys != "" {
			say("  ", "here: "+keys)
		}
		say("  ", "cure: "+w.Cure)
	}
	return shortened(lines, m.area.Height, "v reads the warnings")
}

// shortened is at most height lines; where some are left out, the last says so,
// and how to see them.
func shortened(lines []string, height int, how string) []string {
	if len(lines) <= height || height < 1 {
		return lines
	}
	return append(slices.Clone(lines[:height-1]), fmt.Sprintf("~ %d more lines; %s", len(lines)-height+1, how))
}

// wrapped is text in at most height lines; where it does not fit, the last one
// ends with "~" and the key that opens it.
func (m Model) wrapped(text string, width, height int, key string) []string {
	lines := layout.Wrap(layout.Clean(text, m.theme), width)
	if len(lines) <= height {
		return lines
	}
	if height < 1 {
		return nil
	}
	how := " (" + key + ")"
	last := data.Clean(strings.Join(lines[height-1:], " ")).Cut(max(width-len(how), 0))
	return append(slices.Clone(lines[:height-1]), last.String()+how)
}
