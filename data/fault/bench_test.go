package fault

import (
	"math"
	"testing"

	"afterbeat/data/unit"
)

// BenchmarkFindHour: an hour at 1 kHz.
func BenchmarkFindHour(b *testing.B) {
	x := make([]float64, 3_600_000)
	for i := range x {
		t := float64(i) / 1000
		x[i] = math.Round(10*(90+20*math.Sin(2*math.Pi*1.2*t)+6*math.Sin(4*math.Pi*1.2*t)+math.Sin(2*math.Pi*t/7))) / 10
	}
	b.ReportAllocs()
	for b.Loop() {
		Find(Trace{Values: x, Rate: 1000, Quantity: unit.Pressure, Unit: "mmHg"})
	}
}
