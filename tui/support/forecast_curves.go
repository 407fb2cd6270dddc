package support

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casenote"
	"afterbeat/tree/study"
	"afterbeat/tree/support"
	"afterbeat/tui"
	"afterbeat/tui/chart"
	"afterbeat/tui/layout"
)

// coupledCurves is everything of the forecast that is drawn or paged through.
type coupledCurves struct {
	pressure, flow           traces
	sweeps                   [2]speedLines // pressures, then flows
	measures                 []waveMeasures
	held, depends, ventricle []string
}

// waveMeasures are those of a state, the native one first.
type waveMeasures struct{ pressure, flow beat.Measures }

// speedLines are two quantities against the speed.
type speedLines struct {
	names [2]string
	y     chart.Axis
	each  [2][]float64
}

func coupledCurvesOf(f *study.Forecast, p plan, a tui.Area, t tui.Theme) coupledCurves {
	model := f.Comparison.Fit.Results[f.Comparison.Fit.Chosen].Model.Name
	wave := func(name, unit string, of func(support.Waves) data.Period) traces {
		var states []data.Period
		for _, s := range f.Speeds {
			states = append(states, of(s.Waves))
		}
		return overlaid(name+", coupled to "+model, unit, p, of(f.Native.Waves), [][]data.Period{states})
	}
	c := coupledCurves{
		pressure: wave("pressure", "mmHg", func(w support.Waves) data.Period { return w.Pressure }),
		flow:     wave("flow", "mL/s", func(w support.Waves) data.Period { return w.RootFlow }),
		held:     heldPage(f, a, t), depends: dependsPage(f, a, t), ventricle: ventriclePage(f, a, t),
	}
	c.sweeps[0] = speedLinesOf(f, p, "mmHg", "mean pressure", "pulse pressure",
		func(s *study.ForecastState) float64 { return s.MeanPressure.Value },
		func(s *study.ForecastState) float64 { return s.PulsePressure.Value })
	c.sweeps[1] = speedLinesOf(f, p, "L/min", "output", "pump flow",
		func(s *study.ForecastState) float64 { return litresPerMinute * s.Output.Value },
		func(s *study.ForecastState) float64 { return litresPerMinute * s.PumpFlow.Mean })
	for _, s := range append([]study.ForecastState{f.Native}, f.Speeds...) {
		c.measures = append(c.measures, waveMeasures{measured(s.Waves.Pressure), measured(s.Waves.RootFlow)})
	}
	return c
}

// measured are the measures of a wave; of one without samples there are none.
func measured(p data.Period) beat.Measures {
	if len(p.Samples) == 0 {
		return beat.Measures{}
	}
	return beat.Measure(p)
}

// speedAxis holds all speeds.
func speedAxis(f *study.Forecast) chart.Axis {
	x := chart.Axis{Low: f.Speeds[0].Speed, High: f.Speeds[len(f.Speeds)-1].Speed, Name: "speed", Unit: "1000/min"}
	if x.Low == x.High {
		x.Low, x.High = x.Low-0.5, x.High+0.5
	}
	return x
}

func speedLinesOf(f *study.Forecast, p plan, unit, first, second string, of ...func(*study.ForecastState) float64) speedLines {
	var x []float64
	var y [2][]float64
	for i := range f.Speeds {
		x = append(x, f.Speeds[i].Speed)
		for k := range y {
			y[k] = append(y[k], of[k](&f.Speeds[i]))
		}
	}
	l := speedLines{names: [2]string{first, second}, y: chart.Covering(unit, y[0], y[1], []float64{0})}
	columns, _ := l.frame(f, 0).Area(p.sweepWidth(), p.picture-1)
	for k := range y {
		if l.each[k] = joined(x, y[k], speedAxis(f), columns); len(x) == 1 && columns > 0 {
			l.each[k][(columns-1)/2] = y[k][0]
		}
	}
	return l
}

// frame has the valve limit as a broken line, where the valve stays shut below the
// curves, and the speed shown.
func (l speedLines) frame(f *study.Forecast, at int) chart.Plot {
	x := speedAxis(f)
	shut := chart.Mark{Name: "valve shut", Char: '='}
	plot := chart.Plot{X: x, Y: l.y}
	if limit := f.ValveLimit.Value; limit <= x.High {
		plot.Cursors = []float64{limit}
		shut.Spans = []data.Span{{From: max(limit, x.Low), To: x.High}}
	}
	plot.Marks = []chart.Mark{shut, {Name: "shown", Char: '^', At: []float64{f.Speeds[at].Speed}}}
	return plot
}

// sweepWidth is the cells of a picture over the speed.
func (p plan) sweepWidth() int {
	if p.width < speedBeside {
		return p.width
	}
	return p.width - speedCells - 2
}

