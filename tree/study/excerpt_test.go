package study

import (
	"path/filepath"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/fitting"
)

// excerpts are stretches of real recordings that a clone has; sources and
// licences stand in the README there.
var excerpts = filepath.Join("..", "..", "data", "beat", "testdata")

// Ten seconds of a bench, against a least-squares fit to all samples that was
// computed apart from this program (testdata/README.md): R and C within 5 %, the
// total resistance within 2 % of mean pressure over mean flow of twelve periods.
func TestExcerptOfTheBench(t *testing.T) {
	const name = "bench_10s.csv"
	s := fitted(t, casefile.Case{Recording: name, Replicates: ptr(100)}, folder{name: recordingIn(t, "testdata", name)})
	want := map[string][2]float64{"wk2": {1.0437, 1.3302}, "wk3": {1.0303, 1.3648}}
	compared := 0
	for _, r := range s.Fit.Results {
		e, ok := want[r.Model.Name]
		if !ok {
			continue
		}
		compared++
		if !near(r.Values.R, e[0], 0.05) || !near(r.Values.C, e[1], 0.05) || !near(r.TotalResistance.Value, 1.04487, 0.02) || r.Site != "root" {
			t.Errorf("%s at %s: R %.4f, C %.4f, total %.4f; want %v", r.Model.Name, r.Site, r.Values.R, r.Values.C, r.TotalResistance.Value, e)
		}
		if p, _ := r.Parameter("C"); !p.Total.Contains(e[1]) || !p.Random.Contains(p.Value) {
			t.Errorf("%s: C %+v, independently %v", r.Model.Name, p.Estimate, e[1])
		}
	}
	if compared < len(want) || s.Comparison.Reason != "" {
		t.Errorf("%d fits compared, no comparison: %q", compared, s.Comparison.Reason)
	}
}

// Finger pressure with middle-cerebral velocity is the load of that bed: named
// after it, and of no use for a pump's share, with a diameter too.
func TestExcerptOfACerebralLoadIsRegional(t *testing.T) {
	const name = "tcd_6s.csv"
	s := fitted(t, casefile.Case{Recording: name, Replicates: ptr(20), DiameterCM: ptr(0.3)}, folder{name: recordingIn(t, excerpts, name)})
	report := s.Report(defaults)
	if len(report.Fits) < len(fitting.Models()) || report.Fits[0].Site != data.SiteMCA || !strings.Contains(s.Comparison.Reason, "that of one bed (mca)") || report.Native != nil {
		t.Errorf("%d fits, comparison: %q", len(report.Fits), s.Comparison.Reason)
	}
	if _, ok := warned(s, data.CodeRegional); !ok {
		t.Error("no warning that the load is regional")
	}
}

// Every kind of real recording goes through the whole study, and says what it
// is good for.
func TestExcerptsGoThroughTheStudy(t *testing.T) {
	for name, c := range map[string]struct {
		fits               bool
		reason, comparison string
	}{
		"tcd_6s.csv":              {true, "", "per unit area"},
		"bench_breathing_10s.csv": {true, "", ""},
		"icu_low_30s.csv":         {false, "no time constant either", "nothing was fitted"},
		"icu_premature_30s.csv":   {false, "", "nothing was fitted"},
		"icu_pap_16s.csv":         {false, "", "nothing was fitted"},
		"pig_20s.csv":             {false, "without a scale", "nothing was fitted"},
		"beataveraged_60s.csv":    {false, "no pulse in abp_mmHg", "nothing was fitted"},
	} {
		t.Run(name, func(t *testing.T) {
			choices := casefile.Case{Recording: name, Replicates: ptr(20), Share: []float64{0.5}}
			s := fitted(t, choices, folder{name: recordingIn(t, excerpts, name)})
			reason := ""
			if r := s.Reason(); r != nil {
				reason = *r
			}
			if (len(s.Fit.Results) > 0) != c.fits || !strings.Contains(reason, c.reason) || (reason == "") != (c.reason == "") {
				t.Errorf("%d fits, reason %q", len(s.Fit.Results), reason)
			}
			if got := s.Comparison.Reason; !strings.Contains(got, c.comparison) || (got == "") != (c.comparison == "") {
				t.Errorf("comparison: %q", got)
			}
			text := s.Note().Render(defaults)
			if len(text) < 1000 || strings.Contains(text, "NaN") {
				t.Errorf("the note:\n%s", text)
			}
		})
	}
}
