package chart

import (
	"strings"

	"afterbeat/data"
)

// frame is how a drawing is divided: labels and axis left of columns, a header
// above lines, marks and x axis below.
type frame struct {
	width, label   int
	columns, lines int
	y              Axis
	ticks          []tick // of y
}

// The least that a curve is drawn in.
const (
	minColumns = 8
	minLines   = 2
)

// frame divides width and height; not ok where that leaves too little.
func (p Plot) frame(width, height int) (f frame, ok bool) {
	f = frame{width: width, y: p.bounds(), lines: height - p.overhead()}
	if f.lines < minLines {
		return f, false
	}
	f.ticks = lineTicks(f.y, f.lines)
	f.label = max(p.LabelWidth, 0)
	for _, k := range f.ticks {
		f.label = max(f.label, len(k.label))
	}
	f.columns = width - f.label - 2
	return f, f.columns >= minColumns
}

// overhead is the number of lines that hold no curve.
func (p Plot) overhead() int {
	n := 1
	if len(p.Marks) > 0 {
		n++
	}
	if !p.noX {
		n += 2
	}
	return n
}

// labelWidth is what the labels of y take in a drawing of this height.
func (p Plot) labelWidth(height int) int {
	f, _ := p.frame(0, height)
	return f.label
}

// write puts the parts together.
func (p Plot) write(f frame, g grid, t Theme) string {
	var b strings.Builder
	b.Grow(4 * f.width * (f.lines + 4))
	p.header(&b, f, t)
	labels := make([]string, f.lines)
	for _, k := range f.ticks {
		labels[f.lines-1-k.at] = k.label
	}
	for line, label := range labels {
		edge := t.pick('│', '|')
		if label != "" {
			edge = t.pick('┤', '+')
		}
		f.side(&b, label, edge)
		g.write(&b, line, t)
	}
	if len(p.Marks) > 0 {
		f.side(&b, "", t.pick('│', '|'))
		b.WriteString(strings.TrimRight(string(p.marks(f.columns, t)), " "))
	}
	if !p.noX {
		p.xAxis(&b, f, t)
	}
	return b.String()
}

// side begins a line: its label and the axis.
func (f frame) side(b *strings.Builder, label string, edge rune) {
	b.WriteByte('\n')
	b.WriteString(strings.Repeat(" ", f.label-len(label)))
	b.WriteString(label)
	b.WriteByte(' ')
	b.WriteRune(edge)
}

// xAxis writes the axis, its labels, and the unit behind the last of them.
func (p Plot) xAxis(b *strings.Builder, f frame, t Theme) {
	ticks := columnTicks(p.X, f.columns)
	axis := []rune(strings.Repeat(string(t.pick('─', '-')), f.columns))
	for _, k := range ticks {
		axis[k.at] = t.pick('┬', '+')
	}
	f.side(b, "", t.pick('└', '+'))
	b.WriteString(string(axis))
	b.WriteByte('\n')
	b.WriteString(f.xLabels(ticks, t.clean(p.X.Unit)))
}

// xLabels centres each label under its tick; one that would touch another is
// left out, the last one stays.
func (f frame) xLabels(ticks []tick, unit data.Text) string {
	if len(ticks) == 0 {
		return ""
	}
	final := ticks[len(ticks)-1]
	text := data.Clean(final.label + " " + unit.String()).Cut(f.width)
	last := max(min(f.column(final), f.width-text.Width()), 0)
	line, end := []byte(strings.Repeat(" ", last)), -1
	for _, k := range ticks[:len(ticks)-1] {
		start := f.column(k)
		if start > end && start+len(k.label) < last {
			end = start + copy(line[start:], k.label)
		}
	}
	return string(line) + text.String()
}

// column of the drawing where the label of an x tick begins.
func (f frame) column(k tick) int { return max(f.label+2+k.at-len(k.label)/2, 0) }

// marks is the row under the curves; a later mark covers an earlier one.
func (p Plot) marks(columns int, t Theme) []rune {
	row := []rune(strings.Repeat(" ", columns))
	if !p.X.valid() {
		return row
	}
	for _, m := range p.Marks {
		char := t.char(m.Char)
		for _, s := range m.Spans {
			if s.From <= p.X.High && s.To >= p.X.Low {
				from, to := p.X.place(s.From, columns), p.X.place(s.To, columns)
				for c := max(from, 0); c <= min(to, columns-1); c++ {
					row[c] = char
				}
			}
		}
		for _, x := range m.At {
			if x >= p.X.Low && x <= p.X.High {
				row[p.X.place(x, columns)] = char
			}
		}
	}
	return row
}
