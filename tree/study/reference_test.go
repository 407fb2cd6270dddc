package study

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"afterbeat/data/casefile"
)

// references is the folder of whole recordings, which stands beside the
// repository where there is one; data/beat/testdata has excerpts of them, with
// sources and licences.
var references = filepath.Join("..", "..", "..", "shared", "reference-data")

// recordingIn reads a file of a folder, and leaves the test out where the
// folder is not there.
func recordingIn(t testing.TB, folder, name string) string {
	t.Helper()
	content, err := os.ReadFile(filepath.Join(folder, name))
	if os.IsNotExist(err) && folder == references {
		t.Skip("the whole recordings are not beside the repository")
	}
	if err != nil {
		t.Fatal(err)
	}
	return string(content)
}

// expectation is what an independent computation found in a recording
// (expected.json beside the recordings: numpy and scipy, none of this program).
type expectation struct {
	Rows     int     `json:"rows"`
	Duration float64 `json:"duration_s"`
	Rate     float64 `json:"sampling_Hz_median"`
	Longest  float64 `json:"max_time_step_s"`
	Repeated int     `json:"repeated_time_stamps"`
	Channels map[string]struct {
		HeartRate float64 `json:"heart_rate_bpm_from_median_interval"`
		Systolic  float64 `json:"systolic_median"`
		Diastolic float64 `json:"diastolic_median"`
		Mean      float64 `json:"mean_time_average"`
		Missing   int     `json:"missing_samples"`
		Tolerance *struct {
			HeartRate float64 `json:"heart_rate_bpm"`
			Systolic  float64 `json:"systolic"`
			Diastolic float64 `json:"diastolic"`
			Mean      float64 `json:"mean"`
		} `json:"tolerance_plus_minus"`
	} `json:"channels"`
	Fit *struct {
		Three load    `json:"no_delay"`
		Two   load    `json:"two_element_no_delay"`
		Total float64 `json:"mean_pressure_over_mean_flow"`
	} `json:"lumped_fit_informative"`
}

type load struct {
	R float64 `json:"R_mmHg_s_mL"`
	C float64 `json:"C_mL_mmHg"`
}

func expectations(t testing.TB) map[string]expectation {
	t.Helper()
	var all struct{ Files map[string]expectation }
	if err := json.Unmarshal([]byte(recordingIn(t, references, "expected.json")), &all); err != nil {
		t.Fatal(err)
	}
	benches := 0
	for _, e := range all.Files {
		if e.Fit != nil {
			benches++
		}
	}
	if len(all.Files) < 9 || benches != 3 {
		t.Fatalf("%d recordings are expected, %d with a load", len(all.Files), benches)
	}
	return all.Files
}

// leftOut are the stretches that expected.json leaves out of a recording.
func leftOut(t testing.TB, name string) string {
	t.Helper()
	switch {
	case strings.HasPrefix(name, "tcd_abp_mcav_1000hz"):
		return recordingIn(t, references, "tcd_abp_mcav_1000hz_168s.artefacts.csv")
	case strings.HasPrefix(name, "pig_"):
		return "start_s,end_s\n0,30\n395,405\n"
	}
	return "start_s,end_s\n"
}

// The recordings are described as an independent computation finds them, within
// its tolerances, and no study of one panics.
func TestReferenceRecordings(t *testing.T) {
	for name, want := range expectations(t) {
		t.Run(name, func(t *testing.T) {
			f := folder{name: recordingIn(t, references, name), "ex.csv": leftOut(t, name)}
			c := casefile.Case{Recording: name, Exclude: "ex.csv", Replicates: ptr(20), Share: []float64{0.5}, Speed: []float64{8, 10}}
			if strings.Contains(name, "10hz") {
				c.Velocity = "mcav_left_cm_s"
			}
			s := whole(t, c, f)
			compareWith(t, s.Beats.Check(s.Warnings()), want)
			if want.Fit != nil {
				compareLoad(t, s, want)
			}
			if len(s.Note().Render(defaults)) < 1000 {
				t.Error("there is no note")
			}
		})
	}
}

