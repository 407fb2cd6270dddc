package fitting

import (
	"context"
	"math/rand/v2"
	"testing"
)

var sink float64

// BenchmarkReferenceLoop is a plain loop of 1000 dependent multiplications and
// additions: what the machine is worth, for comparison.
func BenchmarkReferenceLoop(b *testing.B) {
	x := make([]float64, 1000)
	for i := range x {
		x[i] = float64(i % 17)
	}
	b.ReportAllocs()
	for b.Loop() {
		sink = squares(x)
	}
}

func squares(x []float64) float64 {
	sum := 0.0
	for _, v := range x {
		sum += v * v
	}
	return sum
}

// benchmarkFit measures a fit from the samples of the average beat: spectra and
// search.
func benchmarkFit(b *testing.B, n int) {
	f, spectra := fromSamples(b, n)
	b.ReportAllocs()
	for b.Loop() {
		spectra()
		f.search.run()
	}
	sink = f.search.sum
}

// fromSamples sets up a fit of n samples; its second result redoes the spectra.
func fromSamples(tb testing.TB, n int) (f *beatFit, spectra func()) {
	beats := noisy(n, 1, 1)
	f = newBeatFit(model(tb, "wk3"), beats)
	given := asMeasured(0)
	return f, func() {
		f.source.plan.pair(f.source.flow, f.source.pressure, beats.Flow[0], beats.Pressure[0])
		f.moments.set(f.source.flow, f.source.pressure, given)
	}
}

func BenchmarkFitWK3_200(b *testing.B)  { benchmarkFit(b, 200) }
func BenchmarkFitWK3_857(b *testing.B)  { benchmarkFit(b, 857) } // a prime
func BenchmarkFitWK3_1000(b *testing.B) { benchmarkFit(b, 1000) }

func BenchmarkReplicates1000(b *testing.B) {
	beats := noisy(160, 24, 1)
	beats.Systematic = Systematic{Flow: 0.1, PressureScale: 0.03, PressureOffset: 2, Delay: 0.01, OutflowPressure: 10}
	m := model(b, "wk3")
	b.ReportAllocs()
	for b.Loop() {
		r, err := FitBeat(context.Background(), m, beats, Settings{})
		if err != nil {
			b.Fatal(err)
		}
		sink = r.Values.R
	}
}

func TestFitAllocatesNothing(t *testing.T) {
	f, spectra := fromSamples(t, 200)
	if got := testing.AllocsPerRun(20, func() { spectra(); f.search.run() }); got != 0 {
		t.Errorf("a fit from samples: %v allocations", got)
	}
	if got := testing.AllocsPerRun(20, func() { f.refit() }); got != 0 {
		t.Errorf("a replicate's fit: %v allocations", got)
	}
	s := newSource(noisy(200, 24, 1))
	s.useBlocks(5, 1.5)
	starts, flow, pressure := []int32{1, 20, 5, 5, 7}, make([]complex128, 101), make([]complex128, 101)
	if got := testing.AllocsPerRun(20, func() { s.draw(starts, flow, pressure) }); got != 0 {
		t.Errorf("a draw: %v allocations", got)
	}
}

// BenchmarkFitSpan60 is a fit of wk3 to 60 beats at 200 Hz, with its intervals.
func BenchmarkFitSpan60(b *testing.B) {
	s := recorded(60, 0, rand.New(rand.NewPCG(1, 1)))
	m := model(b, "wk3")
	b.ReportAllocs()
	for b.Loop() {
		r, err := FitSpan(context.Background(), m, s, Settings{})
		if err != nil {
			b.Fatal(err)
		}
		sink = r.Values.R
	}
}
