package fitting

import (
	"fmt"

	"afterbeat/data"
	"afterbeat/data/casenote"
)

// Section describes the fit for a note: what was fitted, its parameters with
// both intervals, the residual, and how the intervals came about.
func (r Result) Section() casenote.Section {
	s := casenote.Section{Title: r.title()}
	s.Words = append(s.Words, data.Clean(fmt.Sprintf("Model %s (%s), %s, outflow pressure %.4g mmHg.",
		r.Model.Name, r.Model.Source(), r.basisWords(), r.OutflowPressure)))
	for i, p := range r.Parameters {
		label := fmt.Sprintf("%s, %s", p.Name, r.Model.Parameters()[i].Meaning)
		s.Rows = append(s.Rows, casenote.Quantity(label, p.Estimate, p.Unit, data.Estimated))
	}
	unit := resistance.Unit
	if r.PerArea {
		unit = resistance.PerArea
	}
	s.Rows = append(s.Rows, casenote.Quantity("total resistance", r.TotalResistance, unit, data.Estimated))
	if r.Basis == BasisMeans {
		s.Rows = append(s.Rows, casenote.Words("residual", "none: "+r.CriterionReason), casenote.Words("intervals", r.intervalWords()))
		return s
	}
	s.Rows = append(s.Rows,
		casenote.Quantity("residual, rms", data.Estimate{Value: r.RMSE, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: "of the fit as it stands"}, "mmHg", data.Estimated),
		casenote.Words("intervals", r.intervalWords()))
	return s
}

// title names the model and tells whose load it is: the body's, or that of one
// bed.
func (r Result) title() string {
	site := string(r.Site)
	if site == "" {
		site = string(data.SiteOther)
	}
	title := "Fit of " + r.Model.Name + ", regional load: " + site
	if r.Site.Systemic() {
		title = "Fit of " + r.Model.Name + ", systemic load"
	}
	if r.PerArea {
		title += ", per unit area"
	}
	return title
}

func (r Result) basisWords() string {
	if r.Basis == BasisMeans {
		return "from mean values, and the decay of diastole or the pulse pressure"
	}
	if s := r.Span; s != nil {
		return fmt.Sprintf("fitted to the whole span (%.4g s, runs without a gap: %d)", s.Duration, s.Runs)
	}
	return "fitted to the average beat"
}

// intervalWords names the method of the intervals, or why there are none.
func (r Result) intervalWords() string {
	switch r.IntervalMethod {
	case IntervalBlocks:
		return fmt.Sprintf("%s: 95 %%, %d replicates of blocks of successive beats", r.IntervalMethod, len(r.Replicates.Random))
	case IntervalSpan:
		return fmt.Sprintf("%s: 95 %%, from the residual in %d blocks of %.3g s, Student's t", r.IntervalMethod, r.Span.Blocks, r.Span.BlockLength)
	case IntervalCovariance:
		return r.IntervalMethod + ": 95 %, from the residual and its autocorrelation, few beats"
	}
	return r.IntervalMethod + ": " + r.TotalResistance.Why
}
