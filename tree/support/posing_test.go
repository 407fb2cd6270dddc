package support

import (
	"math"
	"testing"

	"afterbeat/data"

	"pgregory.net/rapid"
)

// halfSine is the inflow of the worked example (values.md 1.4, Ex. 2): 70 mL
// ejected in 0.3 s of 0.8 s, Q = Qm sin(pi t/Ts), Qm = pi SV/(2 Ts).
func halfSine(n int) data.Period {
	const volume, ejection, period = 70.0, 0.3, 0.8
	q := data.Period{Samples: make([]float64, n), Rate: float64(n) / period}
	for j := range q.Samples {
		if t := float64(j) / q.Rate; t < ejection {
			q.Samples[j] = math.Pi * volume / (2 * ejection) * math.Sin(math.Pi*t/ejection)
		}
	}
	return q
}

func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s = %.12g, want %.12g within %g", what, got, want, tolerance)
	}
}

func same(a, b []float64) bool {
	for j := range a {
		if a[j] != b[j] {
			return false
		}
	}
	return len(a) == len(b)
}

func swing(p data.Period) float64 {
	low, high := p.Extremes()
	return high - low
}

// Closed form: of a half-sine of height Qm in (0, Ts), what stands above
// Qm cos(b) is an arc of half-width b/pi Ts; its volume over the whole is
// sin(b) - b cos(b). So the threshold at share s is Qm cos(b) with
// sin(b) - b cos(b) = 1-s. Sampling leaves errors of order 1/N^2.
func TestThresholdOfAHalfSine(t *testing.T) {
	q := halfSine(16000)
	height := math.Pi * 70 / 0.6
	for _, b := range []float64{0.2, 0.5, 1, 1.3, 1.5} {
		share := 1 - (math.Sin(b) - b*math.Cos(b))
		root, threshold := LateValve(q, share)
		near(t, "threshold", threshold, height*math.Cos(b), 1e-5*height)
		_, high := root.Extremes()
		near(t, "peak of root flow", high, height*(1-math.Cos(b))+share*q.Mean(), 1e-5*height)
	}
}

// By hand: Q = 4, 2, 0, -2 (mean 1) at s = 1/2 ejects half of Q+ = 6: above
// q0 = 1.5 stand 2.5 + 0.5 = 3.
func TestLateValveByHand(t *testing.T) {
	root, threshold := LateValve(data.Period{Samples: []float64{4, 2, 0, -2}, Rate: 4}, 0.5)
	near(t, "threshold", threshold, 1.5, 0)
	if want := []float64{3, 1, 0.5, -0.5}; !same(root.Samples, want) {
		t.Errorf("root flow %v, want %v", root.Samples, want)
	}
}

// flows draws a flow with a positive mean, with ties, back-flow and zeros.
func flows() *rapid.Generator[data.Period] {
	return rapid.Custom(func(t *rapid.T) data.Period {
		sample := rapid.OneOf(rapid.Float64Range(-150, 600), rapid.SampledFrom([]float64{0, 0, 0.1, 0.1, 300}))
		q := data.Period{Samples: rapid.SliceOfN(sample, 1, 80).Draw(t, "flow"), Rate: 100}
		if q.Mean() <= 0.1 {
			q.Samples[0] += float64(len(q.Samples)) * (1 - q.Mean())
		}
		return q
	})
}

// Of any flow with a positive mean, both posings keep the mean, are the native
// flow at s = 0 and steady at s = 1; the swing of root flow falls with s and
// never exceeds the native one.
func TestPosingsOfAnyFlow(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		q := flows().Draw(t, "q")
		shares := []float64{rapid.Float64Range(0, 1).Draw(t, "a"), rapid.Float64Range(0, 1).Draw(t, "b")}
		scale := max(1, swing(q))
		for _, posing := range Posings() {
			less, _ := pose(q, posing, min(shares[0], shares[1]))
			more, _ := pose(q, posing, max(shares[0], shares[1]))
			for _, root := range []data.Period{less, more} {
				if d := root.Mean() - q.Mean(); math.Abs(d) > 1e-12*scale {
					t.Fatalf("%s: mean moves by %v", posing, d)
				}
			}
			if a, b := swing(less), swing(more); b > a+1e-12*scale || a > swing(q)+1e-12*scale {
				t.Fatalf("%s: swing %v, then %v, native %v", posing, a, b, swing(q))
			}
			if native, _ := pose(q, posing, 0); !same(native.Samples, q.Samples) {
				t.Fatalf("%s: share 0 is not native", posing)
			}
			if steady, _ := pose(q, posing, 1); swing(steady) != 0 {
				t.Fatalf("%s: share 1 swings by %v", posing, swing(steady))
			}
		}
	})
}

// The threshold solves its equation, whatever ties there are among the samples.
func TestThresholdSolvesItsEquation(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		q := flows().Draw(t, "q")
		share := rapid.Float64Range(0, 1).Draw(t, "share")
		_, threshold := LateValve(q, share)
		above, positive := 0.0, 0.0
		for _, x := range q.Samples {
			above += max(0, max(0, x)-threshold)
			positive += max(0, x)
		}
		if threshold < 0 || math.Abs(above-(1-share)*positive) > 1e-12*(1+positive) {
			t.Fatalf("threshold %v leaves %v of %v", threshold, above, positive)
		}
	})
}

func TestMisuseOfAPosingPanics(t *testing.T) {
	q := halfSine(80)
	for name, misuse := range map[string]func(){
		"share above 1":    func() { Scaled(q, 1.1) },
		"share below 0":    func() { LateValve(q, -0.1) },
		"share NaN":        func() { LateValve(q, math.NaN()) },
		"no mean flow":     func() { LateValve(data.Period{Samples: []float64{1, -1}, Rate: 2}, 0.5) },
		"a made-up posing": func() { pose(q, "sideways", 0.5) },
	} {
		t.Run(name, func(t *testing.T) {
			defer func() {
				if recover() == nil {
					t.Error("no panic")
				}
			}()
			misuse()
		})
	}
}
