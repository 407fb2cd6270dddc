package pump

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func set(t *testing.T, name string) Set {
	t.Helper()
	s, ok := ByName(name)
	if !ok {
		t.Fatalf("no set %q", name)
	}
	return s
}

// Static check of values.md 6, computed there from the coefficients of Simaan
// 2009: head at no flow, what 83.33 mL/s take of it, and the flow of an arrested
// heart, Plv 10, outflow pressure 5 mmHg, resistance 1.
func TestStaticCheckOfTheAxialSet(t *testing.T) {
	s := set(t, "literature axial")
	const cannulas = 2 * 0.0677
	for _, c := range []struct{ speed, head, litres, aortic float64 }{
		{8, 63.376, 3.1411, 57.35}, {9, 80.210, 3.9144, 70.24}, {10, 99.025, 4.7787, 84.65}, {12, 142.596, 6.7803, 118.01},
	} {
		if got := s.Head(c.speed, 0); math.Abs(got-c.head) > 5e-4 {
			t.Errorf("speed %v: head %v, want %v", c.speed, got, c.head)
		}
		arrested := s.Pump
		arrested.Resistance += 1.0 // the body's, in line with the pump
		q := arrested.SteadyFlow(c.speed, 5-10)
		if got := q * 60 / 1000; math.Abs(got-c.litres) > 5e-5 {
			t.Errorf("speed %v: %v L/min, want %v", c.speed, got, c.litres)
		}
		if got := 5 + q; math.Abs(got-c.aortic) > 5e-3 {
			t.Errorf("speed %v: aortic pressure %v, want %v", c.speed, got, c.aortic)
		}
	}
	if got := (s.Resistance - cannulas) * 83.33; math.Abs(got-14.225) > 1e-3 {
		t.Errorf("the pump takes %v mmHg of 83.33 mL/s", got)
	}
}

// The flat curve of values.md 6: 110.0 mmHg at no flow and 75.0 at 83.33 mL/s.
func TestHeadOfTheFlatCurve(t *testing.T) {
	flat := Curve{A: 14.031, C: 0.00504}
	for _, c := range []struct{ flow, head float64 }{{0, 110.0}, {83.33, 75.0}, {-83.33, 145.0}} {
		if got := flat.Head(2.8, c.flow); math.Abs(got-c.head) > 0.01 {
			t.Errorf("head at %v mL/s is %v, want %v", c.flow, got, c.head)
		}
	}
}

// The head falls with flow and rises with speed, and the steady flow is where
// the head less the cannulas is the rise.
func TestHeadIsMonotonic(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		draw := func(what string, low, high float64) float64 { return rapid.Float64Range(low, high).Draw(r, what) }
		p := Pump{Curve{draw("a", 0.1, 20), draw("b", 0, 0.1), draw("c", 0, 0.01)}, draw("Rc", 0.01, 0.5), 0.02}
		n, q := draw("n", 0.5, 15), draw("q", -200, 200)
		if p.Head(n, q+1) > p.Head(n, q)+1e-9 {
			r.Fatal("the head rises with flow")
		}
		if q <= 0 && p.Head(n+0.1, q) < p.Head(n, q) {
			r.Fatal("the head falls with speed")
		}
		rise := draw("rise", -50, 200)
		at := p.SteadyFlow(n, rise)
		if got := p.Head(n, at) - p.Resistance*at; math.Abs(got-rise) > 1e-8*(1+math.Abs(rise)+p.A*n*n) {
			r.Fatalf("at %v mL/s the rise is %v, want %v", at, got, rise)
		}
	})
}

// Every set says where it is from; the invented ones say so, and each gives
// 2 to 10 L/min against 75 mmHg somewhere in its range (common practice).
func TestSets(t *testing.T) {
	for _, s := range Sets() {
		if err := s.Check(); err != nil {
			t.Errorf("%s: %v", s.Name, err)
		}
		if strings.HasPrefix(s.Name, "generic") != strings.Contains(s.Origin, "invented") {
			t.Errorf("%s: origin %q", s.Name, s.Origin)
		}
		low, high := s.SteadyFlow(s.Low, 75)*0.06, s.SteadyFlow(s.High, 75)*0.06
		if !(low < 5 && high > 5) {
			t.Errorf("%s gives %v to %v L/min against 75 mmHg", s.Name, low, high)
		}
	}
	if len(Sets()) != 3 {
		t.Errorf("%d sets", len(Sets()))
	}
	if _, ok := ByName("none"); ok {
		t.Error("found a set of no name")
	}
}

func TestWhatIsNoPump(t *testing.T) {
	for _, p := range []Pump{
		{Curve{A: -1}, 0, 0.02},
		{Curve{A: 1, B: math.NaN()}, 0, 0.02},
		{Curve{A: 1}, math.Inf(1), 0.02},
		{Curve{A: 1}, 0.1, 0},
	} {
		if p.Check() == nil {
			t.Errorf("%v passed", p)
		}
	}
}
