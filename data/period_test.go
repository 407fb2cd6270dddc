package data

import (
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"
)

// Closed form: 3 + 2 cos(wt) + 5 sin(2wt) has X_0 = 3, X_1 = 1, X_2 = -2.5i.
func TestSpectrumOfKnownHarmonics(t *testing.T) {
	const n = 10
	p := Period{Samples: make([]float64, n), Rate: 20}
	for j := range p.Samples {
		a := 2 * math.Pi * float64(j) / n
		p.Samples[j] = 3 + 2*math.Cos(a) + 5*math.Sin(2*a)
	}
	want := []complex128{3, 1, -2.5i, 0, 0, 0}
	for k, x := range p.Spectrum() {
		if cmplx.Abs(x-want[k]) > 1e-14 {
			t.Errorf("X_%d = %v, want %v", k, x, want[k])
		}
	}
	if got := p.Duration(); got != 0.5 {
		t.Errorf("duration %v, want 0.5 s", got)
	}
	if got, want := p.Omega(1), 4*math.Pi; math.Abs(got-want) > 1e-14 {
		t.Errorf("omega %v, want %v", got, want)
	}
}

func TestSpectrumInverseAndParseval(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := Period{Samples: rapid.SliceOfN(rapid.Float64Range(-200, 200), 1, 65).Draw(t, "samples"), Rate: 100}
		n := len(p.Samples)
		x := p.Spectrum()
		back := FromSpectrum(x, n, p.Rate)
		sum, bins := 0.0, 0.0
		for j := range p.Samples {
			if math.Abs(back.Samples[j]-p.Samples[j]) > 1e-10 {
				t.Fatalf("sample %d comes back as %v, was %v", j, back.Samples[j], p.Samples[j])
			}
			sum += p.Samples[j] * p.Samples[j] / float64(n)
		}
		for k := range x {
			bins += Weight(k, n) * real(x[k]*cmplx.Conj(x[k]))
		}
		if math.Abs(sum-bins) > 1e-9*(1+sum) {
			t.Fatalf("Parseval: %v in time, %v in frequency", sum, bins)
		}
	})
}
