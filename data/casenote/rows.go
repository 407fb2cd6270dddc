package casenote

import "strings"

// The measures of a block of rows, in cells.
const (
	widestLabel   = 30 // beyond it a label wraps
	narrowestWrap = 16 // what a label is left with at least
	widestOrigin  = 9  // "estimated"
	gap           = "  "
)

// grid holds the widths of the columns that rows of numbers line up in:
//
//	label  value unit  95 % interval  origin
type grid struct{ label, value, unit, interval int }

// at is where the value begins, doubt where the interval does.
func (g grid) at() int    { return g.label + len(gap) }
func (g grid) doubt() int { return g.at() + g.value + 1 + g.unit + len(gap) }

// rows writes labelled lines: numbers in columns, or each as a sentence where
// the columns would not fit, words wrapped beside their label.
func (r *renderer) rows(list []Row) {
	labels := make([]string, len(list))
	for i, row := range list {
		labels[i] = r.text(row.Label)
	}
	g, ok := r.measure(list)
	g.label = min(widest(labels), widestLabel)
	if spare := columns - (g.doubt() - g.label) - g.interval - len(gap) - widestOrigin; ok {
		ok = spare >= min(g.label, narrowestWrap)
		g.label = min(g.label, max(spare, narrowestWrap))
	}
	headed := false
	for i, row := range list {
		label := hang(labels[i], g.label)
		switch {
		case row.Number == nil:
			r.words(label, r.text(row.Words.String()), g.at())
		case ok && row.Number.inColumns():
			if !headed {
				r.line(blanks(g.at()) + g.line("value", "unit", "95 % interval", "origin"))
				headed = true
			}
			r.put(beside(label, r.inGrid(*row.Number, g), g.at()))
		default:
			r.put(beside(label, hang(r.text(row.Number.String()), columns-g.at()), g.at()))
		}
	}
}

// words writes words beside their label; below it, where that spares a long
// word, such as a checksum, from being broken.
func (r *renderer) words(label []string, text string, at int) {
	const indent = "  "
	longest := widest(strings.Split(text, " "))
	if longest <= columns-at || longest > columns-len(indent) {
		r.put(beside(label, wrap(text, columns-at), at))
		return
	}
	r.put(label)
	for _, s := range wrap(text, columns-len(indent)) {
		r.line(indent + s)
	}
}

// inColumns tells whether there is a value to stand in a column.
func (n Number) inColumns() bool { return n.Identified && !n.undefined() }

// measure gives the columns that the numbers need; false where there are none.
func (r *renderer) measure(list []Row) (grid, bool) {
	g := grid{value: len("value"), unit: len("unit"), interval: len("95 % interval")}
	any := false
	for _, row := range list {
		if row.Number == nil || !row.Number.inColumns() {
			continue
		}
		n := *row.Number
		any = true
		g.value = max(g.value, width(Format(n.Value, n.Total)))
		g.unit = max(g.unit, width(r.text(n.Unit)))
		g.interval = max(g.interval, width(n.interval()))
		if random := n.random(); random != "" {
			g.interval = max(g.interval, width("random "+random)-len(gap)-widestOrigin)
		}
	}
	return g, any
}

// line lines up the parts of a number.
func (g grid) line(value, unit, interval, origin string) string {
	return flush(value, g.value) + " " + pad(unit, g.unit) + gap + pad(interval, g.interval) + gap + origin
}

// inGrid writes a number in columns; below its interval stands the random one,
// where it differs, or the reason why there is none.
func (r *renderer) inGrid(n Number, g grid) []string {
	lines := []string{g.line(Format(n.Value, n.Total), r.text(n.Unit), n.interval(), n.origin())}
	var below []string
	switch random := n.random(); {
	case random != "":
		below = []string{"random " + random}
	case !n.Total.Defined() && n.Why != "":
		below = wrap(r.text("("+n.Why+")"), columns-g.doubt())
	}
	for _, s := range below {
		lines = append(lines, strings.Repeat(" ", g.doubt()-g.at())+s)
	}
	return lines
}
