package tree

import (
	"fmt"
	"strings"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casenote"
	"afterbeat/tui/layout"
)

// The widths of the columns, in cells.
const (
	bedCells   = 13
	flowCells  = 10
	pulseCells = 11
	indexCells = 8
	timeCells  = 8
	nameLeast  = 12
)

// column is a column of a list.
type column struct {
	head  string
	cells int
	words bool // stand left; numbers stand right
}

// list is the head and the rows about the cursor.
func (m Model) list(p plan) []string {
	columns, count, at := m.segmentColumns(p), len(m.rows), m.at
	line := m.segmentCells
	if m.view == beds {
		columns, count, at = m.bedColumns(p), len(m.tree.Beds), m.bed
		line = m.bedCells
	}
	lines := []string{m.line(columns, heads(columns), " ")}
	top := max(0, min(at-p.rows/2, count-p.rows))
	for k := top; k < min(top+p.rows, count); k++ {
		mark := " "
		if k == at {
			mark = ">"
		}
		lines = append(lines, m.line(columns, line(k), mark))
	}
	for len(lines) < p.rows+1 {
		lines = append(lines, "")
	}
	return lines
}

func heads(columns []column) []string {
	out := make([]string, len(columns))
	for i, c := range columns {
		out[i] = c.head
	}
	return out
}

// line sets cells side by side: words left, numbers right.
func (m Model) line(columns []column, cells []string, mark string) string {
	var b strings.Builder
	b.WriteString(mark + " ")
	for i, c := range columns {
		text := layout.Clean(cells[i], m.theme)
		if i == 0 || c.words {
			lead := min(len(cells[i])-len(strings.TrimLeft(cells[i], " ")), c.cells)
			b.WriteString(strings.Repeat(" ", lead) + layout.Pad(text, c.cells-lead))
		} else {
			b.WriteString(layout.PadLeft(text, c.cells))
		}
	}
	return strings.TrimRight(b.String(), " ")
}

// named is the first column with what the others leave.
func named(p plan, head string, others ...column) []column {
	left := p.list - 2
	for _, c := range others {
		left -= c.cells
	}
	for left < nameLeast && len(others) > 1 { // the last columns go first
		left += others[len(others)-1].cells
		others = others[:len(others)-1]
	}
	return append([]column{{head, max(left, 0), true}}, others...)
}

func (m Model) segmentColumns(p plan) []column {
	return named(p, "segment", []column{{head: "flow, mL/s", cells: flowCells}, {head: "PP, mmHg", cells: pulseCells - 1}, {head: "PI flow", cells: indexCells}, {head: "  bed", cells: bedCells + 2, words: true}}...)
}

func (m Model) segmentCells(k int) []string {
	s := m.tree.Segments[m.rows[k]]
	name := s.Called()
	if !m.filtered() {
		fold := "  "
		switch {
		case !s.Terminal && m.folded[s.ID]:
			fold = "+ "
		case !s.Terminal:
			fold = "- "
		}
		name = strings.Repeat(" ", min(s.Depth, deepest)) + fold + name
	}
	return []string{name, number(s.FlowMeasures.Mean), number(s.PressureMeasures.Amplitude), index(s.FlowMeasures), "  " + s.Bed}
}

// deepest is how far names are indented, in cells.
const deepest = 12

func (m Model) bedColumns(p plan) []column {
	return named(p, "bed", []column{{head: "flow, mL/s", cells: flowCells}, {head: "of output", cells: flowCells}, {head: "PP, mmHg", cells: pulseCells - 1}, {head: "PI flow", cells: indexCells}, {head: "t50, s", cells: timeCells}, {head: "t90, s", cells: timeCells}}...)
}

func (m Model) bedCells(k int) []string {
	b := m.tree.Beds[k]
	cells := []string{b.Name, number(b.Measures.Mean), fmt.Sprintf("%.1f %%", 100*b.Share), number(b.PulsePressure), index(b.Measures), "", ""}
	if r := m.tree.Response; r != nil && k < len(r.Flow) {
		cells[5], cells[6] = number(r.Flow[k].T50), number(r.Flow[k].T90)
	}
	return cells
}

func number(v float64) string { return casenote.Format(v, data.NoInterval()) }

// index is Gosling's of a flow; undefined where the mean is next to nothing.
func index(x beat.Measures) string {
	if x.GoslingPI != x.GoslingPI {
		return "none"
	}
	return number(x.GoslingPI)
}
