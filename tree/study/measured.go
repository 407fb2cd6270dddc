package study

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
	"afterbeat/fitting/means"
)

// outputErrors are the 95 % errors of a cardiac output by how it was measured
// (common practice).
var outputErrors = []struct {
	by    string
	error float64
}{
	{"fick", 0.10},
	{"thermodilution", 0.20},
	{"assumed-fick", 0.25},
	{"outflow-doppler", 0.25},
	{"contour", 0.40},
	{"pump", 0.20},
}

// unknownOutputError is that of an output of which nothing is said (an
// assumption).
const unknownOutputError = 0.25

// outputError is the default error of the output of a case.
func outputError(c casefile.Case) float64 {
	for _, e := range outputErrors {
		if e.by == c.OutputBy {
			return e.error
		}
	}
	return unknownOutputError
}

// mostOutput is more than any heart gives, L/min.
const mostOutput = 40

// cardiacOutput is that of the case, mL/s; 0 where it has none, in whatever way it
// would have been measured.
func cardiacOutput(c casefile.Case) (float64, error) {
	var names []string
	known := c.OutputBy == ""
	for _, e := range outputErrors {
		names = append(names, e.by)
		known = known || e.by == c.OutputBy
	}
	if !known {
		return 0, &ChoiceError{Key: "output_by", What: fmt.Sprintf("%q is no way to measure an output", data.Clean(c.OutputBy)), Hint: "ways: " + list(names)}
	}
	if c.CardiacOutput == nil {
		return 0, nil
	}
	if v := *c.CardiacOutput; !(v > 0 && v <= mostOutput) {
		return 0, &ChoiceError{Key: "cardiac_output", What: fmt.Sprintf("%v is not between 0 and %g L/min", v, float64(mostOutput)), Hint: "in L/min, for instance --cardiac-output 4.2"}
	}
	return *c.CardiacOutput / litresPerMinute, nil
}

// cuffOf is the reading of a cuff that the case states; nil where it has none.
func cuffOf(c casefile.Case, widths map[string]float64) (*means.Cuff, error) {
	if c.Cuff == "" {
		return nil, nil
	}
	wrong := func(what string) error {
		return &ChoiceError{Key: "cuff", What: what, Hint: "systolic over diastolic, and the mean where it was read, in mmHg: --cuff 118/74 or --cuff 118/74/90"}
	}
	parts := strings.Split(c.Cuff, "/")
	if len(parts) < 2 || len(parts) > 3 {
		return nil, wrong(fmt.Sprintf("not a reading: %q", data.Clean(c.Cuff)))
	}
	var v [3]float64
	for i, s := range parts {
		var err error
		if v[i], err = strconv.ParseFloat(strings.TrimSpace(s), 64); err != nil || math.IsNaN(v[i]) || v[i] <= 0 || v[i] > 400 {
			return nil, wrong(fmt.Sprintf("not a pressure: %q", data.Clean(s)))
		}
	}
	cuff := &means.Cuff{Systolic: v[0], Diastolic: v[1], Mean: v[2], Error: widths["cuff"]}
	switch {
	case cuff.Systolic <= cuff.Diastolic:
		return nil, wrong(fmt.Sprintf("%g is not above %g", cuff.Systolic, cuff.Diastolic))
	case len(parts) == 3 && !(cuff.Diastolic < cuff.Mean && cuff.Mean < cuff.Systolic):
		return nil, wrong(fmt.Sprintf("a mean of %g does not lie between %g and %g", cuff.Mean, cuff.Diastolic, cuff.Systolic))
	}
	return cuff, nil
}

// mismatch is from where an output given and the flow recorded are said to differ
// (a published criterion of agreement is 30 %, half of it asked for here).
const mismatch = 0.15

// outputWarnings set an output that was given beside the flow recorded: the flow
// rules.
func (f Fit) outputWarnings() []data.Warning {
	given, err := cardiacOutput(f.Beats.Intake.Case)
	if given == 0 || err != nil || f.Beats.Flow.Count == 0 {
		return nil
	}
	site, mean := f.Beats.FlowInfo.Site, f.Beats.Flow.Period.Mean()
	why := ""
	switch {
	case f.Beats.FlowInfo.PerArea:
		why = "the velocity recorded has no diameter to compare it with"
	case !site.Systemic() && site != data.SiteOther:
		why = fmt.Sprintf("the flow recorded is that of one bed (%s), and the output that of the heart", site)
	case math.Abs(mean/given-1) > mismatch:
		return []data.Warning{{
			Code: data.CodeOutputDiffers, Channel: f.flowName(),
			Text: fmt.Sprintf("the flow recorded has a mean of %.3g L/min, and the output given is %.3g L/min: %+.0f %%; the flow is used", litresPerMinute*mean, litresPerMinute*given, 100*(mean/given-1)),
			Cure: "check diameter, angle and scale of the flow, and when the output was measured; --scale can make the flow agree",
		}}
	}
	if why == "" {
		return nil
	}
	return []data.Warning{{Code: data.CodeUnused, Text: "the cardiac output given is not used: " + why, Cure: "leave --cardiac-output out, or record the flow at the root"}}
}

func (f Fit) flowName() data.Text {
	ch, _ := f.Beats.Intake.flowChannel()
	return ch.Name
}

// cuffWarnings say that a reading of a cuff is not used beside a recorded pressure.
func (f Fit) cuffWarnings() []data.Warning {
	if f.Beats.Intake.Case.Cuff == "" || f.Beats.Pressure.Count == 0 {
		return nil
	}
	low, high := f.Beats.Pressure.Period.Extremes()
	return []data.Warning{{
		Code: data.CodeUnused,
		Text: fmt.Sprintf("the cuff's %s mmHg is not used: a pressure was recorded, %.0f/%.0f mmHg on the average beat", f.Beats.Intake.Case.Cuff, high, low),
		Cure: "leave --cuff out; it counts where a flow was recorded without a pressure",
	}}
}

// besideRows are what was measured beside the recording and is used.
func (b Beats) besideRows() []casenote.Row {
	var rows []casenote.Row
	c := b.Intake.Case
	if given, err := cardiacOutput(c); given > 0 && err == nil && b.Flow.Count == 0 {
		w := outputError(c)
		if widths, err := halfWidths(c); err == nil {
			w = widths["cardiac-output"]
		}
		e := data.Estimate{Value: *c.CardiacOutput, Total: around(*c.CardiacOutput, w**c.CardiacOutput), Random: data.NoInterval(), Identified: true}
		rows = append(rows, casenote.Quantity("cardiac output"+by(c.OutputBy), e, "L/min", data.Measured))
	}
	if cuff, err := b.Intake.cuff(); cuff != nil && err == nil && b.Pressure.Count == 0 {
		for _, one := range []struct {
			label string
			value float64
		}{{"cuff, systolic", cuff.Systolic}, {"cuff, diastolic", cuff.Diastolic}} {
			e := data.Estimate{Value: one.value, Total: around(one.value, cuff.Error), Random: data.NoInterval(), Identified: true}
			rows = append(rows, casenote.Quantity(one.label, e, "mmHg", data.Measured))
		}
		mean := data.Estimate{Value: cuff.MeanPressure(), Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: "read"}
		origin := data.Measured
		if cuff.Mean == 0 {
			mean.Why, origin = "diastolic and a third of the pulse", data.Assumed
		}
		rows = append(rows, casenote.Quantity("cuff, mean", mean, "mmHg", origin))
	}
	return rows
}

func by(how string) string {
	if how == "" {
		return ""
	}
	return " by " + how
}
