package support

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casenote"
	"afterbeat/data/unit"
	"afterbeat/tree/study"
	"afterbeat/tree/support"
	"afterbeat/tui/layout"
)

// forecastFigure is a line of a figure natively, on support, and what became of
// it.
type forecastFigure struct {
	label             string
	native, supported data.Estimate
	change            string
}

// forecastFigures are all figures that have intervals, the most useful first.
func (m Model) forecastFigures() []forecastFigure {
	n, s := &m.forecast.Native, m.now()
	return []forecastFigure{
		{"pulse pressure, mmHg", n.PulsePressure, s.PulsePressure, estimate(s.RetainedPulse)},
		{"mean pressure, mmHg", n.MeanPressure, s.MeanPressure, signed(s.PressureChange)},
		{"output, L/min", scaledBy(n.Output, litresPerMinute), scaledBy(s.Output, litresPerMinute), signed(scaledBy(s.OutputChange, litresPerMinute))},
		{"filling press., mmHg", n.FillingPress, s.FillingPress, ""},
		{"valve open a beat, s", n.ValveOpenTime, s.ValveOpenTime, ""},
		{"EEP, mmHg", n.EEPressure, s.EEPressure, ""},
		{"surplus, erg/cm3", n.SurplusEnergy, s.SurplusEnergy, ""},
		{"swing of pump, mL/s", none(), s.PumpSwing, ""},
	}
}

// none is an estimate that is not there.
func none() data.Estimate {
	return data.Estimate{Value: math.NaN(), Total: data.NoInterval(), Random: data.NoInterval(), Identified: true}
}

// coupledFigures are the first of them, at most so many, under their head.
func (m Model) coupledFigures(most int) []string {
	out := []string{m.across("", "native model (95 %)", "supported (95 %)", "change; pulse: retained")}
	if m.narrow() {
		out[0] = m.briefly("", "native", "supported (95 %)")
	}
	list := m.forecastFigures()
	for _, f := range list[:min(most, len(list))] {
		out = append(out, m.line(f))
	}
	return out
}

// line is a figure in print. Where two intervals have no room beside one another,
// that of the native model is left out; m and f on a wider screen have it.
func (m Model) line(f forecastFigure) string {
	native := estimate(f.native)
	switch {
	case math.IsNaN(f.native.Value):
		native = "-"
	case m.narrow() && f.native.Identified:
		native = casenote.Format(f.native.Value, f.native.Total)
	}
	if m.narrow() {
		return m.briefly(f.label, native, estimate(f.supported))
	}
	return m.across(f.label, native, estimate(f.supported), f.change)
}

// narrow tells that two intervals have no room beside one another.
func (m Model) narrow() bool { return m.area.Width < labelCells+2*estimateCells }

func (m Model) briefly(label, native, supported string) string {
	const nativeCells = 10
	cell := func(s string, n int) string { return layout.Pad(layout.Clean(s, m.theme), max(n, 0)) }
	return cell(label, labelCells) + cell(native, nativeCells-1) + " " + cell(supported, m.area.Width-labelCells-nativeCells)
}

// scaledBy is an estimate in another unit.
func scaledBy(e data.Estimate, f float64) data.Estimate {
	e.Value *= f
	e.Total = data.Interval{Low: f * e.Total.Low, High: f * e.Total.High}
	e.Random = data.Interval{Low: f * e.Random.Low, High: f * e.Random.High}
	return e
}

// signed is an estimate of a change.
func signed(e data.Estimate) string {
	if e.Value > 0 && e.Identified {
		return "+" + estimate(e)
	}
	return estimate(e)
}

// coupledIndices are the indices of both waves, or all figures that have
// intervals.
func (m Model) coupledIndices() []string {
	if m.figured {
		out := m.coupledFigures(len(m.forecastFigures()))
		if m.area.Width < ratioWidth {
			s := m.now()
			out = append(out, m.across("retained pulse", "", estimate(s.RetainedPulse), ""),
				m.across("change of mean, mmHg", "", signed(s.PressureChange), ""),
				m.across("change of out., L/min", "", signed(scaledBy(s.OutputChange, litresPerMinute)), ""))
		}
		words := fmt.Sprintf("Total 95 %% intervals over %d draws: of the fit, and of what the traces do not fix of the ventricle. Retained pulse is that of the native model.", m.forecast.Draws)
		return append(out, layout.Wrap(layout.Clean(words, m.theme), m.area.Width)...)
	}
	if !m.curves.ready {
		return nil
	}
	c := m.curves.coupled
	words := "Of the nominal waves, without intervals; f has the figures with theirs."
	return m.indexTable("mL/s", [4]beat.Measures{c.measures[0].pressure, c.measures[m.at+1].pressure, c.measures[0].flow, c.measures[m.at+1].flow}, words)
}

// powerRow is a mean power over a beat, from energies in mmHg mL.
type powerRow struct {
	label string
	of    func(s *study.ForecastState) float64
}

func powerRows() []powerRow {
	energy := func(of func(e support.CoupledEnergy) float64) func(*study.ForecastState) float64 {
		return func(s *study.ForecastState) float64 { return of(s.Energy) / s.Waves.Pressure.Duration() }
	}
	arterial := energy(func(e support.CoupledEnergy) float64 { return e.Zc + e.R + e.Outflow })
	steady := func(s *study.ForecastState) float64 { return s.Arterial.Mean * s.Flow() }
	return []powerRow{
		{"ventricle", energy(func(e support.CoupledEnergy) float64 { return e.Ventricle })},
		{"pump, to the blood", energy(func(e support.CoupledEnergy) float64 { return e.Pump })},
		{"filling", energy(func(e support.CoupledEnergy) float64 { return e.Filling })},
		{"into the arteries", arterial},
		{"of it steady", steady},
		{"of it pulsatile", func(s *study.ForecastState) float64 { return arterial(s) - steady(s) }},
		{"lost in the valves", energy(func(e support.CoupledEnergy) float64 { return e.Mitral + e.Aortic })},
		{"lost in the cannulas", energy(func(e support.CoupledEnergy) float64 { return e.Cannula })},
	}
}

// coupledEnergy is where the power comes from and where it goes, natively and at
// the speed shown.
func (m Model) coupledEnergy() []string {
	n, s := &m.forecast.Native, m.now()
	out := []string{m.across("mean power, mW", "native model", "supported", "")}
	for _, r := range powerRows() {
		out = append(out, m.across(r.label, milliwatts(r.of(n)), milliwatts(r.of(s)), ""))
	}
	out = append(out,
		m.line(forecastFigure{label: "EEP, mmHg", native: n.EEPressure, supported: s.EEPressure}),
		m.line(forecastFigure{label: "surplus, erg/cm3", native: n.SurplusEnergy, supported: s.SurplusEnergy}))
	words := "Powers are those of the nominal state, without intervals. That of the pump is head times flow: its motor draws more. Ventricle and filling are what they give to the blood."
	return append(out, layout.Wrap(layout.Clean(words, m.theme), m.area.Width)...)
}

// milliwatts is a power in mmHg mL/s in print, to a tenth of the unit.
func milliwatts(p float64) string {
	p *= unit.MilliwattPerMmHgMLPerS
	if math.IsNaN(p) || math.IsInf(p, 0) {
		return casenote.Format(math.NaN(), data.NoInterval())
	}
	if math.Abs(p) < 0.05 {
		p = 0 // no minus before a zero
	}
	return fmt.Sprintf("%.1f", p)
}
