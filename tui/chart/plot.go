package chart

import (
	"strings"

	"afterbeat/data"
)

// Plot is some series over one x axis, with what is marked on it.
type Plot struct {
	Title  string
	Series []Series // a later one is drawn over an earlier one
	X, Y   Axis
	// LabelWidth is the least width of the labels of y, in cells. Plots to be
	// compared share it, their bounds and their x axis (see [Alike]). Labels
	// that need more get more.
	LabelWidth int
	Marks      []Mark    // one row under the curves, there if there is any Mark, even an empty one
	Cursors    []float64 // x of broken lines from top to bottom

	noX bool // another plot below has the x axis
}

// Series is one curve.
type Series struct {
	Name string // in the legend; without a name it is not there
	// Values, the first at X.Low and the last at X.High: one a column, from
	// [Columns] and [Plot.Area]. Any other number is brought to columns at each
	// drawing, without bridging a hole. What Columns takes as missing is a gap.
	Values []float64
	Glyph  Glyph
}

// Mark is a kind of place or stretch that the row under the curves shows: the
// onsets of beats, what is unusable.
type Mark struct {
	Name  string // in the legend
	Char  rune
	At    []float64   // single x
	Spans []data.Span // stretches of x
}

const noData = "no data in this window"

// Draw draws the plot in exactly height lines, joined by newlines, of at most
// width cells: title and legend, the curves, the marks, the x axis and its
// labels. Without any value that can be drawn the frame says so; where not even
// eight columns and two lines are left for the curves, a notice stands in its
// place. It takes well under a millisecond when the series hold one value a
// column.
func (p Plot) Draw(width, height int, t Theme) string {
	f, ok := p.frame(width, height)
	if !ok {
		return notice("too small for a plot", width, height)
	}
	g := newGrid(f.columns, f.lines)
	if p.X.valid() {
		for _, x := range p.Cursors {
			if p.X.Low <= x && x <= p.X.High {
				g.cursor(p.X.place(x, f.columns), t)
			}
		}
	}
	if p.empty() {
		g.message(noData)
	}
	for k, s := range p.Series {
		if f.y.valid() {
			g.series(s.columns(f.columns), f.y, s.Glyph.of(k), t)
		}
	}
	return p.write(f, g, t)
}

// Area is how many columns and lines of a drawing of this size are left for the
// curves; 0, 0 where there is no room.
func (p Plot) Area(width, height int) (columns, lines int) {
	f, ok := p.frame(width, height)
	if !ok {
		return 0, 0
	}
	return f.columns, f.lines
}

// Alike gives the plots the y bounds that hold those of all, and one width of
// labels, so that they can be compared when drawn in the same height.
func Alike(height int, plots ...Plot) []Plot {
	var bounds []float64
	for _, p := range plots {
		if y := p.bounds(); y.valid() {
			bounds = append(bounds, y.Low, y.High)
		}
	}
	shared := Covering("", bounds)
	alike, labels := make([]Plot, len(plots)), 0
	for k, p := range plots {
		if shared.valid() {
			p.Y.Low, p.Y.High = shared.Low, shared.High
		}
		alike[k], labels = p, max(labels, p.labelWidth(height))
	}
	for k := range alike {
		alike[k].LabelWidth = labels
	}
	return alike
}

func (p Plot) empty() bool {
	for _, s := range p.Series {
		for _, v := range s.Values {
			if present(v) {
				return false
			}
		}
	}
	return true
}

// bounds is the y axis as given, or else the one that covers the series.
func (p Plot) bounds() Axis {
	if p.Y.valid() {
		return p.Y
	}
	var traces [][]float64
	for _, s := range p.Series {
		traces = append(traces, s.Values)
	}
	return Covering(p.Y.Unit, traces...)
}

// columns is one value a column.
func (s Series) columns(n int) []float64 {
	if len(s.Values) == n {
		return s.Values
	}
	return Columns(s.Values, 0, len(s.Values), n, 0)
}

// notice is a message alone in an area of the size asked for.
func notice(message string, width, height int) string {
	lines := make([]string, max(height, 1))
	lines[len(lines)/2] = strings.TrimRight(message[:min(max(width, 0), len(message))], " ")
	return strings.Join(lines, "\n")
}
