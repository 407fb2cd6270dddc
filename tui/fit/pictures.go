package fit

import (
	"cmp"
	"fmt"
	"math"
	"slices"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/fitting"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/chart"
)

// pictures are the curves of all models and of the flow, drawn within the
// bounds that the models share, so that a step from model to model draws nothing.
type pictures struct {
	items       []string // one a way; the measured pressure alone where there is none
	impedances  []string // one a way
	flow, waves string
}

// picturesMsg brings pictures that were asked for.
type picturesMsg struct {
	request  int
	pictures pictures
}

// prepare asks for the pictures at the present size.
func (m Model) prepare() (tui.Screen, tea.Cmd) {
	m.request++
	if !m.beat() {
		return m, nil
	}
	request, d := m.request, m.drawing()
	draw := func() tea.Msg { return picturesMsg{request: request, pictures: d.pictures()} }
	s, weigh := m.weigh()
	return s, tea.Batch(draw, weigh)
}

// drawing is what pictures are made of.
type drawing struct {
	fit   study.Fit
	items []item
	plan  plan
	theme chart.Theme
	// What all pictures share, so that a step from one to the next moves nothing.
	pressureAxis chart.Axis
	residuals    []chart.Axis // one a result
}

func (m Model) drawing() drawing {
	d := drawing{fit: *m.fit, items: m.items, plan: m.plan(), theme: m.theme.Chart()}
	all := [][]float64{d.fit.Beats.Pressure.Period.Samples}
	for _, r := range d.fit.Results {
		all = append(all, r.Modelled.Samples)
	}
	d.pressureAxis, d.residuals = chart.Covering("mmHg", all...), ranges(d.fit.Results)
	return d
}

func (d drawing) pictures() pictures {
	out := pictures{flow: d.flow(), waves: d.waves(), impedances: d.impedances()}
	for i, one := range d.items {
		out.items = append(out.items, d.item(i, one))
	}
	if len(out.items) == 0 {
		out.items = []string{d.alone(d.pressure("average beat"))}
	}
	return out
}

// title names a way, its place among all, and the load.
func (d drawing) title(i int) string {
	one := d.items[i]
	title := fmt.Sprintf("%s (%d of %d)", one.title(), i+1, len(d.items))
	if one.load != "" {
		title += ", " + one.load
	}
	return title
}

// item draws one way: the pressure that it makes of the flow over the measured
// one, as far as it makes one.
func (d drawing) item(i int, one item) string {
	main := d.pressure(d.title(i))
	if one.fitted() {
		r := d.fit.Results[one.result]
		return d.over(main, r.Model.Name, r.Modelled.Samples, r.Residual, d.residuals[one.result], "")
	}
	modelled, ok := d.fit.Modelled(one.estimate)
	if !ok {
		return d.alone(main)
	}
	measured := d.fit.Beats.Pressure.Period.Samples
	residual := make([]float64, len(measured))
	for j := range residual {
		residual[j] = measured[j] - modelled.Samples[j]
	}
	top := largest(residual)
	return d.over(main, "wk2 of R, C", modelled.Samples, residual, chart.Covering("mmHg", []float64{-top, top}), "")
}

// whatIf draws a fit with an assumption moved, within the bounds of the fit as it
// is.
func (d drawing) whatIf(result int, all []study.WhatIf, i int) string {
	w, was := all[i], d.fit.Results[result]
	main := d.pressure(fmt.Sprintf("WHAT IF %s (%d of %d): %s %s", assumption(w.Sensitivity), i+1, len(all), was.Model.Name, was.Basis))
	top := max(largest(w.Result.Residual), largest(was.Residual))
	return d.over(main, "if so", w.Result.Modelled.Samples, w.Result.Residual, chart.Covering("mmHg", []float64{-top, top}), fmt.Sprintf(", was %s", bare(was.RMSE)))
}

// over draws a modelled pressure over the measured one, and the residual below
// where there is room.
func (d drawing) over(main chart.Plot, name string, modelled, residual []float64, y chart.Axis, was string) string {
	if len(modelled) > 0 { // a load of mean values and a decay has no wave
		main.Series = append(main.Series, chart.Series{Name: name, Values: modelled})
	}
	if !d.plan.stacked || len(residual) == 0 {
		return d.alone(main)
	}
	return d.stacked(chart.Stack{Main: main, Lower: d.residual(residual, y, was)})
}

