package beats

import (
	"math"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tui"
	"afterbeat/tui/chart"
)

// order is what an overlay is made from.
type order struct {
	number, signal int
	area           tui.Area
	theme          tui.Theme
	table          bool
}

// overlay is the average beat over the beats it was made of, ready to be drawn.
type overlay struct {
	order   order
	plot    chart.Plot
	columns int
	table   string
}

// overlayMsg brings an overlay.
type overlayMsg struct{ overlay overlay }

func overlaid(o order, s signal) tea.Cmd {
	return func() tea.Msg { return overlayMsg{makeOverlay(o, s)} }
}

func makeOverlay(o order, s signal) overlay {
	p := chart.Plot{
		Title:      s.averageTitle(),
		X:          chart.Axis{Low: 0, High: float64(len(s.average.Period.Samples)-1) / s.average.Period.Rate, Name: "time", Unit: "s"},
		Y:          chart.Covering(s.unit, append([][]float64{s.average.Period.Samples}, s.cloud...)...),
		LabelWidth: 5,
	}
	average := chart.Series{Name: "average", Values: s.average.Period.Samples, Glyph: chart.Line}
	if o.table {
		p.Series = []chart.Series{average}
		return overlay{order: o, table: p.Table(o.area.Width, o.area.Height, o.theme.Chart())}
	}
	columns, lines := p.Area(o.area.Width, o.area.Height)
	average.Values = chart.Columns(average.Values, 0, len(average.Values), columns, 0)
	p.Series = append(cloud(s.cloud, p.Y, columns, lines), average)
	return overlay{order: o, plot: p, columns: columns}
}

// averageTitle names what is averaged; of a velocity, that it is a flow.
func (s signal) averageTitle() string {
	if s.diameter != "" {
		return "average " + s.role + ", from velocity"
	}
	return "average " + s.role
}

// cloud is the beats as dots, each cell of the plot that any of them comes
// through once: as many series as one column has such cells. It draws the same
// as all the beats would, and hundreds of them cost no more than a few.
func cloud(beats [][]float64, y chart.Axis, columns, lines int) []chart.Series {
	if columns < 1 || lines < 2 || !(y.High > y.Low) {
		return nil
	}
	hit := make([]bool, columns*lines)
	for _, b := range beats {
		for c, v := range chart.Columns(b, 0, len(b), columns, 0) {
			if l := math.Round((v - y.Low) / (y.High - y.Low) * float64(lines-1)); l >= 0 && l < float64(lines) {
				hit[c*lines+int(l)] = true
			}
		}
	}
	var out []chart.Series
	for c := range columns {
		k := 0
		for l := range lines {
			if !hit[c*lines+l] {
				continue
			}
			if k == len(out) {
				out = append(out, chart.Series{Values: chart.Columns(nil, 0, 0, columns, 0), Glyph: chart.Dots})
			}
			out[k].Values[c] = y.Low + (y.High-y.Low)*float64(l)/float64(lines-1)
			k++
		}
	}
	if len(out) > 0 {
		out[0].Name = "beats"
	}
	return out
}

// with is the plot with the beat under the cursor drawn over it, brought to the
// length of the average.
func (o overlay) with(s signal, beat int, name string) chart.Plot {
	p := o.plot
	if beat < 0 || beat >= len(s.beats) || o.columns < 1 {
		return p
	}
	b := s.beats[beat]
	values := chart.Columns(s.source.Values, b.From, b.To, o.columns, 0)
	for i := range values {
		values[i] *= s.gain
	}
	// below the average, above the cloud
	last := len(p.Series) - 1
	series := append(p.Series[:last:last], chart.Series{Name: name, Values: values, Glyph: chart.Stars}, p.Series[last])
	p.Series = series
	return p
}
