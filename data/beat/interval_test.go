package beat

import (
	"math"
	"math/rand/v2"
	"testing"
)

// Ranks of the 95 % interval of a median as tables of order statistics have them
// (e.g. Conover 1999, from memory), and P(X < j) by the binomial sum itself.
func TestLowerRank(t *testing.T) {
	for n, want := range map[int]int{5: 0, 6: 1, 8: 1, 9: 2, 10: 2, 12: 3, 15: 4, 20: 6, 25: 8, 50: 18, 100: 40} {
		if got := lowerRank(n); got != want {
			t.Errorf("n = %d: rank %d, want %d", n, got, want)
		}
		below, choose := 0.0, 1.0
		for k := range want {
			below += choose * math.Pow(0.5, float64(n))
			choose *= float64(n-k) / float64(k+1)
		}
		next := below + choose*math.Pow(0.5, float64(n))
		if below > 0.025 || next <= 0.025 {
			t.Errorf("n = %d: %g and %g do not enclose 0.025", n, below, next)
		}
	}
}

// Closed form: an AR(1) series has tau = (1 + phi)/(1 - phi).
func TestCorrelationTime(t *testing.T) {
	for _, phi := range []float64{0, 0.3, 0.6, 0.8} {
		mean := 0.0
		for seed := range uint64(20) {
			mean += correlationTime(autoregressive(seed, 1, 4000, phi)) / 20
		}
		if want := (1 + phi) / (1 - phi); math.Abs(mean-want) > 0.15*want {
			t.Errorf("phi = %g: tau %.2f, want %.2f", phi, mean, want)
		}
	}
	if got := correlationTime([]float64{3, 3, 3}); got != 1 {
		t.Errorf("a constant has tau %g", got)
	}
}

// The intervals cover the truth in 95 % of the cases, or somewhat more, when
// beats are independent, when they swing with breathing, and when they wander.
func TestIntervalsCover(t *testing.T) {
	const trials = 400
	for _, c := range []struct {
		name  string
		least float64
		draw  func(rng *rand.Rand, i int, last float64, phase float64) float64
	}{
		{"independent", 0.93, func(rng *rand.Rand, _ int, _, _ float64) float64 { return rng.NormFloat64() }},
		{"breathing", 0.95, func(rng *rand.Rand, i int, _, phase float64) float64 {
			return 2*math.Sin(2*math.Pi*(float64(i)/5.3+phase)) + rng.NormFloat64()
		}},
		{"wandering", 0.88, func(rng *rand.Rand, _ int, last, _ float64) float64 { return 0.7*last + rng.NormFloat64() }},
	} {
		medians, means := 0, 0
		for trial := range uint64(trials) {
			rng := rand.New(rand.NewPCG(trial, 7))
			phase, last := rng.Float64(), 0.0
			var x []float64
			var beats []Beat
			for i := range 160 {
				last = c.draw(rng, i, last, phase)
				if i >= 40 {
					x = append(x, last)
					beats = append(beats, Beat{From: 100 * i, To: 100 * (i + 1), Mean: last})
				}
			}
			if i, _ := medianInterval(x); i.Contains(0) {
				medians++
			}
			if i, _ := meanInterval(beats); i.Contains(0) {
				means++
			}
		}
		median, mean := float64(medians)/trials, float64(means)/trials
		t.Logf("%s: median covered %.3f, mean %.3f", c.name, median, mean)
		if median < c.least || mean < c.least {
			t.Errorf("%s: want %.2f or more", c.name, c.least)
		}
		if c.name == "independent" && (median > 0.995 || mean > 0.995) {
			t.Errorf("%s: too wide", c.name)
		}
	}
}

func TestNoIntervalFromFewBeats(t *testing.T) {
	if i, why := medianInterval([]float64{1, 2, 3, 4, 5}); i.Defined() || why == "" {
		t.Errorf("%v %q from five", i, why)
	}
	if i, why := medianInterval([]float64{1, 5, 2, 6, 3, 4}); i.Low != 1 || i.High != 6 || why != "" {
		t.Errorf("%v %q from six", i, why)
	}
	if i, why := meanInterval([]Beat{{From: 0, To: 10, Mean: 3}}); i.Defined() || why == "" {
		t.Errorf("%v %q from one", i, why)
	}
}
