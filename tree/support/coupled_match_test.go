package support

import (
	"math"
	"testing"
)

// A matched flow is met by the filling pressure alone, a matched pressure by the
// resistance alone, at the filling pressure of the line; the plain method, given
// what was changed, finds the same state.
func TestMatchedStates(t *testing.T) {
	for name, c := range couplings(t) {
		k := coupled(t, c)
		native := at(t, k, 0)
		for what, m := range map[string]Match{"flow": {Flow: native.Flow()}, "pressure": {Pressure: native.Arterial.Mean}} {
			matched := k.Coupling
			matched.Match = m
			km := coupled(t, matched)
			if got := at(t, km, 0); math.Abs(got.Arterial.Mean-native.Arterial.Mean) > 1e-4 || got.Resistance != c.Load.R {
				t.Errorf("%s: matching %s moves the native state", name, what)
			}
			met := 0
			for _, speed := range []float64{8, 9} {
				s := at(t, km, speed)
				if s.Missed {
					continue
				}
				met++
				if what == "flow" && (math.Abs(s.Flow()/m.Flow-1) > 1e-5 || s.Resistance != c.Load.R) {
					t.Errorf("%s, speed %v: flow %v, want %v", name, speed, s.Flow(), m.Flow)
				}
				if what == "pressure" && (math.Abs(s.Arterial.Mean-m.Pressure) > 1e-3 || math.Abs(s.Filling-k.Filling.At(s.Flow())) > 1e-3) {
					t.Errorf("%s, speed %v: pressure %v, want %v; filling %v, on the line %v", name, speed, s.Arterial.Mean, m.Pressure, s.Filling, k.Filling.At(s.Flow()))
				}
				p := plain{Coupling: k.Coupling, fill: s.Filling, speed: speed, r: s.Resistance}
				want := p.settle(t)
				if math.Abs(s.Arterial.Mean-want.pao.Mean) > 1e-3 || math.Abs(s.PulsePressure()-want.pao.Swing()) > 0.02 {
					t.Errorf("%s, speed %v, %s: %v, by the plain method %v", name, speed, what, s.Arterial, want.pao)
				}
				if testing.Short() {
					break
				}
			}
			if met == 0 {
				t.Errorf("%s: %s is met at no speed", name, what)
			}
		}
	}
}

// What cannot be met is said: the state that comes nearest is missed.
func TestWhatCannotBeMatched(t *testing.T) {
	c := coupled(t, failingCase(t)).Coupling
	for name, m := range map[string]Match{"too little flow": {Flow: 1}, "too much flow": {Flow: 1000}, "too little pressure": {Pressure: 6}} {
		c.Match = m
		s := at(t, coupled(t, c), 9)
		warned := false
		for _, w := range s.Warnings {
			warned = warned || w.Code == "not-matched"
		}
		if !s.Missed || !warned {
			t.Errorf("%s: missed %v, warned %v: %v L/min at %v mmHg", name, s.Missed, warned, s.Flow()*0.06, s.Filling)
		}
	}
	for name, m := range map[string]Match{"both": {Flow: 50, Pressure: 80}, "below 0": {Flow: -1}, "no number": {Pressure: math.NaN()}} {
		c.Match = m
		if _, err := NewCoupled(c); err == nil {
			t.Errorf("%s is accepted", name)
		}
	}
	c.Match = Match{Flow: 60}
	if _, err := coupled(t, c).Step(8, 9, 3); err == nil {
		t.Error("a transient is matched")
	}
}

// A pump that draws from the atrium relieves the ventricle by what it takes from
// its filling only; a leaking valve sends part of the flow of the pump round and
// round, and less of it into the arteries.
func TestInletAndLeak(t *testing.T) {
	c := coupled(t, failingCase(t)).Coupling
	plainly, atrial, leaks := at(t, coupled(t, c), 9), at(t, coupled(t, fromAtrium(c)), 9), at(t, coupled(t, leaking(c, 1)), 9)
	if !atrial.ValveOpened || plainly.ValveOpened || plainly.Loop != 0 {
		t.Errorf("valve open from the ventricle %v, from the atrium %v", plainly.ValveOpened, atrial.ValveOpened)
	}
	if !(leaks.Loop > 5) || !(leaks.PumpFlow.Mean > plainly.PumpFlow.Mean) || !(leaks.Flow() < plainly.Flow()) {
		t.Errorf("loop %v; pump %v and %v; into the arteries %v and %v", leaks.Loop, leaks.PumpFlow.Mean, plainly.PumpFlow.Mean, leaks.Flow(), plainly.Flow())
	}
	if got := leaks.PumpFlow.Mean - leaks.Flow(); !leaks.ValveOpened && math.Abs(got-leaks.Loop) > 1e-6 {
		t.Errorf("pump flow less systemic flow is %v, loop flow %v", got, leaks.Loop)
	}
	c.Inlet = "aorta"
	if _, err := NewCoupled(c); err == nil {
		t.Error("an unknown inlet is accepted")
	}
}
