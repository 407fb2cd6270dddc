package trace

import (
	"math"

	"afterbeat/data"
	"afterbeat/tui"
	"afterbeat/tui/chart"
)

// Source is a uniform trace to look at. Its values are never changed.
type Source struct {
	// ID tells sources apart: other values, grid or marks need another ID.
	ID         string
	Name, Unit string
	Grid       data.Grid
	Values     []float64
	Marks      []chart.Mark
}

// samples that the source has.
func (s Source) samples() int { return len(s.Values) }

// window is a stretch of samples, from <= i < from+n.
type window struct{ from, n int }

// within is the window shortened and moved so that it lies within samples.
func (w window) within(samples int) window {
	w.n = max(min(w.n, samples), min(leastSamples, samples))
	w.from = max(0, min(w.from, samples-w.n))
	return w
}

func (w window) holds(i int) bool { return w.from <= i && i < w.from+w.n }

// leastSamples is the shortest window.
const leastSamples = 16

// order is what a picture is made from.
type order struct {
	id     string
	window window
	area   tui.Area
	theme  tui.Theme
	table  bool
}

// picture is a window made ready to be shown.
type picture struct {
	order   order
	plot    chart.Plot
	columns int
	table   string // where one was ordered
}

// preparedMsg brings a picture.
type preparedMsg struct{ picture picture }

// labelWidth is room for labels such as 120.5, so that another window seldom
// moves the axis.
const labelWidth = 5

// prepare makes the picture.
func (s Source) prepare(o order) picture {
	w := o.window
	values := s.Values[w.from : w.from+w.n]
	p := chart.Plot{
		Title:      s.Name,
		X:          chart.Axis{Low: s.Grid.At(w.from), High: s.Grid.At(w.from + w.n - 1), Name: "time", Unit: "s"},
		Y:          chart.Covering(s.Unit, values),
		LabelWidth: labelWidth,
	}
	if o.table {
		p.Series = []chart.Series{{Name: s.Name, Values: values}}
		return picture{order: o, plot: p, table: p.Table(o.area.Width, o.area.Height, o.theme.Chart())}
	}
	p.Marks = []chart.Mark{{}} // there is always a row of marks, for the cursor
	columns, _ := p.Area(o.area.Width, o.area.Height)
	p.Series = s.series(w, columns)
	p.Marks = append(p.Marks, inColumns(s.Marks, p.X, columns)...)
	return picture{order: o, plot: p, columns: columns}
}

// crowded is the time in a column, s, above which beats cannot be told apart.
const crowded = 0.5

// series are the curve of a window, or, where a column holds too much time for
// a curve, the highest and the lowest value of each column.
func (s Source) series(w window, columns int) []chart.Series {
	if float64(w.n)/float64(max(columns, 1)) < crowded*s.Grid.Rate {
		return []chart.Series{{Values: chart.Columns(s.Values, w.from, w.from+w.n, columns, 0)}}
	}
	low, high := envelope(s.Values[w.from:w.from+w.n], columns)
	return []chart.Series{
		{Values: low, Glyph: chart.Line},
		{Name: "lowest and highest", Values: high, Glyph: chart.Line},
	}
}

// envelope is the lowest and the highest value of each column, by the map of
// package chart; NaN where it has none.
func envelope(values []float64, columns int) (low, high []float64) {
	low, high = chart.Columns(nil, 0, 0, columns, 0), chart.Columns(nil, 0, 0, columns, 0)
	for i, v := range values {
		c := 0
		if len(values) > 1 {
			c = (2*i*(columns-1) + len(values) - 1) / (2 * (len(values) - 1))
		}
		if c >= columns || math.IsNaN(v) {
			continue
		}
		if !(v >= low[c]) {
			low[c] = v
		}
		if !(v <= high[c]) {
			high[c] = v
		}
	}
	return low, high
}

// inColumns keeps of each mark what can be told apart in the columns, so that
// drawing thousands of them costs no more than drawing a row.
func inColumns(marks []chart.Mark, x chart.Axis, columns int) []chart.Mark {
	out := make([]chart.Mark, len(marks))
	if columns < 2 || !(x.High > x.Low) {
		return out
	}
	step := (x.High - x.Low) / float64(columns-1)
	place := func(t float64) float64 { return math.Round((t - x.Low) / step) }
	for k, m := range marks {
		out[k] = chart.Mark{Name: m.Name, Char: m.Char}
		seen := -1.
		for _, t := range m.At {
			if t >= x.Low && t <= x.High && place(t) != seen {
				seen = place(t)
				out[k].At = append(out[k].At, t)
			}
		}
		out[k].Spans = merged(m.Spans, x, place)
	}
	return out
}

// merged joins the spans within x that leave no column between them. They are in
// order of time.
func merged(spans []data.Span, x chart.Axis, place func(float64) float64) []data.Span {
	var out []data.Span
	for _, s := range spans {
		if s.To < x.Low || s.From > x.High {
			continue
		}
		if n := len(out); n > 0 && place(s.From) <= place(out[n-1].To)+1 {
			out[n-1].To = max(out[n-1].To, s.To)
			continue
		}
		out = append(out, s)
	}
	return out
}
