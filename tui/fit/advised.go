package fit

import (
	"fmt"
	"math"
	"strings"

	"afterbeat/tui/layout"
)

// advised is the recommendation in full, the comparison of all fits, what is not
// identified, and what there is to say of each estimator.
func (m Model) advised() []string {
	width := m.area.Width
	lines := layout.Wrap(layout.Clean(m.advice(), m.theme), width)
	if m.fits() > 0 {
		lines = append(lines, "", fmt.Sprintf("%-10s%9s%9s%9s%10s", "", "AICc", "BIC", "dAICc", "rms mmHg"))
	}
	for _, one := range m.items {
		if one.fitted() {
			r := m.fit.Results[one.result]
			shown := m
			shown.items, shown.shown = []item{one}, 0
			lines = append(lines, fmt.Sprintf("%-10s%9s%9s%9s%10s", one.title(), criterion(r.AICc), criterion(r.BIC), criterion(r.AICc-shown.lowest()), bare(r.RMSE)))
		}
	}
	if m.fits() > 0 {
		lines = append(lines, layout.Wrap(layout.Clean("dAICc: AICc less the lowest of the basis. Lower is better; the person decides.", m.theme), width)...)
		lines = append(lines, "")
	}
	for _, one := range m.items {
		lines = append(lines, m.faults(one)...)
	}
	return lines
}

// faults are what is to be said against an item.
func (m Model) faults(one item) []string {
	var lines []string
	for _, r := range one.rows {
		if r.broken() {
			lines = append(lines, m.labelled(one.title(), r.name+" "+r.number.Value.String())...)
		}
	}
	if one.fitted() && math.IsNaN(m.fit.Results[one.result].AICc) {
		lines = append(lines, m.labelled(one.title(), "AICc: none, "+m.fit.Results[one.result].CriterionReason)...)
	}
	if !one.fitted() && one.remark != "" {
		lines = append(lines, m.labelled(one.title(), one.remark)...)
	}
	return lines
}

// labelled is text wrapped beside its label.
func (m Model) labelled(label, text string) []string {
	const hang = 19
	var lines []string
	for k, line := range layout.Wrap(layout.Clean(text, m.theme), m.area.Width-hang) {
		if k > 0 {
			label = ""
		}
		lines = append(lines, fmt.Sprintf("%-*s", hang, label)+line)
	}
	return lines
}

// sentence begins with a capital, unless its first word is a name with a digit.
func sentence(s string) string {
	first, _, _ := strings.Cut(s, " ")
	if s == "" || strings.ContainsAny(first, "0123456789_") {
		return s
	}
	return strings.ToUpper(s[:1]) + s[1:]
}
