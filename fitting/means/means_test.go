package means

import (
	"context"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/fitting"
)

// The worked example (half-sine, stroke volume 70 mL in 0.3 s of 0.8 s; R = 1, C =
// 1.5, Zc = 0.05), computed independently: mean flow 87.5 mL/s, mean pressure 91.875
// mmHg, pulse pressure 40.3701832, the pulse-pressure method of wk2 gives C
// 1.125678.
const (
	exampleT  = 0.8
	exampleTs = 0.3
	exampleQm = math.Pi * 70 / (2 * exampleTs)
	samples   = 400
)

func exampleFlow(t float64) float64 {
	if t < exampleTs {
		return exampleQm * math.Sin(math.Pi*t/exampleTs)
	}
	return 0
}

// flows are beats of the example whose stroke varies by 4 % from beat to beat.
func flows(count int) [][]float64 {
	rng := rand.New(rand.NewPCG(11, 2))
	var beats [][]float64
	for range count {
		scale := 1 + 0.04*rng.NormFloat64()
		if count == 1 {
			scale = 1
		}
		beat := make([]float64, samples)
		for j := range beat {
			beat[j] = scale * exampleFlow(exampleT*float64(j)/samples)
		}
		beats = append(beats, beat)
	}
	return beats
}

const rate = samples / exampleT

// pressures are the periodic responses of the example's wk3 above pv, with noise.
func pressures(count int, pv, noise float64) [][]float64 {
	rng := rand.New(rand.NewPCG(5, 9))
	m, _ := fitting.ByName("wk3")
	var beats [][]float64
	for _, q := range flows(count) {
		p := fitting.Respond(fitting.Lumped{Model: m, Values: fitting.Values{R: 1, C: 1.5, Zc: 0.05}}, data.Period{Samples: q, Rate: rate}, pv)
		for j := range p.Samples {
			p.Samples[j] += noise * rng.NormFloat64()
		}
		beats = append(beats, p.Samples)
	}
	return beats
}

func near(t *testing.T, what string, got, want, part float64) {
	t.Helper()
	if !(math.Abs(got-want) <= part*math.Abs(want)) {
		t.Errorf("%s: %v, want %v", what, got, want)
	}
}

// R from means: 91.875/87.5 = 1.05 in all, 5 % of it taken for Zc; tau is 1.5 s, so
// C = 1.5/(0.95 1.05) = 1.5038, where the truth is 1.5.
func TestOutputOfTheExample(t *testing.T) {
	for _, pv := range []float64{0, 12} {
		p := Pressure{Beats: pressures(1, pv, 0), Rate: rate, Output: 87.5, OutflowPressure: pv}
		r, reason, err := FromOutput(context.Background(), p, fitting.Settings{})
		if reason != "" || err != nil {
			t.Fatal(reason, err)
		}
		near(t, "total", r.TotalResistance.Value, 1.05, 1e-4)
		near(t, "R", r.Values.R, 0.9975, 1e-4)
		near(t, "C", r.Values.C, 1.5/0.9975, 1e-3)
		if zc, _ := r.Parameter("Zc"); zc.Identified || !strings.Contains(zc.Why, "5 %") {
			t.Errorf("Zc %+v", zc)
		}
		if r.Basis != fitting.BasisMeans || r.IntervalMethod != fitting.IntervalNone || r.TotalResistance.Total.Defined() {
			t.Errorf("basis %s, interval %s %v", r.Basis, r.IntervalMethod, r.TotalResistance.Total)
		}
	}
}

// The total interval carries the output's error, which moves R and C exactly (an
// output 20 % low: R +25 %, C -20 %); the random one does not.
func TestOutputIntervals(t *testing.T) {
	for _, count := range []int{24, 5} {
		p := Pressure{Beats: pressures(count, 0, 1), Rate: rate, Output: 87.5, Systematic: fitting.Systematic{Flow: 0.2}}
		r, _, err := FromOutput(context.Background(), p, fitting.Settings{})
		if err != nil {
			t.Fatal(err)
		}
		want := fitting.IntervalBlocks
		if count < fitting.FewBeats {
			want = fitting.IntervalCovariance
		}
		if r.IntervalMethod != want {
			t.Errorf("%d beats: %s", count, r.IntervalMethod)
		}
		c, _ := r.Parameter("C")
		for name, e := range map[string]data.Estimate{"total resistance": r.TotalResistance, "C": c.Estimate} {
			if w := e.Total.Width() / e.Value; w < 0.38 || w > 0.60 || !e.Identified {
				t.Errorf("%d beats, %s: total interval %.0f %% wide (%s)", count, name, 100*w, e.Why)
			}
			if !(e.Random.Width() < 0.5*e.Total.Width()) || !(e.Random.Width() > 0) || !e.Random.Contains(e.Value) {
				t.Errorf("%d beats, %s: random %v, total %v", count, name, e.Random, e.Total)
			}
		}
		low := p.At(0, 0.8, 1)
		near(t, "R at an output 20 % low", low.R, 1.25*r.Values.R, 1e-9)
		near(t, "C at an output 20 % low", low.C, 0.8*r.Values.C, 1e-9)
		// A pulse 1.3 times the root's: the decay is steeper by 1.3 about a lower level.
		if up := p.At(0, 1, 1.3); !(up.C < 0.9*r.Values.C) || math.Abs(up.R/r.Values.R-1) > 1e-9 {
			t.Errorf("a pulse 1.3 times as large: %+v", up)
		}
	}
}

