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
	models []string // one a result; the measured pressure alone where there is none
	flow   string
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
	request, d := m.request, newDrawing(*m.fit, m.plan(), m.theme)
	return m, func() tea.Msg {
		return picturesMsg{request: request, pictures: d.pictures()}
	}
}

// drawing is what pictures are made of.
type drawing struct {
	fit   study.Fit
	plan  plan
	theme chart.Theme
}

func newDrawing(f study.Fit, p plan, t tui.Theme) drawing {
	return drawing{fit: f, plan: p, theme: t.Chart()}
}

func (d drawing) pictures() pictures {
	out := pictures{flow: d.flow()}
	if len(d.fit.Results) == 0 {
		out.models = []string{d.alone(d.pressure("average beat"))}
	}
	y := ranges(d.fit.Results)
	for i, r := range d.fit.Results {
		main := d.pressure(title(d.fit, i))
		main.Series = append(main.Series, chart.Series{Name: r.Model.Name, Values: r.Modelled.Samples})
		if !d.plan.stacked {
			out.models = append(out.models, d.alone(main))
			continue
		}
		out.models = append(out.models, d.stacked(chart.Stack{Main: main, Lower: d.residual(r, y[i])}))
	}
	return out
}

// title names the load, the model and its place among the models.
func title(f study.Fit, i int) string {
	return fmt.Sprintf("%s (%d of %d)", f.Results[i].Section().Title, i+1, len(f.Results))
}

// labelWidth is room for the labels of any residual but a tiny one, so that a
// step from model to model does not move the picture.
const labelWidth = 5

// pressure is the measured one, within bounds that hold that of every model.
func (d drawing) pressure(title string) chart.Plot {
	p := d.fit.Beats.Pressure.Period
	all := [][]float64{p.Samples}
	for _, r := range d.fit.Results {
		all = append(all, r.Modelled.Samples)
	}
	return chart.Plot{
		Title: title, X: timeAxis(p), Y: chart.Covering("mmHg", all...), LabelWidth: labelWidth,
		Series: []chart.Series{{Name: "measured", Values: p.Samples}},
	}
}

// residual is that of a model about the line of 0, in the range of its own size.
// It is made of stars and dots, of one byte each: lines of Unicode would be most
// of what a step from model to model sends.
func (d drawing) residual(r fitting.Result, y chart.Axis) chart.Plot {
	zero := make([]float64, len(r.Residual))
	return chart.Plot{
		Title: fmt.Sprintf("measured less %s, rms %s, maximum %s mmHg", r.Model.Name, bare(r.RMSE), bare(largest(r.Residual))),
		Y:     y,
		Series: []chart.Series{
			{Values: zero, Glyph: chart.Dots},
			{Values: r.Residual, Glyph: chart.Stars},
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
