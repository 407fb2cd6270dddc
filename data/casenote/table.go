package casenote

import (
	"fmt"
	"strings"
)

// narrowestWords is how far a column of words may be squeezed to make a table
// fit, in cells.
const narrowestWords = 14

// column is a column of a table, laid out.
type column struct {
	head   string
	cells  []string
	number bool // holds a number: flushed right, never wrapped
	width  int
}

// table writes a table: columns side by side, the wordy ones wrapped if need
// be, or, where that does not fit either, one block of lines a row. Below it
// stands what its numbers have in common, and its foot.
func (r *renderer) table(t Table) {
	if len(t.Header) == 0 {
		return
	}
	marks := markNumbers(t)
	list := make([]column, len(t.Header))
	for i, h := range t.Header {
		list[i] = column{head: r.text(h)}
		for _, row := range t.Rows {
			if len(row) != len(t.Header) {
				panic(fmt.Sprintf("casenote: a table row of %d cells under %d headings", len(row), len(t.Header)))
			}
			list[i].cells = append(list[i].cells, r.text(marks.cell(row[i])))
			list[i].number = list[i].number || row[i].Number != nil
		}
	}
	switch {
	case len(t.Rows) == 0:
		r.line("No rows.")
	case fit(list):
		r.sideBySide(list, len(t.Rows))
	default:
		r.stacked(list, len(t.Rows))
	}
	for _, s := range marks.foot(t.Foot) {
		r.paragraph(s)
	}
}

// fit gives the columns their widths and tells whether they fit into a line.
func fit(list []column) bool {
	total := len(gap) * (len(list) - 1)
	for i := range list {
		c := &list[i]
		c.width = max(widest(c.cells), widest(strings.Split(c.head, " ")))
		total += c.width
	}
	for total > columns {
		w := widestWords(list)
		if w == nil {
			return false
		}
		squeezed := max(w.width-(total-columns), narrowestWords)
		total -= w.width - squeezed
		w.width = squeezed
	}
	return true
}

// widestWords is the widest column of words that can still be squeezed; nil
// where there is none.
func widestWords(list []column) *column {
	var w *column
	for i := range list {
		c := &list[i]
		if !c.number && c.width > narrowestWords && (w == nil || c.width > w.width) {
			w = c
		}
	}
	return w
}

// sideBySide writes the header, ruled off, and the rows.
func (r *renderer) sideBySide(list []column, rows int) {
	head := make([][]string, len(list))
	rule := make([][]string, len(list))
	tallest := 0
	for i, c := range list {
		head[i] = wrap(c.head, c.width)
		rule[i] = []string{strings.Repeat("-", c.width)}
		tallest = max(tallest, len(head[i]))
	}
	for i, h := range head {
		head[i] = append(make([]string, tallest-len(h)), h...)
	}
	r.across(list, head)
	r.across(list, rule)
	for k := range rows {
		cells := make([][]string, len(list))
		for i, c := range list {
			cells[i] = hang(c.cells[k], c.width)
		}
		r.across(list, cells)
	}
}

// across writes the lines of one row of cells.
func (r *renderer) across(list []column, cells [][]string) {
	tallest := 0
	for _, lines := range cells {
		tallest = max(tallest, len(lines))
	}
	for k := range tallest {
		parts := make([]string, len(list))
		for i, c := range list {
			s := ""
			if k < len(cells[i]) {
				s = cells[i][k]
			}
			if c.number {
				parts[i] = flush(s, c.width)
			} else {
				parts[i] = pad(s, c.width)
			}
		}
		r.line(strings.Join(parts, gap))
	}
}

// stacked writes every row as a block of lines, heading and cell in each.
func (r *renderer) stacked(list []column, rows int) {
	heads := make([]string, len(list))
	for i, c := range list {
		heads[i] = c.head
	}
	label := min(widest(heads), widestLabel)
	at := label + len(gap)
	for k := range rows {
		if k > 0 {
			r.line("")
		}
		for i, c := range list {
			r.put(beside(hang(heads[i], label), hang(c.cells[k], columns-at), at))
		}
	}
}
