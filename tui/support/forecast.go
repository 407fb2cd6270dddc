package support

import (
	"fmt"
	"math"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tree/study"
	"afterbeat/tui/layout"
)

// litresPerMinute are those of 1 mL/s.
const litresPerMinute = 0.06

// speedPlaced finds the speed in the forecast.
func (m Model) speedPlaced() Model {
	if m.forecast == nil {
		return m
	}
	speeds := m.forecast.Speeds
	m.at = max(0, min(m.forecast.Middle, len(speeds)-1))
	if m.speed == 0 {
		return m
	}
	for i, s := range speeds {
		if math.Abs(s.Speed-m.speed) < math.Abs(speeds[m.at].Speed-m.speed) {
			m.at = i
		}
	}
	return m
}

// now is the coupled state shown.
func (m Model) now() *study.ForecastState { return &m.forecast.Speeds[m.at] }

// coupledHead says what is shown: posing, speed and pump; head and flow of the
// pump and mean pressure; the retained pulse, and what the valve does.
func (m Model) coupledHead(p plan) []string {
	say := func(words string) string { return layout.Clean(words, m.theme).String() }
	speed := fmt.Sprintf("%-*s (1000/min), %s", m.speedWidth(), share(m.now().Speed), pumpName(m.forecast))
	if p.width < besideWidth {
		lines := []string{say("coupled  " + speed), say(m.retainedPulse() + "; " + m.valveBriefly())}
		if p.head > 2 {
			lines = append(lines, say(m.pumpWords()))
		}
		return lines
	}
	first := say("coupled  speed " + speed)
	if p.head < 3 {
		return []string{first, say(m.retainedPulse() + "; " + m.valveWords())}
	}
	mean := m.now().MeanPressure
	return []string{first, say(m.pumpWords() + "; mean " + estimate(mean) + " mmHg"), say(m.retainedPulse() + "; " + m.valveWords())}
}

// pumpName is the set of coefficients, and that it is invented, or remembered.
func pumpName(f *study.Forecast) string {
	for _, word := range []string{"invented", "from memory"} {
		if strings.Contains(f.Pump.Origin, word) {
			return f.Pump.Name + ", " + word
		}
	}
	return f.Pump.Name
}

// speedWidth is the width of the widest speed.
func (m Model) speedWidth() int {
	n := 0
	for _, s := range m.forecast.Speeds {
		n = max(n, len(share(s.Speed)))
	}
	return n
}

func (m Model) retainedPulse() string { return "retained pulse " + estimate(m.now().RetainedPulse) }

func (m Model) pumpWords() string {
	return fmt.Sprintf("head %.1f mmHg, pump flow %.2f L/min", m.head(), litresPerMinute*m.now().PumpFlow.Mean)
}

// head is the mean head of the pump, mmHg. Over a periodic beat the inertance
// takes nothing, so that it is mean Pao - mean Plv + Rc mean Qp.
func (m Model) head() float64 {
	s := m.now()
	return s.Arterial.Mean - s.Ventricular.Mean + m.forecast.Pump.Resistance*s.PumpFlow.Mean
}

// valveBriefly says whether the aortic valve opens in the nominal state.
func (m Model) valveBriefly() string {
	switch s := m.now(); {
	case !s.Settled:
		return "no periodic state"
	case !s.ValveOpened:
		return "valve shut"
	}
	return "valve opens"
}

// valveWords say what the aortic valve does, in how many of the draws, and where
// the state is not to be trusted.
func (m Model) valveWords() string {
	s, words := m.now(), m.valveBriefly()
	switch {
	case !s.Settled:
		return words + " was found"
	case s.Suction:
		return words + ", near suction"
	case m.forecast.Draws > 1 && (s.ValveOpenDraws == 0 && !s.ValveOpened || s.ValveOpenDraws == 1 && s.ValveOpened):
		return words + " in all draws"
	case m.forecast.Draws > 1 && s.ValveOpened:
		return fmt.Sprintf("%s (in %.0f %% of draws)", words, 100*s.ValveOpenDraws)
	case m.forecast.Draws > 1:
		return fmt.Sprintf("%s (opens in %.0f %% of draws)", words, 100*s.ValveOpenDraws)
	}
	return words
}

// coupledStatus is the line of what is the same, and the count of warnings.
func (m Model) coupledStatus(p plan) string {
	count := m.warnings.Count()
	words := "Same load, heart rate, contractility at every speed (h)"
	switch mean := m.now().MeanPressure; {
	case p.width >= besideWidth:
	case p.head > 2:
		words = "mean " + casenote.Format(mean.Value, mean.Total) + " mmHg; h: what is held"
	default:
		words = fmt.Sprintf("head %.0f, mean %.0f mmHg, pump %.2f L/min", m.head(), mean.Value, litresPerMinute*m.now().PumpFlow.Mean)
	}
	return layout.Pad(data.Clean(words), max(p.width-len(count)-2, 0)) + "  " + count
}

// coupledBody is the view of the forecast between head and status.
func (m Model) coupledBody(p plan) []string {
	body := max(p.height-p.head-p.status, 0)
	switch m.viewing() {
	case sweep:
		return layout.Lines(strings.Join(m.coupledSweep(body), "\n"), body)
	case energy:
		return layout.Lines(strings.Join(m.coupledEnergy(), "\n"), body)
	case indices:
		return layout.Lines(strings.Join(m.coupledIndices(), "\n"), body)
	}
	lines := layout.Lines(m.picture, p.plot)
	if p.figures > 0 {
		figures := m.coupledFigures
		if m.moved.at != 0 {
			figures = m.movedFigures
		}
		lines = append(lines, figures(p.figures-1)...)
	}
	return lines
}
