package chart

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"afterbeat/data"
)

// Table is the plot in words, for people who cannot use the picture, in exactly
// height lines of at most width cells: a title, the heads of the columns, as
// many rows as fit, and the extremes of each series. The numbers are the
// values of the series and nothing between them; so give it the samples
// themselves rather than columns. The longest series sets the rows, evenly
// spread over its samples from the first to the last; of another length the
// sample nearest in x is shown. A missing value is the word none.
func (p Plot) Table(width, height int, t Theme) string {
	samples := p.longest()
	rows := min(height-2-len(p.Series), samples)
	switch {
	case p.empty():
		return notice(noData, width, height)
	case rows < 1:
		return notice("too small for a table", width, height)
	}
	title := fmt.Sprintf("%d of %d samples", rows, samples)
	if p.Title != "" {
		title = p.Title + ": " + title
	}
	lines := []string{t.clean(title).Cut(width).String()}
	lines = append(lines, aligned(p.cells(rows, samples, t), width)...)
	for k, s := range p.Series {
		lines = append(lines, t.clean(p.extremesOf(k, s)).Cut(width).String())
	}
	return strings.Join(lines, "\n") + strings.Repeat("\n", height-len(lines))
}

func (p Plot) longest() int {
	n := 0
	for _, s := range p.Series {
		n = max(n, len(s.Values))
	}
	return n
}

// cells are the heads and the rows of the table.
func (p Plot) cells(rows, samples int, t Theme) [][]data.Text {
	head := []data.Text{t.clean(p.xHead())}
	for k, s := range p.Series {
		head = append(head, t.clean(headed(p.nameOf(k, s), p.Y.Unit)))
	}
	table := [][]data.Text{head}
	writeX, writeY := p.xFormat(samples), p.yFormat()
	for r := range rows {
		i := nearest(r, rows, samples)
		row := []data.Text{data.Clean(writeX(i))}
		for _, s := range p.Series {
			row = append(row, data.Clean(writeY(s.at(i, samples))))
		}
		table = append(table, row)
	}
	return table
}

// nearest is the element of n that stands where element r of rows does.
func nearest(r, rows, n int) int {
	if rows < 2 {
		return 0
	}
	return int(math.Round(float64(r) * float64(n-1) / float64(rows-1)))
}

// at is the value nearest in x to sample i of n.
func (s Series) at(i, n int) float64 {
	if len(s.Values) == 0 {
		return math.NaN()
	}
	return s.Values[nearest(i, n, len(s.Values))]
}

func headed(name, unit string) string {
	if unit == "" {
		return name
	}
	return strings.TrimSpace(fmt.Sprintf("%s (%s)", name, unit))
}

func (p Plot) xHead() string {
	if !p.X.valid() {
		return "sample"
	}
	return headed(p.X.Name, p.X.Unit)
}

// nameOf is the name of series k, counted from 0, or a number where it has none.
func (p Plot) nameOf(k int, s Series) string {
	if s.Name == "" {
		return fmt.Sprintf("series %d", k+1)
	}
	return s.Name
}

// xFormat writes the x of sample i of n, with decimals enough to tell the
// samples apart; the number of the sample where there is no x axis.
func (p Plot) xFormat(n int) func(i int) string {
	if !p.X.valid() || n < 2 {
		return strconv.Itoa
	}
	write := formatter(p.X, coarsest(p.X.High-p.X.Low, 2*(n-1)))
	return func(i int) string {
		return write(p.X.Low + (p.X.High-p.X.Low)*float64(i)/float64(n-1))
	}
}

// yFormat writes values to a five-hundredth of their range or better.
func (p Plot) yFormat() func(float64) string {
	p.Y = Axis{}
	y := p.bounds()
	write := formatter(y, coarsest(y.High-y.Low, 500))
	return func(v float64) string {
		if !present(v) {
			return "none"
		}
		return write(v)
	}
}

// extremesOf says the smallest and the largest value of series k, and where.
func (p Plot) extremesOf(k int, s Series) string {
	name := p.nameOf(k, s)
	low, high, ok := extremes(s.Values)
	if !ok {
		return name + ": " + noData
	}
	writeX, writeY := p.xFormat(len(s.Values)), p.yFormat()
	place := func(i int) string {
		if !p.X.valid() {
			return "sample " + writeX(i)
		}
		return writeX(i) + " " + p.X.Unit
	}
	return fmt.Sprintf("%s: lowest %s %s at %s, highest %s %s at %s", name,
		writeY(s.Values[low]), p.Y.Unit, place(low), writeY(s.Values[high]), p.Y.Unit, place(high))
}

// aligned sets columns flush right, two spaces apart.
func aligned(table [][]data.Text, width int) []string {
	widths := make([]int, len(table[0]))
	for _, row := range table {
		for c, text := range row {
			widths[c] = max(widths[c], text.Width())
		}
	}
	lines := make([]string, len(table))
	for k, row := range table {
		var b strings.Builder
		l := line{b: &b, left: width}
		for c, text := range row {
			l.space(widths[c] - text.Width() + min(2*c, 2))
			l.text(text)
		}
		lines[k] = b.String()
	}
	return lines
}
