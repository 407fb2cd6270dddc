package study

import (
	"context"
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/fitting"
	"afterbeat/fitting/estimate"
	"afterbeat/fitting/means"
)

// Row is the row of the table of what the data allow that a fit stands in.
type Row string

// The rows.
const (
	RowAll       Row = "pressure and flow of the same beats: all models"
	RowPerArea   Row = "pressure and velocity of the same beats, no diameter: all models, per unit area"
	RowOutput    Row = "pressure and an output: the resistance from means, the compliance from the decay of diastole"
	RowCuff      Row = "flow and a cuff: the resistance from means, the compliance from the pulse pressure"
	RowPressure  Row = "pressure alone: the time constant of diastole"
	RowOfNothing Row = ""
)

// fromPressure estimates what a pressure without a flow allows: the load where an
// output was measured beside it, else the time constant alone.
func (f Fit) fromPressure(ctx context.Context, s fitting.Settings) (Fit, error) {
	given, err := cardiacOutput(f.Beats.Intake.Case)
	if err != nil {
		return f, err
	}
	widths, err := halfWidths(f.Beats.Intake.Case)
	if err != nil {
		return f, err
	}
	p := means.Pressure{
		Beats: f.Beats.Ensemble.Beats[0], Rate: f.Beats.Ensemble.Rate, Output: given, OutflowPressure: outflow(f.Beats),
		Systematic: fitting.Systematic{
			Flow: widths["cardiac-output"], PressureScale: widths["pressure-scale"],
			PressureOffset: widths["pressure-offset"], OutflowPressure: widths["outflow-pressure"],
		},
	}
	if given == 0 {
		if f = f.fromPressureAlone(); f.Reason == "" {
			if f.TimeConstant, err = means.TimeConstant(ctx, p, s); err != nil {
				return f, err
			}
		}
		f.Warnings = append(f.Warnings, f.cuffWarnings()...)
		return f, nil
	}
	f.Estimators = estimators(f.Beats, nil)
	r, reason, err := means.FromOutput(ctx, p, s)
	if err != nil {
		return f, err
	}
	if f.Reason = reason; reason != "" {
		return f, nil
	}
	f.Results, f.Row = []fitting.Result{r}, RowOutput
	f.Recommended = fitting.Recommendation{
		Model: r.Model.Name, Basis: r.Basis,
		Why: "a pressure and an output allow this load and no other: R from means, C from the decay of diastole, Zc taken for 5 % of the total resistance",
	}
	f.Chosen = f.chosenAmong()
	f.Warnings = append(f.Warnings, f.meansWarnings(r)...)
	f.Warnings = append(f.Warnings, f.pressureSiteWarnings(p.At(p.OutflowPressure, 1, 1/1.3), r.Values)...)
	f.Warnings = append(f.Warnings, f.outputWords(widths["cardiac-output"])...)
	f.Warnings = append(f.Warnings, f.cuffWarnings()...)
	f.Sensitivity = movedLoads(r, func(pv, output, _ float64) fitting.Values { return p.At(pv, output, 1) }, false)
	return f, nil
}

// fromCuff estimates the load of a flow without a pressure from a reading of a
// cuff.
func (f Fit) fromCuff(ctx context.Context, s fitting.Settings, cuff means.Cuff) (Fit, error) {
	widths, err := halfWidths(f.Beats.Intake.Case)
	if err != nil {
		return f, err
	}
	flow := means.Flow{
		Beats: f.Beats.Ensemble.Beats[0], Rate: f.Beats.Ensemble.Rate, Cuff: cuff, OutflowPressure: outflow(f.Beats), Site: siteOfFit(f.Beats.FlowInfo.Site),
		Systematic: fitting.Systematic{Flow: f.Beats.FlowInfo.Error, PressureScale: widths["pressure-scale"], OutflowPressure: widths["outflow-pressure"]},
	}
	var reason string
	if f.Results, reason, err = means.FromCuff(ctx, flow, s); err != nil {
		return f, err
	}
	if f.Reason = reason; len(f.Results) == 0 {
		return f, nil
	}
	f.Row, f.Cuff = RowCuff, &cuff
	f.Estimators = estimate.OfCuff(estimate.Beat{Flow: f.Beats.Flow.Period, OutflowPressure: flow.OutflowPressure}, cuff.MeanPressure(), cuff.Pulse())
	f.Recommended = fitting.Recommendation{
		Model: f.Results[0].Model.Name, Basis: f.Results[0].Basis,
		Why: "nothing of it is taken but the outflow pressure: R is from means and C from the pulse pressure, while wk3 needs a Zc that was not measured",
	}
	f.Chosen = f.chosenAmong()
	if f.Chosen < 0 {
		return f, nil
	}
	r := f.Results[f.Chosen]
	low, why := flow.At(r.Model.Name, flow.OutflowPressure, 1, 1/1.3)
	f.Warnings = append(f.Warnings, f.meansWarnings(r)...)
	if why == "" {
		f.Warnings = append(f.Warnings, data.Warning{
			Code: data.CodeStandIn,
			Text: fmt.Sprintf("the pressure of the cuff stands in for that at the %s, where the flow was measured; were its pulse 1.3 times as large as there, C would be %.0f %% too low", f.Beats.FlowInfo.Site, 100*(1-r.Values.C/low.C)),
			Cure: "record a pressure beside the flow",
		})
	}
	f.Warnings = append(f.Warnings, f.outputWarnings()...)
	f.Sensitivity = movedLoads(r, func(pv, output, pulse float64) fitting.Values {
		v, _ := flow.At(r.Model.Name, pv, output, pulse)
		return v
	}, true)
	return f, nil
}

