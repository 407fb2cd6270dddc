package beat

import (
	"math"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"afterbeat/data/unit"
)

// inTurns is a pulse of which every other beat has its own size and comes early
// by a part of the interval.
func inTurns(heartRate, size, early float64) []float64 {
	x := make([]float64, 125*60)
	noise := autoregressive(3, 125, 60, 0)
	period := 60 / heartRate
	for k := -2; k < int(60/period)+1; k++ {
		onset, amplitude := float64(k)*period, 40.0
		if k%2 != 0 {
			onset, amplitude = onset-early*period, 40*size
		}
		invented{rate: 125, amplitude: amplitude}.add(x, onset, period)
	}
	for i := range x {
		x[i] += 60 + 0.5*noise[i]
	}
	return x
}

// Beats of two kinds in turns are warned of, whether they are told apart by size
// alone (pulsus alternans) or come early as well (bigeminy).
func TestBeatsOfTwoKinds(t *testing.T) {
	for _, c := range []struct{ heartRate, size, early float64 }{
		{75, 0.9, 0}, {75, 0.8, 0}, {90, 0.6, 0}, {60, 0.4, 0}, {75, 0.35, 0}, {75, 0.6, 0.25}, {80, 0.4, 0.25}, {90, 0.5, 0.3},
	} {
		p := Find(inTurns(c.heartRate, c.size, c.early), 125, unit.Pressure)
		codes := strings.Join(warningsOf(p), " ")
		t.Logf("%v: %.1f/min, alternation %.2f, second %.2f, %s; %s", c, p.HeartRate(), p.Alternation, p.SecondPulse, codes, Tally(p.Beats))
		if !p.Found || !strings.Contains(codes, "two-kinds-of-beat") && !strings.Contains(codes, "irregular-rhythm") && !strings.Contains(codes, "many-rejected") {
			t.Errorf("%v: no warning, %.1f/min; %s", c, p.HeartRate(), p.Reason)
		}
	}
	if p := Find(inTurns(75, 1, 0), 125, unit.Pressure); p.Alternation != 0 || p.SecondPulse != 0 {
		t.Errorf("of one kind: %.2f, %.2f", p.Alternation, p.SecondPulse)
	}
}

// A breath of 4 s that moves the pulse by a tenth is measured; the bench
// recording was ventilated 12 times a minute.
func TestBreathing(t *testing.T) {
	v := invented{rate: 125, seconds: 60, heartRate: 75, amplitude: 40, noise: 0.5, offset: 60}
	x, onsets := v.make(4)
	for i := range x {
		k, _ := slices.BinarySearch(onsets, float64(i)/125)
		at := onsets[max(0, k-1)]
		x[i] = 60 + (x[i]-60)*(1+0.05*math.Sin(2*math.Pi*at/4))
	}
	if b := Find(x, 125, unit.Pressure).Breathing; math.Abs(b.Period-4) > 0.1 || math.Abs(b.Variation-0.1) > 0.025 {
		t.Errorf("invented: %+v", b)
	}
	r := read(t, filepath.Join("testdata", "bench_breathing_10s.csv"))
	if _, err := os.Stat(referenceData); err == nil {
		r = read(t, filepath.Join(referenceData, "bench_pq_hyperdynamic_resp12_1000hz_66s.csv"))
		b := Find(r.channel(t, "aortic_pressure_mmHg"), r.grid.Rate, unit.Pressure).Breathing
		t.Logf("bench: %+v", b)
		if math.Abs(b.Period-5) > 0.15 || !(b.Variation > 0.1) {
			t.Errorf("bench: %+v", b)
		}
	}
}
