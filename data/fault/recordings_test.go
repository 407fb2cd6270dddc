package fault

import (
	"errors"
	"io/fs"
	"math"
	"os"
	"path/filepath"
	"testing"

	"github.com/google/go-cmp/cmp"

	"afterbeat/data"
	"afterbeat/data/unit"
)

const (
	referenceData = "../../../shared/reference-data"
	excerpts      = "../beat/testdata"
)

// channels reads a recording and gives its traces of pressure, flow and velocity.
func channels(tb testing.TB, path string) (data.Grid, []Trace) {
	tb.Helper()
	f, err := os.Open(path)
	if errors.Is(err, fs.ErrNotExist) && filepath.Dir(path) == referenceData {
		tb.Skip("the reference recordings are not beside this clone")
	}
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
	var out []Trace
	for i, c := range r.Channels {
		switch c.Quantity {
		case unit.Pressure, unit.Flow, unit.Velocity:
			out = append(out, Trace{Values: values[i], Rate: grid.Rate, Quantity: c.Quantity, Unit: c.Unit.Name, Name: c.Name})
		}
	}
	if len(out) == 0 {
		tb.Fatal("no channel")
	}
	return grid, out
}

// excerpt is one channel of a file.
func excerpt(tb testing.TB, path, name string) Trace {
	tb.Helper()
	_, all := channels(tb, path)
	for _, t := range all {
		if t.Name.String() == name {
			return t
		}
	}
	tb.Fatalf("no channel %s", name)
	return Trace{}
}

func codes(found []Finding) []data.Code {
	out := []data.Code{}
	for _, f := range found {
		out = append(out, f.Code)
	}
	return out
}

// What is found, channel by channel, and nothing else. The description that comes
// with the recordings names the steps of 1 mmHg, the held pressure (5 samples) and the
// recalibrations; the velocity's steps of 15.6 samples, with the noise of a second
// conversion on them, can be seen in the file.
func TestReferenceRecordings(t *testing.T) {
	cuff := []data.Code{data.CodeHeld, data.CodeQuantised, data.CodeRecalibrated}
	for file, want := range map[string]map[string][]data.Code{
		"tcd_abp_mcav_1000hz_168s.csv":                 {"abp_mmHg": cuff, "mcav_cm_s": {data.CodeHeld}},
		"bench_pq_normovolemic_1000hz_58s.csv":         {},
		"bench_pq_lowoutput_1000hz_58s.csv":            {},
		"bench_pq_hyperdynamic_resp12_1000hz_66s.csv":  {},
		"icu_art_ecg_125hz_600s.csv":                   {},
		"icu_art_pap_125hz_16s.csv":                    {},
		"icu_art_pleth_125hz_230s.csv":                 {},
		"pig_carotid_uncalibrated_volts_64hz_480s.csv": {},
		"tcd_abp_mcav_10hz_beataveraged_300s.csv":      {},
	} {
		t.Run(file, func(t *testing.T) {
			_, all := channels(t, filepath.Join(referenceData, file))
			for _, trace := range all {
				found := Find(trace)
				expected := want[trace.Name.String()]
				if expected == nil {
					expected = []data.Code{}
				}
				if d := cmp.Diff(expected, codes(found)); d != "" {
					t.Errorf("%s: %s", trace.Name, d)
				}
				for _, f := range found {
					t.Logf("%s: %s: %s", trace.Name, f.Code, f.Text)
					if f.Text == "" || f.Cure == "" {
						t.Errorf("%s: %s without words", trace.Name, f.Code)
					}
				}
			}
		})
	}
}

func TestExcerptsHaveNoFaultOfTheirOwn(t *testing.T) {
	for _, file := range []string{"icu_low_30s.csv", "icu_premature_30s.csv", "icu_pap_16s.csv", "pig_20s.csv", "bench_breathing_10s.csv", "beataveraged_60s.csv"} {
		_, all := channels(t, filepath.Join(excerpts, file))
		for _, trace := range all {
			for _, f := range Find(trace) {
				t.Errorf("%s, %s: %s: %s", file, trace.Name, f.Code, f.Text)
			}
		}
	}
}

// The true rates of the excerpt: 200 Hz, the device's, and 64 Hz.
func TestTrueRateOfHeldSamples(t *testing.T) {
	for name, want := range map[string]float64{"abp_mmHg": 200, "mcav_cm_s": 64} {
		found := Find(excerpt(t, filepath.Join(excerpts, "tcd_6s.csv"), name))
		if len(found) == 0 || found[0].Code != data.CodeHeld || math.Abs(found[0].Number-want) > 0.002*want {
			t.Errorf("%s: %+v, want %g Hz", name, found, want)
		}
	}
}

// overlap is the part of a span that the runs cover, and the part of the runs near it
// that lie within it.
func overlap(grid data.Grid, runs []Run, s data.Span) (covered, within float64) {
	both, all := 0.0, 0.0
	for _, r := range runs {
		from, to := grid.At(r.From), grid.At(r.To)
		if to < s.From || from > s.To {
			continue
		}
		both += min(to, s.To) - max(from, s.From)
		all += to - from
	}
	return both / (s.To - s.From), both / all
}

func TestCuffRecalibrations(t *testing.T) {
	for _, c := range []struct{ recording, intervals string }{
		{"testdata/cuff_50hz_122s.csv", "testdata/cuff_intervals.csv"},
		{filepath.Join(referenceData, "tcd_abp_mcav_1000hz_168s.csv"), filepath.Join(referenceData, "tcd_abp_mcav_1000hz_168s.artefacts.csv")},
	} {
		t.Run(filepath.Base(c.recording), func(t *testing.T) {
			grid, all := channels(t, c.recording)
			file, err := os.Open(c.intervals)
			if err != nil {
				t.Fatal(err)
			}
			defer file.Close()
			spans, err := data.ReadSpans(c.intervals, file)
			if err != nil || len(spans) < 4 {
				t.Fatal(err, len(spans))
			}
			var f Finding
			for _, one := range Find(all[0]) {
				if one.Code == data.CodeRecalibrated {
					f = one
				}
			}
			if len(f.Runs) != 4 || !f.Unusable {
				t.Fatalf("%d recalibrations, unusable %v", len(f.Runs), f.Unusable)
			}
			for _, s := range spans[:4] {
				covered, within := overlap(grid, f.Runs, s)
				t.Logf("%.2f to %.2f s: %.1f %% covered; %.1f %% of what is left out lies in it", s.From, s.To, 100*covered, 100*within)
				if covered < 0.95 || within < 0.95 {
					t.Errorf("%.2f to %.2f s: covered %.3f, within %.3f", s.From, s.To, covered, within)
				}
			}
		})
	}
}
