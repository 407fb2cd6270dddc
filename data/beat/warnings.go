package beat

import (
	"fmt"

	"afterbeat/data"
)

// Limits of the warnings.
const (
	fewBeats     = 8 // fewer carry no span fit
	manyRejected = 1 / 3.0
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
		warn(data.CodeFewBeats, "take a longer span", "%d beats can be used, fewer than %d", n, fewBeats)
	}
	if r := p.Rejected(); float64(r) > manyRejected*float64(len(p.Beats)) {
		warn(data.CodeManyRejected, "choose a quieter span, or leave out the artefacts",
			"%d of %d beats are not used: %s", r, len(p.Beats), Tally(p.Beats))
	}
	if p.PeriodCV > irregular {
		warn(data.CodeIrregular, "take a span of steady rhythm; an average beat of an irregular one is no beat of the patient",
			"the intervals of the used beats vary by %.0f %% (standard deviation over mean)", 100*p.PeriodCV)
	}
	return out
}
