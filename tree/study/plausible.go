package study

import (
	"fmt"
	"math"
	"slices"

	"afterbeat/data"
	"afterbeat/data/unit"
	"afterbeat/fitting/estimate"
)

// window is what a mean value has in people, in the internal unit.
type window struct{ low, high float64 }

// The windows of means. Pressure: Sun, Reisner and Mark 2006, Comput Cardiol
// 33:13 (from memory); output: 1.5 to 10 L/min, about the limits of cardiac index
// of 3090 people (J Am Soc Echocardiogr; from a stored abstract) widened for low
// output; velocity: common practice.
var (
	meanPressure = window{30, 200}
	meanOutput   = window{25, 170}
	meanVelocity = window{1, 150}
)

// implausible warns of a chosen channel whose mean lies outside what its
// quantity has in people, and proposes the unit that would fit.
func implausible(b Beats) []data.Warning {
	var out []data.Warning
	for _, i := range b.chosen() {
		ch := b.Intake.Channels[i]
		w, tried, ok := expected(ch)
		mean := b.Pulses[i].Mean
		if !ok || !b.Pulses[i].Found || math.IsNaN(mean) || w.holds(mean) { // NaN: no beat is used
			continue
		}
		warning := data.Warning{
			Code: data.CodeUnlikely, Channel: ch.Name,
			Text: fmt.Sprintf("mean %s is %.4g %s, outside %g to %g", ch.Quantity, mean, unit.Internal(ch.Quantity).Name, w.low, w.high),
			Cure: "check unit, scale and zero of the channel (--unit, --scale, --offset)",
		}
		for _, name := range tried {
			u, _ := unit.Parse(name)
			if w.holds(mean / ch.Unit.Factor * u.Factor) {
				warning.Text += fmt.Sprintf("; in %s it would be likely", name)
				warning.Cure = fmt.Sprintf("if the unit is wrong: --unit %s=%s", ch.Name, name)
				break
			}
		}
		out = append(out, warning)
	}
	return out
}

// expected is the window of a channel's mean, and the units it may be in really.
func expected(ch data.Channel) (w window, tried []string, ok bool) {
	switch {
	case !ch.Unit.Calibrated:
		return window{}, nil, false
	case ch.Quantity == unit.Pressure:
		return meanPressure, []string{"mmHg", "kPa", "cmH2O", "Pa"}, true
	case ch.Quantity == unit.Flow && (ch.Site.Systemic() || ch.Site == data.SiteOther):
		return meanOutput, []string{"mL/s", "L/min", "mL/min", "L/s"}, true
	case ch.Quantity == unit.Velocity:
		return meanVelocity, []string{"cm/s", "m/s", "mm/s"}, true
	}
	return window{}, nil, false
}

// holds takes a mean below 0 for one of a channel upside down, which the fit
// refuses by itself.
func (w window) holds(mean float64) bool { return w.low <= math.Abs(mean) && math.Abs(mean) <= w.high }

// most is how far two estimates of C may differ before it is said.
const most = 1.5

// disagreements warns where another way and the fit in use give compliances that
// are far apart.
func disagreements(f Fit) []data.Warning {
	// The others scatter too much to accuse the fit, or are no compliance.
	steady := []string{estimate.Decay, estimate.Area, estimate.PulsePressure}
	c := f.Results[f.Chosen].Values.C
	for _, e := range f.Estimators {
		if !slices.Contains(steady, e.Name) || !(e.C > 0) || !(c > 0) || (e.C/c < most && c/e.C < most) {
			continue
		}
		return []data.Warning{{
			Code: data.CodeDisagree,
			Text: fmt.Sprintf("%s gives C %.3g, the fit of %s %.3g: they differ by a factor of %.1f", e.Name, e.C, f.Results[f.Chosen].Model.Name, c, max(e.C/c, c/e.C)),
			Cure: "check the delay between the channels first, then the outflow pressure, then where they were measured",
		}}
	}
	return nil
}
