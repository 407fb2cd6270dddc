package support

import (
	"testing"

	"afterbeat/fitting"
	"afterbeat/tree/heart"
)

// BenchmarkCoupledWK3 finds one state at a given filling pressure, from nothing.
func BenchmarkCoupledWK3(b *testing.B) {
	c := failingCase(b)
	c.Filling = heart.Filling{Pressure: 20, Flow: 60}
	b.ReportAllocs()
	for b.Loop() {
		at(b, coupled(b, c), 9)
	}
}

// BenchmarkCoupledLoads is the same for each load, on a filling line.
func BenchmarkCoupledLoads(b *testing.B) {
	for _, kind := range LoadKinds() {
		b.Run(string(kind), func(b *testing.B) {
			c := failingCase(b)
			c.Filling.Flow = 60
			c.Load = Windkessel{Kind: kind, Values: fitting.Values{R: 1.2, C: 1.3, Zc: 0.05, L: 0.005}}
			b.ReportAllocs()
			for b.Loop() {
				at(b, coupled(b, c), 9)
			}
		})
	}
}

// BenchmarkSweep30 sweeps 30 speeds on a filling line that it settles itself.
func BenchmarkSweep30(b *testing.B) {
	c := failingCase(b)
	speeds := make([]float64, 30)
	for i := range speeds {
		speeds[i] = 6 + 0.2*float64(i)
	}
	b.ReportAllocs()
	for b.Loop() {
		if _, err := coupled(b, c).Sweep(speeds); err != nil {
			b.Fatal(err)
		}
	}
}

// BenchmarkBeat is one beat of the integration; it allocates nothing.
func BenchmarkBeat(b *testing.B) {
	k := coupled(b, failingCase(b))
	at(b, k, 8)
	s := &k.shooter
	b.ReportAllocs()
	for b.Loop() {
		y := k.last.start
		s.beat(&y)
	}
}