// labelWidth is room for the labels of any residual but a tiny one, so that a
// step from model to model does not move the picture.
const labelWidth = 5

// pressure is the measured one.
func (d drawing) pressure(title string) chart.Plot {
	p := d.fit.Beats.Pressure.Period
	plot := chart.Plot{Title: title, X: timeAxis(p), Y: d.pressureAxis, LabelWidth: labelWidth}
	if len(p.Samples) == 0 { // a cuff has no wave
		plot.X = timeAxis(d.fit.Beats.Flow.Period)
		return plot
	}
	plot.Series = []chart.Series{{Name: "measured", Values: p.Samples}}
	return plot
}

// residual is what is left over about the line of 0, in the range of its own
// size. It is made of stars and dots, of one byte each: lines of Unicode would be
// most of what a step from one way to the next sends.
func (d drawing) residual(residual []float64, y chart.Axis, was string) chart.Plot {
	square := 0.0
	for _, v := range residual {
		square += v * v
	}
	rms := math.Sqrt(square / float64(max(len(residual), 1)))
	return chart.Plot{
		Title: fmt.Sprintf("measured less that, rms %s%s, maximum %s mmHg", bare(rms), was, bare(largest(residual))),
		Y:     y,
		Series: []chart.Series{
			{Values: make([]float64, len(residual)), Glyph: chart.Dots},
			{Values: residual, Glyph: chart.Stars},
		},
	}
}

// suffices is the part of a range that a residual has to fill, at least, for the
// range to be that of another model too.
const suffices = 0.25

// ranges are those of the residuals, about 0: rounded to steps of 1, 2 or 5 of
// the residual's own size, and the same for models as long as it suffices.
func ranges(results []fitting.Result) []chart.Axis {
	order := make([]int, len(results))
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(i, j int) int {
		return cmp.Compare(largest(results[j].Residual), largest(results[i].Residual))
	})
	out := make([]chart.Axis, len(results))
	var y chart.Axis
	for _, i := range order {
		if top := largest(results[i].Residual); !(top >= suffices*y.High) || y.High == 0 {
			y = chart.Covering("mmHg", []float64{-top, top})
		}
		out[i] = y
	}
	return out
}

// largest is the largest size of a value; 0 where there is none.
func largest(values []float64) float64 {
	top := 0.0
	for _, v := range values {
		if size := math.Abs(v); size > top {
			top = size
		}
	}
	return top
}

func (d drawing) flow() string {
	p := d.fit.Beats.Flow.Period
	return d.alone(chart.Plot{
		Title: "average beat", X: timeAxis(p), Y: chart.Covering(flowUnit(d.fit), p.Samples),
		Series: []chart.Series{{Name: "flow", Values: p.Samples}},
	})
}

// alone draws one plot.
func (d drawing) alone(p chart.Plot) string {
	columns, _ := p.Area(d.plan.width, d.plan.plot)
	p.Series = inColumns(p.Series, columns)
	return p.Draw(d.plan.width, d.plan.plot, d.theme)
}

// stacked draws a plot over its residual.
func (d drawing) stacked(s chart.Stack) string {
	columns, _, _ := s.Area(d.plan.width, d.plan.plot)
	s.Main.Series, s.Lower.Series = inColumns(s.Main.Series, columns), inColumns(s.Lower.Series, columns)
	return s.Draw(d.plan.width, d.plan.plot, d.theme)
}

// inColumns brings the samples of series to one value a column.
func inColumns(series []chart.Series, columns int) []chart.Series {
	out := slices.Clone(series)
	for i := range out {
		out[i].Values = chart.Columns(out[i].Values, 0, len(out[i].Values), columns, 0)
	}
	return out
}

// timeAxis runs over one beat.
func timeAxis(p data.Period) chart.Axis {
	if n := len(p.Samples); n > 1 {
		return chart.Axis{Low: 0, High: float64(n-1) / p.Rate, Name: "time", Unit: "s"}
	}
	return chart.Axis{}
}

// flowUnit is the unit of the average flow.
func flowUnit(f study.Fit) string {
	if f.Beats.FlowInfo.PerArea {
		return "cm/s"
	}
	return "mL/s"
}
