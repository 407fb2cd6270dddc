package fit

import (
	"fmt"
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
	for i, r := range d.fit.Results {
		main := d.pressure(title(d.fit, i))
		main.Series = append(main.Series, chart.Series{Name: r.Model.Name, Values: r.Modelled.Samples})
		if !d.plan.stacked {
			out.models = append(out.models, d.alone(main))
			continue
		}
		out.models = append(out.models, d.stacked(chart.Stack{Main: main, Lower: d.residual(r)}))
	}
	return out
}

// title names the load, the model and its place among the models.
func title(f study.Fit, i int) string {
	return fmt.Sprintf("%s (%d of %d)", f.Results[i].Section().Title, i+1, len(f.Results))
}

// pressure is the measured one, within bounds that hold that of every model.
func (d drawing) pressure(title string) chart.Plot {
	p := d.fit.Beats.Pressure.Period
	all := [][]float64{p.Samples}
	for _, r := range d.fit.Results {
		all = append(all, r.Modelled.Samples)
	}
	return chart.Plot{
		Title: title, X: timeAxis(p), Y: chart.Covering("mmHg", all...),
		Series: []chart.Series{{Name: "measured", Values: p.Samples}},
	}
}

// residual is that of a model, within bounds that hold that of every model. It
// is made of dots, of one byte each: a line of Unicode would be most of what a
// step from model to model sends.
func (d drawing) residual(r fitting.Result) chart.Plot {
	var all [][]float64
	for _, other := range d.fit.Results {
		all = append(all, other.Residual)
	}
	return chart.Plot{
		Title: fmt.Sprintf("measured less %s, rms %s mmHg", r.Model.Name, bare(r.RMSE)),
		Y:     chart.Covering("mmHg", all...), Series: []chart.Series{{Values: r.Residual, Glyph: chart.Dots}},
	}
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
