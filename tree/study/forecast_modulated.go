package study

import (
	"fmt"
	"math"
	"slices"

	"afterbeat/data"
	"afterbeat/tree/support"
)

// ForecastModulated is the state under a speed that changes over time, beside
// that at its mean speed held constant.
type ForecastModulated struct {
	Words  string // how the speed changes
	Locked int    // beats of its period; 0: free
	Window float64
	// State is over the window; its Speed is the mean one. It has no energies, and
	// waves only where it is locked.
	State ForecastState
	// BeatPulse is the mean over the beats of their max - min of pressure, mmHg.
	BeatPulse data.Estimate
	Steady    ForecastState // at the mean speed, constant
}

// stateOfModulated is a modulated state in the form of a constant one.
func stateOfModulated(m *support.Modulated, speed float64) support.CoupledState {
	return support.CoupledState{
		Speed: speed, Settled: m.Settled, Missed: m.Missed, Arterial: m.Arterial, PumpFlow: m.PumpFlow, ValveFlow: m.ValveFlow,
		RootFlow: m.RootFlow, ValveOpen: m.ValveOpen, ValveOpened: m.ValveOpened, Filling: m.Filling, Resistance: m.Resistance, EEP: m.EEP, SHE: m.SHE,
	}
}

// nominal is the modulated state of the nominal ventricle.
func (m *modulation) nominal(k *support.Coupled, samples int, native drawn) (*ForecastModulated, error) {
	speeds, locked, err := m.at(k.Ventricle.Period)
	if err != nil {
		return nil, err
	}
	out := &ForecastModulated{Locked: locked, Words: m.words(slices.Min(speeds.Speeds), slices.Max(speeds.Speeds), locked)}
	steady, err := k.At(speeds.Mean())
	if err != nil {
		return nil, &ChoiceError{Key: "modulation", What: err.Error(), Hint: "speeds in 1000/min"}
	}
	out.Steady.CoupledState = steady
	out.Steady.take(drawnOf(&steady), native)
	var now support.Modulated
	if locked == 0 {
		now, err = k.Modulate(speeds, 0)
	} else {
		var t support.Trace
		now, t, err = k.ModulateTraced(speeds, locked, samples)
		out.State.Waves = support.Waves{Pressure: t.Arterial, RootFlow: t.Flow, PumpFlow: t.PumpFlow, Ventricular: t.Ventricular, Volume: t.Volume}
	}
	if err != nil {
		return nil, &ChoiceError{Key: "modulation", What: err.Error(), Hint: "another period; what is matched needs a modulation that is locked"}
	}
	out.Window = now.Window
	out.State.CoupledState = stateOfModulated(&now, speeds.Mean())
	values := drawnOfModulated(&now, speeds.Mean())
	out.State.take(values, native)
	out.State.Against.Posing = support.ModulatedPosing
	out.BeatPulse = data.Estimate{Value: values[drawnBeatPulse], Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: noDraws}
	return out, nil
}

func drawnOfModulated(m *support.Modulated, speed float64) drawn {
	s := stateOfModulated(m, speed)
	values := drawnOf(&s)
	if missing(&s) == "" {
		values[drawnBeatPulse] = m.PulsePressureBeatMean
	}
	return values
}

// drawn is the modulated state of a draw and that at the mean speed; both NaN
// where there is none, and the first where the modulation is free, which takes
// too long to be drawn.
func (m *modulation) drawn(k *support.Coupled) (modulated, steady drawn) {
	none := drawnOf(&support.CoupledState{})
	speeds, locked, err := m.at(k.Ventricle.Period)
	if err != nil {
		return none, none
	}
	s, err := k.At(speeds.Mean())
	if err != nil {
		return none, none
	}
	if locked == 0 {
		return none, drawnOf(&s)
	}
	now, err := k.Modulate(speeds, locked)
	if err != nil {
		return none, drawnOf(&s)
	}
	return drawnOfModulated(&now, speeds.Mean()), drawnOf(&s)
}

// doubt gives the modulated state its intervals over the draws.
func (m *ForecastModulated) doubt(random, total []row) {
	of := func(s *ForecastState, pick func(*row) drawn, why string) {
		there := func(all []row) []row {
			return slices.DeleteFunc(slices.Clone(all), func(r row) bool { return math.IsNaN(pick(&r)[drawnMean]) })
		}
		random, total := there(random), there(total)
		if min(len(random), len(total)) < 2 {
			for _, e := range s.estimates() {
				e.into.Why = why
			}
			return
		}
		for _, e := range s.estimates() {
			doubt(e.into, random, total, func(r *row) float64 { return e.of(pick(r), r.states[0]) })
		}
	}
	const free = "a free modulation is not drawn"
	of(&m.Steady, func(r *row) drawn { return r.steady }, "what is to be matched cannot be met")
	of(&m.State, func(r *row) drawn { return r.modulated }, free)
	m.BeatPulse.Why = free
	if m.State.PulsePressure.Total.Defined() {
		there := func(all []row) []row {
			return slices.DeleteFunc(slices.Clone(all), func(r row) bool { return math.IsNaN(r.modulated[drawnMean]) })
		}
		doubt(&m.BeatPulse, there(random), there(total), func(r *row) float64 { return r.modulated[drawnBeatPulse] })
	}
}

// warning is what the modulated state must not be quoted without.
func (m *ForecastModulated) warning() []data.Warning {
	s := &m.State.CoupledState
	if why := missing(s); why != "" {
		return []data.Warning{{Code: data.CodeNotSettled, Text: "under the modulated speed: " + why, Cure: "do not use this state; another period or other speeds"}}
	}
	if s.BackFlow() {
		return []data.Warning{{
			Code: data.CodeBackFlow, Text: fmt.Sprintf("under the modulated speed blood flows back through the pump, at up to %.3g mL/s", -s.PumpFlow.Min),
			Cure: "see that the given head-flow law holds for reversed flow",
		}}
	}
	return nil
}
