package energy

import (
	"math"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"

	"pgregory.net/rapid"
)

// Closed form: a resistor R with Q0 + A sin loses R (Q0^2 + A^2/2). With R = 1
// and Q0 = A = 80: 9600 mmHg mL/s = 1.279895 W, one third of it pulsatile.
func TestPowerOfAResistor(t *testing.T) {
	q := sine(96, 80, 80, 0)
	w := PowerOf(q, q) // P = 1 Q
	near(t, "input", w.Input, 9600, 1e-9)
	near(t, "steady", w.Steady, 6400, 1e-9)
	near(t, "pulsatile", w.Pulsatile, 3200, 1e-9)
	near(t, "input, W", w.Input*unit.MilliwattPerMmHgMLPerS/1000, 1.279895, 5e-7)
}

// Closed form: amplitudes A and B at an angle phi carry A B cos(phi)/2; against
// the sign of either the power turns negative.
func TestPulsatilePowerFollowsTheAngle(t *testing.T) {
	for _, phase := range []float64{0, 1, math.Pi / 2, 3} {
		w := PowerOf(sine(75, 93, 20, 0), sine(75, 90, 80, phase))
		near(t, "pulsatile", w.Pulsatile, 800*math.Cos(phase), 1e-9)
	}
}

// Parseval: what the samples carry is what the harmonics carry, the Nyquist bin
// of an even number of samples included.
func TestInputIsSteadyAndPulsatile(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(1, 64).Draw(t, "n")
		p := data.Period{Samples: rapid.SliceOfN(rapid.Float64Range(-20, 250), n, n).Draw(t, "p"), Rate: 100}
		q := data.Period{Samples: rapid.SliceOfN(rapid.Float64Range(-100, 600), n, n).Draw(t, "q"), Rate: 100}
		w := PowerOf(p, q)
		if d := w.Input - w.Steady - w.Pulsatile; math.Abs(d) > 1e-9*(1+250*600) {
			t.Fatalf("input %v, steady %v, pulsatile %v: differ by %v", w.Input, w.Steady, w.Pulsatile, d)
		}
	})
}

// Common practice: cardiac power is MAP CO/451 W, with the exact mmHg 450.04.
func TestCardiacPower(t *testing.T) {
	const pressure, litres = 93.0, 5.4
	near(t, "cardiac power", CardiacPower(pressure, litres*1000/60), pressure*litres/450.04, 1e-5)
}
