package study

import (
	"context"

	"afterbeat/data"
	"afterbeat/fitting"
	"afterbeat/fitting/estimate"
)

// WhatIf is a result fitted anew with one assumption moved and all others as they
// are: nothing of it is kept.
type WhatIf struct {
	Sensitivity
	Result fitting.Result // without intervals
}

// WhatIfs moves the assumptions of [Fit.Sensitivity] about result i, and the
// diameter by 5 % where a velocity was made into a flow.
func (f Fit) WhatIfs(ctx context.Context, i int) ([]WhatIf, error) {
	if f.Results[i].Basis == fitting.BasisMeans {
		return f.movedMeans(i), nil
	}
	all := moves()
	if f.Beats.FlowInfo.Conversion != nil {
		for _, d := range []float64{-0.05, 0.05} {
			all = append(all, flowMove("diameter", d, (1+d)*(1+d)))
		}
	}
	return f.moved(ctx, i, all)
}

// Doubts moves each systematic error of result i to the upper end of its 95 %
// interval: what the total interval is made of, beside random error.
//
// A load on the basis of means has none: [Fit.Sensitivity] says what moves it.
func (f Fit) Doubts(ctx context.Context, i int) ([]WhatIf, error) {
	if f.Results[i].Basis == fitting.BasisMeans {
		return nil, nil
	}
	b, err := fitData(f.Beats)
	if err != nil {
		return nil, err
	}
	s, flow := b.Systematic, "flow"
	if f.Beats.FlowInfo.Conversion != nil {
		flow = "flow from velocity"
	}
	all := []move{
		flowMove(flow, s.Flow, 1+s.Flow),
		outflowMove(s.OutflowPressure),
		delayMove(s.Delay),
		pressureMove("pressure-scale", "%", 100*s.PressureScale, func(c *fitting.Calibration) { c.PressureScale *= 1 + s.PressureScale }),
		pressureMove("pressure-offset", "mmHg", s.PressureOffset, func(c *fitting.Calibration) { c.PressureOffset += s.PressureOffset }),
	}
	var some []move
	for _, m := range all {
		if m.by > 0 {
			some = append(some, m)
		}
	}
	return f.moved(ctx, i, some)
}

// movedMeans is result i, on the basis of means, under each assumption of
// [Fit.Sensitivity]; nothing for another than the chosen one.
func (f Fit) movedMeans(i int) (out []WhatIf) {
	if i != f.Chosen {
		return nil
	}
	for _, s := range f.Sensitivity {
		r := fitting.NewResult(f.Results[i].Model, fitting.BasisMeans, s.Values, f.Results[i].Site, f.Results[i].OutflowPressure, f.Results[i].CriterionReason)
		if f.Beats.Flow.Count > 0 {
			r.Modelled = fitting.Respond(r.Load(), f.Beats.Flow.Period, r.OutflowPressure)
		}
		out = append(out, WhatIf{s, r})
	}
	return out
}

// moved fits result i anew under each move.
func (f Fit) moved(ctx context.Context, i int, all []move) ([]WhatIf, error) {
	b, err := fitData(f.Beats)
	if err != nil {
		return nil, err
	}
	was, d := f.Results[i], fitting.Span{Beats: b, Runs: f.Beats.Runs}
	var out []WhatIf
	for _, m := range all {
		r, err := refit(ctx, was, d, m)
		if err != nil {
			return out, err
		}
		out = append(out, WhatIf{m.effect(r, was), r})
	}
	return out, nil
}

// LoadOf is the wk2 that an estimate's R and C make; false where it has none.
func (f Fit) LoadOf(e estimate.Estimate) (fitting.Lumped, bool) {
	wk2, ok := fitting.ByName("wk2")
	return fitting.Lumped{Model: wk2, Values: fitting.Values{R: e.R, C: e.C}}, ok && e.R > 0 && e.C > 0
}

// Modelled is the pressure that [Fit.LoadOf] makes of the average flow; false
// where the estimate or the flow does not allow it.
func (f Fit) Modelled(e estimate.Estimate) (data.Period, bool) {
	load, ok := f.LoadOf(e)
	if !ok || f.Beats.Flow.Count == 0 {
		return data.Period{}, false
	}
	return fitting.Respond(load, f.Beats.Flow.Period, outflow(f.Beats)), true
}

// Remark is what there is to say of an estimate: what it gives beside tau, R and
// C, what to mind, or why there is none.
func (f Fit) Remark(e estimate.Estimate) string { return f.remark(e) }
