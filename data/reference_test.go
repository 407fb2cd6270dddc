package data

import (
	"bytes"
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// recordings is where the full reference recordings lie beside a checkout;
// SOURCES.md there says where each comes from.
const recordings = "../../shared/reference-data"

// expected are values that a script which shares nothing with this package
// has computed from the reference recordings.
type expected struct {
	Rows        int     `json:"rows"`
	Duration    float64 `json:"duration_s"`
	LongestStep float64 `json:"max_time_step_s"`
	Repeated    int     `json:"repeated_time_stamps"`
	Channels    map[string]struct {
		Mean      float64            `json:"mean_time_average"`
		Missing   int                `json:"missing_samples"`
		Tolerance map[string]float64 `json:"tolerance_plus_minus"`
	} `json:"channels"`
}

func readRecording(t testing.TB, path string, o ReadOptions) *Recording {
	t.Helper()
	f, err := os.Open(path)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rec, err := ReadCSV(path, f, o)
	if err != nil {
		t.Fatal(err)
	}
	return rec
}

// expectations reads the table of expected values, and skips where the full
// recordings are not at hand.
func expectations(t testing.TB) map[string]expected {
	t.Helper()
	raw, err := os.ReadFile(filepath.Join(recordings, "expected.json"))
	if os.IsNotExist(err) {
		t.Skip("the full reference recordings are not beside this checkout")
	}
	if err != nil {
		t.Fatal(err)
	}
	var all struct{ Files map[string]expected }
	if err := json.Unmarshal(raw, &all); err != nil {
		t.Fatal(err)
	}
	if len(all.Files) < 9 {
		t.Fatalf("only %d recordings are described", len(all.Files))
	}
	return all.Files
}

// The rates are those of SOURCES.md: 124.945 Hz for the pulse oximeter's file
// (steps of 8.0035 ms), 62.5 Hz within 1 % for the pig's, else as named.
var rates = map[string]struct{ rate, relative float64 }{
	"tcd_abp_mcav_1000hz_168s.csv":                 {1000, 1e-9},
	"bench_pq_normovolemic_1000hz_58s.csv":         {1000, 1e-9},
	"bench_pq_lowoutput_1000hz_58s.csv":            {1000, 1e-9},
	"bench_pq_hyperdynamic_resp12_1000hz_66s.csv":  {1000, 1e-9},
	"icu_art_ecg_125hz_600s.csv":                   {125, 1e-9},
	"icu_art_pap_125hz_16s.csv":                    {125, 1e-9},
	"icu_art_pleth_125hz_230s.csv":                 {124.945, 2e-6},
	"pig_carotid_uncalibrated_volts_64hz_480s.csv": {62.5, 0.01},
	"tcd_abp_mcav_10hz_beataveraged_300s.csv":      {10, 1e-9},
}

// spansUsed are the stretches that the expected means were taken over.
func spansUsed(t *testing.T, file string) (use, leave []Span) {
	t.Helper()
	switch {
	case strings.HasPrefix(file, "pig"):
		return []Span{{30, 395}, {405, math.Inf(1)}}, nil
	case file == "tcd_abp_mcav_1000hz_168s.csv":
		f, err := os.Open(filepath.Join(recordings, "tcd_abp_mcav_1000hz_168s.artefacts.csv"))
		if err != nil {
			t.Fatal(err)
		}
		defer f.Close()
		if leave, err = ReadSpans(f.Name(), f); err != nil {
			t.Fatal(err)
		}
		if len(leave) != 41 {
			t.Fatalf("%d artefacts, want 41", len(leave))
		}
	}
	return []Span{{math.Inf(-1), math.Inf(1)}}, leave
}

func contains(spans []Span, t float64) bool {
	for _, s := range spans {
		if s.From <= t && t < s.To {
			return true
		}
	}
	return false
}

// meanOver is the mean of the values that exist at the times used.
func meanOver(times, values []float64, use, leave []Span) float64 {
	sum, n := 0.0, 0
	for i, t := range times {
		if contains(use, t) && !contains(leave, t) && !math.IsNaN(values[i]) {
			sum += values[i]
			n++
		}
	}
	return sum / float64(n)
}

func TestReferenceRecordings(t *testing.T) {
	for file, want := range expectations(t) {
		t.Run(file, func(t *testing.T) {
			rec := readRecording(t, filepath.Join(recordings, file), ReadOptions{})
			c := rec.Clock()
			if c.Rows != want.Rows || c.Repeated != want.Repeated {
				t.Errorf("%d rows, %d repeated, want %d, %d", c.Rows, c.Repeated, want.Rows, want.Repeated)
			}
			if math.Abs(c.Duration-want.Duration) > 5e-4 || math.Abs(c.LongestStep-want.LongestStep) > 5e-4 {
				t.Errorf("duration %v s, longest step %v s, want %v, %v", c.Duration, c.LongestStep, want.Duration, want.LongestStep)
			}
			rate, ok := rates[file]
			if !ok || math.Abs(c.Rate/rate.rate-1) > rate.relative {
				t.Errorf("rate %v Hz, want %v", c.Rate, rate.rate)
			}
			use, leave := spansUsed(t, file)
			g, even, err := rec.Uniform()
			if err != nil {
				t.Fatal(err)
			}
			instants := make([]float64, g.N)
			for k := range instants {
				instants[k] = g.At(k)
			}
			compared := 0
			for i, ch := range rec.Channels {
				w, ok := want.Channels[ch.Name.String()]
				if !ok {
					continue
				}
				compared++
				tolerance := w.Tolerance["mean"]
				if tolerance == 0 {
					tolerance = 0.001 // a mean of the whole file, given to three decimals
				}
				if ch.Missing() != w.Missing {
					t.Errorf("%s: %d missing, want %d", ch.Name, ch.Missing(), w.Missing)
				}
				if m := meanOver(rec.Time, ch.Values, use, leave); math.Abs(m-w.Mean) > tolerance {
					t.Errorf("%s: mean %v, want %v", ch.Name, m, w.Mean)
				}
				if m := meanOver(instants, even[i], use, leave); math.Abs(m-w.Mean) > tolerance {
					t.Errorf("%s: mean %v on the even clock, want %v", ch.Name, m, w.Mean)
				}
			}
			if compared != len(want.Channels) || compared == 0 {
				t.Errorf("%d channels compared, want %d", compared, len(want.Channels))
			}
			for _, w := range rec.Warnings {
				t.Logf("%s %s: %s (%s)", w.Code, w.Channel, w.Text, w.Cure)
			}
		})
	}
}

func BenchmarkReadCSV(b *testing.B) {
	raw := benchmarkFile()
	b.SetBytes(int64(len(raw)))
	b.ReportAllocs()
	for b.Loop() {
		if _, err := ReadCSV("bench.csv", bytes.NewReader(raw), ReadOptions{}); err != nil {
			b.Fatal(err)
		}
	}
}
