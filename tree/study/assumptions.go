package study

import (
	"fmt"

	"afterbeat/data"
	"afterbeat/data/casenote"
)

// assumptionSection lists what was given or assumed beside the recording, with
// the systematic errors that the total intervals carry.
func (b Beats) assumptionSection(seed, replicates int) casenote.Section {
	s := casenote.Section{Title: "Given and assumed", Chief: true}
	hasFlow := b.FlowInfo.Channel >= 0
	// An error of flow that was given is all of it, those of its parts included.
	parts := b.FlowInfo.Conversion != nil && b.Intake.Case.Error["flow"] == ""
	delay := data.Estimate{Value: b.Delay.Value, Total: around(b.Delay.Value, b.Delay.Error), Random: data.NoInterval(), Identified: true}
	s.Rows = append(s.Rows, b.besideRows()...)
	if hasFlow && b.Pressure.Count > 0 {
		s.Rows = append(s.Rows, casenote.Quantity("delay of pressure", delay, "s", b.Delay.origin()))
	}
	pv := outflow(b)
	widths, _ := halfWidths(b.Intake.Case) // checked when the beats were cut
	against := data.Estimate{Value: pv, Total: around(pv, widths["outflow-pressure"]), Random: data.NoInterval(), Identified: true}
	s.Rows = append(s.Rows, casenote.Quantity("outflow pressure", against, "mmHg", origin(b.Intake.Case.OutflowPressure != nil)))
	pressure := b.Intake.pressureErrors(widths)
	for _, k := range errorKinds() {
		w := widths[k.name]
		if k.name == "delay" {
			w = b.Delay.Error
		}
		switch k.name {
		case "cardiac-output":
			if hasFlow || b.Intake.Case.CardiacOutput == nil {
				continue
			}
		case "flow":
			if w = b.FlowInfo.Error; !hasFlow {
				continue
			}
		case "delay":
			if !hasFlow || b.Pressure.Count == 0 {
				continue
			}
		case "filling-slope": // stands with the ventricle
			continue
		case "cuff":
			if !pressure.FromCuff && b.Pressure.Count > 0 {
				continue
			}
		case "pressure-scale":
			if pressure.FromCuff {
				s.Rows = append(s.Rows, casenote.Words("95 % error, "+k.name, fmt.Sprintf("+-%.3g %% about %.4g mmHg (from the cuff's)", 100*pressure.Scale, pressure.Pivot)))
				continue
			}
		case "pressure-offset":
			if b.Pressure.Count == 0 {
				continue
			}
			if pressure.FromCuff {
				s.Rows = append(s.Rows, casenote.Words("95 % error, "+k.name, fmt.Sprintf("+-%.3g mmHg (from the cuff's)", pressure.Offset)))
				continue
			}
		case "diameter", "angle":
			if !parts {
				continue
			}
		}
		s.Rows = append(s.Rows, casenote.Words("95 % error, "+k.name, k.words(w)+stated(b.Intake.Case.Error[k.name] != "")))
	}
	if b.some().Count >= 2 {
		s.Rows = append(s.Rows, casenote.Words("replicates", fmt.Sprintf("%d, seed %d", replicates, seed)))
	}
	return s
}

// words writes the half-width of an error.
func (k errorKind) words(w float64) string {
	if k.relative {
		return fmt.Sprintf("+-%.3g %%", 100*w)
	}
	return fmt.Sprintf("+-%.3g %s", w, k.unit)
}

func stated(given bool) string {
	if given {
		return " (given)"
	}
	return " (assumed)"
}

func origin(given bool) data.Origin {
	if given {
		return data.Measured
	}
	return data.Assumed
}

func around(v, halfWidth float64) data.Interval {
	return data.Interval{Low: v - halfWidth, High: v + halfWidth}
}
