package energy

import (
	"math"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"

	"pgregory.net/rapid"
)

// sine is mean + amplitude sin(wt - phase), one period of n samples.
func sine(n int, mean, amplitude, phase float64) data.Period {
	p := data.Period{Samples: make([]float64, n), Rate: float64(n) / 0.8}
	for j := range p.Samples {
		p.Samples[j] = mean + amplitude*math.Sin(2*math.Pi*float64(j)/float64(n)-phase)
	}
	return p
}

func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s = %.12g, want %.12g within %g", what, got, want, tolerance)
	}
}

// Closed form: P = 93 + 20 sin, Q = 90 + 80 sin(. - phi) has
// EEP = 93 + 20 80 cos(phi)/(2 90).
func TestEquivalentPressureOfSines(t *testing.T) {
	for _, c := range []struct{ degrees, eep, she, percent float64 }{
		{0, 101.8889, 11850.879, 9.5579},
		{60, 97.4444, 5925.439, 4.77897},
		{90, 93, 0, 0},
		{180, 84.1111, -11850.879, -9.5579}, // below the mean, never clamped
	} {
		phase := c.degrees * math.Pi / 180
		p, q := sine(160, 93, 20, 0), sine(160, 90, 80, phase)
		near(t, "EEP, closed form", EEP(p, q), 93+20*80*math.Cos(phase)/180, 1e-11)
		near(t, "EEP", EEP(p, q), c.eep, 5e-5)
		near(t, "SHE", SHE(p, q), c.she, 5e-4)
		near(t, "percent pulsatility", PercentPulsatility(p, q), c.percent, 5e-5)
	}
}

// A steady pressure or a steady flow carries no surplus and no pulsatile power,
// whatever the other does; and none means 0, not a rounding error.
func TestSteadySignalsHaveNoSurplus(t *testing.T) {
	beating, steady := sine(90, 93, 20, 0), sine(90, 91.8751234567, 0, 0)
	near(t, "SHE of steady flow", SHE(beating, steady), 0, 0)
	near(t, "SHE of steady pressure", SHE(steady, beating), 0, 0)
	near(t, "pulsatile power of steady flow", PowerOf(beating, steady).Pulsatile, 0, 0)
	near(t, "pulsatile power of steady pressure", PowerOf(steady, beating).Pulsatile, 0, 0)
}

func TestNothingDeliveredHasNoEquivalentPressure(t *testing.T) {
	p := sine(90, 93, 20, 0)
	for name, q := range map[string]data.Period{
		"no mean flow":  {Samples: make([]float64, 90), Rate: p.Rate},
		"reversed flow": sine(90, -90, 80, 0),
	} {
		for what, v := range map[string]float64{"EEP": EEP(p, q), "SHE": SHE(p, q), "percent": PercentPulsatility(p, q)} {
			if !math.IsNaN(v) {
				t.Errorf("%s: %s = %v, want NaN", name, what, v)
			}
		}
	}
	if v := PercentPulsatility(sine(90, 0, 20, 0), sine(90, 90, 80, 0)); !math.IsNaN(v) {
		t.Errorf("percent pulsatility at no mean pressure = %v, want NaN", v)
	}
}

// The centred form is the definition: EEP = sum PQ / sum Q.
func TestEquivalentPressureIsItsDefinition(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(1, 60).Draw(t, "n")
		p := data.Period{Samples: rapid.SliceOfN(rapid.Float64Range(-20, 250), n, n).Draw(t, "p"), Rate: 100}
		q := data.Period{Samples: rapid.SliceOfN(rapid.Float64Range(-100, 600), n, n).Draw(t, "q"), Rate: 100}
		q.Samples[0] += 120 * float64(n) // keeps mean flow positive
		pq, sum := 0.0, 0.0
		for j := range p.Samples {
			pq += p.Samples[j] * q.Samples[j]
			sum += q.Samples[j]
		}
		if got := EEP(p, q); math.Abs(got-pq/sum) > 1e-9 {
			t.Fatalf("EEP %v, by definition %v", got, pq/sum)
		}
		if got, want := SHE(p, q), unit.DynPerMmHg*(pq/sum-p.Mean()); math.Abs(got-want) > 1e-6 {
			t.Fatalf("SHE %v, by definition %v", got, want)
		}
	})
}

func TestPeriodsThatDoNotMatchPanic(t *testing.T) {
	defer func() {
		if recover() == nil {
			t.Error("no panic")
		}
	}()
	EEP(sine(90, 93, 20, 0), sine(91, 90, 80, 0))
}