// compareWith holds what check says of a recording to what is expected.
func compareWith(t *testing.T, got CheckReport, want expectation) {
	t.Helper()
	r := got.Recording
	if r.Rows != want.Rows || r.RepeatedTimes != want.Repeated || math.Abs(float64(r.Duration)-want.Duration) > 1e-3 ||
		!near(float64(r.Rate), want.Rate, 0.01) || math.Abs(float64(r.LongestStep)-want.Longest) > 1e-3 {
		t.Errorf("%+v, want %+v", r, want)
	}
	checked := 0
	for _, ch := range got.Channels {
		e, ok := want.Channels[ch.Name.String()]
		if !ok {
			continue
		}
		checked++
		if ch.Missing != e.Missing {
			t.Errorf("%s: %d missing, want %d", ch.Name, ch.Missing, e.Missing)
		}
		if e.Tolerance == nil { // no pulse: a mean, and nothing else
			if ch.Pulse.Found || ch.Pulse.Reason == nil || !near(float64(ch.Mean), e.Mean, 1e-4) {
				t.Errorf("%s: %+v, want no pulse about a mean of %v", ch.Name, ch, e.Mean)
			}
			continue
		}
		for what, v := range map[string][3]float64{
			"heart rate": {float64(ch.Pulse.HeartRate), e.HeartRate, e.Tolerance.HeartRate},
			"systolic":   {float64(ch.Systolic), e.Systolic, e.Tolerance.Systolic},
			"diastolic":  {float64(ch.Diastolic), e.Diastolic, e.Tolerance.Diastolic},
			"mean":       {float64(ch.Mean), e.Mean, e.Tolerance.Mean},
		} {
			if !(math.Abs(v[0]-v[1]) <= v[2]) {
				t.Errorf("%s: %s %v, want %v within %v", ch.Name, what, v[0], v[1], v[2])
			}
		}
	}
	if checked == 0 {
		t.Error("no channel was compared")
	}
}

// compareLoad holds the load of the bench, on the stretch of an independent fit
// of its own kind (all samples, a free initial pressure), to that fit: R and C
// within 5 %, total resistance within 2 % of mean pressure over mean flow.
func compareLoad(t *testing.T, s Study, want expectation) {
	t.Helper()
	c := s.Inputs.Case
	c.From, c.To = ptr(5.0), ptr(35.0)
	s, err := Run(t.Context(), s.With(c).Inputs, StageFit)
	if err != nil {
		t.Fatal(err)
	}
	compared := 0
	for _, r := range s.Fit.Results {
		e := want.Fit.Three
		switch r.Model.Name {
		case "wk2":
			e = want.Fit.Two
		case "wk4s", "wk4p":
			continue
		}
		compared++
		if !near(r.Values.R, e.R, 0.05) || !near(r.Values.C, e.C, 0.05) || !near(r.TotalResistance.Value, want.Fit.Total, 0.02) {
			t.Errorf("%s: R %.4f, C %.4f, total %.4f; want %+v and %v", r.Model.Name, r.Values.R, r.Values.C, r.TotalResistance.Value, e, want.Fit.Total)
		}
	}
	if compared < 2 {
		t.Errorf("%d fits", compared)
	}
}

// In a recording of beat averages there is no pulse, and check has no answer.
func TestReferenceWithoutAPulse(t *testing.T) {
	const name = "tcd_abp_mcav_10hz_beataveraged_300s.csv"
	s, err := try(casefile.Case{Recording: name}, folder{name: recordingIn(t, references, name)}, StageBeats)
	if err != nil {
		t.Fatal(err)
	}
	if r := s.Beats.Check(nil).Reason; r == nil || !strings.Contains(*r, "no pulse in abp_mmHg") {
		t.Errorf("reason: %v", r)
	}
}
