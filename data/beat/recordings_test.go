package beat

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
)

const referenceData = "../../../shared/reference-data"

// recording is a file on its even clock.
type recording struct {
	grid     data.Grid
	channels []data.Channel
	values   [][]float64
}

func read(tb testing.TB, path string) recording {
	tb.Helper()
	f, err := os.Open(path)
	if err != nil {
		tb.Fatal(err)
	}
	defer f.Close()
	r, err := data.ReadCSV(path, f, data.ReadOptions{})
	if err != nil {
		tb.Fatal(err)
	}
	grid, values, err := r.Uniform()
	if err != nil {
		tb.Fatal(err)
	}
	return recording{grid, r.Channels, values}
}

// channel returns a copy of a channel without the samples in the spans.
func (r recording) channel(tb testing.TB, name string, leaveOut ...data.Span) []float64 {
	tb.Helper()
	for i, c := range r.channels {
		if c.Name.String() != name {
			continue
		}
		out := append([]float64(nil), r.values[i]...)
		for k := range out {
			for _, s := range leaveOut {
				if at := r.grid.At(k); at >= s.From && at < s.To {
					out[k] = math.NaN()
				}
			}
		}
		return out
	}
	tb.Fatalf("no channel %q", name)
	return nil
}

func (r recording) quantity(name string) unit.Quantity {
	for _, c := range r.channels {
		if c.Name.String() == name {
			return c.Quantity
		}
	}
	return unit.Other
}

// tolerances of a channel, in its unit, and of its heart rate.
type tolerances struct{ rate, systolic, diastolic, mean float64 }

func holdAgainst(t *testing.T, p Pulse, rate, systolic, diastolic, mean float64, within tolerances) {
	t.Helper()
	t.Logf("%.1f/min %.2f/%.2f mean %.2f, %d of %d beats used, CV %.3f; not used: %s",
		p.HeartRate(), p.Systolic, p.Diastolic, p.Mean, p.Used(), len(p.Beats), p.PeriodCV, Tally(p.Beats))
	for _, c := range []struct {
		what              string
		got, want, within float64
	}{
		{"heart rate", p.HeartRate(), rate, within.rate},
		{"systolic", p.Systolic, systolic, within.systolic},
		{"diastolic", p.Diastolic, diastolic, within.diastolic},
		{"mean", p.Mean, mean, within.mean},
	} {
		if !(math.Abs(c.got-c.want) <= c.within) {
			t.Errorf("%s %.3f, want %.3f within %.3f (%s)", c.what, c.got, c.want, c.within, p.Reason)
		}
	}
}

// Values computed with scipy, see testdata/README.md. Beats at the ends of an
// excerpt differ between the two methods, and so a little do the medians.
func TestExcerpts(t *testing.T) {
	for _, c := range []struct {
		file, channel                   string
		beats                           int
		rate, systolic, diastolic, mean float64
		within                          tolerances
	}{
		{"tcd_6s", "abp_mmHg", 10, 117.9, 122, 60.5, 77.1, tolerances{1.5, 1, 1, 1}},
		{"tcd_6s", "mcav_cm_s", 10, 117.5, 96.3, 32.9, 53.26, tolerances{1.5, 1, 1, 1}},
		{"bench_breathing_10s", "aortic_flow_mL_s", 17, 109.3, 463.5, -70.3, 85.08, tolerances{1.5, 10, 4, 1.5}},
		{"bench_breathing_10s", "aortic_pressure_mmHg", 17, 110.7, 53.45, 21.3, 34.55, tolerances{1.5, 2, 1, 1}},
		{"bench_breathing_10s", "radial_pressure_mmHg", 17, 109.9, 62.8, 22, 36.74, tolerances{1.5, 2, 1, 1}},
		{"icu_low_30s", "abp_mmHg", 60, 123, 43.22, 27.88, 32.21, tolerances{1.5, 1, 1, 1}},
		// The pauses, in which pressure is low, are not used: the mean is higher.
		{"icu_premature_30s", "abp_mmHg", 49, 104.1, 160.66, 90.88, 110.38, tolerances{1.5, 1, 1, 2}},
		{"icu_pap_16s", "abp_mmHg", 25, 94.9, 83.47, 42.05, 55.9, tolerances{1.5, 1, 1, 1}},
		{"icu_pap_16s", "pap_mmHg", 24, 94.9, 27.82, 10.98, 20.44, tolerances{1.5, 1, 2, 1}},
		{"pig_20s", "carotid_pressure_V", 45, 138.9, 1.89, 1.55, 1.70, tolerances{2, 0.02, 0.02, 0.02}},
	} {
		t.Run(c.file+" "+c.channel, func(t *testing.T) {
			r := read(t, filepath.Join("testdata", c.file+".csv"))
			p := Find(r.channel(t, c.channel), r.grid.Rate, r.quantity(c.channel))
			holdAgainst(t, p, c.rate, c.systolic, c.diastolic, c.mean, c.within)
			if d := len(p.Beats) - c.beats; d < -1 || d > 1 {
				t.Errorf("%d beats, want %d", len(p.Beats), c.beats)
			}
		})
	}
}

