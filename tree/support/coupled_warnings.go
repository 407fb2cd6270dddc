package support

import (
	"fmt"
	"math"

	"afterbeat/data"
)

const (
	// littleFlow is the pump flow below which a warning is due: 0.5 L/min, mL/s.
	littleFlow = 500.0 / 60
	// nearV0 is how near to V0 the ventricle is emptied without suction, mL.
	nearV0 = 2
	// coupledBalance is the largest balance of energy without a warning.
	coupledBalance = 1e-6
)

// BackFlow tells whether flow through the pump reverses within the beat.
func (s CoupledState) BackFlow() bool { return s.Speed > 0 && s.PumpFlow.Min < 0 }

// suction tells whether the ventricle is emptied to near V0, or its pressure
// falls below 0.
func (k *Coupled) suction(s *CoupledState) bool {
	return s.Volume.Min < k.Ventricle.V0+nearV0 || s.Ventricular.Min < 0
}

// warnings are what the state must not be quoted without.
func (k *Coupled) warnings(s *CoupledState) []data.Warning {
	var all []data.Warning
	warn := func(code data.Code, cure, format string, args ...any) {
		all = append(all, data.Warning{Code: code, Text: s.name() + ": " + fmt.Sprintf(format, args...), Cure: cure})
	}
	if !s.Settled {
		warn(data.CodeNotSettled, "do not use this state; check the parameters for extreme values", "no periodic state was found in %d beats", s.Beats)
	}
	if math.IsNaN(s.Arterial.Mean) {
		return all
	}
	if s.Missed {
		warn(data.CodeNotMatched, "another speed, or --match none", "what was to be matched is not: with a filling pressure of %.3g mmHg and a resistance of %.3g mmHg s/mL mean flow is %.3g L/min and mean pressure %.4g mmHg", s.Filling, s.Resistance, s.Flow()*0.06, s.Arterial.Mean)
	}
	if s.BackFlow() {
		warn(data.CodeBackFlow, "see that the given head-flow law holds for reversed flow", "blood flows back through the pump, at up to %.3g mL/s", -s.PumpFlow.Min)
	} else if s.Speed > 0 && s.PumpFlow.Min < littleFlow {
		warn(data.CodeLittleFlow, "see that the given head-flow law holds at little flow", "pump flow falls to %.2g L/min within the beat", s.PumpFlow.Min*0.06)
	}
	if s.Suction {
		warn(data.CodeSuction, "do not use this state: in a patient the wall is drawn into the inlet first, and no model of that is here", "the ventricle empties to %.3g mL (V0 is %.3g), its pressure falls to %.3g mmHg", s.Volume.Min, k.Ventricle.V0, s.Ventricular.Min)
	}
	if !s.ValveOpened {
		warn(data.CodeValveShut, "none: it follows from what is given; other speeds show where it opens", "the aortic valve does not open")
	}
	if b := s.Energy.Balance(); s.Settled && math.Abs(b) > coupledBalance {
		warn(data.CodeBalance, "do not use the losses", "energy in and energy accounted for differ by %.2g", b)
	}
	return all
}

// name says which state a warning speaks of.
func (s CoupledState) name() string {
	if s.Speed == 0 {
		return "without a pump"
	}
	return fmt.Sprintf("at %.0f/min", 1000*s.Speed)
}
