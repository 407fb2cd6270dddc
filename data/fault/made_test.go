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

// clean are traces without a fault of their own, of different devices and pulses.
func clean(tb testing.TB) map[string]Trace {
	return map[string]Trace{
		"shock":   excerpt(tb, filepath.Join(excerpts, "icu_low_30s.csv"), "abp_mmHg"),
		"early":   excerpt(tb, filepath.Join(excerpts, "icu_premature_30s.csv"), "abp_mmHg"),
		"bench":   excerpt(tb, filepath.Join(excerpts, "bench_breathing_10s.csv"), "aortic_pressure_mmHg"),
		"flow":    excerpt(tb, filepath.Join(excerpts, "bench_breathing_10s.csv"), "aortic_flow_mL_s"),
		"support": supported(200, 60),
	}
}

// supported is an invented patient on a pump: 6 mmHg of pulse, breathing, beats that
// vary, and the noise of a converter.
func supported(rate, seconds float64) Trace {
	rng := rand.New(rand.NewPCG(1, 2))
	t := Trace{Rate: rate, Quantity: unit.Pressure, Unit: "mmHg", Name: data.Clean("abp")}
	phase := 0.0
	for i := range int(rate * seconds) {
		at := float64(i) / rate
		phase += (1.4 + 0.05*math.Sin(2*math.Pi*0.25*at) + 0.01*rng.NormFloat64()) / rate
		x := 82 + 2.5*math.Sin(2*math.Pi*phase) + 0.8*math.Sin(4*math.Pi*phase+1) + math.Sin(2*math.Pi*0.25*at) + 0.05*rng.NormFloat64()
		t.Values = append(t.Values, math.Round(100*x)/100)
	}
	return t
}

// only checks that one fault was found, and no other but those allowed.
func only(t *testing.T, what string, found []Finding, want data.Code, allowed ...data.Code) (f Finding) {
	t.Helper()
	for _, one := range found {
		switch {
		case one.Code == want:
			f = one
		case !slices.Contains(allowed, one.Code):
			t.Errorf("%s: %s: %s", what, one.Code, one.Text)
		}
	}
	if f.Code == "" {
		t.Errorf("%s: no %s in %v", what, want, codes(found))
	}
	return f
}

func TestNothingOnCleanTraces(t *testing.T) {
	for name, trace := range clean(t) {
		if found := Find(trace); len(found) > 0 {
			t.Errorf("%s: %s: %s", name, found[0].Code, found[0].Text)
		}
	}
}

// A trace read out k times faster than it was measured, k whole or not.
func TestHeld(t *testing.T) {
	for name, trace := range clean(t) {
		holds := []float64{1.6, 2, 2.5, 3, 4, 5.2, 8, 10}
		if trace.Rate >= 1000 {
			holds = holds[4:6]
		}
		for _, k := range holds {
			was := trace.Rate
			held := trace
			held.Rate, held.Values = was*k, nil
			for i := range int(float64(len(trace.Values)) * k) {
				held.Values = append(held.Values, trace.Values[int((float64(i)+0.3)/k)])
			}
			f := only(t, name, Find(held), data.CodeHeld)
			if math.Abs(f.Number-was) > 0.002*was {
				t.Errorf("%s, held for %g samples: %g Hz, want %g", name, k, f.Number, was)
			}
		}
	}
}

// Rounding to one thirtieth of the pulse.
func TestQuantised(t *testing.T) {
	for name, trace := range clean(t) {
		q := measure(trace.Values, trace.Rate).pulse / 30
		coarse := trace
		coarse.Values = nil
		for _, v := range trace.Values {
			coarse.Values = append(coarse.Values, math.Round(v/q)*q)
		}
		f := only(t, name, Find(coarse), data.CodeQuantised)
		if math.Abs(f.Number-q) > 1e-9*q {
			t.Errorf("%s: steps of %g, want %g", name, f.Number, q)
		}
	}
}

// Clipped a fifth of the pulse under the top: the samples of single pulses are left
// out, those of every pulse are not.
func TestClipped(t *testing.T) {
	for name, trace := range clean(t) {
		for _, sign := range []float64{1, -1} {
			s := measure(trace.Values, trace.Rate)
			rail := s.high - 0.2*s.pulse
			if sign < 0 {
				rail = s.low + 0.1*s.pulse
			}
			cut := trace
			cut.Values = slices.Clone(trace.Values)
			n := 0
			for i, v := range cut.Values {
				if sign*(v-rail) > 0 {
					cut.Values[i] = rail
					n++
				}
			}
			f := only(t, name, Find(cut), data.CodeClipped)
			if f.Number != rail || math.Abs(float64(f.Samples()-n)) > 0.15*float64(n) {
				t.Errorf("%s %+g: clipped at %g with %d samples, want %g with %d", name, sign, f.Number, f.Samples(), rail, n)
			}
		}
	}
}

func TestClippedNowAndThenIsLeftOut(t *testing.T) {
	trace := supported(200, 60)
	trace.Quantity = unit.Flow                     // a pressure would have been flushed
	for from := 1000; from < 11000; from += 3000 { // to the end of the scale
		for i := from; i < from+60; i++ {
			trace.Values[i] = 300
		}
	}
	f := only(t, "flushes", Find(trace), data.CodeClipped)
	if len(f.Runs) != 4 || f.Samples() != 240 || !f.Unusable {
		t.Errorf("%d runs, %d samples, unusable %v", len(f.Runs), f.Samples(), f.Unusable)
	}
}

