package support

import (
	"math"
	"testing"
)

// The beats after a step, by the plain method: the same, beat by beat.
func TestStepAgainstAPlainMethod(t *testing.T) {
	const from, to, beats = 8, 9.5, 8
	for name, c := range couplings(t) {
		k := coupled(t, c)
		before := at(t, k, from)
		r, err := k.Step(from, to, beats)
		if err != nil || !r.Complete || len(r.Arterial) != beats {
			t.Fatal(name, err, r)
		}
		p := plain{Coupling: k.Coupling, speed: to, lag: DefaultFillingLag}
		y := [4]float64{before.start[vol], before.start[pc], before.start[qp], before.start[qx]}
		fill, flow := before.Filling, before.Flow()
		for i := range beats {
			p.fill = k.Filling.At(flow)
			p.gap = fill - p.fill
			var s seen
			y = p.beat(y, 4000, &s)
			fill = p.fill + p.gap*math.Exp(-c.Ventricle.Period/p.lag)
			flow = s.qp.Mean + s.qav
			near(t, name+" mean", r.Arterial[i], s.pao.Mean, 1e-3)
			near(t, name+" flow", r.Flow[i], flow, 1e-3)
			near(t, name+" end of beat", r.BeatEnd[i], float64(i+1)*c.Ventricle.Period, 1e-9)
			mean := p.fill + p.gap*p.lag/c.Ventricle.Period*(1-math.Exp(-c.Ventricle.Period/p.lag))
			near(t, name+" filling pressure", r.Filling[i], mean, 1e-3)
		}
	}
}

// A step leads to the settled state of the new speed; one to the same speed
// leaves everything; without a pump before or after, it can still be taken.
func TestStepArrives(t *testing.T) {
	k := coupled(t, failingCase(t))
	for _, c := range []struct{ from, to float64 }{{8, 9.5}, {9, 9}, {0, 9}, {9, 0}} {
		r, err := k.Step(c.from, c.to, 120)
		if err != nil || !r.Complete {
			t.Fatal(err)
		}
		start, end := at(t, k, c.from), at(t, k, c.to)
		last := len(r.Flow) - 1
		near(t, "mean", r.Arterial[last], end.Arterial.Mean, 1e-4)
		near(t, "flow", r.Flow[last], end.Flow(), 1e-4)
		near(t, "filling pressure", r.Filling[last], end.Filling, 1e-4)
		// The first beat lags: filling pressure has hardly begun to move.
		if way := (r.Filling[0] - start.Filling) / (end.Filling - start.Filling); c.from != c.to && math.Abs(way) > 0.2 {
			t.Errorf("%v to %v: filling pressure has gone %v of the way in the first beat", c.from, c.to, way)
		}
	}
}

func TestWhatIsNoStep(t *testing.T) {
	k := coupled(t, failingCase(t))
	for _, c := range []struct {
		from, to float64
		beats    int
	}{{8, 9, 0}, {-1, 9, 4}, {8, math.NaN(), 4}} {
		if _, err := k.Step(c.from, c.to, c.beats); err == nil {
			t.Errorf("%v passed", c)
		}
	}
}
