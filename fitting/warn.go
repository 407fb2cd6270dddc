package fitting

import (
	"fmt"
	"math"
	"strings"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// largeMisfit is the residual over the pulse amplitude, root mean square over
// max - min, above which a fit is warned of (an assumption).
const largeMisfit = 0.10

// warn adds the warnings of a finished fit.
func (f *beatFit) warn(r *Result) {
	add := func(code data.Code, cure, format string, args ...any) {
		r.Warnings = append(r.Warnings, data.Warning{Code: code, Text: r.Model.Name + ": " + fmt.Sprintf(format, args...), Cure: cure})
	}
	pressure, flow := f.beats.Average()
	if !r.Converged {
		add(data.CodeNotConverged, "look for values far out of range in the beats", "the search for the best fit ended outside of numbers")
	}
	if q := flow.Mean(); q <= 0 {
		add(data.CodeNegativeFlow, "invert the flow channel, or leave the fit out", "mean flow is %.3g %s", q, f.flowUnit())
	}
	for _, p := range r.Parameters {
		if !p.Identified {
			add(data.CodeNotIdentified, cureOf(p.Name), "%s is not identified: %s", p.Name, p.Why)
		}
	}
	low, high := pressure.Extremes()
	if r.RMSE > largeMisfit*(high-low) {
		add(data.CodeMisfit, "try a model with more elements; check delay and calibration of the two channels",
			"the residual is %.3g mmHg (rms) beside a pulse of %.3g mmHg", r.RMSE, high-low)
	}
	if n := f.beats.Count(); n < fewBeats {
		add(data.CodeFewBeats, "a longer recording, of 8 usable beats or more", "beats that carry the fit: %d", n)
	}
	if !f.beats.OutflowMeasured {
		add(data.CodeOutflow, "a measured venous or zero-flow pressure", "outflow pressure %.3g mmHg is an assumption; %s", r.OutflowPressure, r.outflowWords())
	}
}

// flowUnit is the unit of what was taken for flow.
func (f *beatFit) flowUnit() string {
	if f.beats.PerArea {
		return unit.Internal(unit.Velocity).Name
	}
	return unit.Internal(unit.Flow).Name
}

// outflowWords tells what other outflow pressures would make of R and C.
func (r *Result) outflowWords() string {
	var parts []string
	for _, row := range r.OutflowSensitivity {
		if math.IsNaN(row.R) || math.IsNaN(row.C) {
			continue
		}
		parts = append(parts, fmt.Sprintf("with %.3g mmHg R changes by %+.1f %% and C by %+.1f %%", row.OutflowPressure, 100*row.R, 100*row.C))
	}
	if len(parts) == 0 {
		return "what another one would do cannot be said"
	}
	return strings.Join(parts, ", ")
}

// cureOf is what would determine a parameter.
func cureOf(name string) string {
	switch name {
	case "Zc", "L":
		return "a flow channel with a wider band, its delay known; or use a model without " + name
	case "C":
		return "more beats, with a clearer pulse in flow and pressure"
	}
	return "check the sign and the zero of flow, and the outflow pressure"
}
