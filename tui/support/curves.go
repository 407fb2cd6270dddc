package support

import (
	"math"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/data/unit"
	"afterbeat/tree/study"
	"afterbeat/tree/support"
	"afterbeat/tui"
	"afterbeat/tui/chart"
	"afterbeat/tui/layout"
)

// curves is everything that is drawn, one value a column.
type curves struct {
	ready          bool
	pressure, flow traces
	sweeps         [3]lines // by quantity
	held           []string // the page of what is held equal
	coupled        coupledCurves
}

// traces are the waves of all states in bounds that they share.
type traces struct {
	name      string
	x, y      chart.Axis
	native    []float64
	supported [][][]float64 // [answer][state]
}

// quantity is what is drawn against the share.
type quantity int

const (
	retainedPulse quantity = iota
	retainedFlow
	pulsatilePower
)

// lines are a quantity against the share, one line a posing.
type lines struct {
	y    chart.Axis
	each [][]float64 // [answer]
}

// curvesMsg brings curves that were asked for.
type curvesMsg struct {
	request int
	curves  curves
}

// prepare asks for the curves at the present size.
func (m Model) prepare() (tui.Screen, tea.Cmd) {
	m.request++
	if !m.there() {
		return m, nil
	}
	c, f, request, p, area, theme := *m.comparison, m.forecast, m.request, m.plan(), m.area, m.theme
	return m, func() tea.Msg {
		all := curves{
			ready:    true,
			pressure: tracesOf(c, p, "pressure", "mmHg", func(s support.State) data.Period { return s.Pressure }),
			flow:     tracesOf(c, p, "flow", flowUnit(c), func(s support.State) data.Period { return s.Flow }),
			held:     heldLines(c, area, theme),
		}
		for q := range all.sweeps {
			all.sweeps[q] = linesOf(c, p, quantity(q))
		}
		if f != nil {
			all.coupled = coupledCurvesOf(f, p, area, theme)
		}
		return curvesMsg{request: request, curves: all}
	}
}

// tracesOf brings one signal of all states to the columns of a plan.
func tracesOf(c study.Comparison, p plan, name, unit string, of func(support.State) data.Period) traces {
	var supported [][]data.Period
	for _, a := range c.Answers {
		var states []data.Period
		for _, s := range a.Supported {
			states = append(states, of(s))
		}
		supported = append(supported, states)
	}
	return overlaid(name+" of "+c.Fit.Results[c.Fit.Chosen].Model.Name, unit, p, of(c.Native), supported)
}

// overlaid brings native and supported waves to the columns of a plan, in bounds
// that hold them all.
func overlaid(name, unit string, p plan, native data.Period, supported [][]data.Period) traces {
	all := [][]float64{native.Samples}
	for _, states := range supported {
		for _, s := range states {
			all = append(all, s.Samples)
		}
	}
	t := traces{
		name: name, y: chart.Covering(unit, all...),
		x: chart.Axis{Low: 0, High: float64(len(native.Samples)-1) / native.Rate, Name: "time", Unit: "s"},
	}
	columns, _ := t.plot("").Area(p.width, p.plot)
	t.native = columnsOf(native.Samples, columns)
	for _, states := range supported {
		var drawn [][]float64
		for _, s := range states {
			drawn = append(drawn, columnsOf(s.Samples, columns))
		}
		t.supported = append(t.supported, drawn)
	}
	return t
}

func columnsOf(samples []float64, columns int) []float64 {
	return chart.Columns(samples, 0, len(samples), columns, 0)
}

// plot is the frame of the waves.
func (t traces) plot(title string) chart.Plot {
	return chart.Plot{Title: title, X: t.x, Y: t.y}
}

