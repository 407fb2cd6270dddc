package beats

import (
	"fmt"
	"strconv"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tui/layout"
)

// listed is the list of the beats about the cursor.
func (m Model) listed(width, height int) []string {
	beats, grid := m.beatsShown(), m.ready.grid
	unit := m.clean(m.signal().source.Unit).Cut(5).String()
	lines := []string{fmt.Sprintf("  %5s %10s  %-19s%9s%10s%10s%11s",
		"beat", "onset, s", "used, or why not", "length, s", "min, "+unit, "max, "+unit, "mean, "+unit)}
	rows := min(max(height-1, 0), len(beats))
	first := max(0, min(m.at-rows/2, len(beats)-rows))
	for i := first; i < first+rows; i++ {
		b, cursor := beats[i], " "
		if i == m.at {
			cursor = ">"
		}
		write := func(v float64) string { return casenote.Format(v, data.NoInterval()) }
		fate := strings.TrimPrefix(m.fateOf(i), "not used, ")
		lines = append(lines, fmt.Sprintf("%s %5d %10.3f  %-19s%9.3f%10s%10s%11s", cursor, i+1, grid.At(b.From), fate,
			grid.At(b.To)-grid.At(b.From), write(b.Min), write(b.Max), write(b.Mean)))
	}
	for i, line := range lines {
		lines[i] = layout.Clip(line, width)
	}
	return layout.Lines(strings.Join(lines, "\n"), height)
}

// tables are the counts by reason and the numbers, beside one another where
// there is room.
func (m Model) tables(height int) []string {
	if height < 1 {
		return nil
	}
	if m.area.Width < fullFrom {
		return layout.Lines(strings.Join(m.numbers(m.area.Width, height), "\n"), height)
	}
	numbers := m.numbers(m.area.Width-reasonsFor-1, height)
	return layout.Lines(strings.Join(layout.Beside(m.reasons(height), numbers, reasonsFor+1), "\n"), height)
}

// reasons is the table of the beats by their fate. What does not fit is counted.
func (m Model) reasons(height int) []string {
	const digits = 5
	var lines []string
	line := func(fate string, n int) {
		lines = append(lines, layout.Pad(data.Clean(fate), reasonsFor-digits)+layout.PadLeft(data.Clean(strconv.Itoa(n)), digits))
	}
	tally := m.ready.tally
	line("used", tally[0].n)
	if len(tally) == 1 {
		return lines
	}
	line("not used", total(tally[1:]))
	for i, c := range tally[1:] {
		if rest := tally[i+1:]; len(lines) == height-1 && len(rest) > 1 {
			c = count{"other reasons", total(rest)}
		}
		lines = append(lines, " "+layout.Pad(m.clean(c.fate), reasonsFor-digits-1)+layout.PadLeft(data.Clean(strconv.Itoa(c.n)), digits))
	}
	return lines[:min(len(lines), height)]
}

func total(counts []count) int {
	n := 0
	for _, c := range counts {
		n += c.n
	}
	return n
}

// numbers is the table of the indices, in two blocks where one is not enough
// and there is room.
func (m Model) numbers(width, height int) []string {
	rows := m.signal().rows
	const block = 64
	of := "of the beats used"
	if m.signal().diameter != "" {
		of = "as flow, beats used"
	}
	head := m.numberLine(row{label: of, value: "value", unit: "unit", interval: "95 %, random"}, width)
	lines := []string{head}
	for _, r := range rows[:min(len(rows), height-1)] {
		lines = append(lines, m.numberLine(r, width))
	}
	if len(rows) > height-1 && width >= 2*block {
		right := []string{head}
		for _, r := range rows[height-1 : min(len(rows), 2*(height-1))] {
			right = append(right, m.numberLine(r, width-block))
		}
		lines = layout.Beside(lines, right, block)
	}
	return lines
}

func (m Model) numberLine(r row, width int) string {
	line := layout.Pad(m.clean(r.label), 21) + layout.PadLeft(m.clean(r.value), 9) + " " + layout.Pad(m.clean(r.unit), 6) + " "
	return line + m.clean(r.interval).Cut(max(width-len(line), 0)).String()
}
