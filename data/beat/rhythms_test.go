package beat

import (
	"math"
	"os"
	"path/filepath"
	"testing"

	"afterbeat/data/unit"
)

// twoRhythms is the heart's pulse and a modulation beside it.
func twoRhythms(rate, seconds, heart, heartSwing, pump, pumpSwing float64, shape string) []float64 {
	x := make([]float64, int(rate*seconds))
	v := ripple{shape: shape}
	noise := autoregressive(5, rate, seconds, 0)
	for i := range x {
		t := float64(i) / rate
		_, u := math.Modf(heart*t + 0.13)
		x[i] = 80 + heartSwing*v.at(u) + pumpSwing/2*math.Sin(2*math.Pi*pump*t+0.4) + 0.1*noise[i]
	}
	return x
}

// Heart and modulation are separated, each with its frequency within 1 % and its
// pulse within 5 %, whatever the criteria.
func TestTwoRhythms(t *testing.T) {
	for _, by := range []Criteria{Measured, Support} {
		for _, shape := range []string{"pulse", "hump", "sine"} {
			for k, c := range []struct{ rate, seconds, heart, heartSwing, pump, pumpSwing float64 }{
				{200, 60, 1.2, 20, 0.5, 8},
				{100, 30, 1.2, 10, 0.5, 5},
				{125, 120, 1.2, 30, 0.5, 10},
				{250, 40, 1.2, 12, 0.5, 12},
				{125, 60, 1.5, 15, 0.62, 5},
				{125, 60, 1.1, 15, 0.43, 4},
				{125, 60, 2.0, 20, 0.83, 8},
			} {
				if k > 1 && (by == Support) != (shape == "hump") { // enough of them
					continue
				}
				x := twoRhythms(c.rate, c.seconds, c.heart, c.heartSwing, c.pump, c.pumpSwing, shape)
				p := FindBy(by, x, c.rate, unit.Pressure)
				if len(p.Rhythms) != 2 {
					t.Errorf("%s %s %v: %v, %s %s", by, shape, c, p.Rhythms, p.Reason, p.Overlap)
					continue
				}
				for i, want := range []Rhythm{{c.heart, c.heartSwing}, {c.pump, c.pumpSwing}} {
					got := p.Rhythms[i]
					if math.Abs(got.Frequency/want.Frequency-1) > 0.01 || math.Abs(got.PulseAmplitude/want.PulseAmplitude-1) > 0.05 {
						t.Errorf("%s %s %v: rhythm %d %v", by, shape, c, i, got)
					}
				}
			}
		}
	}
}

// A modulation at a simple ratio to the heart rate is not separated.
func TestOverlappingRhythms(t *testing.T) {
	for _, pump := range []float64{0.6, 0.8, 0.4} {
		x := twoRhythms(125, 60, 1.2, 20, pump, 8, "pulse")
		p := Find(x, 125, unit.Pressure)
		t.Logf("%g Hz: %v, %q", pump, p.Rhythms, p.Overlap)
		if len(p.Rhythms) > 1 || p.Overlap == "" && len(warningsOf(p)) == 0 {
			t.Errorf("%g Hz: %v, %q", pump, p.Rhythms, p.Overlap)
		}
	}
}

// No recording of the reference has a second rhythm, or two kinds of beat.
func TestOneRhythmInRecordings(t *testing.T) {
	if _, err := os.Stat(referenceData); err != nil {
		t.Skip("the full reference recordings are not beside this clone")
	}
	files, _ := filepath.Glob(filepath.Join(referenceData, "*[0-9]s.csv"))
	looked := 0
	for _, file := range files {
		r := read(t, file)
		for _, c := range r.channels {
			if c.Quantity != unit.Pressure && c.Quantity != unit.Flow && c.Quantity != unit.Velocity {
				continue
			}
			p := Find(r.channel(t, c.Name.String()), r.grid.Rate, c.Quantity)
			looked++
			if len(p.Rhythms) > 1 || p.Overlap != "" || p.Alternation > 0 || p.SecondPulse > 0 {
				t.Errorf("%s %s: %v %s, alternation %.2f, second pulse %.2f", filepath.Base(file), c.Name, p.Rhythms, p.Overlap, p.Alternation, p.SecondPulse)
			}
		}
	}
	if looked < 10 {
		t.Errorf("%d channels", looked)
	}
}
