package study

import (
	"context"
	"slices"
	"testing"
)

// Moving the scale of the flow by f divides R and Zc by f, and multiplies C by f,
// exactly (the model is linear in the flow); a diameter moved by 5 % moves the
// flow by its square. A pressure offset of 2 mmHg does what an outflow pressure
// 2 mmHg lower does.
func TestWhatIfsFollowTheirIdentities(t *testing.T) {
	s := sharedDemo(t)
	f := *s.Fit
	for i, r := range f.Results {
		if r.Model.Name != "wk3" || r.Basis != "beat" {
			continue
		}
		all, err := f.WhatIfs(context.Background(), i)
		if err != nil {
			t.Fatal(err)
		}
		found := 0
		for _, w := range all {
			scale := 0.0
			switch w.Assumption {
			case "output":
				scale = 1 + w.By
			case "diameter":
				scale = (1 + w.By) * (1 + w.By)
			default:
				continue
			}
			found++
			if v := w.Values; !near(v.R, r.Values.R/scale, 1e-6) || !near(v.C, r.Values.C*scale, 1e-6) || !near(v.Zc, r.Values.Zc/scale, 1e-6) {
				t.Errorf("%s %s: %+v of %+v", w.Assumption, w.Change, v, r.Values)
			}
			if !near(w.Result.RMSE, r.RMSE, 1e-5) {
				t.Errorf("%s %s: rms %g, was %g", w.Assumption, w.Change, w.Result.RMSE, r.RMSE)
			}
		}
		if found != 4 {
			t.Errorf("%d moves of the flow: the demo has a velocity and a diameter", found)
		}
		if !slices.ContainsFunc(all, func(w WhatIf) bool { return w.Assumption == "delay" && w.By == 0.010 }) {
			t.Error("no delay is moved")
		}
		return
	}
	t.Fatal("no wk3 of the average beat")
}

// The what-ifs hold the sensitivities of the chosen fit, and change nothing of it.
func TestWhatIfsAreTheSensitivities(t *testing.T) {
	f := *sharedDemo(t).Fit
	before := f.Results[f.Chosen].Values
	all, err := f.WhatIfs(context.Background(), f.Chosen)
	if err != nil || len(all) < len(f.Sensitivity) || len(f.Sensitivity) == 0 {
		t.Fatalf("%d, %v", len(all), err)
	}
	for i, s := range f.Sensitivity {
		if all[i].Values != s.Values || all[i].By != s.By || all[i].Assumption != s.Assumption {
			t.Errorf("%+v is not %+v", all[i].Sensitivity, s)
		}
	}
	if f.Results[f.Chosen].Values != before {
		t.Error("the fit itself was moved")
	}
}

func TestDoubtsAreOfTheSizesOfTheCase(t *testing.T) {
	f := *sharedDemo(t).Fit
	all, err := f.Doubts(context.Background(), f.Chosen)
	if err != nil {
		t.Fatal(err)
	}
	b, err := fitData(f.Beats)
	if err != nil {
		t.Fatal(err)
	}
	sizes := map[string]float64{"outflow-pressure": b.Systematic.OutflowPressure, "delay": b.Systematic.Delay, "pressure-offset": b.Systematic.PressureOffset}
	for _, d := range all {
		if want, ok := sizes[d.Assumption]; ok {
			if d.By != want {
				t.Errorf("%s by %g, not %g", d.Assumption, d.By, want)
			}
			delete(sizes, d.Assumption)
		}
	}
	for name, size := range sizes {
		if size > 0 {
			t.Errorf("%s is not moved", name)
		}
	}
}
