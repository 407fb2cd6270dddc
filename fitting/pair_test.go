package fitting

import (
	"math"
	"testing"
)

// Two flows together meet what each meets alone.
func TestPairIsTwoResponses(t *testing.T) {
	for _, n := range []int{1, 2, 7, 16, 200, 211, 857} {
		a, b := sample(exampleFlow, n, 0.3), sample(exampleFlow, n, 0)
		for j := range b.Samples {
			b.Samples[j] = 40 - b.Samples[j]/3
		}
		for _, m := range Models() {
			l := Lumped{Model: m, Values: example}
			r := NewResponder(n, a.Rate)
			z, toA, toB := make([]complex128, n/2+1), make([]float64, n), make([]float64, n)
			r.Impedances(z, l)
			r.Pair(toA, toB, z, a.Samples, b.Samples)
			wantA, wantB := Respond(l, a, 0), Respond(l, b, 0)
			for j := range n {
				if math.Abs(toA[j]-wantA.Samples[j]) > 1e-10 || math.Abs(toB[j]-wantB.Samples[j]) > 1e-10 {
					t.Fatalf("%s, n = %d, sample %d: %v and %v, want %v and %v", m.Name, n, j, toA[j], toB[j], wantA.Samples[j], wantB.Samples[j])
				}
			}
		}
	}
}

func TestPairAllocatesNothing(t *testing.T) {
	a := sample(exampleFlow, 211, 0)
	r := NewResponder(211, a.Rate)
	var l Load = Lumped{Model: model(t, "wk3"), Values: example}
	z, toA, toB := make([]complex128, 106), make([]float64, 211), make([]float64, 211)
	if got := testing.AllocsPerRun(10, func() {
		r.Impedances(z, l)
		r.Pair(toA, toB, z, a.Samples, a.Samples)
	}); got != 0 {
		t.Errorf("%v allocations", got)
	}
}
