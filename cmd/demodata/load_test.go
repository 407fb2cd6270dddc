package main

import (
	"math"
	"testing"

	"afterbeat/data/demo"
)

func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s: %v, want %v within %v", what, got, want, tolerance)
	}
}

// simpson is the integral of f over a..b by Simpson's rule.
func simpson(f func(float64) float64, a, b float64, intervals int) float64 {
	h := (b - a) / float64(2*intervals)
	sum := f(a) + f(b)
	for i := 1; i < 2*intervals; i++ {
		sum += float64(2+2*(i%2)) * f(a+float64(i)*h)
	}
	return sum * h / 3
}

func TestStrokeHasItsVolumeAndShape(t *testing.T) {
	s := stroke{from: 3, duration: 0.25, volume: 60}
	q := s.coefficients()
	near(t, "volume", 0.25*simpson(q.at, 0, 1, 4), 60, 1e-12) // Simpson is exact for a cubic
	near(t, "flow at the start", q.at(0), 0, 1e-12)
	near(t, "flow at the end", q.at(1), 0, 1e-12)
	near(t, "mean over peak", 60/0.25/q.at(0.4045), 0.64, 0.001)
	if peak := q.at(0.4045); q.at(0.39) >= peak || q.at(0.42) >= peak {
		t.Error("the peak is not at 0.40 of the duration")
	}
}

// The pressure in the compliance meets the equation of the windkessel,
// C dPd/dt = Q - Pd/R (Westerhof 1969), by central differences (of some 280
// mL/s at the peak); at the ends of
// pieces, where the flow has corners, it is continuous.
func TestLoadSolvesTheWindkessel(t *testing.T) {
	p := demo.Truth()
	l := newLoad(p, strokes(beats(p)))
	pd := func(t float64) float64 { return l.pressure(t) - p.OutflowPressure - p.Zc*l.flow(t) }
	const h = 3e-5
	checked := 0
	for i := 1; i < len(l.pieces); i++ {
		from, to := l.pieces[i-1].from, l.pieces[i].from
		near(t, "jump of pressure", l.pressure(to+1e-12)-l.pressure(to-1e-12), 0, 1e-6)
		for _, part := range []float64{0.1, 0.37, 0.5, 0.83} {
			at := from + part*(to-from)
			slope := (pd(at+h) - pd(at-h)) / (2 * h)
			near(t, "C dPd/dt - Q + Pd/R", p.C*slope-l.flow(at)+pd(at)/p.R, 0, 1e-3)
			checked++
		}
	}
	if checked < 4*3*p.Beats {
		t.Errorf("only %d instants checked", checked)
	}
}

// What flowed in is stored or has flowed out: int Q dt = C (Pd1 - Pd0) +
// int Pd/R dt over the recording, an identity that knows nothing of the solution.
func TestVolumeIsConserved(t *testing.T) {
	p := demo.Truth()
	all := beats(p)
	l := newLoad(p, strokes(all))
	pd := func(t float64) float64 { return l.pressure(t) - p.OutflowPressure - p.Zc*l.flow(t) }
	a, b := all[runIn].onset, all[runIn+p.Beats].onset
	in := 0.0
	for _, beat := range all[runIn : runIn+p.Beats] {
		in += beat.volume
	}
	near(t, "inflow", simpson(l.flow, a, b, 20000), in, 1e-3)
	out := simpson(pd, a, b, 20000) / p.R
	near(t, "inflow - stored - outflow", in-p.C*(pd(b)-pd(a))-out, 0, 1e-3)
}

// Steady beats come to a mean of Pv + (R + Zc) Q, and nothing is left of the
// start when the recording begins.
func TestSteadyBeatsHaveTheMeanOfTheTotalResistance(t *testing.T) {
	p := demo.Truth()
	var all []beat
	for k := range runIn + 2 {
		all = append(all, beat{onset: float64(k) * p.Period, volume: p.StrokeVolume, ejection: p.Ejection})
	}
	l := newLoad(p, strokes(all))
	mean := simpson(l.pressure, all[runIn].onset, all[runIn+1].onset, 2000) / p.Period
	near(t, "mean pressure", mean, p.OutflowPressure+(p.R+p.Zc)*p.StrokeVolume/p.Period, 1e-3)
}
