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

// The windows of means. Pressure of a systemic artery: Sun, Reisner and Mark 2006,
// Comput Cardiol 33:13 (from memory); of others, pulmonary to venous: common practice.
// Output: 1.5 to 10 L/min, about the limits of cardiac index of 3090 people (J Am Soc
// Echocardiogr; from a stored abstract) widened for low output. Flow of one artery, a
// third of the published mean to three times it and what support and exercise add:
// common carotid 415 mL/min (n = 174), middle cerebral 168 to 180 mL/min a side
// (n = 35), renal 522 mL/min a kidney (organ table, at 5.5 L/min); the limbs: common
// practice. Velocity: middle cerebral 45 to 58 cm/s (n = 50); outflow tract: 16 to 22 cm
// a beat; the rest common practice.
var (
	meanPressure = window{30, 200}
	otherMean    = window{0.5, 80}
	meanOutput   = window{25, 170}
	meanVelocity = window{1, 150}

	flowAt = map[data.Site]window{
		data.SiteCarotid: {2, 25}, data.SiteMCA: {0.8, 10}, data.SiteRenal: {2, 30},
		data.SiteFemoral: {0.5, 60}, data.SiteBrachial: {0.2, 20}, data.SiteRadial: {0.1, 8}, data.SiteFinger: {0.005, 1},
	}
	velocityAt = map[data.Site]window{
		data.SiteMCA: {12, 180}, data.SiteRoot: {3, 100}, data.SiteLVOT: {3, 100}, data.SiteCarotid: {5, 120},
	}
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
			Text: fmt.Sprintf("mean %s is %.4g %s, outside %g to %g%s", ch.Quantity, mean, unit.Internal(ch.Quantity).Name, w.low, w.high, siteWords(ch)),
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
		return at(ch.Arterial(), meanPressure, otherMean), []string{"mmHg", "kPa", "cmH2O", "Pa"}, true
	case ch.Quantity == unit.Flow:
		w, known := flowAt[ch.Site]
		return at(known, w, meanOutput), []string{"mL/s", "L/min", "mL/min", "L/s"}, true
	case ch.Quantity == unit.Velocity:
		w, known := velocityAt[ch.Site]
		return at(known, w, meanVelocity), []string{"cm/s", "m/s", "mm/s"}, true
	}
	return window{}, nil, false
}

// siteWords names the site where the window is its own.
func siteWords(ch data.Channel) string {
	_, flow := flowAt[ch.Site]
	_, velocity := velocityAt[ch.Site]
	if flow && ch.Quantity == unit.Flow || velocity && ch.Quantity == unit.Velocity {
		return " at site " + string(ch.Site)
	}
	return ""
}

// at is the window a where first, else b.
func at(first bool, a, b window) window {
	if first {
		return a
	}
	return b
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
