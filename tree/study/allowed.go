package study

import (
	"fmt"

	"afterbeat/data"
	"afterbeat/fitting/means"
)

// notFittable says why pressure and flow of the average beat carry no fit, with
// the smallest thing that would cure it; empty where they do. A pressure without
// a flow is no reason here: see [Fit.Estimators].
func notFittable(b Beats) string {
	pressure, hasPressure := b.Intake.Chosen(b.Intake.Selection.Pressure)
	flow, hasFlow := b.Intake.flowChannel()
	switch {
	case !hasPressure:
		return b.withoutPressure()
	case !pressure.Unit.Calibrated:
		return uncalibrated(pressure, "mmHg")
	case !hasFlow:
		return ""
	case !flow.Unit.Calibrated:
		return uncalibrated(flow, b.flowUnit())
	}
	if w := reversed(b); len(w) > 0 {
		return w[0].Text + "; " + w[0].Cure
	}
	return ""
}

// withoutPressure says why a flow without a pressure carries no fit, with the
// smallest thing that would cure it; empty where a cuff stands in for it.
func (b Beats) withoutPressure() string {
	flow, hasFlow := b.Intake.flowChannel()
	switch {
	case b.Intake.Case.Cuff == "":
		return "no arterial pressure: a fit needs one; name it with --pressure, or give a reading of a cuff, --cuff SYS/DIA"
	case !hasFlow:
		return "a reading of a cuff and no flow: a fit needs the wave of one of the two"
	case !flow.Unit.Calibrated:
		return uncalibrated(flow, b.flowUnit())
	case b.FlowInfo.PerArea:
		return "a velocity and a cuff make no load without the diameter of the vessel: state it with --diameter-cm D"
	}
	if w := reversed(b); len(w) > 0 {
		return w[0].Text + "; " + w[0].Cure
	}
	return ""
}

// cuff is the reading that the case states; nil where it has none.
func (t Intake) cuff() (*means.Cuff, error) {
	widths, err := halfWidths(t.Case)
	if err != nil {
		return nil, err
	}
	return cuffOf(t.Case, widths)
}

// reversed warns of a mean flow that is not positive.
func reversed(b Beats) []data.Warning {
	mean := b.Flow.Period.Mean()
	if mean > 0 {
		return nil
	}
	flow, _ := b.Intake.flowChannel()
	return []data.Warning{{
		Code: data.CodeNegativeFlow, Channel: flow.Name,
		Text: fmt.Sprintf("the mean flow is %.3g %s, not positive", mean, b.flowUnit()),
		Cure: fmt.Sprintf("if the channel is upside down, give --invert %s; if its zero is off, --offset %s=VALUE", flow.Name, flow.Name),
	}}
}

func uncalibrated(ch data.Channel, unit string) string {
	said := fmt.Sprintf("%s is in %s, without a scale: state --unit %s=%s with --scale and --offset", ch.Name, ch.Unit.Name, ch.Name, unit)
	if unit == "mmHg" {
		said += fmt.Sprintf(", or --calibrate %s=SYS/DIA", ch.Name)
	}
	return said
}

// checkOutflow refuses an outflow pressure that the mean pressure does not
// exceed: no resistance would be positive.
func checkOutflow(b Beats) error {
	mean := b.Pressure.Period.Mean()
	if cuff, err := b.Intake.cuff(); b.Pressure.Count == 0 && cuff != nil && err == nil {
		mean = cuff.MeanPressure()
	}
	if outflow(b) >= mean {
		return &ChoiceError{
			Key:  "outflow_pressure",
			What: fmt.Sprintf("%g mmHg is not below the mean pressure of %.4g mmHg", outflow(b), mean),
			Hint: "the pressure that blood flows out against: venous, or that at zero flow",
		}
	}
	return nil
}

// steadyPart is the least flow over the mean flow above which a recording looks
// as if a pump were already carrying part of it (an assumption: at the root
// natively the flow stops in diastole).
const steadyPart = 0.25

// onSupport says why a flow is not a native one; empty where it may be.
func onSupport(b Beats) string {
	low, _ := b.Flow.Period.Extremes()
	mean := b.Flow.Period.Mean()
	if !b.FlowInfo.Site.Systemic() || low < steadyPart*mean {
		return ""
	}
	return fmt.Sprintf("the flow at the root never stops (it falls to %.0f %% of its mean at the least): "+
		"the recording seems to be made on support already, and the native state is not known", 100*low/mean)
}
