package tree

import (
	"math"
	"math/cmplx"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/tree/anatomy"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/chart"
	"afterbeat/tui/layout"
)

// curves is everything that is drawn, one value a column.
type curves struct {
	ready          bool
	x              chart.Axis
	pressure, flow traces
	beds           [][]float64 // flow of each bed over its mean
	modulus, phase spectrum
	measured       []chart.Plot // ready to be drawn
	made           []string
}

// traces are the waves at the ends of all segments, in bounds that they share.
type traces struct {
	y    chart.Axis
	root []float64
	each [][]float64 // by segment of the tree
}

// spectrum is modulus or phase over frequency.
type spectrum struct {
	x, y           chart.Axis
	tree, measured []float64
}

// curvesMsg brings curves that were asked for.
type curvesMsg struct {
	request int
	curves  curves
}

// prepare asks for the curves at the present size.
func (m Model) prepare() (tui.Screen, tea.Cmd) {
	m.request++
	m = m.drawn()
	if m.tree == nil {
		return m, nil
	}
	t, s, request, area, theme := *m.tree, m.study, m.request, m.area, m.theme
	return m, func() tea.Msg {
		return curvesMsg{request: request, curves: curvesOf(t, s, area, theme)}
	}
}

// columnsMost is how many values a prepared wave keeps: enough for any picture,
// which takes one a column from them.
const columnsMost = 256

func curvesOf(t study.Tree, s study.Study, area tui.Area, theme tui.Theme) curves {
	flow := t.Fit.Beats.Flow.Period
	c := curves{ready: true, x: chart.Axis{Low: 0, High: float64(len(flow.Samples)-1) / flow.Rate, Name: "time", Unit: "s"}}
	c.pressure.root = kept(t.Segments[0].Waves.Inlet.Pressure.Samples)
	c.flow.root = kept(overMean(t.Segments[0].Waves.Inlet.Flow))
	for _, one := range t.Segments {
		c.pressure.each = append(c.pressure.each, kept(one.Waves.Outlet.Pressure.Samples))
		c.flow.each = append(c.flow.each, kept(overMean(one.Waves.Outlet.Flow)))
	}
	for _, b := range t.Beds {
		c.beds = append(c.beds, kept(overMean(b.Flow)))
	}
	c.pressure.y = chart.Covering("mmHg", append(c.pressure.each, c.pressure.root)...)
	c.flow.y = flowBounds(append(append(c.beds, c.flow.each...), c.flow.root))
	c.modulus, c.phase = spectra(t)
	c.measured = tracePlots(t)
	c.made = madeLines(t, area, theme)
	return c
}

// kept is a wave in at most columnsMost values.
func kept(samples []float64) []float64 {
	if len(samples) <= columnsMost {
		return samples
	}
	return chart.Columns(samples, 0, len(samples), columnsMost, 0)
}

// overMean is a flow over its mean; without a mean there is nothing to show.
func overMean(p data.Period) []float64 {
	mean := p.Mean()
	out := make([]float64, len(p.Samples))
	for j, v := range p.Samples {
		out[j] = v / mean
		if math.Abs(out[j]) > 1e6 || mean == 0 {
			out[j] = math.NaN()
		}
	}
	return out
}

// mostFlow is the largest flow over its mean that the bounds make room for; more
// is clipped, and marked by the plot.
const mostFlow = 8

func flowBounds(all [][]float64) chart.Axis {
	y := chart.Covering("of mean", all...)
	y.Low, y.High = max(y.Low, -mostFlow/2), min(y.High, mostFlow)
	return y
}

// highest is the highest frequency of the spectra, Hz; least the least modulus
// of a harmonic of flow over the largest at which a measured impedance is shown.
const (
	highest = 15.0
	least   = 0.03
)

// spectra are the impedance of the root: of the tree, and of what was measured
// where the flow has a harmonic to speak of.
func spectra(t study.Tree) (modulus, phase spectrum) {
	flow := t.Fit.Beats.Flow.Period
	q, p := flow.Spectrum(), t.Fit.Beats.Pressure.Period.Spectrum()
	largest := 0.0
	for _, v := range q[1:] {
		largest = max(largest, cmplx.Abs(v))
	}
	for k := 1; k < len(t.Root) && k < len(p); k++ {
		if float64(k)/flow.Duration() > highest {
			break
		}
		size, degrees := t.Impedance(k)
		modulus.tree, phase.tree = append(modulus.tree, size), append(phase.tree, degrees)
		size, degrees = math.NaN(), math.NaN()
		if cmplx.Abs(q[k]) >= least*largest {
			size, degrees = cmplx.Abs(p[k]/q[k]), cmplx.Phase(p[k]/q[k])*180/math.Pi
		}
		modulus.measured, phase.measured = append(modulus.measured, size), append(phase.measured, degrees)
	}
	n := float64(len(modulus.tree))
	x := chart.Axis{Low: 1 / flow.Duration(), High: n / flow.Duration(), Name: "frequency", Unit: "Hz"}
	modulus.x, phase.x = x, x
	modulus.y = chart.Covering("mmHg s/mL", []float64{0}, modulus.tree, modulus.measured)
	phase.y = chart.Covering("deg", phase.tree, phase.measured)
	return modulus, phase
}

// tracePlots are the measured traces over those of the tree, the pressure of the
// fit first.
func tracePlots(t study.Tree) []chart.Plot {
	var out []chart.Plot
	for k, c := range append([]anatomy.Compared{t.Pressure}, t.Distal...) {
		unit := "mmHg"
		seen, predicted := c.Beat.Samples, c.Predicted.Samples
		if !c.IsPressure() {
			unit, seen, predicted = "of mean", overMean(c.Beat), overMean(c.Predicted)
		}
		title := c.Name.String() + ", " + c.Place
		if k > 0 {
			title = c.Name.String() + " (" + string(c.Site) + "), " + c.Place
		}
		out = append(out, chart.Plot{
			Title:  title,
			X:      chart.Axis{Low: 0, High: float64(len(seen)-1) / c.Beat.Rate, Name: "time", Unit: "s"},
			Y:      chart.Covering(unit, seen, predicted),
			Series: []chart.Series{{Name: "measured", Values: seen}, {Name: "tree", Values: predicted}},
		})
	}
	return out
}

// madeLines are how the tree came about, wrapped to the area.
func madeLines(t study.Tree, a tui.Area, theme tui.Theme) []string {
	var out []string
	for _, words := range t.Made() {
		out = append(out, layout.Wrap(layout.Clean(words, theme), a.Width)...)
	}
	return out
}
