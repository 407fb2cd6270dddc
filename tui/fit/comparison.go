package fit

import (
	"fmt"
	"math"

	"afterbeat/fitting"
	"afterbeat/tui/layout"
)

// fullWidth is the cells from which the comparison has all its columns.
const fullWidth = 38

// comparison sets the ways of the kind shown beside one another: the models on
// one basis, or the estimators.
func (m Model) comparison(p plan) []string {
	width, height := p.width, p.compare
	if p.beside {
		width, height = p.width-p.numbersWidth(), p.numbers
	}
	if len(m.items) < 2 || height < 1 {
		return nil
	}
	var lines []string
	if p.head > 0 {
		lines = append(lines, m.comparisonHead(width))
	}
	var rows []string
	at := 0
	for i, one := range m.items {
		if one.group != m.item().group {
			continue
		}
		if i == m.shown {
			at = len(rows)
		}
		rows = append(rows, cursor(i == m.shown)+" "+m.comparisonLine(one, width))
	}
	room := height - len(lines)
	from := max(0, min(at-room/2, len(rows)-room))
	return append(lines, rows[from:min(len(rows), from+max(room, 0))]...)
}

func (m Model) comparisonHead(width int) string {
	switch full := width >= fullWidth; {
	case m.item().fitted() && full:
		return fmt.Sprintf("  %-5s%8s%8s%7s%9s", m.item().group, "AICc", "BIC", "dAICc", "rms mmHg")
	case m.item().fitted():
		return fmt.Sprintf("  %-5s%5s%8s", m.item().group, "dAICc", "rms")
	case full:
		return fmt.Sprintf("  %-16s%7s%7s%7s", "other ways", "R", "C", "tau s")
	}
	return fmt.Sprintf("  %-11s%7s", "other ways", m.column())
}

// column is what the estimators are compared by where there is room for one: tau
// where the pressure is alone.
func (m Model) column() string {
	if m.fits() == 0 {
		return "tau s"
	}
	return "C"
}

func (m Model) comparisonLine(one item, width int) string {
	full := width >= fullWidth
	if !one.fitted() {
		name := layout.Clean(one.name, m.theme)
		e := one.estimate
		if full {
			return layout.Pad(name, 16) + fmt.Sprintf("%7s%7s%7s", dash(e.R), dash(e.C), dash(e.Tau))
		}
		if m.fits() == 0 {
			return layout.Pad(name, 11) + fmt.Sprintf("%7s", dash(e.Tau))
		}
		return layout.Pad(name, 11) + fmt.Sprintf("%7s", dash(e.C))
	}
	r := m.fit.Results[one.result]
	if full {
		return fmt.Sprintf("%-5s%8s%8s%7s%9s", one.name, criterion(r.AICc), criterion(r.BIC), criterion(r.AICc-m.lowest()), bare(r.RMSE))
	}
	return fmt.Sprintf("%-5s%5s%8s", one.name, criterion(r.AICc-m.lowest()), bare(r.RMSE))
}

// lowest is the lowest AICc of the fits on the basis shown.
func (m Model) lowest() float64 {
	low := math.Inf(1)
	for _, r := range m.fit.Results {
		if r.Basis == m.item().group && !math.IsNaN(r.AICc) {
			low = min(low, r.AICc)
		}
	}
	return low
}

// criterion writes AICc, BIC, or a difference of them.
func criterion(v float64) string {
	switch {
	case math.IsNaN(v) || math.IsInf(v, 0):
		return "none"
	case math.Abs(v) >= 999.95:
		return fmt.Sprintf("%.0f", v)
	}
	return fmt.Sprintf("%.1f", v)
}

func dash(v float64) string {
	if math.IsNaN(v) {
		return "-"
	}
	return fmt.Sprintf("%.4g", v)
}

// used is the fit that goes downstream, and whether by choice.
func (m Model) used() string {
	if m.fit.Chosen < 0 {
		return "none"
	}
	r := m.fit.Results[m.fit.Chosen]
	used := r.Model.Name + " " + r.Basis
	switch {
	case m.fit.BasisMissed():
		used += ", no " + m.study.Inputs.Case.Basis
	case m.study.Inputs.Case.Model == r.Model.Name:
		used += ", chosen"
	}
	return used
}

// judged is what speaks for the fit shown in numbers.
func judged(r fitting.Result) string {
	if math.IsNaN(r.AICc) {
		return "AICc none"
	}
	return fmt.Sprintf("AICc %s, BIC %s", criterion(r.AICc), criterion(r.BIC))
}
