package fitting

import (
	"fmt"
	"math"
	"math/cmplx"
	"math/rand/v2"
	"testing"

	"afterbeat/data"
)

// Two independent ways: the definition summed as it stands, and the library's
// transform behind data.Period.
func TestTransformAgainstDefinition(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	for _, n := range []int{1, 2, 3, 4, 5, 6, 7, 8, 11, 15, 16, 20, 61, 62, 67, 71, 122, 134, 197, 200, 211, 360, 857, 860, 1000} {
		a, b := make([]float64, n), make([]float64, n)
		for j := range n {
			a[j], b[j] = 90+10*rng.NormFloat64(), 300*rng.NormFloat64()
		}
		plan := newTransform(n)
		x, y := make([]complex128, n/2+1), make([]complex128, n/2+1)
		plan.pair(x, y, a, b)
		want := data.Period{Samples: b, Rate: 1}.Spectrum()
		for k := range x {
			var sum complex128
			for j := range n {
				sin, cos := math.Sincos(2 * math.Pi * float64(j*k%n) / float64(n))
				sum += complex(a[j]*cos, -a[j]*sin)
			}
			sum /= complex(float64(n), 0)
			// The library loses digits at large prime lengths (1e-11 at 211).
			if cmplx.Abs(x[k]-sum) > 1e-12 || cmplx.Abs(y[k]-want[k]) > 1e-10 {
				t.Fatalf("n = %d, k = %d: %v and %v, want %v and %v", n, k, x[k], y[k], sum, want[k])
			}
		}
		back := make([]float64, n)
		plan.inverse(back, x)
		for j := range n {
			if math.Abs(back[j]-a[j]) > 1e-11 {
				t.Fatalf("n = %d: sample %d comes back as %v, was %v", n, j, back[j], a[j])
			}
		}
	}
}

// The parts of an inverse that cannot be in a real signal do not count, as
// data.FromSpectrum has it.
func TestInverseDropsImaginaryEnds(t *testing.T) {
	x := []complex128{1 + 5i, 2 - 1i, 3 + 7i}
	got := make([]float64, 4)
	newTransform(4).inverse(got, x)
	want := data.FromSpectrum([]complex128{1, 2 - 1i, 3}, 4, 1).Samples
	for j := range want {
		if math.Abs(got[j]-want[j]) > 1e-14 {
			t.Errorf("sample %d: %v, want %v", j, got[j], want[j])
		}
	}
}

func TestTransformAllocatesNothing(t *testing.T) {
	for _, n := range []int{200, 857} {
		plan, a := newTransform(n), make([]float64, n)
		x, y := make([]complex128, n/2+1), make([]complex128, n/2+1)
		if got := testing.AllocsPerRun(10, func() { plan.pair(x, y, a, a); plan.inverse(a, x) }); got != 0 {
			t.Errorf("n = %d: %v allocations", n, got)
		}
	}
}

func BenchmarkTransformPair(b *testing.B) {
	for _, n := range []int{200, 854, 857, 860, 1000} {
		b.Run(fmt.Sprint(n), func(b *testing.B) {
			plan, a := newTransform(n), make([]float64, n)
			x, y := make([]complex128, n/2+1), make([]complex128, n/2+1)
			b.ReportAllocs()
			for b.Loop() {
				plan.pair(x, y, a, a)
			}
		})
	}
}
