package fitting

import (
	"strings"
	"testing"

	"afterbeat/data"
)

func TestSection(t *testing.T) {
	b := noisy(160, 12, 16)
	b.Systematic = someErrors
	s := fit(t, model(t, "wk3"), b, Settings{Replicates: 100}).Section()
	if s.Title != "Fit of wk3, systemic load" || !strings.Contains(s.Words[0].String(), "wk3 (Westerhof 1969), fitted to the average beat") {
		t.Errorf("title %q, words %v", s.Title, s.Words)
	}
	labels := ""
	for _, row := range s.Rows[:5] {
		labels += row.Label + "; "
		if row.Number == nil || row.Number.Unit == "" || row.Number.Origin != data.Estimated {
			t.Errorf("%s: %+v", row.Label, row.Number)
		}
	}
	if want := "R, peripheral resistance; C, compliance; Zc, characteristic impedance; total resistance; residual, rms; "; labels != want {
		t.Errorf("rows %q, want %q", labels, want)
	}
	if got := s.Rows[5].Words.String(); !strings.HasPrefix(got, "blocks-of-beats: 95 %, 100 replicates") {
		t.Errorf("intervals: %q", got)
	}
	if got := s.Rows[0].Number; !got.Total.Defined() || !got.Random.Defined() {
		t.Errorf("R without its intervals: %+v", got)
	}
}

func TestSectionOfOneBedPerArea(t *testing.T) {
	b := noisy(160, 1, 16)
	b.Site, b.PerArea = data.SiteMCA, true
	s := fit(t, model(t, "wk2"), b, Settings{}).Section()
	if s.Title != "Fit of wk2, regional load: mca, per unit area" || s.Rows[2].Number.Unit != "mmHg s/cm" {
		t.Errorf("title %q, unit %q", s.Title, s.Rows[2].Number.Unit)
	}
	if got := s.Rows[4].Words.String(); got != "none: a single beat: no scatter to judge by" {
		t.Errorf("intervals: %q", got)
	}
}
