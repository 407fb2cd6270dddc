package support

import (
	"fmt"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tui"
	"afterbeat/tui/layout"
)

// View puts together what is there.
func (m Model) View() string {
	switch {
	case m.warnings.Open():
		return m.warnings.View()
	case m.numbers.Open():
		return m.numbers.View()
	case !m.there():
		return layout.Fit(m.absent(), m.area)
	case m.viewing().paged():
		return layout.Fit(append(m.page.Window(), m.page.Position()), m.area)
	}
	p := m.plan()
	if m.coupled() {
		head := m.coupledHead
		if m.moved.at != 0 {
			head = m.movedHead
		}
		lines := append(head(p), m.coupledBody(p)...)
		return layout.Fit(append(lines, m.coupledStatus(p)), m.area)
	}
	lines := append(m.headline(p), m.notice()...)
	body := p.height - p.head - p.status
	switch m.viewing() {
	case sweep:
		lines = append(lines, layout.Lines(strings.Join(m.sweep(p, m.sweepQuantity()), "\n"), body)...)
	case energy:
		lines = append(lines, layout.Lines(strings.Join(m.energy(p), "\n"), body)...)
	case indices:
		lines = append(lines, layout.Lines(strings.Join(m.indices(), "\n"), body)...)
	default:
		lines = append(lines, layout.Lines(m.picture, p.plot)...)
		if p.figures > 0 {
			lines = append(lines, m.figures(m.waveFigures())...)
		}
	}
	return layout.Fit(append(lines, m.status(p)), m.area)
}

// headline says what is shown: posing, share, mean pressure and what is
// retained, the 95 % interval in brackets; and below what kind of statement it
// is, and what the valve does.
func (m Model) headline(p plan) []string {
	a := m.shown()
	s := a.Supported[m.state]
	first := fmt.Sprintf("%-10s  share %-*s  %s  %s", a.Posing, m.shareWidth(), share(s.Share), m.mean(), m.retained())
	second := "a yardstick, no forecast: no ventricle answers to the load"
	if a.Posing.ByConstruction() {
		second = "by construction: an identity, never a forecast"
	}
	if m.view == sweep || m.view == energy { // both posings are shown
		second = "scaled: by construction: an identity, never a forecast"
		if p.width >= besideWidth {
			return []string{first, second + "; late-valve: a yardstick"}
		}
	}
	if p.width < besideWidth {
		return []string{fmt.Sprintf("%-10s %-*s  %s", a.Posing, m.shareWidth(), share(s.Share), m.retained()), second}
	}
	return []string{first, second + "; " + m.valve()}
}

// notice says whether there is a forecast beside the yardsticks: a line below the
// head, or two, where there is room. The head of the forecast itself needs the
// same room.
func (m Model) notice() []string {
	if !m.there() {
		return nil
	}
	roomy := m.area.Height >= noticeHeight
	words := "The forecast is not computed yet; until it is, these are the yardsticks."
	switch f := m.study.Forecast; {
	case m.forecast != nil && !roomy:
		return nil
	case m.forecast != nil:
		words = "The forecast is the posing coupled (left, right)."
	case f != nil && f.Reason != "":
		words = "No forecast: " + f.Reason + "."
	case f != nil:
		words = "No forecast: it has no speed."
	}
	most := 1
	if roomy {
		most = 2
	}
	lines := layout.Wrap(layout.Clean(words, m.theme), m.area.Width)
	if m.forecast != nil {
		return lines[:1]
	}
	if len(lines) > most {
		lines = lines[:most]
		lines[most-1] = layout.Pad(layout.Clean(lines[most-1], m.theme), max(m.area.Width-2, 0)) + " ~"
	}
	return lines
}

// shareWidth is the width of the widest share.
func (m Model) shareWidth() int {
	n := 0
	for _, s := range m.shown().Supported {
		n = max(n, len(share(s.Share)))
	}
	return n
}

func (m Model) mean() string {
	e := m.shown().Supported[m.state].MeanPressure
	return "mean " + casenote.Format(e.Value, e.Total) + " mmHg"
}

// retained is what is retained of the pulse shown.
func (m Model) retained() string {
	c := m.shown().Comparisons[m.state]
	e, what := c.RetainedPressure, "retained pulse "
	if m.flow {
		e, what = c.RetainedFlow, "retained swing "
	}
	switch {
	case m.shown().Posing.ByConstruction(), c.Share == 0:
		return what + casenote.Format(e.Value, data.NoInterval())
	case e.Identified:
		return what + estimate(e)
	}
	n := casenote.Number{Estimate: e, Origin: data.Estimated}
	return what + strings.TrimSuffix(n.String(), ", estimated")
}

// valve says what still passes it.
func (m Model) valve() string {
	s := m.shown().Supported[m.state]
	if s.Share >= 1 {
		return "valve shut"
	}
	return fmt.Sprintf("valve passes %.0f %%", 100*(1-s.Share))
}

func share(v float64) string { return fmt.Sprintf("%.4g", v) }

// status is the line of what is the same, and the count of warnings.
func (m Model) status(p plan) string {
	count := m.warnings.Count()
	words := data.Clean("Same R, C, Zc, outflow pressure, period and mean flow (h)")
	if p.width < besideWidth {
		words = data.Clean(m.mean() + "; h: what is held")
	}
	return layout.Pad(words, max(p.width-len(count)-2, 0)) + "  " + count
}

// absent says why there is nothing, and what cures it.
func (m Model) absent() []string {
	if m.comparison == nil {
		why := tui.Support.Missing(m.study)
		return []string{strings.ToUpper(why[:1]) + why[1:] + "."}
	}
	var lines []string
	say := func(text string) {
		lines = append(lines, layout.Wrap(layout.Clean(text, m.theme), m.area.Width)...)
	}
	why := m.comparison.Reason
	if of := m.comparison.Fit.Reason; of != "" {
		why += ": " + of
	}
	say("There is no comparison: " + why + ".")
	lines = append(lines, "")
	say("A comparison needs a fit, and the flow at the root. What cures it is chosen on Intake (1): the flow, its unit and site, a diameter for a velocity.")
	lines = append(lines, "")
	for _, w := range m.study.Warnings() {
		say(strings.TrimPrefix(w.Channel.String()+": "+w.Text, ": "))
		say("cure: " + w.Cure)
	}
	if h := m.area.Height; len(lines) > h && h > 0 {
		lines = append(lines[:h-1], fmt.Sprintf("~ %d more lines; v reads the warnings", len(lines)-h+1))
	}
	return lines
}
