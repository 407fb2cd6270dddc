package fitting

import (
	"math"
	"strings"
	"testing"

	"afterbeat/data"
)

// made is a result with the given criteria; lost names a parameter that is not
// identified.
func made(name, basis string, aicc, rmse float64, lost string) Result {
	m, _ := ByName(name)
	r := Result{Model: m, Basis: basis, AICc: aicc, RMSE: rmse}
	if math.IsNaN(aicc) {
		r.CriterionReason = "a reason"
	}
	for _, s := range m.Parameters() {
		e := data.Estimate{Value: 1, Identified: s.Name != lost}
		if !e.Identified {
			e.Why = "it is 0, the end of its range"
		}
		r.Parameters = append(r.Parameters, Parameter{Name: s.Name, Estimate: e})
	}
	return r
}

func TestRecommend(t *testing.T) {
	nan := math.NaN()
	for _, c := range []struct {
		name         string
		results      []Result
		model, basis string
		why          []string
	}{
		{"lowest AICc", []Result{made("wk2", "beat", 20, 3, ""), made("wk3", "beat", 5, 1, "")}, "wk3", "beat", []string{"lowest AICc, by 15.0"}},
		{"simpler wins", []Result{made("wk2", "beat", 20, 3, ""), made("wk3", "beat", 22, 2.9, "")}, "wk2", "beat", []string{"lowest AICc, by 2.0"}},
		{"Zc not identified", []Result{made("wk2", "beat", 20, 3, ""), made("wk3", "beat", 5, 1, "Zc")}, "wk2", "beat", []string{"only model", "Zc of wk3 is not identified (it is 0"}},
		{"AICc undefined", []Result{made("wk2", "beat", nan, 3, ""), made("wk3", "beat", nan, 1, "")}, "wk3", "beat", []string{"smallest residual, 1 mmHg", "AICc is undefined: a reason"}},
		{"span before beat", []Result{made("wk3", "beat", 1, 1, ""), made("wk2", "span", 9, 3, ""), made("wk3", "span", 5, 1, "")}, "wk3", "span", []string{"by 4.0"}},
		{"span without doubt only", []Result{made("wk2", "beat", 1, 1, ""), made("wk2", "span", 0, 3, "C")}, "wk2", "beat", []string{"C of wk2"}},
		{"one", []Result{made("wk2", "beat", nan, 1, "")}, "wk2", "beat", []string{"only model fitted"}},
		{"none sound", []Result{made("wk2", "beat", 1, 1, "C"), made("wk3", "beat", 1, 1, "R")}, "", "", []string{"no model has all", "C of wk2", "R of wk3"}},
		{"none", nil, "", "", []string{"no model was fitted"}},
	} {
		got := Recommend(c.results)
		if got.Model != c.model || got.Basis != c.basis {
			t.Errorf("%s: %+v, want %s on %s", c.name, got, c.model, c.basis)
		}
		for _, why := range c.why {
			if !strings.Contains(got.Why, why) {
				t.Errorf("%s: %q does not say %q", c.name, got.Why, why)
			}
		}
	}
}

// From data: the model that made them is the one recommended.
func TestRecommendFromData(t *testing.T) {
	b := noisy(160, 24, 14)
	var results []Result
	for _, m := range Models() {
		results = append(results, fit(t, m, b, Settings{Replicates: 100}))
	}
	if got := Recommend(results); got.Model != "wk3" {
		t.Errorf("%+v", got)
	}
}
