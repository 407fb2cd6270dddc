package intake

import (
	"strings"

	"afterbeat/data"
	"afterbeat/tui/layout"
)

// column is one column of the table of channels.
type column struct {
	head  string
	width int
	right bool
	cell  func(c channel) string
}

// columns are those of the table, in their order, those that a narrow screen
// can do without at the end of wanted.
func columns() (all []column, wanted []int) {
	all = []column{
		{"quantity", 8, false, func(c channel) string { return string(c.Quantity) }},
		{"unit", 8, false, func(c channel) string { return c.Unit.Name }},
		{"site", 8, false, func(c channel) string { return string(c.Site) }},
		{"missing", 7, true, func(c channel) string { return c.missing }},
		{"lowest", 8, true, func(c channel) string { return c.low }},
		{"highest", 8, true, func(c channel) string { return c.high }},
		{"in", 8, false, func(c channel) string { return c.unit }},
		{"used as", 8, false, func(c channel) string { return c.used }},
		{"warnings", 8, true, func(c channel) string { return c.warnings }},
	}
	return all, []int{7, 0, 2, 1, 3, 8, 4, 5, 6}
}

// The name of a channel gets what the other columns leave.
const (
	leastName = 18
	mostName  = 44
)

// table is the heads and as many rows as given, the chosen one among them.
func (m Model) table(rows int) []string {
	shown, name := m.columnsShown()
	lines := []string{tableRow("  "+layout.Pad(m.clean("channel"), name), shown, func(c column) string { return c.head })}
	first := max(0, min(m.chosen-rows/2, len(m.ready.channels)-rows))
	for i, ch := range m.ready.channels[first : first+rows] {
		cursor := "  "
		if first+i == m.chosen {
			cursor = "> "
		}
		head := cursor + layout.Pad(m.clean(ch.Name.String()), name)
		lines = append(lines, tableRow(head, shown, func(c column) string { return m.clean(c.cell(ch)).String() }))
	}
	return lines
}

// columnsShown are the columns that fit, and the width of the names.
func (m Model) columnsShown() (shown []column, name int) {
	all, wanted := columns()
	room := m.area.Width - 2 - leastName
	fits := map[int]bool{}
	for _, k := range wanted {
		if all[k].width+1 > room {
			break
		}
		room -= all[k].width + 1
		fits[k] = true
	}
	for k, c := range all {
		if fits[k] {
			shown = append(shown, c)
		}
	}
	return shown, min(leastName+max(room, 0), mostName)
}

func tableRow(head string, columns []column, text func(column) string) string {
	var b strings.Builder
	b.WriteString(head)
	for _, c := range columns {
		b.WriteByte(' ')
		if c.right {
			b.WriteString(layout.PadLeft(data.Clean(text(c)), c.width))
		} else {
			b.WriteString(layout.Pad(data.Clean(text(c)), c.width))
		}
	}
	return b.String()
}
