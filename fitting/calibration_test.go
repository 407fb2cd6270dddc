package fitting

import (
	"math"
	"math/rand/v2"
	"testing"
)

// A cuff of 130/70 mmHg, each within 8: drawn calibrations put 130 and 70 within 8, and
// the two errors do not go together. A width is 1.96 standard deviations.
func TestScaleAboutAPivot(t *testing.T) {
	s := Systematic{PressureScale: 8 * math.Sqrt2 / 60, PressurePivot: 100, PressureOffset: 8 / math.Sqrt2}
	rng := rand.New(rand.NewPCG(1, 2))
	var uu, dd, ud float64
	const n = 40_000
	for range n {
		c := s.draw(rng, 0)
		u, d := c.PressureScale*130+c.PressureOffset-130, c.PressureScale*70+c.PressureOffset-70
		uu, dd, ud = uu+u*u/n, dd+d*d/n, ud+u*d/n
	}
	for _, v := range []float64{uu, dd} {
		if got := z95 * math.Sqrt(v); math.Abs(got-8) > 0.1 {
			t.Errorf("half-width %v, want 8", got)
		}
	}
	if r := ud / math.Sqrt(uu*dd); math.Abs(r) > 0.02 {
		t.Errorf("the errors go together: %v", r)
	}
}
