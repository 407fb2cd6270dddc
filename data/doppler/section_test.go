package doppler

import (
	"strings"
	"testing"

	"afterbeat/data"
)

func TestSectionNamesOriginsAndDoubt(t *testing.T) {
	s := convert(t, Settings{Diameter: 2, Angle: 45, Site: data.SiteCarotid}).Section(DefaultErrors())
	origins := map[string]data.Origin{
		"diameter d": data.Measured, "angle theta": data.Measured,
		"factor k": data.Assumed, "flow for 1 cm/s": data.Estimated,
	}
	words := map[string]string{"site": "carotid", "why this factor": "not known", "error of flow": "13.3 %"}
	for _, row := range s.Rows {
		if row.Number == nil {
			if !strings.Contains(row.Words.String(), words[row.Label]) || words[row.Label] == "" {
				t.Errorf("%s: %q, want %q in it", row.Label, row.Words, words[row.Label])
			}
			delete(words, row.Label)
			continue
		}
		if row.Number.Origin != origins[row.Label] {
			t.Errorf("%s: origin %q, want %q", row.Label, row.Number.Origin, origins[row.Label])
		}
		delete(origins, row.Label)
		if !row.Number.Total.Contains(row.Number.Value) || !row.Number.Identified {
			t.Errorf("%s: %+v", row.Label, row.Number.Estimate)
		}
	}
	if len(origins)+len(words) != 0 {
		t.Errorf("rows missing: %v %v", origins, words)
	}
}

func TestSectionSaysWhatWasNotGiven(t *testing.T) {
	for _, row := range []struct {
		settings Settings
		why      string
	}{
		{Settings{Diameter: 2, Site: data.SiteLVOT}, "blunt"},
		{Settings{Diameter: 2, Site: data.SiteMCA, Factor: 0.5}, "given"},
	} {
		found := false
		for _, r := range convert(t, row.settings).Section(DefaultErrors()).Rows {
			switch r.Label {
			case "angle theta":
				if r.Number.Origin != data.Assumed {
					t.Errorf("an angle not given has origin %q", r.Number.Origin)
				}
			case "why this factor":
				found = strings.Contains(r.Words.String(), row.why)
			}
		}
		if !found {
			t.Errorf("%+v: the note does not say %q", row.settings, row.why)
		}
	}
}