// What was averaged over beats has no pulse: at its own 10 Hz, and made finer.
func TestAveragedOverBeats(t *testing.T) {
	r := read(t, "testdata/beataveraged_60s.csv")
	for _, name := range []string{"abp_mmHg", "mcav_left_cm_s", "mcav_right_cm_s"} {
		x := r.channel(t, name)
		for _, finer := range []int{1, 3, 10} {
			p := Find(refine(x, finer), r.grid.Rate*float64(finer), unit.Pressure)
			if p.Found || p.Reason == "" {
				t.Errorf("%s at %g Hz: %d beats found, reason %q", name, r.grid.Rate*float64(finer), len(p.Beats), p.Reason)
			}
		}
		if p := Find(x, r.grid.Rate, unit.Pressure); !strings.Contains(p.Reason, "averaged over beats") {
			t.Errorf("%s: reason %q", name, p.Reason)
		}
	}
}

// refine interpolates linearly to times as many samples.
func refine(x []float64, times int) []float64 {
	out := make([]float64, (len(x)-1)*times)
	for i := range out {
		out[i] = between(x, float64(i)/float64(times))
	}
	return out
}

type expectedChannel struct {
	HeartRate float64 `json:"heart_rate_bpm_from_median_interval"`
	Systolic  float64 `json:"systolic_median"`
	Diastolic float64 `json:"diastolic_median"`
	Mean      float64 `json:"mean_time_average"`
	Tolerance *struct {
		HeartRate float64 `json:"heart_rate_bpm"`
		Systolic  float64 `json:"systolic"`
		Diastolic float64 `json:"diastolic"`
		Mean      float64 `json:"mean"`
	} `json:"tolerance_plus_minus"`
}

// Independent values of expected.json (numpy and scipy, no code of the project):
// heart rate, systolic, diastolic and mean of every channel, on the span it
// states and, with doubled tolerance, on all of the file.
func TestReferenceRecordings(t *testing.T) {
	text, err := os.ReadFile(filepath.Join(referenceData, "expected.json"))
	if err != nil {
		t.Skip("the full reference recordings are not beside this clone")
	}
	var expected struct {
		Files map[string]struct {
			Channels map[string]expectedChannel `json:"channels"`
		} `json:"files"`
	}
	if err := json.Unmarshal(text, &expected); err != nil {
		t.Fatal(err)
	}
	compared := 0
	for file, f := range expected.Files {
		r := read(t, filepath.Join(referenceData, file))
		for name, want := range f.Channels {
			t.Run(file+" "+name, func(t *testing.T) {
				p := Find(r.channel(t, name, leftOut(t, file)...), r.grid.Rate, r.quantity(name))
				all := Find(r.channel(t, name), r.grid.Rate, r.quantity(name))
				compared++
				if want.Tolerance == nil {
					if p.Found || all.Found {
						t.Errorf("%d beats found where there is no pulse", len(p.Beats))
					}
					return
				}
				d := *want.Tolerance
				holdAgainst(t, p, want.HeartRate, want.Systolic, want.Diastolic, want.Mean,
					tolerances{d.HeartRate, d.Systolic, d.Diastolic, d.Mean})
				holdAgainst(t, all, want.HeartRate, want.Systolic, want.Diastolic, want.Mean,
					tolerances{2 * d.HeartRate, 2 * d.Systolic, 2 * d.Diastolic, 2 * d.Mean})
			})
		}
	}
	if compared == 0 {
		t.Fatal("nothing compared")
	}
}

// leftOut is what expected.json leaves out of a file.
func leftOut(tb testing.TB, file string) []data.Span {
	switch {
	case strings.HasPrefix(file, "tcd_abp_mcav_1000hz"):
		name := filepath.Join(referenceData, "tcd_abp_mcav_1000hz_168s.artefacts.csv")
		f, err := os.Open(name)
		if err != nil {
			tb.Fatal(err)
		}
		defer f.Close()
		spans, err := data.ReadSpans(name, f)
		if err != nil {
			tb.Fatal(err)
		}
		return spans
	case strings.HasPrefix(file, "pig"):
		return []data.Span{{From: 0, To: 30}, {From: 395, To: 405}, {From: 480, To: 1e9}}
	}
	return nil
}
