package support

import (
	"fmt"
	"slices"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tree/support"
	"afterbeat/tui/chart"
	"afterbeat/tui/layout"
)

// figure is a line of native beside supported.
type figure struct {
	label             string
	native, supported data.Estimate
	retained          *data.Estimate // nil where no ratio is made
}

// waveFigures are those under the waves.
func (m Model) waveFigures() []figure {
	a := m.shown()
	n, s, c := a.Native, a.Supported[m.state], a.Comparisons[m.state]
	return []figure{
		{"pulse pressure, mmHg", n.PulsePressure, s.PulsePressure, &c.RetainedPressure},
		{"greatest, mmHg", n.MaxPressure, s.MaxPressure, nil},
		{"least, mmHg", n.MinPressure, s.MinPressure, nil},
		{"swing of flow, " + flowUnit(*m.comparison), n.FlowSwing, s.FlowSwing, &c.RetainedFlow},
	}
}

// powerFigures are those of the energy view.
func (m Model) powerFigures() []figure {
	a := m.shown()
	n, s, c := a.Native, a.Supported[m.state], a.Comparisons[m.state]
	u := powerUnit(*m.comparison)
	return []figure{
		{"power in, " + u, milliwatt(n.InputPower), milliwatt(s.InputPower), nil},
		{"steady part, " + u, milliwatt(n.SteadyPower), milliwatt(s.SteadyPower), nil},
		{"pulsatile part, " + u, milliwatt(n.PulsatilePower), milliwatt(s.PulsatilePower), &c.RetainedPower},
		{"EEP, mmHg", n.EEP, s.EEP, nil},
		{"surplus, erg/cm3", n.SHE, s.SHE, &c.RetainedSHE},
	}
}

// The columns of figures, in cells.
const (
	labelCells    = 21
	estimateCells = 26
	ratioWidth    = labelCells + 3*estimateCells // of the area, from which ratios have a column
)

// estimateWidth is what an estimate has of the area.
func (m Model) estimateWidth() int {
	return max(min(estimateCells, (m.area.Width-labelCells)/2), 0)
}

// figures sets native beside supported, with what is retained where there is
// room for it.
func (m Model) figures(list []figure) []string {
	out := []string{m.across("", "native (95 %)", "supported (95 %)", "retained (95 %)")}
	for _, f := range list {
		retained := ""
		if f.retained != nil {
			retained = m.ratio(*f.retained)
		}
		out = append(out, m.across(f.label, estimate(f.native), estimate(f.supported), retained))
	}
	return out
}

func (m Model) across(label, native, supported, retained string) string {
	cell := func(s string, n int) string { return layout.Pad(layout.Clean(s, m.theme), n) }
	w := m.estimateWidth()
	line := cell(label, labelCells) + cell(native, w-1) + " " + cell(supported, w)
	if m.area.Width >= ratioWidth {
		line += cell(retained, w)
	}
	return line
}

// retainedLines are the ratios of figures, where they have no column.
func (m Model) retainedLines(list []figure) []string {
	var out []string
	for _, f := range list {
		if f.retained != nil && m.area.Width < ratioWidth {
			label, _, _ := strings.Cut(f.label, ",")
			out = append(out, m.across("retained, "+strings.TrimSuffix(label, " part"), "", m.ratio(*f.retained), ""))
		}
	}
	return out
}

// ratio is a retained part; under a posing by construction it is an identity.
func (m Model) ratio(e data.Estimate) string {
	if m.shown().Posing.ByConstruction() {
		return casenote.Format(e.Value, e.Total) + " by construction"
	}
	return estimate(e)
}

// estimate writes a value with its interval in brackets.
func estimate(e data.Estimate) string {
	n := casenote.Number{Estimate: e}
	value := casenote.Format(e.Value, e.Total)
	switch {
	case value == "undefined":
		return value
	case !n.Identified && n.Total.Defined():
		return "not identified (" + casenote.FormatRange(e.Value, e.Total) + ")"
	case !n.Identified:
		return "not identified"
	case !n.Total.Defined() || n.Total.Low == n.Total.High:
		return value
	}
	return value + " (" + casenote.FormatRange(e.Value, e.Total) + ")"
}

