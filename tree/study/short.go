package study

import (
	"fmt"
	"math"
	"slices"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casenote"
	"afterbeat/data/unit"
	"afterbeat/tree/support"
)

// litresPerMinute is 1 mL/s in L/min.
const litresPerMinute = 0.06

// shortSection is the study in a few lines, each of which has its place below.
func (s Study) shortSection() casenote.Section {
	out := casenote.Section{Title: "In short", Chief: true}
	if s.Beats == nil || s.Beats.Reason != "" {
		return out
	}
	out.Rows = append(out.Rows, s.Beats.measuredRows()...)
	warnings := casenote.Words("warnings", fmt.Sprintf("%d, listed below with what would cure them", len(s.Warnings())))
	if s.Fit == nil || s.Fit.Chosen < 0 {
		out.Rows = append(out.Rows, warnings)
		return out
	}
	r := s.Fit.Results[s.Fit.Chosen]
	for i, p := range r.Parameters {
		label := fmt.Sprintf("%s (%s), %s", p.Name, r.Model.Name, r.Model.Parameters()[i].Meaning)
		out.Rows = append(out.Rows, casenote.Quantity(label, p.Estimate, p.Unit, data.Estimated))
	}
	if s.Forecast != nil && s.Forecast.Reason == "" {
		out.Words = words(s.Forecast.shortWords())
		out.Rows = slices.Concat(s.Forecast.shortRows(), s.Comparison.shortRows(), out.Rows)
	} else if s.Comparison != nil && s.Comparison.Reason == "" {
		out.Words = []data.Text{data.Clean("The retained pulse is that of a yardstick without a ventricle, no forecast; its interval holds if the posing did. Each line has its place below.")}
		out.Rows = append(out.Rows, s.Comparison.shortRows()...)
	}
	out.Rows = append(out.Rows, warnings)
	return out
}

// measuredRows are what was measured, with calibration errors in the total
// intervals.
func (b Beats) measuredRows() []casenote.Row {
	rows := []casenote.Row{casenote.Quantity("heart rate", b.Pulses[b.Lead].HeartRateEstimate(), "1/min", data.Measured)}
	widths, _ := halfWidths(b.Intake.Case) // checked when the beats were cut
	next := 0
	if b.Pressure.Count > 0 {
		c := indexColumn{beat.Measure(b.Pressure.Period), b.Ensemble.LeaveOut(next), 0}
		next++
		errors := b.Intake.pressureErrors(widths)
		if !b.Intake.Channels[b.Intake.Selection.Pressure].Unit.Calibrated {
			errors = pressureErrors{} // they are those of a calibration
		}
		mean := withSystematic(c.estimate(indexRow{of: func(m beat.Measures) float64 { return m.Mean - errors.Pivot }}), errors.Scale, errors.Offset)
		mean = raised(mean, errors.Pivot)
		pulse := withSystematic(c.estimate(indexRow{of: func(m beat.Measures) float64 { return m.Amplitude }}), errors.Scale, 0)
		rows = append(rows,
			casenote.Quantity("mean pressure", mean, b.pressureUnit(), data.Measured),
			casenote.Quantity("pulse pressure", pulse, b.pressureUnit(), data.Measured))
	}
	if b.Flow.Count > 0 && b.flowUnit() == unit.Internal(unit.Flow).Name {
		c := indexColumn{beat.Measure(b.Flow.Period), b.Ensemble.LeaveOut(next), 0}
		mean := c.estimate(indexRow{of: func(m beat.Measures) float64 { return litresPerMinute * m.Mean }})
		rows = append(rows, casenote.Quantity("mean flow", withSystematic(mean, b.FlowInfo.Error, 0), "L/min", data.Measured))
	}
	return rows
}

// raised is the estimate with v added.
func raised(e data.Estimate, v float64) data.Estimate {
	e.Value += v
	e.Total = data.Interval{Low: e.Total.Low + v, High: e.Total.High + v}
	e.Random = data.Interval{Low: e.Random.Low + v, High: e.Random.High + v}
	return e
}

// withSystematic adds a relative and an absolute 95 % half-width of systematic
// error to the total interval, in quadrature.
func withSystematic(e data.Estimate, relative, absolute float64) data.Estimate {
	if !e.Random.Defined() {
		return e
	}
	systematic := math.Hypot(relative*e.Value, absolute)
	e.Total = data.Interval{
		Low:  e.Value - math.Hypot(e.Value-e.Random.Low, systematic),
		High: e.Value + math.Hypot(e.Random.High-e.Value, systematic),
	}
	return e
}

// shortRows say what is left of the pulse, at the share nearest to one half.
func (c Comparison) shortRows() []casenote.Row {
	var rows []casenote.Row
	for _, a := range c.Answers {
		if a.Posing.ByConstruction() || len(a.Comparisons) == 0 {
			continue
		}
		near := nearestHalf(a.Comparisons)
		label := fmt.Sprintf("yardstick, share %.2g, %s: retained pulse", near.Share, a.Posing)
		rows = append(rows, casenote.Quantity(label, near.RetainedPressure, "of native", data.Estimated))
	}
	return rows
}

func nearestHalf(all []support.Comparison) support.Comparison {
	best := all[0]
	for _, one := range all {
		if math.Abs(one.Share-0.5) < math.Abs(best.Share-0.5) {
			best = one
		}
	}
	return best
}