func TestFlat(t *testing.T) {
	for name, trace := range clean(t) {
		flat := trace
		flat.Values = slices.Clone(trace.Values)
		n := int(3 * trace.Rate)
		from := len(flat.Values) / 3
		for i := range n {
			flat.Values[from+i] = flat.Values[from]
		}
		f := only(t, name, Find(flat), data.CodeFlat)
		if math.Abs(float64(f.Samples()-n)) > 0.02*float64(n) || !f.Unusable || math.Abs(f.Number-3) > 0.06 {
			t.Errorf("%s: %g s, %d of %d samples", name, f.Number, f.Samples(), n)
		}
	}
	all := Trace{Values: slices.Repeat([]float64{5}, 1000), Rate: 100, Quantity: unit.Pressure}
	if found := Find(all); len(found) > 0 {
		t.Errorf("all of it flat: %+v; the search for beats says so", found)
	}
}

// Spikes of half a pulse and more, one or two samples wide.
func TestSpikes(t *testing.T) {
	for name, trace := range clean(t) {
		rng := rand.New(rand.NewPCG(3, 4))
		s := measure(trace.Values, trace.Rate)
		spiked := trace
		spiked.Values = slices.Clone(trace.Values)
		at, wide := map[int]bool{}, 0
		for i := int(trace.Rate); i < len(trace.Values)-9; i += int(1.37 * trace.Rate) {
			height := s.pulse * (1.5 + rng.Float64())
			if rng.IntN(2) == 0 {
				height = -height
			}
			spiked.Values[i] += height
			at[i] = true
			wide++
			for k := 1; k < int(0.006*trace.Rate); k++ { // as wide as 6 ms
				spiked.Values[i+k] += height
				wide++
			}
		}
		f := only(t, name, Find(spiked), data.CodeSpikes)
		if len(f.Runs) != len(at) || f.Samples() != wide {
			t.Errorf("%s: %d spikes, want %d", name, len(f.Runs), len(at))
		}
		for _, r := range f.Runs {
			if !at[r.From] {
				t.Errorf("%s: a spike at %d", name, r.From)
			}
		}
	}
}

// A drift of one pulse over the recording.
func TestDrift(t *testing.T) {
	long := map[string]Trace{"support": supported(200, 60), "long": supported(100, 900)}
	long["icu"] = excerpt(t, filepath.Join(excerpts, "icu_premature_30s.csv"), "abp_mmHg")
	for name, trace := range long {
		for _, sign := range []float64{1, -1} {
			s := measure(trace.Values, trace.Rate)
			drifting := trace
			drifting.Values = slices.Clone(trace.Values)
			per := sign * s.pulse / trace.seconds()
			for i := range drifting.Values {
				drifting.Values[i] += per * float64(i) / trace.Rate
			}
			f := only(t, name, Find(drifting), data.CodeDrift)
			if math.Abs(f.Number-60*per) > 0.15*math.Abs(60*per) {
				t.Errorf("%s: %g a minute, want %g", name, f.Number, 60*per)
			}
		}
	}
}

// Mains of 4 % of the pulse from peak to peak.
func TestHum(t *testing.T) {
	for name, trace := range clean(t) {
		for _, mains := range []float64{50, 60} {
			if trace.Rate < 2*mains+2 {
				t.Fatalf("%s: %g Hz cannot be seen", name, mains)
			}
			s := measure(trace.Values, trace.Rate)
			humming := trace
			humming.Values = slices.Clone(trace.Values)
			a := 0.02 * s.pulse
			for i := range humming.Values {
				humming.Values[i] += a * math.Sin(2*math.Pi*(mains+0.03)*float64(i)/trace.Rate)
			}
			f := only(t, name, Find(humming), data.CodeHum)
			if math.Abs(f.Number-2*a) > 0.2*a {
				t.Errorf("%s: %g from peak to peak, want %g", name, f.Number, 2*a)
			}
		}
	}
}

// A supported patient's pulse, rounded to whole mmHg at 1 kHz, changes now and then
// only, and yet is not held.
func TestCoarseIsNotHeld(t *testing.T) {
	for seed := range 5 {
		trace := supported(1000, 40)
		for i := range trace.Values {
			trace.Values[i] = math.Round(trace.Values[i] + 0.1*float64(seed))
		}
		only(t, "whole mmHg", Find(trace), data.CodeQuantised)
	}
	regular := Trace{Rate: 1000, Quantity: unit.Pressure, Unit: "mmHg"}
	for i := range 40_000 {
		regular.Values = append(regular.Values, math.Round(80+4*math.Sin(2*math.Pi*1.25*float64(i)/1000)))
	}
	only(t, "exactly regular", Find(regular), data.CodeQuantised)
}

func TestFindLeavesTheValues(t *testing.T) {
	trace := supported(200, 30)
	trace.Values[2000] = 500
	before := slices.Clone(trace.Values)
	if len(Find(trace)) == 0 {
		t.Error("no spike")
	}
	if !slices.Equal(before, trace.Values) {
		t.Error("the values changed")
	}
}

func TestTracesWithoutAnything(t *testing.T) {
	nan := math.NaN()
	for name, values := range map[string][]float64{
		"none": {}, "one": {1}, "two": {1, 2}, "missing": slices.Repeat([]float64{nan}, 5000),
		"missing but two": append(slices.Repeat([]float64{nan}, 5000), 1, 2), "infinite": slices.Repeat([]float64{math.Inf(1), 3}, 3000),
	} {
		for _, f := range Find(Trace{Values: values, Rate: 100, Quantity: unit.Pressure}) {
			t.Logf("%s: %s %s", name, f.Code, f.Text)
			if math.IsNaN(f.Number) {
				t.Errorf("%s: %+v", name, f)
			}
		}
	}
}
