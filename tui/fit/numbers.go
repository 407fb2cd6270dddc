package fit

import (
	"cmp"
	"fmt"
	"math"
	"strings"

	"afterbeat/data"
	"afterbeat/fitting/estimate"
	"afterbeat/tree/study"
	"afterbeat/tui/layout"
)

const noFlow = data.CodeNoFlow

// columns of the numbers, in cells; two before the name hold the cursor.
const (
	nameCells     = 6
	valueCells    = 7
	unitCells     = 9
	intervalCells = 16
	movedCells    = 18
)

// wide is the width from which the what-if has a column of its own.
const wide = 100

// numbersWidth is what the numbers take beside the comparison.
func (m Model) numbersWidth(p plan) int {
	w := 2 + nameCells + valueCells + 1 + unitCells + 1 + intervalCells + 1 + intervalCells + 1
	if p.width >= wide {
		w += movedCells + 1
	}
	return w
}

// numbers are the lines of the numbers, with their head.
func (m Model) numbers(p plan) []string {
	var lines []string
	if p.head > 0 {
		head := row{value: "value", unit: "unit", total: "95 %, total", random: "random"}
		lines = append(lines, m.inColumns(blanks(2+nameCells), head, m.movedHead(), p))
	}
	for i, r := range m.rows() {
		moved := ""
		if m.moved > 0 && m.moved <= len(r.moved) {
			moved = r.moved[m.moved-1]
		}
		lines = append(lines, m.line(cursor(i == m.cursor), r, moved, p))
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
func (m Model) line(cursor string, r row, moved string, p plan) string {
	start := cursor + " " + layout.Pad(layout.Clean(r.name, m.theme), nameCells)
	if r.broken() {
		words := layout.Clean(strings.TrimSuffix(r.number.String(), ", estimated"), m.theme)
		return start + "  " + layout.Pad(words, min(m.numbersWidth(p), p.width)-nameCells-5)
	}
	return m.inColumns(start, r, moved, p)
}

// inColumns sets a number in columns after its name. Where there is no room for
// a column of its own, the what-if takes that of the random interval.
func (m Model) inColumns(start string, r row, moved string, p plan) string {
	clean := func(s string) data.Text { return layout.Clean(s, m.theme) }
	random := r.random
	if moved != "" && p.width < wide {
		random = moved
	}
	s := start + layout.PadLeft(clean(r.value), valueCells) + " " + layout.Pad(clean(r.unit), unitCells) +
		" " + layout.Pad(clean(r.total), intervalCells) + " " + layout.Pad(clean(random), intervalCells)
	if p.width >= wide {
		s += " " + layout.Pad(clean(moved), movedCells)
	}
	return s
}

// movedHead heads the column of the what-if.
func (m Model) movedHead() string {
	if m.moved == 0 || m.count() == 0 || m.shown != m.fit.Chosen {
		return ""
	}
	return "if " + short(m.fit.Sensitivity[m.moved-1])
}

// short names an assumption moved, in the cells of a column.
func short(s study.Sensitivity) string {
	if s.Assumption == "outflow-pressure" {
		return "Pv " + s.Change
	}
	return assumption(s)
}

// assumption names an assumption moved in words.
func assumption(s study.Sensitivity) string {
	return strings.ReplaceAll(s.Assumption, "-", " ") + " " + s.Change
}

// comparison sets the models beside one another, on the basis shown.
func (m Model) comparison(p plan) []string {
	if m.count() == 0 {
		return nil
	}
	var lines []string
	if p.head > 0 {
		lines = append(lines, fmt.Sprintf("  %-4s %7s %5s", m.result().Basis, "rms", "AICc"))
	}
	for i, r := range m.fit.Results {
		if r.Basis != m.result().Basis {
			continue
		}
		aicc := fmt.Sprintf("%.1f", r.AICc)
		if math.IsNaN(r.AICc) {
			aicc = "none"
		}
		lines = append(lines, comparisonLine(cursor(i == m.shown), r.Model.Name, bare(r.RMSE), aicc))
	}
	return append(lines, "  in use "+m.used())
}

// recommended is the name of the recommended model.
func (m Model) recommended() string { return cmp.Or(m.fit.Recommended.Model, "none") }

// used is the name of the model that goes downstream, and whether by choice.
func (m Model) used() string {
	if m.fit.Chosen < 0 {
		return "none"
	}
	used := m.fit.Results[m.fit.Chosen].Model.Name
	if m.study.Inputs.Case.Model == used {
		used += ", chosen"
	}
	return used
}

func comparisonLine(cursor, model, rms, aicc string) string {
	return fmt.Sprintf("%s %-4s %7s %5s", cursor, model, rms, aicc)
}

// assumptions is the table of what each assumption moved does to the model in
// use, and what another method gives.
func (m Model) assumptions(p plan) []string {
	if p.assumptions == 0 {
		return nil
	}
	used := m.fit.Results[m.fit.Chosen].Model
	head := fmt.Sprintf("  %-28s", "What if, of "+used.Name)
	for _, s := range used.Parameters() {
		head += fmt.Sprintf("%12s", s.Name)
	}
	lines := []string{"", head}
	for i, s := range m.fit.Sensitivity {
		line := fmt.Sprintf("%s %-28s", cursor(i+1 == m.moved), assumption(s))
		for _, name := range used.Parameters() {
			line += fmt.Sprintf("%12s", percent(s.Percent.Of(name.Name)))
		}
		lines = append(lines, line)
	}
	for _, e := range m.decays() {
		lines = append(lines, m.estimatorLine(e))
	}
	return layout.Lines(strings.Join(lines, "\n"), p.assumptions)
}

// decays are the estimators that have a line here: the first.
func (m Model) decays() []estimate.Estimate { return m.fit.Estimators[:min(1, len(m.fit.Estimators))] }

// estimatorLine is another way to the same numbers.
func (m Model) estimatorLine(e estimate.Estimate) string {
	if e.Reason != "" {
		return fmt.Sprintf("  By %s: none, %s", e.Name, e.Reason)
	}
	line := fmt.Sprintf("  By %s of late diastole: tau %s s", e.Name, bare(e.Tau))
	if !math.IsNaN(e.C) {
		line += fmt.Sprintf(", C %s %s", bare(e.C), m.unitOf("C"))
	}
	return line + " (no interval)"
}

// unitOf is the unit of a parameter of the fits; empty where none has it.
func (m Model) unitOf(parameter string) string {
	for _, r := range m.fit.Results {
		if p, ok := r.Parameter(parameter); ok {
			return p.Unit
		}
	}
	return ""
}

func blanks(n int) string { return strings.Repeat(" ", n) }
