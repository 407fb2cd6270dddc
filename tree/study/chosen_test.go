package study

import (
	"errors"
	"testing"

	"afterbeat/data/casefile"
	"afterbeat/fitting"
)

func TestPickTakesTheBasisWanted(t *testing.T) {
	var results []fitting.Result
	for _, basis := range []string{fitting.BasisBeat, fitting.BasisSpan} {
		for _, m := range fitting.Models()[:2] {
			results = append(results, fitting.Result{Model: m, Basis: basis})
		}
	}
	for _, c := range []struct {
		results      []fitting.Result
		model, basis string
		want         int
	}{
		{results, "wk3", "", 3},
		{results, "wk3", fitting.BasisBeat, 1},
		{results, "wk2", fitting.BasisSpan, 2},
		{results[:2], "wk3", fitting.BasisSpan, 1}, // not fitted: the one there is
		{results, "none", "", -1},
	} {
		if got := pick(c.results, c.model, c.basis); got != c.want {
			t.Errorf("%s on %q: %d, want %d", c.model, c.basis, got, c.want)
		}
	}
}

// The basis that a person chose goes downstream, is said by the note, and changes
// nothing before the fit; one that there is not is refused.
func TestTheBasisChosen(t *testing.T) {
	s := demoFitted(t, func(c *casefile.Case) { c.Basis = fitting.BasisBeat })
	if r := s.Fit.Results[s.Fit.Chosen]; r.Basis != fitting.BasisBeat || s.Fit.BasisMissed() {
		t.Errorf("in use: %s on %s", r.Model.Name, r.Basis)
	}
	if got := s.Comparison.Fit.Results[s.Comparison.Fit.Chosen].Basis; got != fitting.BasisBeat {
		t.Errorf("compared: %s", got)
	}
	a := s.Inputs.Case
	b := a
	b.Basis = fitting.BasisSpan
	if got := firstTouched(a, b); got != StageFit {
		t.Errorf("a change of basis begins at %s", got)
	}
	var choice *ChoiceError
	if err := checkModel(casefile.Case{Basis: "week"}); !errors.As(err, &choice) || choice.Key != "basis" {
		t.Errorf("%v", err)
	}
}
