package study

import (
	"encoding/json"
	"testing"

	"github.com/google/go-cmp/cmp"
	"pgregory.net/rapid"

	"afterbeat/data/casefile"
)

// changes has one way to set every key of a case, and the stage it bears on.
func changes() map[string]struct {
	value string
	stage Stage
} {
	return map[string]struct {
		value string
		stage Stage
	}{
		"recording": {"b.csv", StageIntake}, "exclude": {"ex.csv", StageIntake}, "tree": {"tree.csv", StageIntake}, "time": {"time_s", StageIntake}, "rate": {"100", StageIntake},
		"unit": {"ao_mmHg=kPa", StageIntake}, "scale": {"ao_mmHg=1.1", StageIntake}, "offset": {"ao_mmHg=3", StageIntake}, "invert": {"lvot_velocity", StageIntake},
		"calibrate":        {"ao_mmHg=120/80", StageIntake},
		"velocity_range":   {"lvot_velocity=400", StageIntake},
		"sensor_height_cm": {"ao_mmHg=10", StageIntake},
		"pressure":         {"ao_mmHg", StageIntake}, "flow": {"ao_flow_mL_s", StageIntake}, "velocity": {"lvot_velocity_cm_s", StageIntake}, "site": {"ao_mmHg=radial", StageIntake},
		"from": {"1", StageIntake}, "to": {"10", StageIntake}, "drop": {"5", StageIntake}, "keep": {"5", StageIntake},
		"diameter_cm": {"2", StageIntake}, "angle_deg": {"10", StageIntake}, "profile": {"0.9", StageIntake},
		"delay": {"0.01", StageIntake}, "error": {"flow=20%", StageIntake}, "one_beat": {"true", StageIntake}, "beats": {"support", StageIntake},
		"model": {"wk2", StageFit}, "basis": {"beat", StageFit}, "outflow_pressure": {"8", StageFit}, "replicates": {"12", StageFit}, "seed": {"3", StageFit},
		"cardiac_output": {"4.2", StageFit}, "output_by": {"fick", StageFit}, "cuff": {"118/74", StageFit},
		"edv_ml": {"210", StageForecast}, "ef": {"0.25", StageForecast}, "pump": {"generic B", StageForecast}, "speed": {"3", StageForecast},
		"ventricle": {"Pfill=15", StageForecast}, "match": {"flow", StageForecast}, "quote": {"4", StageForecast}, "hold_resistance": {"0.9", StageForecast}, "modulation": {"shape=sine", StageForecast},
		"height_cm": {"180", StageTree}, "weight_kg": {"80", StageTree}, "age": {"60", StageTree}, "sex": {"male", StageTree}, "pwv_m_s": {"8", StageTree}, "vessel_cm": {"carotid=0.7", StageTree}, "brain_flow_ml_min": {"600", StageTree}, "hold_out": {"ao_mmHg", StageTree},
		"share": {"0.3", StageSupport}, "label": {"pilot-07", StageDone}, "brief": {"true", StageDone}, "remark": {"look again", StageDone},
	}
}

// What a change bears on is known for every key of a case.
func TestFirstTouched(t *testing.T) {
	all := changes()
	for _, k := range casefile.Keys() {
		c, known := all[k.Name]
		if !known {
			t.Errorf("no change of %q is tested", k.Name)
			continue
		}
		before, after := casefile.Case{Recording: "a.csv"}, casefile.Case{Recording: "a.csv"}
		if k.Name == "recording" {
			after.Recording = c.value
		} else if err := after.Set(k.Flag, c.value); err != nil {
			t.Fatal(err)
		}
		for _, got := range []Stage{firstTouched(before, after), firstTouched(after, before)} {
			if got != c.stage {
				t.Errorf("%s bears on %q, want %q", k.Name, got, c.stage)
			}
		}
		if got := firstTouched(after, after); got != StageDone {
			t.Errorf("no change of %s bears on %q", k.Name, got)
		}
	}
}

// said is all that a study says, as text.
func said(t interface{ Fatal(...any) }, s Study) string {
	text, err := json.MarshalIndent(s.Report(defaults), "", " ")
	if err != nil {
		t.Fatal(err)
	}
	return string(text)
}

// After any changes, what is computed again together with what was kept is what
// a fresh run gives.
func TestStudyAfterAChangeIsThatOfAFreshRun(t *testing.T) {
	f := folder{"a.csv": table(100, 1000, aortic("ao_mmHg"), column{"lvot_velocity_cm_s", noisy(scaled(halfFlow, 0.25, 0), 0.2)})}
	start := casefile.Case{Recording: "a.csv", Replicates: ptr(6), Share: []float64{0.5}, Speed: []float64{4}, DiameterCM: ptr(2.2)}
	base := fitted(t, start, f)
	before := said(t, base)
	files := map[string]bool{"recording": true, "exclude": true, "tree": true, "hold_out": true, "time": true, "rate": true, "unit": true, "flow": true}
	var keys []casefile.Key
	for _, k := range casefile.Keys() {
		if !files[k.Name] { // what names or reads a file begins anew
			keys = append(keys, k)
		}
	}
	rapid.Check(t, func(t *rapid.T) {
		s, c := base, start
		for range rapid.IntRange(1, 3).Draw(t, "changes") {
			k := rapid.SampledFrom(keys).Draw(t, "key")
			if err := c.Set(k.Flag, changes()[k.Name].value); err != nil {
				t.Fatal(err)
			}
			s = s.With(c)
			if rapid.Bool().Draw(t, "compute") {
				s = finished(t, s)
			}
		}
		s = finished(t, s)
		in, err := Read(c, f.read)
		if err != nil {
			t.Fatal(err)
		}
		if d := cmp.Diff(said(t, finished(t, Study{Inputs: in})), said(t, s)); d != "" {
			t.Fatalf("(-fresh +changed)\n%s", d)
		}
	})
	if said(t, base) != before {
		t.Error("the study that the changes began from has changed")
	}
}

// finished computes what is left of a study but the forecast, which takes the
// longest and comes last.
func finished(t *rapid.T, s Study) Study {
	for s.Pending() != StageForecast && s.Pending() != StageDone {
		var err error
		if s, err = s.Next(t.Context()); err != nil {
			t.Fatal(err)
		}
	}
	s.Forecast = nil // of the study that the changes began from
	return s
}
