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
			"the intervals vary by %s (standard deviation over mean)", spread)
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
