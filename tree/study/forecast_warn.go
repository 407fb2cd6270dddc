package study

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"afterbeat/data"
)

const (
	// missed is the part of a measured quantity by which the native state of the
	// model may differ without a warning.
	missed = 0.10
	// fewDraws is the part of the draws that must be met for intervals to be
	// sure.
	fewDraws = 0.8
)

// warnings are what the forecast must not be quoted without: each code once, with
// the speeds that it speaks of.
func (f *Forecast) warnings() []data.Warning {
	out := f.stateWarnings()
	for _, m := range f.Mismatch {
		if off := m.Percent(); math.Abs(off) > 100*missed {
			out = append(out, data.Warning{
				Code: data.CodeNativeMiss,
				Text: fmt.Sprintf("the native state of the model has a %s %.0f %% off the measured one: %.4g against %.4g %s", m.Quantity, off, m.Modelled, m.Measured, m.Unit),
				Cure: "see that pressure and flow belong to the same beats, and the delay between them; another model with --model",
			})
		}
	}
	if f.Draws < int(fewDraws*forecastDraws) {
		out = append(out, data.Warning{
			Code: data.CodeFewDraws,
			Text: fmt.Sprintf("%d of %d drawn ventricles go into the intervals of the forecast; the others do not meet the native state, or there are no replicates", f.Draws, forecastDraws),
			Cure: "give what is known of the ventricle: --edv-ml or --ef",
		})
	}
	for _, p := range f.Published {
		if p.Reason == "" && !p.Inside() {
			out = append(out, data.Warning{
				Code: data.CodePublished,
				Text: fmt.Sprintf("%s (%s) is %s, outside the published %g to %g", p.Name, p.At, strings.TrimSpace(fmt.Sprintf("%.3g %s", p.Value, p.Unit)), p.Low, p.High),
				Cure: "nothing by itself: patients differ; look at what the forecast depends on most, and at the pump's coefficients",
			})
		}
	}
	if f.Modulated != nil {
		out = append(out, f.Modulated.warning()...)
	}
	return slices.Concat(out, f.volumesDisagree(), f.beyond())
}

// volumesDisagree warns of a volume and a fraction that say another stroke
// volume than the flow.
func (f *Forecast) volumesDisagree() []data.Warning {
	c, sv := f.caseOf(), f.Mismatch[strokeVolumeRow].Measured
	if c.EDVML == nil || c.EF == nil || math.Abs(*c.EDVML**c.EF/sv-1) < 0.15 {
		return nil
	}
	return []data.Warning{{
		Code: data.CodeDisagree,
		Text: fmt.Sprintf("end-diastolic volume and ejection fraction give a stroke volume of %.3g mL, the flow one of %.3g mL; the volume is used", *c.EDVML**c.EF, sv),
		Cure: "check the three; leave out --edv-ml or --ef where it is doubtful",
	}}
}

// stateWarnings gathers the warnings of the states.
func (f *Forecast) stateWarnings() []data.Warning {
	type gathered struct {
		data.Warning
		speeds []string
	}
	var all []*gathered
	at := map[data.Code]*gathered{}
	for i := range len(f.Speeds) + 1 {
		s := f.state(i)
		for _, w := range s.CoupledState.Warnings {
			g := at[w.Code]
			if g == nil {
				g = &gathered{Warning: w}
				at[w.Code] = g
				all = append(all, g)
			}
			g.speeds = append(g.speeds, fmt.Sprintf("%.4g", s.Speed))
		}
	}
	var out []data.Warning
	for _, g := range all {
		if len(g.speeds) > 1 {
			_, what, _ := strings.Cut(g.Text, ": ")
			g.Text = fmt.Sprintf("at speeds %s (1000/min); at %s: %s", list(g.speeds), g.speeds[0], what)
		}
		out = append(out, g.Warning)
	}
	return out
}

// beyond warns of speeds outside the range of the pump.
func (f *Forecast) beyond() []data.Warning {
	var speeds []string
	for _, n := range f.speeds() {
		if n < f.Pump.Low || n > f.Pump.High {
			speeds = append(speeds, fmt.Sprintf("%.4g", n))
		}
	}
	if len(speeds) == 0 {
		return nil
	}
	return []data.Warning{{
		Code: data.CodeBeyondPump,
		Text: fmt.Sprintf("speeds %s (1000/min) lie outside the range of %s, %g to %g", list(speeds), f.Pump.Name, f.Pump.Low, f.Pump.High),
		Cure: "name a speed within the range with --speed, or another set with --pump",
	}}
}

// disproof is the one bedside measurement that would prove the forecast wrong.
func (f *Forecast) disproof() string {
	s := f.Speeds[f.Middle]
	text := fmt.Sprintf("Measure the pulse pressure of the arterial line with the pump at %.4g/min and nothing else changed", 1000*s.Speed)
	if !s.PulsePressure.Total.Defined() {
		return text + "."
	}
	return text + fmt.Sprintf(": outside %.2g to %.2g mmHg the forecast is wrong.", s.PulsePressure.Total.Low, s.PulsePressure.Total.High)
}

// heaviest are the n assumptions that move the retained pulse most, each with
// its largest move.
func (f *Forecast) heaviest(n int) []ForecastSensitivity {
	var out []ForecastSensitivity
	seen := map[string]bool{}
	for _, s := range f.Sensitivity {
		if !seen[s.Assumption] && !s.Beyond && len(out) < n {
			seen[s.Assumption] = true
			out = append(out, s)
		}
	}
	return out
}
