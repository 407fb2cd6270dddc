package fit

import (
	"fmt"
	"strings"

	"afterbeat/data"
	"afterbeat/tui/layout"
)

// columns of the numbers, in cells; two before the name hold the cursor.
const (
	nameCells     = 6
	valueCells    = 7
	unitCells     = 9
	intervalCells = 16
	movedCells    = 18
)

// numbersWidth is what the numbers take beside the comparison.
func (p plan) numbersWidth() int {
	w := 2 + nameCells + valueCells + 1 + unitCells + 1 + intervalCells + 1 + intervalCells + 1
	if p.width >= wideWidth {
		w += movedCells + 1
	}
	return w
}

// numberLines are the lines of the numbers, with their head; of an estimator that
// does not apply, the reason.
func (m Model) numberLines(p plan) []string {
	var lines []string
	if p.head > 0 {
		head := row{value: "value", unit: "unit", total: "95 %, total", random: "random"}
		lines = append(lines, m.inColumns(blanks(2+nameCells), head, m.movedHead(), p))
	}
	one := m.item()
	for i, r := range one.rows {
		lines = append(lines, m.line(cursor(i == m.cursor), r, p))
	}
	width := p.width
	if p.beside {
		width = p.numbersWidth() - 1
	}
	if !one.fitted() && one.remark != "" {
		lines = append(lines, m.wrapped(one.remark, width, max(p.numbers-len(lines), 0), "enter: in full")...)
	}
	return lines
}

func cursor(here bool) string {
	if here {
		return ">"
	}
	return " "
}

// line is one number; one that is not identified is a sentence.
func (m Model) line(cursor string, r row, p plan) string {
	start := cursor + " " + layout.Pad(layout.Clean(r.name, m.theme), nameCells)
	if r.broken() {
		words := layout.Clean(strings.TrimSuffix(r.number.Value.String(), ", estimated"), m.theme)
		return start + "  " + layout.Pad(words, min(p.numbersWidth(), p.width)-nameCells-5)
	}
	return m.inColumns(start, r, m.movedTo(r), p)
}

// inColumns sets a number in columns after its name. Where there is no room for
// a column of its own, the what-if takes that of the random interval.
func (m Model) inColumns(start string, r row, moved string, p plan) string {
	clean := func(s string) data.Text { return layout.Clean(s, m.theme) }
	random := r.random
	if moved != "" && p.width < wideWidth {
		random = moved
	}
	s := start + layout.PadLeft(clean(r.value), valueCells) + " " + layout.Pad(clean(r.unit), unitCells) +
		" " + layout.Pad(clean(r.total), intervalCells) + " " + layout.Pad(clean(random), intervalCells)
	if p.width >= wideWidth {
		s += " " + layout.Pad(clean(moved), movedCells)
	}
	return s
}

// movedHead heads the column of the what-if.
func (m Model) movedHead() string {
	w, ok := m.whatIf()
	switch {
	case !ok:
		return ""
	case w.Assumption == "outflow-pressure":
		return "if Pv " + w.Change
	}
	return "if " + assumption(w.Sensitivity)
}

// assumptions is the table of what each assumption moved does to the fit shown.
func (m Model) assumptions(p plan) []string {
	if p.assumptions == 0 {
		return nil
	}
	one := m.item()
	if !one.fitted() {
		return layout.Lines("", p.assumptions)
	}
	head := fmt.Sprintf("  %-28s", "What if, of "+one.title())
	for _, r := range one.rows {
		head += fmt.Sprintf("%12s", r.name)
	}
	lines := []string{"", head + fmt.Sprintf("%12s", "rms, mmHg")}
	for i, w := range m.weighed[m.shown].whatIfs {
		line := fmt.Sprintf("%s %-28s", cursor(i+1 == m.moved), assumption(w.Sensitivity))
		for _, r := range one.rows {
			line += fmt.Sprintf("%12s", effect(w, m.fit.Results[one.result], r.of))
		}
		lines = append(lines, line+fmt.Sprintf("%12s", bare(w.Result.RMSE)))
	}
	return layout.Lines(strings.Join(lines, "\n"), p.assumptions)
}

func blanks(n int) string { return strings.Repeat(" ", n) }
