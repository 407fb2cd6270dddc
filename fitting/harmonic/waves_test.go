package harmonic

import (
	"math"
	"testing"

	"afterbeat/data"
)

// A forward wave, and the same a part G of it returned after a time: then P = P+ +
// P- and Q = (P+ - P-)/Zc by the definition of the characteristic impedance, and
// G and the time are known.
func TestWavesOfAKnownReflection(t *testing.T) {
	const n, rate, zc = 400, 500.0, 0.07
	for _, c := range []struct {
		part float64
		late int // samples
	}{{0.3, 60}, {0.7, 100}, {0.5, 25}} {
		forward := func(j int) float64 {
			s := float64(((j%n)+n)%n) / rate
			return 30*math.Exp(-math.Pow((s-0.25)/0.06, 2)) + 10*math.Exp(-math.Pow((s-0.35)/0.09, 2))
		}
		p, q := data.Period{Samples: make([]float64, n), Rate: rate}, data.Period{Samples: make([]float64, n), Rate: rate}
		for j := range n {
			f, b := forward(j), c.part*forward(j-c.late)
			p.Samples[j], q.Samples[j] = f+b, (f-b)/zc
		}
		w := Separate(p, q, zc)
		if math.Abs(w.Magnitude-c.part) > 1e-9 || math.Abs(w.ReturnTime-float64(c.late)/rate) > 1e-9 || w.Reason != "" {
			t.Errorf("part %v after %v s: %v after %v s", c.part, float64(c.late)/rate, w.Magnitude, w.ReturnTime)
		}
		for j := range n {
			if math.Abs(w.Forward.Samples[j]+w.Backward.Samples[j]-p.Samples[j]) > 1e-9 {
				t.Fatal("the waves do not add up to the pressure")
			}
		}
		// Pressure begun elsewhere has the same waves.
		turn := func(x data.Period) data.Period {
			return data.Period{Samples: append(append([]float64(nil), x.Samples[150:]...), x.Samples[:150]...), Rate: rate}
		}
		if v := Separate(turn(p), turn(q), zc); math.Abs(v.ReturnTime-w.ReturnTime) > 1e-9 {
			t.Errorf("turned: return after %v s, %v before", v.ReturnTime, w.ReturnTime)
		}
	}
}

// A matched line reflects nothing: P = Zc Q.
func TestWavesOfAMatchedLine(t *testing.T) {
	p, q := data.Period{Rate: 100}, data.Period{Rate: 100}
	for j := range 80 {
		v := math.Sin(2 * math.Pi * float64(j) / 80)
		p.Samples, q.Samples = append(p.Samples, 0.05*v), append(q.Samples, v)
	}
	if w := Separate(p, q, 0.05); w.Magnitude > 1e-12 {
		t.Errorf("magnitude %v", w.Magnitude)
	}
	if w := Separate(p, q, 0); w.Reason == "" || !math.IsNaN(w.Magnitude) {
		t.Errorf("no characteristic impedance: %+v", w)
	}
}

// Leaving out a block of identical beats changes nothing.
func TestWavesWithBlocksLeftOut(t *testing.T) {
	p, q, rate := beats(published[1].z, 9, 100, 8, 0, 0)
	all := LeaveOut(p, q, rate, 0.05, 3)
	whole := Separate(data.Period{Samples: p[0], Rate: rate}, data.Period{Samples: q[0], Rate: rate}, 0.05)
	if len(all) != 3 || LeaveOut(p, q, rate, 0.05, 9) != nil {
		t.Fatalf("%d blocks", len(all))
	}
	for _, w := range all {
		if math.Abs(w.Magnitude-whole.Magnitude) > 1e-9 || math.Abs(w.ReturnTime-whole.ReturnTime) > 1e-9 {
			t.Errorf("%v after %v s, want %v after %v s", w.Magnitude, w.ReturnTime, whole.Magnitude, whole.ReturnTime)
		}
	}
}
