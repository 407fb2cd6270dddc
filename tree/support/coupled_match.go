package support

import (
	"errors"
	"fmt"
	"math"

	"afterbeat/tree/heart"
)

// Match says what is made equal to a given value wherever the pump runs, and by
// what. The zero Match makes nothing equal: output and pressure follow from the
// filling line.
type Match struct {
	// Flow is a mean flow into the arteries, mL/s, met by another filling
	// pressure than that of the line; 0: not matched.
	Flow float64
	// Pressure is a mean arterial pressure, mmHg, met by another resistance R,
	// at the filling pressure of the line; 0: not matched.
	Pressure float64
	// Factor is R with the pump running over that of the load; 0: 1. It does not
	// go with a Pressure.
	Factor float64
}

// highestFilling is the highest filling pressure at which a flow is looked for,
// mmHg: far above any that a person has.
const highestFilling = 60

// None tells that nothing is matched.
func (m Match) None() bool { return m.Flow == 0 && m.Pressure == 0 }

// resistance is R with the pump running.
func (m Match) resistance(r float64) float64 {
	if m.Factor > 0 {
		return r * m.Factor
	}
	return r
}

func (m Match) check() error {
	switch {
	case m.Flow != 0 && m.Pressure != 0:
		return fmt.Errorf("mean flow and mean pressure cannot both be matched by one change")
	case m.Pressure != 0 && m.Factor != 0:
		return fmt.Errorf("a mean pressure is matched by the resistance, which a factor fixes: match the flow that belongs to the pressure")
	case !(m.Factor >= 0) || math.IsInf(m.Factor, 0):
		return fmt.Errorf("a factor of %v on the resistance is not above 0", m.Factor)
	case !(m.Flow >= 0) || math.IsInf(m.Flow, 0):
		return fmt.Errorf("a mean flow of %v mL/s to match is not above 0", m.Flow)
	case !(m.Pressure >= 0) || math.IsInf(m.Pressure, 0):
		return fmt.Errorf("a mean pressure of %v mmHg to match is not above 0", m.Pressure)
	}
	return nil
}

// errTransient is that there is no settled state to match anything in.
var errTransient = errors.New("what follows the filling line with a lag cannot be matched")

// aim is what the last place of a start stands for, and which value of it a
// state asks for.
type aim interface {
	// Impose gives the filling pressure and the resistance R of a value.
	Impose(x float64) (fill, r float64)
	// Next is the value that a mean flow asks for, of a state found with x.
	Next(x, flow float64) float64
	Lowest() float64
	Highest() float64
	Guess() float64
}

// onLine aims at the filling line: x is the filling pressure.
type onLine struct {
	line heart.Filling
	r    float64
}

func (a onLine) Impose(x float64) (fill, r float64) { return x, a.r }
func (a onLine) Next(_, flow float64) float64       { return a.line.At(flow) }
func (a onLine) Lowest() float64                    { return 0 }
func (a onLine) Highest() float64                   { return a.line.Highest() }
func (a onLine) Guess() float64                     { return a.line.Pressure }

// toFlow aims at a mean flow: x is the filling pressure, which rises as long as
// the flow is too low.
type toFlow struct{ flow, r, guess float64 }

func (a toFlow) Impose(x float64) (fill, r float64) { return x, a.r }
func (a toFlow) Next(x, flow float64) float64       { return x + heart.RampSlope*(a.flow-flow) }
func (a toFlow) Lowest() float64                    { return 0 }
func (a toFlow) Highest() float64                   { return highestFilling }
func (a toFlow) Guess() float64                     { return a.guess }

// toPressure aims at a mean pressure: x is the mean flow, which gives the filling
// pressure on the line, and the resistance that turns it into the pressure.
type toPressure struct {
	line     heart.Filling
	over     float64 // pressure above outflow, mmHg
	inSeries float64 // what Z(0) has beside R
}

// leastResistance is the lowest R that is looked for, mmHg s/mL.
const leastResistance = 0.05

func (a toPressure) Impose(x float64) (fill, r float64) {
	return a.line.At(x), max(leastResistance, a.over/x-a.inSeries)
}
func (a toPressure) Next(_, flow float64) float64 { return flow }
func (a toPressure) Lowest() float64              { return 1 }
func (a toPressure) Highest() float64             { return a.over / (leastResistance + a.inSeries) }
func (a toPressure) Guess() float64               { return min(max(a.Lowest(), a.line.Flow), a.Highest()) }

// SeriesResistance is Z(0) - R, mmHg s/mL.
func (w Windkessel) SeriesResistance() float64 {
	if w.Kind == WK3 || w.Kind == WK4S {
		return w.Zc
	}
	return 0
}

// aim sets what the states at a speed aim at, and tells whether that leaves the
// last place of a start open.
func (k *Coupled) aim(speed float64) (open bool) {
	s := &k.shooter
	was := s.line
	s.line = onLine{k.Filling, k.Load.R}
	open = k.Filling.Slope > 0
	if speed > 0 {
		s.line = onLine{k.Filling, k.Match.resistance(k.Load.R)}
	}
	if speed > 0 && k.Match.Flow > 0 {
		s.line, open = toFlow{k.Match.Flow, k.Match.resistance(k.Load.R), k.Filling.Pressure}, true
	}
	if speed > 0 && k.Match.Pressure > 0 {
		s.line, open = toPressure{k.Filling, k.Match.Pressure - k.Load.OutflowPressure, k.Load.SeriesResistance()}, true
	}
	if s.line != was { // the last place means something else
		s.known, k.haveLast = false, false
	}
	return open
}
