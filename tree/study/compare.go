package study

import (
	"context"
	"fmt"

	"afterbeat/data"
	"afterbeat/tree/support"
)

// Comparison is the native state of the fitted load beside what a steady pump
// leaves of it, under every posing that needs no ventricle.
type Comparison struct {
	Fit      Fit
	Native   support.State
	Answers  []support.Answer // one a posing
	Reason   string           // why there is no comparison; empty where there is one
	Warnings []data.Warning
}

// Compare poses a steady pump about the native flow, on the chosen fit, at the
// shares of the case. The intervals come from the replicates of the fit.
func Compare(ctx context.Context, f Fit) (Comparison, error) {
	c := Comparison{Fit: f}
	wanted, err := shares(f.Beats.Intake.Case)
	if err != nil {
		return c, err
	}
	if c.Reason = notComparable(f); c.Reason != "" {
		return c, nil
	}
	r := f.Results[f.Chosen]
	flow := f.Beats.Flow.Period
	for _, posing := range support.Posings() {
		a, err := support.Pose(r.Load(), flow, r.OutflowPressure, posing, wanted)
		if err != nil {
			return c, err
		}
		a.OutflowOrigin = origin(f.Beats.Intake.Case.OutflowPressure != nil)
		if a, err = a.WithIntervals(ctx, r.Model, r.Replicates); err != nil {
			return c, err
		}
		c.Answers = append(c.Answers, a)
		c.Warnings = append(c.Warnings, a.Warnings()...)
	}
	c.Native = c.Answers[0].Native
	return c, nil
}

// notComparable says why a fit carries no comparison; empty where it does.
func notComparable(f Fit) string {
	site := f.Beats.FlowInfo.Site
	switch {
	case len(f.Results) == 0:
		return "nothing was fitted to the beats"
	case f.Chosen < 0:
		return f.Recommended.Why + "; name a model with --model to go on all the same"
	case f.Beats.Flow.Count == 0:
		return "an output has a mean and no wave, and what a pump leaves of a pulse needs the wave: record a flow, or a velocity with its diameter"
	case f.Beats.FlowInfo.PerArea:
		return "the fit is per unit area: state the diameter (--diameter-cm) to compare flows"
	case !site.Systemic() && site != data.SiteOther:
		return fmt.Sprintf("the flow is that of one bed (%s): a pump's share needs the flow at the root", site)
	}
	return onSupport(f.Beats)
}
