package support

import (
	"fmt"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tree/support"
	"afterbeat/tui/explain"
)

// explained are the numbers of the state shown, as enter opens them.
func (m Model) explained() []explain.Number {
	switch {
	case !m.there():
		return nil
	case m.coupled():
		return m.forecastNumbers()
	}
	return m.yardstickNumbers()
}

// number is a figure with its account.
func number(f support.Figure, of string, e data.Estimate, unit string) explain.Number {
	return explain.Number{
		Name: string(f), Of: of, Account: f.Account(),
		Value: casenote.Number{Estimate: e, Unit: unit, Origin: data.Estimated},
	}
}

// forecastNumbers are those of the forecast at the speed shown.
func (m Model) forecastNumbers() []explain.Number {
	s := m.now()
	of := fmt.Sprintf("the forecast at speed %s", share(s.Speed))
	list := []explain.Number{
		number(support.RetainedPulse, of, s.RetainedPulse, ""),
		number(support.PulsePressure, of, s.PulsePressure, "mmHg"),
		number(support.MeanPressure, of, s.MeanPressure, "mmHg"),
		number(support.PressureChange, of, s.PressureChange, "mmHg"),
		number(support.Output, of, scaledBy(s.Output, litresPerMinute), "L/min"),
		number(support.OutputChange, of, scaledBy(s.OutputChange, litresPerMinute), "L/min"),
		number(support.FillingPressure, of, s.FillingPress, "mmHg"),
		number(support.ValveOpen, of, s.ValveOpenTime, "s"),
		number(support.EnergyPressure, of, s.EEPressure, "mmHg"),
		number(support.SurplusEnergy, of, s.SurplusEnergy, "erg/cm3"),
		number(support.PumpFlowSwing, of, s.PumpSwing, "mL/s"),
	}
	for i := range list {
		list[i].Method = fmt.Sprintf("%d draws: the fit, and what the traces do not fix of the ventricle; random: the fit alone", m.forecast.Draws)
	}
	list[0].Leads = m.leading(func(retained, _ float64) string { return fmt.Sprintf("%+.3f", retained) })
	list[1].Leads = m.leading(func(_, pulse float64) string { return fmt.Sprintf("%+.1f mmHg", pulse) })
	return list
}

// mostLeads is how many of the assumptions that move a number are named.
const mostLeads = 4

// leading are the assumptions that move the pulse most, one at a time, at the
// middle speed; words are made of the changes of retained pulse and of pulse
// pressure.
func (m Model) leading(words func(retained, pulse float64) string) []string {
	f := m.forecast
	middle := f.Speeds[max(0, min(f.Middle, len(f.Speeds)-1))]
	var out []string
	for _, s := range f.Sensitivity {
		if s.Beyond || len(out) == mostLeads {
			continue
		}
		moved := words(s.Difference, s.PulsePressure-middle.PulsePressure.Value)
		out = append(out, fmt.Sprintf("%s %s: %s at speed %s", s.Assumption, s.Change, moved, share(middle.Speed)))
	}
	return out
}

// yardstickNumbers are those of a yardstick at the share shown.
func (m Model) yardstickNumbers() []explain.Number {
	a := m.shown()
	s, c := a.Supported[m.state], a.Comparisons[m.state]
	of := fmt.Sprintf("the posing %s at share %s", a.Posing, share(s.Share))
	u := powerUnit(*m.comparison)
	list := []explain.Number{
		number(support.RetainedPulse, of, c.RetainedPressure, ""),
		number(support.PulsePressure, of, s.PulsePressure, "mmHg"),
		number(support.MeanPressure, of, s.MeanPressure, "mmHg"),
		number(support.GreatestOf, of, s.MaxPressure, "mmHg"),
		number(support.LeastOf, of, s.MinPressure, "mmHg"),
		number(support.RetainedSwing, of, c.RetainedFlow, ""),
		number(support.FlowSwing, of, s.FlowSwing, flowUnit(*m.comparison)),
		number(support.PulsatileIn, of, milliwatt(s.PulsatilePower), u),
		number(support.EnergyPressure, of, s.EEP, "mmHg"),
		number(support.SurplusEnergy, of, s.SHE, "erg/cm3"),
	}
	for i := range list {
		list[i].Method = "every replicate of the fit, sent through the posing"
		list[i].Notes = []string{"a yardstick: no ventricle answers to the load"}
		if a.Posing.ByConstruction() {
			list[i].Notes = []string{"by construction: an identity, never a forecast"}
		}
	}
	return list
}