// The random interval of the total resistance covers the truth of noisy beats in
// about 95 % of recordings; the mean of the beats' own strokes is the truth here,
// since the output given is theirs.
func TestOutputCoverage(t *testing.T) {
	covered, runs := 0, 40
	for run := range runs {
		rng := rand.New(rand.NewPCG(uint64(run), 4))
		var beats [][]float64
		base := pressures(1, 0, 0)[0]
		for range 30 {
			beat, shift := make([]float64, samples), 2*rng.NormFloat64()
			for j := range beat {
				beat[j] = base[j] + shift + rng.NormFloat64()
			}
			beats = append(beats, beat)
		}
		r, _, err := FromOutput(context.Background(), Pressure{Beats: beats, Rate: rate, Output: 87.5}, fitting.Settings{Replicates: 200, Seed: uint64(run + 1)})
		if err != nil {
			t.Fatal(err)
		}
		if r.TotalResistance.Random.Contains(1.05) {
			covered++
		}
	}
	if covered < 35 {
		t.Errorf("%d of %d", covered, runs)
	}
}

// The cuff's reading is the example's own pressure.
func TestCuffOfTheExample(t *testing.T) {
	f := Flow{Beats: flows(1), Rate: rate, Cuff: Cuff{Systolic: 113.636082, Diastolic: 73.265899, Mean: 91.875}, Site: data.SiteRoot}
	all, reason, err := FromCuff(context.Background(), f, fitting.Settings{})
	if reason != "" || err != nil || len(all) != 2 {
		t.Fatal(reason, err, len(all))
	}
	near(t, "R of wk2", all[0].Values.R, 1.05, 1e-4)
	near(t, "C of wk2", all[0].Values.C, 1.125678, 2e-3)
	near(t, "total of wk3", all[1].TotalResistance.Value, 1.05, 1e-4)
	near(t, "C of wk3, Zc taken a little too high", all[1].Values.C, 1.5, 0.05)
	low, high := all[1].Modelled.Extremes()
	near(t, "pulse of wk3", high-low, f.Cuff.Pulse(), 1e-6)
	near(t, "mean of wk3", all[1].Modelled.Mean(), 91.875, 1e-6)
}

func TestCuffIntervals(t *testing.T) {
	f := Flow{
		Beats: flows(20), Rate: rate, Cuff: Cuff{Systolic: 113.6, Diastolic: 73.3, Error: 6}, OutflowPressure: 5, Site: data.SiteRoot,
		Systematic: fitting.Systematic{Flow: 0.1},
	}
	near(t, "mean", f.Cuff.MeanPressure(), 73.3+40.3/3, 1e-12)
	all, _, err := FromCuff(context.Background(), f, fitting.Settings{Replicates: 300})
	if err != nil {
		t.Fatal(err)
	}
	for _, r := range all {
		c, _ := r.Parameter("C")
		// The pulse is good to sqrt(2) 6/40 = 21 %, the flow to 10 %; with Zc in series
		// half of the pulse is that of Zc, and C feels the error twice.
		most := map[string]float64{"wk2": 0.8, "wk3": 1.6}[r.Model.Name]
		if w := c.Total.Width() / c.Value; w < 0.35 || w > most || !c.Total.Contains(c.Value) || !(c.Random.Width() < 0.3*c.Total.Width()) {
			t.Errorf("%s: C %v, total %v, random %v", r.Model.Name, c.Value, c.Total, c.Random)
		}
		one := r.Replicates.Total[7]
		near(t, "flow of a replicate", one.Flow().Mean(), 87.5*one.FlowScale, 0.1)
		if len(r.OutflowSensitivity) != 3 || !(r.OutflowSensitivity[1].R < -0.2) {
			t.Errorf("outflow: %+v", r.OutflowSensitivity)
		}
	}
}

// What cannot be is said.
func TestWithoutAnAnswer(t *testing.T) {
	flat := make([]float64, samples)
	for j := range flat {
		flat[j] = 90
	}
	_, reason, _ := FromOutput(context.Background(), Pressure{Beats: [][]float64{flat}, Rate: rate, Output: 90}, fitting.Settings{})
	if !strings.Contains(reason, "does not fall") {
		t.Errorf("a flat pressure: %q", reason)
	}
	huge := Flow{Beats: flows(1), Rate: rate, Cuff: Cuff{Systolic: 900, Diastolic: 50, Mean: 60}}
	if all, reason, _ := FromCuff(context.Background(), huge, fitting.Settings{}); len(all) != 0 || reason == "" {
		t.Errorf("a pulse of 850 mmHg: %d, %q", len(all), reason)
	}
	below := Flow{Beats: flows(1), Rate: rate, Cuff: Cuff{Systolic: 60, Diastolic: 30}, OutflowPressure: 50}
	if _, reason, _ := FromCuff(context.Background(), below, fitting.Settings{}); !strings.Contains(reason, "outflow pressure") {
		t.Errorf("a mean below the outflow pressure: %q", reason)
	}
}
