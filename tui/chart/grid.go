package chart

import (
	"math"
	"strings"

	"github.com/guptarohit/asciigraph"
)

// grid is the area between the axes. Line 0 is the uppermost.
type grid struct {
	columns, lines int
	cells          []cell
}

type cell struct {
	char  rune
	ink   ink
	curve bool // belongs to a joined curve
}

func newGrid(columns, lines int) grid {
	g := grid{columns, lines, make([]cell, columns*lines)}
	for k := range g.cells {
		g.cells[k].char = ' '
	}
	return g
}

func (g grid) at(column, line int) *cell { return &g.cells[line*g.columns+column] }

// cursor draws a broken line down a column.
func (g grid) cursor(column int, t Theme) {
	for line := range g.lines {
		*g.at(column, line) = cell{char: t.pick('┊', ':')}
	}
}

// series draws one value a column.
func (g grid) series(values []float64, y Axis, glyph Glyph, t Theme) {
	heights := make([]float64, len(values)+1)
	drawn := false
	for c, v := range values {
		heights[c] = math.NaN()
		switch {
		case !present(v):
		case v > y.High:
			g.dot(c, 0, cell{char: '^', ink: glyph.ink()})
		case v < y.Low:
			g.dot(c, g.lines-1, cell{char: 'v', ink: glyph.ink()})
		default:
			heights[c], drawn = float64(y.place(v, g.lines)), true
		}
	}
	heights[len(values)] = heights[len(values)-1]
	switch {
	case glyph == Dots:
		g.dots(heights[:len(values)])
	case glyph == Points:
		for c, h := range heights[:len(values)] {
			if !math.IsNaN(h) {
				*g.at(c, g.lines-1-int(h)) = cell{char: 'o', curve: true}
			}
		}
	case drawn:
		g.curve(heights, glyph, t)
	}
}

func (g grid) dots(heights []float64) {
	for c, h := range heights {
		if !math.IsNaN(h) {
			g.dot(c, g.lines-1-int(h), cell{char: '.'})
		}
	}
}

// dot draws where no curve is.
func (g grid) dot(column, line int, c cell) {
	if at := g.at(column, line); !at.curve {
		*at = c
	}
}

// curve joins heights, whole numbers of lines above the lowest, by the plotting
// library. Column c shows heights[c] and the way to heights[c+1], so there is
// one height more than columns. The library is told what is certain to be in
// range: bounds 0 and lines-1, which gives it one line a unit; its own axis and
// labels are dropped.
func (g grid) curve(heights []float64, glyph Glyph, t Theme) {
	drawing := asciigraph.Plot(heights,
		asciigraph.Height(g.lines-1), asciigraph.LowerBound(0), asciigraph.UpperBound(float64(g.lines-1)),
		asciigraph.Offset(gutter), asciigraph.YAxisValueFormatter(func(float64) string { return "" }),
		asciigraph.SeriesChars(glyph.charSet(t)))
	column, line := -gutter, 0
	for _, r := range drawing {
		switch {
		case r == '\n':
			column, line = -gutter, line+1
			continue
		case column >= 0 && r != ' ':
			g.put(column, line, cell{r, glyph.ink(), true})
		}
		column++
	}
}

// gutter is how many cells the library draws left of a curve when labels are empty.
const gutter = 2

// shared columns are given to two curves in turns of four, not singly: each
// change of colour costs 11 bytes.
const turn = 4

// put draws a cell of a joined curve. Where an earlier curve is, it takes the
// first of two turns.
func (g grid) put(column, line int, c cell) {
	if at := g.at(column, line); !at.curve || column/turn%2 == 0 {
		*at = c
	}
}

// message writes plain text across the middle, as far as it fits.
func (g grid) message(text string) {
	text = text[:min(len(text), g.columns)]
	for k, r := range text {
		*g.at((g.columns-len(text))/2+k, g.lines/2) = cell{char: r}
	}
}

// write appends a line of the grid, without trailing spaces. An ink lasts over
// spaces, so that a curve costs one escape a line where it is alone.
func (g grid) write(b *strings.Builder, line int, t Theme) {
	cells := g.cells[line*g.columns : (line+1)*g.columns]
	for len(cells) > 0 && cells[len(cells)-1].char == ' ' {
		cells = cells[:len(cells)-1]
	}
	now := plain
	for _, c := range cells {
		if c.char != ' ' && c.ink != now {
			b.WriteString(t.change(now, c.ink))
			now = c.ink
		}
		b.WriteRune(c.char)
	}
	b.WriteString(t.change(now, plain))
}
