package tree

import (
	"fmt"
	"math"
	"math/cmplx"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tui"
	"afterbeat/tui/layout"
)

// View puts together what is there.
func (m Model) View() string {
	switch {
	case m.warnings.Open():
		return m.warnings.View()
	case m.tree == nil:
		return layout.Fit(m.absent(), m.area)
	case m.view == made:
		return layout.Fit(append(m.page.Window(), m.page.Position()), m.area)
	}
	p := m.plan()
	lines := append([]string{m.headline(p)}, m.body(p)...)
	lines = layout.Lines(strings.Join(lines, "\n"), max(p.height-1, 0))
	return layout.Fit(append(lines, m.status(p)), m.area)
}

func (m Model) body(p plan) []string {
	switch m.view {
	case impedance:
		return append([]string{m.reflectionLine()}, m.beside(p)...)
	case measured:
		return append([]string{m.misfitLine()}, strings.Split(m.pictures[0], "\n")...)
	}
	pictures := strings.Split(m.pictures[0], "\n")
	switch {
	case p.right:
		pictures = append(pictures, strings.Split(m.pictures[1], "\n")...)
	case p.plots == 2:
		pictures = layout.Beside(pictures, strings.Split(m.pictures[1], "\n"), p.plotWidth+gapCells)
	}
	switch {
	case m.waves:
		return pictures
	case p.right:
		return layout.Beside(m.list(p), pictures, p.list+gapCells)
	}
	return append(m.list(p), pictures...)
}

// beside are the two pictures of the impedance.
func (m Model) beside(p plan) []string {
	width, _, below := p.pair()
	left, right := strings.Split(m.pictures[0], "\n"), strings.Split(m.pictures[1], "\n")
	if below {
		return append(left, right...)
	}
	return layout.Beside(left, right, width+gapCells)
}

// headline is the whole in a line, or the question for a filter.
func (m Model) headline(p plan) string {
	if m.asking {
		return "filter: " + m.filter.View(max(p.width-len("filter: "), 0), m.theme)
	}
	t := m.tree
	words := fmt.Sprintf("C of the tree %s mL/mmHg, of the lumped fit %s; R %s mmHg s/mL; misses pressure by %s mmHg",
		ranged(t.Compliance), ranged(t.Lumped), ranged(t.Resistance), casenote.Format(t.Pressure.RMSE, data.NoInterval()))
	if p.width < 110 {
		words = fmt.Sprintf("C %s mL/mmHg (lumped %s), R %s mmHg s/mL", ranged(t.Compliance), casenote.Format(t.Lumped.Value, t.Lumped.Total), casenote.Format(t.Resistance.Value, t.Resistance.Total))
	}
	if m.filtered() {
		words = fmt.Sprintf("filter %q: %d of %d segments; esc clears", strings.TrimSpace(m.filter.Value()), len(m.rows), len(t.Segments))
	}
	return layout.Pad(layout.Clean(words, m.theme), p.width)
}

// ranged is a number with its total interval.
func ranged(e data.Estimate) string {
	s := casenote.Format(e.Value, e.Total)
	if e.Total.Defined() {
		s += " (" + casenote.FormatRange(e.Value, e.Total) + ")"
	}
	return s
}

// reflectionLine says when a wave comes to the end of the chosen segment, and what
// is reflected there of the first harmonic.
func (m Model) reflectionLine() string {
	i := m.segment()
	if i < 0 {
		return m.chosenWords()
	}
	s := m.tree.Segments[i]
	words := fmt.Sprintf("%s, %.0f ms from the root: reflects %.2f at %+.0f deg",
		m.chosenWords(), 1000*s.PathTime, cmplx.Abs(s.Reflection), cmplx.Phase(s.Reflection)*180/math.Pi)
	return layout.Pad(layout.Clean(words, m.theme), m.area.Width)
}

// misfitLine says by how much a trace is missed, and which of how many it is.
func (m Model) misfitLine() string {
	c, n := m.tree.Pressure, len(m.tree.Distal)
	if m.trace > 0 {
		c = m.tree.Distal[m.trace-1]
	}
	unit := " mmHg"
	if !c.IsPressure() {
		unit = " of its mean"
	}
	words := fmt.Sprintf("Trace %d of %d: the tree misses it by %s%s (RMS)", m.trace+1, n+1, casenote.Format(c.RMSE, data.NoInterval()), unit)
	if c.HeldOut {
		words += "; held out: a test"
	}
	if n == 0 {
		words += "; none is distal"
	}
	return layout.Pad(layout.Clean(words, m.theme), m.area.Width)
}

// status says what stands under the cursor, and counts the warnings.
func (m Model) status(p plan) string {
	count := m.warnings.Count()
	words := layout.Clean(m.chosenWords(), m.theme)
	if m.view == measured || m.view == impedance {
		words = data.Clean("Refined: " + m.factorWords())
	}
	return layout.Pad(words, max(p.width-len(count)-2, 0)) + "  " + count
}

// factorWords are the factors in a line.
func (m Model) factorWords() string {
	var all []string
	for _, f := range m.tree.Factors {
		all = append(all, f.Name+" "+casenote.Format(f.Value, f.Total))
	}
	return strings.Join(all, ", ")
}

// absent says why there is nothing, and what cures it.
func (m Model) absent() []string {
	say := func(text string) []string { return layout.Wrap(layout.Clean(text, m.theme), m.area.Width) }
	if m.study.Tree == nil {
		why := tui.Tree.Missing(m.study)
		if why == "" {
			return nil
		}
		return say(strings.ToUpper(why[:1]) + why[1:] + ".")
	}
	lines := say("There is no tree: " + m.study.Tree.Reason + ".")
	lines = append(lines, "")
	lines = append(lines, say("A tree needs a fit, and pressure and flow at the root. What cures it is chosen on Intake (1): the flow, its unit and site, a diameter for a velocity.")...)
	for _, w := range m.study.Tree.Warnings {
		lines = append(lines, "")
		lines = append(lines, say(w.Text)...)
		lines = append(lines, say("cure: "+w.Cure)...)
	}
	return lines
}
