package fault

import (
	"math"
	"math/rand/v2"
	"path/filepath"
	"slices"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// carotid is an invented velocity, 20 to 110 cm/s, in steps of 0.1 cm/s.
func carotid(rate, seconds float64) Trace {
	rng := rand.New(rand.NewPCG(7, 8))
	t := Trace{Rate: rate, Quantity: unit.Velocity, Unit: "cm/s", Name: data.Clean("cca")}
	for i := range int(rate * seconds) {
		at := float64(i) / rate
		v := 20 + 2*(artery(at)-70) + 0.2*rng.NormFloat64()
		t.Values = append(t.Values, math.Round(10*v)/10)
	}
	return t
}

// fold is what a scale from low, of some range, shows.
func fold(v, low, scale float64) float64 { return v - scale*math.Floor((v-low)/scale) }

func TestUnwrapIsExact(t *testing.T) {
	trace := carotid(100, 30)
	for _, low := range []float64{-80, -64, -20, 0} {
		const scale = 128 // of which sums of tenths stay what they are to 1e-12
		var folded []float64
		for _, v := range trace.Values {
			folded = append(folded, fold(v, low, scale))
		}
		got := Unwrap(folded, scale)
		shift := math.Round((trace.Values[0]-got[0])/scale) * scale // where it begins folded
		for i, v := range trace.Values {
			if math.Abs(got[i]+shift-v) > 1e-9 {
				t.Fatalf("scale from %v: sample %d is %v, want %v", low, i, got[i]+shift, v)
			}
		}
	}
}

// Scales that end at 70 to 100 cm/s, under the systolic velocity; missing samples in it.
func TestAliased(t *testing.T) {
	for _, rate := range []float64{64, 100, 200} {
		trace := carotid(rate, 30)
		for _, top := range []float64{70, 80, 90} {
			const scale = 120
			folded := trace
			folded.Values = nil
			for i, v := range trace.Values {
				if i%997 == 500 {
					v = math.NaN()
				}
				folded.Values = append(folded.Values, fold(v, top-scale, scale))
			}
			f := only(t, "folded", Find(folded), data.CodeAliased)
			if math.Abs(f.Number-scale) > 0.02*scale {
				t.Errorf("%g Hz, to %g: a range of %g, want %g", rate, top, f.Number, float64(scale))
			}
			if got := Unwrap(folded.Values, scale); math.Abs(got[200]-trace.Values[200]) > 1e-9 {
				t.Errorf("%g Hz, to %g: %v, want %v", rate, top, got[200], trace.Values[200])
			}
		}
	}
}

// A wall filter of 8 cm/s on a velocity that falls to 2; the same velocity without it,
// one that stops in diastole by itself, and a real one.
func TestWallFilter(t *testing.T) {
	trace := carotid(200, 30)
	for i, v := range trace.Values {
		trace.Values[i] = math.Round(10*max(0, v-22)) / 10
	}
	if found := Find(trace); slices.Contains(codes(found), data.CodeWallFilter) {
		t.Errorf("without a filter: %v", found)
	}
	filtered := trace
	filtered.Values = slices.Clone(trace.Values)
	for i, v := range filtered.Values {
		if v < 8 {
			filtered.Values[i] = 0
		}
	}
	f := only(t, "wall filter", Find(filtered), data.CodeWallFilter)
	if math.Abs(f.Number-8) > 1 {
		t.Errorf("%g cm/s, want 8", f.Number)
	}
	half := trace
	half.Values = nil
	for i := range 6000 {
		half.Values = append(half.Values, max(0, 84*math.Sin(2*math.Pi*1.25*float64(i)/200)))
	}
	for _, f := range Find(half) {
		t.Errorf("half sine: %s: %s", f.Code, f.Text)
	}
	for _, f := range Find(excerpt(t, filepath.Join(excerpts, "tcd_6s.csv"), "mcav_cm_s")) {
		if f.Code != data.CodeHeld {
			t.Errorf("a real velocity: %s", f.Text)
		}
	}
}
