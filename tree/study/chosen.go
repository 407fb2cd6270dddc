package study

import "afterbeat/fitting"

// pick is the index of the fit of a model that goes downstream: that on the basis
// wanted; else, and where none is wanted, the last of them, which is that to the
// whole span where there is one; -1 where the model was not fitted.
func pick(results []fitting.Result, model, basis string) int {
	chosen := -1
	for i, r := range results {
		if r.Model.Name != model {
			continue
		}
		if r.Basis == basis {
			return i
		}
		chosen = i
	}
	return chosen
}

// BasisMissed tells that a person wants another basis than the fit in use has: it
// was not fitted.
func (f Fit) BasisMissed() bool {
	wanted := f.Beats.Intake.Case.Basis
	return f.Chosen >= 0 && wanted != "" && wanted != f.Results[f.Chosen].Basis
}