// energy is the figures of power of the state shown, with power over the share
// above them where there is room; or, as a table, power over the share alone.
func (m Model) energy(p plan) []string {
	if m.table {
		return m.sweep(p, pulsatilePower)
	}
	below := m.energyFigures()
	if room := p.picture - len(below); room >= leastPicture {
		p.picture = room
		return append(layout.Lines(strings.Join(m.sweep(p, pulsatilePower), "\n"), room), below...)
	}
	return below
}

func (m Model) energyFigures() []string {
	list := m.powerFigures()
	return slices.Concat(m.figures(list), m.retainedLines(list), m.words[m.answer])
}

// sweepQuantity is what the sweep shows.
func (m Model) sweepQuantity() quantity {
	if m.flow {
		return retainedFlow
	}
	return retainedPulse
}

// sweep is a quantity over the share, under its title: as a picture and a table
// beside it, or as one of them where there is no room for both.
func (m Model) sweep(p plan, q quantity) []string {
	if p.picture < 2 {
		return nil
	}
	lines := layout.Wrap(layout.Clean(q.title()+" against the pump's share of the flow", m.theme), p.width)[:1]
	p.picture--
	switch {
	case m.table && !p.beside:
		return append(lines, m.sweepTable(p, q)...)
	case !p.beside:
		return append(lines, strings.Split(m.picture, "\n")...)
	}
	return append(lines, layout.Beside(strings.Split(m.picture, "\n"), m.sweepTable(p, q), p.sweep(q)+2)...)
}

// overShare draws a quantity over the share in some lines.
func (m Model) overShare(p plan, q quantity, lines int) string {
	l := m.curves.sweeps[q]
	plot := frame(l.y)
	for i, a := range m.comparison.Answers {
		plot.Series = append(plot.Series, chart.Series{Name: string(a.Posing), Values: l.each[i]})
	}
	plot.Cursors = []float64{m.shown().Supported[m.state].Share}
	return plot.Draw(p.sweep(q), lines, m.theme.Chart())
}

// sweepTable is a quantity for every share and posing.
func (m Model) sweepTable(p plan, q quantity) []string {
	answers := m.comparison.Answers
	head := "  share"
	for _, a := range answers {
		head += "  " + pad(string(a.Posing), columnOf(a, q))
	}
	from, to := around(m.state, m.count(), p.picture-1)
	out := []string{head}
	for i := from; i < to; i++ {
		cursor := " "
		if i == m.state {
			cursor = ">"
		}
		line := fmt.Sprintf("%s %5s", cursor, share(m.shown().Supported[i].Share))
		for _, a := range answers {
			line += "  " + pad(q.words(a, i), columnOf(a, q))
		}
		out = append(out, line)
	}
	return out
}

// words is the quantity of one state in print. The native state over itself is
// 1 without any doubt.
func (q quantity) words(a support.Answer, state int) string {
	e := q.of(a, state)
	if q != pulsatilePower && (a.Posing.ByConstruction() || a.Supported[state].Share == 0) {
		return casenote.Format(e.Value, data.NoInterval())
	}
	return estimate(e)
}

// columnOf is the width of a posing's column.
func columnOf(a support.Answer, q quantity) int {
	switch {
	case q == pulsatilePower:
		return powerCells
	case a.Posing.ByConstruction():
		return identityCells
	}
	return ratioCells
}

func pad(s string, n int) string { return layout.Pad(data.Clean(s), n) }

// around is a window of at most size rows of n about row i.
func around(i, n, size int) (from, to int) {
	size = max(min(size, n), 0)
	from = max(0, min(i-size/2, n-size))
	return from, from + size
}