// linesOf joins the states of each posing by straight lines over the share.
func linesOf(c study.Comparison, p plan, q quantity) lines {
	y := [][]float64{}
	for _, a := range c.Answers {
		_, values := points(a, q)
		y = append(y, values)
	}
	l := lines{y: chart.Covering(q.unit(c), append(y, []float64{0})...)}
	columns, _ := frame(l.y).Area(p.sweep(q), p.picture-1)
	for i, a := range c.Answers {
		shares, _ := points(a, q)
		l.each = append(l.each, joined(shares, y[i], chart.Axis{Low: 0, High: 1}, columns))
	}
	return l
}

// points are the shares and the values of a quantity, the native state first.
func points(a support.Answer, q quantity) (shares, values []float64) {
	for i, s := range a.Supported {
		if i == 0 && s.Share > 0 {
			shares, values = append(shares, 0), append(values, q.native(a))
		}
		shares, values = append(shares, s.Share), append(values, q.of(a, i).Value)
	}
	return shares, values
}

// of is the quantity of one state.
func (q quantity) of(a support.Answer, state int) data.Estimate {
	switch q {
	case retainedFlow:
		return a.Comparisons[state].RetainedFlow
	case pulsatilePower:
		return milliwatt(a.Supported[state].PulsatilePower)
	}
	return a.Comparisons[state].RetainedPressure
}

func (q quantity) native(a support.Answer) float64 {
	if q == pulsatilePower {
		return milliwatt(a.Native.PulsatilePower).Value
	}
	return 1
}

func (q quantity) unit(c study.Comparison) string {
	if q == pulsatilePower {
		return powerUnit(c)
	}
	return ""
}

func (q quantity) title() string {
	return [...]string{"retained pulse of pressure", "retained swing of flow", "pulsatile power into the arteries"}[q]
}

// frame is that of a quantity over the share.
func frame(y chart.Axis) chart.Plot {
	return chart.Plot{X: chart.Axis{Low: 0, High: 1, Name: "share"}, Y: y}
}

// joined puts straight lines through points of rising x, one value a column of
// the axis; columns outside of them have none.
func joined(x, y []float64, axis chart.Axis, columns int) []float64 {
	out := make([]float64, max(columns, 0))
	for c := range out {
		out[c] = math.NaN()
		at := axis.Low + (axis.High-axis.Low)*float64(c)/float64(max(columns-1, 1))
		for i := 1; i < len(x); i++ {
			if at >= x[i-1] && at <= x[i] {
				out[c] = y[i-1] + (y[i]-y[i-1])*(at-x[i-1])/(x[i]-x[i-1])
			}
		}
	}
	return out
}

// milliwatt turns a power into the unit in print.
func milliwatt(e data.Estimate) data.Estimate {
	return scaledBy(e, unit.MilliwattPerMmHgMLPerS)
}

func flowUnit(c study.Comparison) string {
	if c.Answers[0].PerArea {
		return "cm/s"
	}
	return "mL/s"
}

func powerUnit(c study.Comparison) string {
	if c.Answers[0].PerArea {
		return "mW/cm2"
	}
	return "mW"
}

// heldLines is what is held equal, wrapped to the area.
func heldLines(c study.Comparison, a tui.Area, t tui.Theme) []string {
	section := c.Answers[0].HeldSection()
	out := []string{section.Title, ""}
	for _, r := range section.Rows {
		words := r.Words.String()
		if r.Number != nil {
			words = heldWords(*r.Number)
		}
		for k, line := range layout.Wrap(layout.Clean(words, t), a.Width-heldLabel) {
			label := ""
			if k == 0 {
				label = r.Label
			}
			out = append(out, layout.Pad(layout.Clean(label, t), heldLabel)+line)
		}
	}
	for _, w := range section.Words {
		out = append(out, "")
		out = append(out, layout.Wrap(layout.Clean(w.String(), t), a.Width)...)
	}
	return out
}

const heldLabel = 28

// heldWords is a number that is held, with its origin.
func heldWords(n casenote.Number) string {
	s := casenote.Format(n.Value, data.NoInterval()) + " " + n.Unit
	return s + ", " + string(n.Origin)
}
