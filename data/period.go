package data

import (
	"math"

	"gonum.org/v1/gonum/dsp/fourier"
)

// Period is one period of a periodic signal: N samples at Rate, so that it
// lasts exactly N/Rate; sample N would be sample 0 again. Between samples it
// is the trigonometric interpolation.
type Period struct {
	Samples []float64 // in the internal unit of the quantity
	Rate    float64   // Hz
}

// Duration is N/Rate, in s.
func (p Period) Duration() float64 { return float64(len(p.Samples)) / p.Rate }

// Mean is the average over the period, which is X_0 of the spectrum.
func (p Period) Mean() float64 {
	sum := 0.0
	for _, x := range p.Samples {
		sum += x
	}
	return sum / float64(len(p.Samples))
}

// Extremes returns the smallest and the largest sample.
func (p Period) Extremes() (low, high float64) {
	low, high = math.Inf(1), math.Inf(-1)
	for _, x := range p.Samples {
		low, high = min(low, x), max(high, x)
	}
	return low, high
}

// Omega is the angular frequency of harmonic k, 2 pi k/Duration, in rad/s.
func (p Period) Omega(k int) float64 { return 2 * math.Pi * float64(k) / p.Duration() }

// Spectrum returns the Fourier coefficients X_k, k = 0 .. N/2 (rounded down):
//
//	X_k = (1/N) sum_j x_j exp(-2 pi i j k/N)
//
// so X_0 is the mean, and the amplitude of harmonic k is 2|X_k|. At the
// Nyquist bin (k = N/2 of an even N) X_k is real and the amplitude is |X_k|.
func (p Period) Spectrum() []complex128 {
	n := len(p.Samples)
	x := fourier.NewFFT(n).Coefficients(nil, p.Samples)
	for k := range x {
		x[k] /= complex(float64(n), 0)
	}
	return x
}

// FromSpectrum is the inverse of [Period.Spectrum] for a period of n samples.
// Of X_0 and of the Nyquist bin of an even n only the real part counts.
func FromSpectrum(x []complex128, n int, rate float64) Period {
	if len(x) != n/2+1 {
		panic("data: FromSpectrum: want n/2+1 coefficients")
	}
	return Period{Samples: fourier.NewFFT(n).Sequence(nil, x), Rate: rate}
}

// Weight is how often harmonic k of n samples counts in Parseval's sum,
//
//	(1/n) sum_j x_j^2 = sum_k Weight(k, n) |X_k|^2,
//
// 1 at k = 0 and at the Nyquist bin of an even n, else 2.
func Weight(k, n int) float64 {
	if k == 0 || 2*k == n {
		return 1
	}
	return 2
}