// speedBeside is the width from which the table over the speed stands beside its
// picture, speedCells the width of the table.
const (
	speedCells  = 79
	speedBeside = speedCells + 52
)

// coupledPicture draws the waves or the sweep of the forecast.
func (m Model) coupledPicture(p plan) string {
	switch m.viewing() {
	case waves:
		return m.coupledWaves(p)
	case sweep:
		return m.overSpeed(p)
	}
	return ""
}

func (m Model) coupledWaves(p plan) string {
	unit := "mmHg"
	t, of := m.curves.coupled.pressure, func(w support.Waves) data.Period { return w.Pressure }
	if m.flow {
		unit = "mL/s"
		t, of = m.curves.coupled.flow, func(w support.Waves) data.Period { return w.RootFlow }
	}
	plot := t.plot(t.name)
	if m.table {
		plot.Series = []chart.Series{{Name: "native", Values: of(m.forecast.Native.Waves).Samples}, {Name: "supported", Values: of(m.now().Waves).Samples}}
		return plot.Table(p.width, p.plot, m.theme.Chart())
	}
	plot.Series = []chart.Series{{Name: "native", Values: t.native}, {Name: "supported", Values: t.supported[0][m.at]}}
	return m.withMoved(plot, p, unit, of).Draw(p.width, p.plot, m.theme.Chart())
}

// overSpeed draws two quantities over the speed, below the line of words on the
// valve limit.
func (m Model) overSpeed(p plan) string {
	l := m.curves.coupled.sweeps[0]
	if m.flow {
		l = m.curves.coupled.sweeps[1]
	}
	plot := l.frame(m.forecast, m.at)
	for k, name := range l.names {
		plot.Series = append(plot.Series, chart.Series{Name: name, Values: l.each[k]})
	}
	return plot.Draw(p.sweepWidth(), p.picture-1, m.theme.Chart())
}

// coupledSweep is the valve limit in words, and pressures or flows over the speed
// as a picture or a table, or both beside one another.
func (m Model) coupledSweep(lines int) []string {
	if lines < 2 {
		return nil
	}
	head := layout.Wrap(layout.Clean(m.limitWords(), m.theme), m.area.Width)[:1]
	picture := layout.Lines(m.picture, lines-1)
	switch {
	case m.area.Width >= speedBeside:
		return append(head, layout.Beside(picture, m.speedTable(lines-1), m.plan().sweepWidth()+2)...)
	case m.table:
		return append(head, m.speedTable(lines-1)...)
	}
	return append(head, picture...)
}

// limitWords say at which speed the valve begins to stay shut.
func (m Model) limitWords() string {
	e := m.forecast.ValveLimit
	if math.IsNaN(e.Value) {
		return "no valve limit: " + e.Why
	}
	words := "valve limit, the lowest speed with it shut: "
	if m.area.Width < besideWidth {
		words = "valve limit "
	}
	return words + fullEstimate(e) + ", 1000/min"
}

// speedTable has every speed, the native state of the model first.
func (m Model) speedTable(lines int) []string {
	row := func(cursor, speed, pulse, mean, output, valve string) string {
		cell := func(s string, n int) string { return layout.Pad(layout.Clean(s, m.theme), n) }
		if m.area.Width < besideWidth {
			return cursor + layout.PadLeft(data.Clean(speed), 7) + "  " + cell(pulse, 21) + " " + cell(mean, 21) + " " + cell(valve, 5)
		}
		return cursor + layout.PadLeft(data.Clean(speed), 7) + "  " + cell(pulse, 20) + " " + cell(mean, 22) + " " + cell(output, 19) + " " + cell(valve, 5)
	}
	of := func(cursor, speed string, s *study.ForecastState) string {
		valve := "shut"
		if s.ValveOpened {
			valve = "opens"
		}
		return row(cursor, speed, estimate(s.PulsePressure), estimate(s.MeanPressure), estimate(scaledBy(s.Output, litresPerMinute)), valve)
	}
	out := []string{row(" ", "speed", "pulse pressure, mmHg", "mean, mmHg", "output, L/min", "valve"), of(" ", "native", &m.forecast.Native)}
	from, to := around(m.at, m.count(), lines-len(out))
	for i := from; i < to; i++ {
		cursor := " "
		if i == m.at {
			cursor = ">"
		}
		out = append(out, of(cursor, share(m.forecast.Speeds[i].Speed), &m.forecast.Speeds[i]))
	}
	return out[:min(len(out), max(lines, 0))]
}

// plain is a number without doubt of its own.
func plain(v float64) string { return casenote.Format(v, data.NoInterval()) }

// plus is a difference with its sign.
func plus(v float64) string { return fmt.Sprintf("%+.3f", v) }