// chosenAmong is the index of the result of the model that the case names, else of
// the recommended one; -1 where there is none.
func (f Fit) chosenAmong() int {
	wanted := f.Recommended.Model
	if f.named() {
		wanted = f.Beats.Intake.Case.Model
	}
	for i, r := range f.Results {
		if r.Model.Name == wanted {
			return i
		}
	}
	return -1
}

// movedLoads are a load with one assumption moved at a time.
func movedLoads(r fitting.Result, at func(pv, output, pulse float64) fitting.Values, cuff bool) []Sensitivity {
	var out []Sensitivity
	add := func(assumption, change string, by float64, v fitting.Values) {
		out = append(out, Sensitivity{Assumption: assumption, Change: change, By: by, Values: v, Percent: percent(v, r.Values)})
	}
	pv := r.OutflowPressure
	for _, d := range []float64{-10, 10} {
		add("outflow-pressure", fmt.Sprintf("%+g mmHg", d), d, at(pv+d, 1, 1))
	}
	for _, d := range []float64{-0.2, 0.2} {
		add("output", fmt.Sprintf("%+.0f %%", 100*d), d, at(pv, 1+d, 1))
	}
	for _, d := range []float64{-0.1, 0.1} {
		if cuff {
			add("cuff, pulse", fmt.Sprintf("%+.0f %%", 100*d), d, at(pv, 1, 1+d))
		}
	}
	return out
}

// meansWarnings are those of every load on the basis of means.
func (f Fit) meansWarnings(r fitting.Result) []data.Warning {
	out := []data.Warning{{
		Code: data.CodeMeans,
		Text: r.Model.Name + ": " + string(f.Row),
		Cure: map[Row]string{RowOutput: "a flow or a velocity recorded with the pressure", RowCuff: "a pressure recorded with the flow"}[f.Row],
	}}
	if f.Beats.Intake.Case.OutflowPressure == nil {
		out = append(out, data.Warning{
			Code: data.CodeOutflow,
			Text: fmt.Sprintf("%s: outflow pressure %.3g mmHg is an assumption; %s", r.Model.Name, r.OutflowPressure, r.OutflowWords()),
			Cure: "a measured venous or zero-flow pressure: --outflow-pressure MMHG",
		})
	}
	if n := f.Beats.some().Count; n < fitting.FewBeats {
		out = append(out, data.Warning{Code: data.CodeFewBeats, Text: fmt.Sprintf("%s: beats that carry it: %d", r.Model.Name, n), Cure: "a longer recording, of 8 usable beats or more"})
	}
	for _, p := range r.Parameters {
		if p.Name != "Zc" && !p.Identified {
			out = append(out, data.Warning{Code: data.CodeNotIdentified, Text: fmt.Sprintf("%s: %s is not identified: %s", r.Model.Name, p.Name, p.Why), Cure: "an output, or a cuff reading, with a smaller error: --error"})
		}
	}
	return out
}

// pressureSiteWarnings warn of a pressure that stands in for the root's beside an
// output, with what a pulse 1.3 times too large does to this beat: atRoot is the
// load of a pulse smaller by that.
func (f Fit) pressureSiteWarnings(atRoot, now fitting.Values) []data.Warning {
	p, ok := f.Beats.Intake.Chosen(f.Beats.Intake.Selection.Pressure)
	if !ok || p.Site == data.SiteRoot {
		return nil
	}
	w := standIn(p)
	if change := 100 * (1 - now.C/atRoot.C); !math.IsNaN(change) {
		where := "at the " + string(p.Site)
		if p.Site == data.SiteOther {
			where = "at a place that its name does not tell"
		}
		w.Text = fmt.Sprintf("pressure measured %s stands in for the root's; were its pulse 1.3 times that of the root, C would be %.0f %% too low and R unchanged", where, change)
	}
	return []data.Warning{w}
}

// outputWords warn of an output that is itself an estimate, or of which nothing is
// said.
func (f Fit) outputWords(width float64) []data.Warning {
	var text, cure string
	switch f.Beats.Intake.Case.OutputBy {
	case "contour":
		text, cure = "the output is itself an estimate, made from the contour of the pressure", "an output by --output-by fick or thermodilution"
	case "pump":
		text, cure = "the output is the pump's own estimate", "an output by --output-by fick or thermodilution"
	case "":
		text, cure = "how the output was measured is not said", "state it with --output-by, or its error with --error cardiac-output=10%"
	default:
		return nil
	}
	return []data.Warning{{Code: data.CodeOutputEstimate, Text: fmt.Sprintf("%s: its error is taken for %.0f %%", text, 100*width), Cure: cure}}
}

// rowSection says which row of the table of what the data allow was taken.
func (f Fit) rowSection() casenote.Section {
	s := casenote.Section{Title: "What the data allow", Words: words("Given: " + string(f.Row) + ".")}
	if f.Row == RowPressure {
		s.Rows = append(s.Rows, casenote.Quantity("time constant of diastole, R C", f.TimeConstant, "s", data.Estimated))
	}
	return s
}
