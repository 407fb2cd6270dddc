package fitting

import (
	"math"
	"testing"

	"afterbeat/data"
)

// There and back, and against the library's transform, at lengths of every kind.
func TestFourierPairs(t *testing.T) {
	for _, n := range []int{1, 2, 3, 8, 37, 60, 129, 200} {
		f := NewFourier(n)
		a, b := make([]float64, n), make([]float64, n)
		for j := range a {
			a[j], b[j] = math.Sin(float64(j*j)), math.Cos(float64(3*j))+float64(j)
		}
		x, y := make([]complex128, n/2+1), make([]complex128, n/2+1)
		f.Pair(x, y, a, b)
		for k, v := range (data.Period{Samples: b, Rate: 1}).Spectrum() {
			if d := v - y[k]; math.Hypot(real(d), imag(d)) > 1e-12 {
				t.Errorf("n %d, coefficient %d: %v, want %v", n, k, y[k], v)
			}
		}
		backA, backB := make([]float64, n), make([]float64, n)
		f.InversePair(backA, backB, x, y)
		for j := range a {
			if math.Abs(backA[j]-a[j]) > 1e-12 || math.Abs(backB[j]-b[j]) > 1e-11 {
				t.Fatalf("n %d, sample %d: %g, %g, want %g, %g", n, j, backA[j], backB[j], a[j], b[j])
			}
		}
	}
}
