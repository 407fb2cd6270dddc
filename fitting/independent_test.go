package fitting

import (
	"math"
	"math/cmplx"
	"testing"

	"afterbeat/fitting/leastsquares"
)

// An independent way to the least squares: Levenberg and Marquardt's method on the
// samples, with the response by a plain Fourier sum and the impedance of the
// literature, from far away, on the average of noisy beats that no model meets.
func TestAgainstLevenbergMarquardt(t *testing.T) {
	for _, n := range []int{60, 81} {
		b := generateFrom(Lumped{model(t, "wk4p"), example}, 12, n, 1, newSeeded(31))
		b.OutflowPressure = 3
		pressure, flow := b.Average()
		spectrum := plainSpectrum(flow.Samples)
		for _, m := range Models() {
			r := fit(t, m, b, Settings{Replicates: 20})
			names := m.Parameters()
			var free []int
			for i, s := range names {
				if r.Values.Of(s.Name) > 0 {
					free = append(free, i)
				}
			}
			start := make([]float64, len(free))
			for k, i := range free {
				start[k] = math.Log(1.3 * r.Values.Of(names[i].Name)) // at a stationary point that is lower than where it started
			}
			at := func(x []float64) Values {
				var v Values
				into := map[string]*float64{"R": &v.R, "C": &v.C, "Zc": &v.Zc, "L": &v.L}
				for k, i := range free {
					*into[names[i].Name] = math.Exp(x[k])
				}
				return v
			}
			best := leastsquares.Minimise(t.Context(), leastsquares.Problem{Count: n, Residuals: func(dst, x []float64) {
				plainResponse(dst, Lumped{m, at(x)}, spectrum, flow.Rate)
				for j, p := range pressure.Samples {
					dst[j] += b.OutflowPressure - p
				}
			}}, start, leastsquares.Settings{})
			if best.Status != leastsquares.Found {
				t.Errorf("%s at %d samples: %s", m.Name, n, best.Status)
				continue
			}
			near(t, m.Name, r.Values, at(best.X), 1e-6)
			if math.Abs(r.SumOfSquares/best.SumOfSquares-1) > 1e-9 {
				t.Errorf("%s at %d samples: sum %v, by the other method %v", m.Name, n, r.SumOfSquares, best.SumOfSquares)
			}
		}
	}
}

// plainSpectrum is (1/n) sum_j q_j exp(-2 pi i j k/n), term by term.
func plainSpectrum(q []float64) []complex128 {
	n := len(q)
	out := make([]complex128, n/2+1)
	for k := range out {
		for j, v := range q {
			out[k] += complex(v/float64(n), 0) * cmplx.Rect(1, -2*math.Pi*float64(j*k%n)/float64(n))
		}
	}
	return out
}

// plainResponse sums Z Q over the harmonics, the real part at the Nyquist bin.
func plainResponse(dst []float64, l Lumped, spectrum []complex128, rate float64) {
	n := len(dst)
	for j := range dst {
		dst[j] = real(l.Impedance(0) * spectrum[0])
	}
	for k := 1; k < len(spectrum); k++ {
		z, weight := l.Impedance(2*math.Pi*float64(k)*rate/float64(n)), 2.0
		if 2*k == n {
			z, weight = complex(real(z), 0), 1
		}
		for j := range dst {
			dst[j] += weight * real(z*spectrum[k]*cmplx.Rect(1, 2*math.Pi*float64(j*k%n)/float64(n)))
		}
	}
}
