package beat

import (
	"math"
	"testing"

	"afterbeat/data/unit"
)

// An hour at 1 kHz has 3.6 million samples: 277 ns a sample are a second.
func BenchmarkFind(b *testing.B) {
	v := invented{rate: 1000, seconds: 300, heartRate: 75, scatter: 0.03, amplitude: 40, noise: 1, breathing: 5, offset: 60}
	x, _ := v.make(1)
	b.ReportAllocs()
	for b.Loop() {
		if !Find(x, v.rate, unit.Pressure).Found {
			b.Fatal("no pulse")
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*len(x)), "ns/sample")
}

// The plain loop beside it: a slope sum and its mean, nothing else.
func BenchmarkPlainSlopeSum(b *testing.B) {
	v := invented{rate: 1000, seconds: 300, heartRate: 75, scatter: 0.03, amplitude: 40, noise: 1, breathing: 5, offset: 60}
	x, _ := v.make(1)
	total := 0.0
	for b.Loop() {
		sum := 0.0
		for i := 129; i < len(x); i++ {
			sum += math.Max(0, x[i]-x[i-1]) - math.Max(0, x[i-128]-x[i-129])
			total += sum
		}
	}
	if math.IsNaN(total) {
		b.Fatal("not a number")
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*len(x)), "ns/sample")
}

func BenchmarkCut(b *testing.B) {
	v := invented{rate: 1000, seconds: 300, heartRate: 75, scatter: 0.03, amplitude: 40, noise: 1, breathing: 5, offset: 60}
	x, _ := v.make(1)
	p := Find(x, v.rate, unit.Pressure)
	b.ReportAllocs()
	for b.Loop() {
		if e := Cut(p.Beats, v.rate, Signal{Values: x}, Signal{Values: x, Delay: 0.0123}); len(e.Used) == 0 {
			b.Fatal("no beat")
		}
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N*len(x)), "ns/sample")
}
