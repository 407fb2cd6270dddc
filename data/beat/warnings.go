package beat

import (
	"fmt"
	"math"
	"slices"

	"afterbeat/data"
)

// Limits of the warnings.
const (
	fewBeats     = 8 // fewer carry no span fit
	manyRejected = 1 / 3.0
	faintPulse   = 7.0  // over the noise
	irregularAll = 0.15 // CV of all intervals; one early beat among thirty makes 0.10
	irregular    = 0.10 // CV of the intervals; at rest in sinus rhythm it is 0.02 to 0.08 (common practice)
)

// Warnings says what to mind about the beats of a channel; none where no pulse
// was found.
func (p Pulse) Warnings(channel data.Text) []data.Warning {
	if !p.Found {
		return nil
	}
	var out []data.Warning
	warn := func(code data.Code, cure, format string, args ...any) {
		out = append(out, data.Warning{Code: code, Channel: channel, Text: fmt.Sprintf(format, args...), Cure: cure})
	}
	if n := p.Used(); n < fewBeats {
		warn(data.CodeFewBeats, "take a longer span", "beats that can be used: %d, fewer than %d", n, fewBeats)
	}
	if r := p.Rejected(); float64(r) > manyRejected*float64(len(p.Beats)) {
		warn(data.CodeManyRejected, "choose a quieter span, or leave out the artefacts",
			"%d of %d beats are not used: %s", r, len(p.Beats), Tally(p.Beats))
	}
	if p.PulseToNoise() < faintPulse {
		warn(data.CodeFaintPulse, faintCure(p.Criteria),
			"the pulse is %.2g times the noise: that of the average beat is %.3g, and noise lifts the systolic and lowers the diastolic value of single beats",
			p.PulseToNoise(), p.Amplitude)
	}
	// Of all beats too: where the rhythm is worst, the used ones are the regular ones.
	all := variation(each(whole(p.Beats), func(b Beat) float64 { return b.Interval }))
	if p.PeriodCV > irregular || all > irregularAll {
		spread := fmt.Sprintf("%.0f %% in all", 100*all)
		if !math.IsNaN(p.PeriodCV) { // two used beats at least
			spread = fmt.Sprintf("%.0f %% in the used beats and by %s", 100*p.PeriodCV, spread)
		}
		warn(data.CodeIrregular, "take a span of steady rhythm; an average beat of an irregular one is no beat of the patient",
			"the intervals vary by %s (standard deviation over mean); for an average pulse within 2 %%, %d beats are needed by their scatter here (in atrial fibrillation 13 on average, up to 17: J Am Soc Echocardiogr 1997;10:67)",
			spread, p.BeatsNeeded())
	}
	return append(out, p.rhythmWarnings(channel)...)
}

// rhythmWarnings speak of a second rhythm and of beats of two kinds.
func (p Pulse) rhythmWarnings(channel data.Text) []data.Warning {
	var out []data.Warning
	warn := func(code data.Code, cure, format string, args ...any) {
		out = append(out, data.Warning{Code: code, Channel: channel, Text: fmt.Sprintf(format, args...), Cure: cure})
	}
	if len(p.Rhythms) > 1 {
		warn(data.CodeTwoRhythms, "hold the pump's speed steady, or take a span that holds many of its cycles",
			"beside the pulse of %.3g at %.3g Hz a steady wave of %.3g at %.3g Hz runs, as a pump makes that changes its speed; it is in the values of single beats",
			p.Rhythms[0].PulseAmplitude, p.Rhythms[0].Frequency, p.Rhythms[1].PulseAmplitude, p.Rhythms[1].Frequency)
	}
	if p.Overlap != "" {
		warn(data.CodeTwoRhythms, "hold the pump's speed steady, or record at another heart rate", "%s", p.Overlap)
	}
	if p.Alternation > 0 {
		warn(data.CodeTwoKinds, "mind that the average beat is the mean of two kinds",
			"every other beat is larger by %.0f %% (pulsus alternans, or a pump locked to every other beat)", 100*p.Alternation)
	}
	if p.SecondPulse > 0 {
		warn(data.CodeTwoKinds, "look at the beats: where each holds two pulses, heart rate is twice what is said",
			"a second pulse of %.0f %% of the first stands within the beat: a bigeminy that is counted once, or a deep dicrotic wave", 100*p.SecondPulse)
	}
	return out
}

func faintCure(by Criteria) string {
	if by == Support {
		return "take a longer span, and use the average beat"
	}
	return "look for beats with --beats support, and use the average beat"
}

// whole are the beats without an unusable sample.
func whole(beats []Beat) []Beat {
	return slices.DeleteFunc(slices.Clone(beats), func(b Beat) bool { return b.Rejected == Gap })
}
