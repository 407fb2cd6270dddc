package beat

import (
	"fmt"
	"math"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
)

// Section describes the beats of a channel for the note, in its unit. The
// intervals are of random error alone: they say how well the beats of the span
// determine a value, not how well the channel was calibrated. Those of heart
// rate, systolic and diastolic are by order statistics, that of the mean by
// Student's t over beats, all widened for beats that resemble their neighbours
// (breathing).
func (p Pulse) Section(channel data.Text, unit string) casenote.Section {
	s := casenote.Section{Title: "Beats of " + channel.String()}
	if !p.Found {
		s.Rows = append(s.Rows, casenote.Words("pulse", "none: "+p.Reason))
		return s
	}
	good := used(p.Beats)
	s.Rows = append(s.Rows, casenote.Words("beats used", fmt.Sprintf("%d of %d", len(good), len(p.Beats))))
	if p.Rejected() > 0 {
		s.Rows = append(s.Rows, casenote.Words("not used", Tally(p.Beats)))
	}
	row := func(label string, e data.Estimate, unit string) {
		s.Rows = append(s.Rows, casenote.Quantity(label, e, unit, data.Measured))
	}
	if p.Criteria == Support {
		s.Rows = append(s.Rows, casenote.Words("looked for", "as a pulse on support: by what the upstrokes share, at the dominant period"))
	}
	if !math.IsNaN(p.PulseToNoise()) {
		s.Rows = append(s.Rows, casenote.Words("pulse over noise", fmt.Sprintf("%.2g (average beat over what single beats differ from it)", p.PulseToNoise())))
	}
	if b := p.Breathing; !math.IsNaN(b.Period) {
		s.Rows = append(s.Rows, casenote.Words("breathing", fmt.Sprintf("%.2g s a breath; pulse varies with it by %.2g %%", b.Period, 100*b.Variation)))
	}
	for _, r := range p.Rhythms[min(1, len(p.Rhythms)):] {
		s.Rows = append(s.Rows, casenote.Words("second rhythm", fmt.Sprintf("%.3g Hz, %.3g %s; the heart's alone: %.3g Hz, %.3g %s",
			r.Frequency, r.PulseAmplitude, unit, p.Rhythms[0].Frequency, p.Rhythms[0].PulseAmplitude, unit)))
	}
	row("heart rate", p.heartRate(good), "1/min")
	row("systolic", medianOf(good, func(b Beat) float64 { return b.Max }), unit)
	row("diastolic", medianOf(good, func(b Beat) float64 { return b.Min }), unit)
	interval, why := meanInterval(good)
	row("mean", estimate(p.Mean, interval, why), unit)
	s.Words = []data.Text{data.Clean("Intervals are of random error, widened for the likeness of neighbouring beats; calibration is not in them.")}
	return s
}

// HeartRateEstimate is the heart rate, 1/min, with its interval of random error.
func (p Pulse) HeartRateEstimate() data.Estimate { return p.heartRate(used(p.Beats)) }

// heartRate is 60 over the median interval, and so are the ends of its interval.
func (p Pulse) heartRate(good []Beat) data.Estimate {
	interval, why := medianInterval(each(good, func(b Beat) float64 { return b.Interval }))
	return estimate(p.HeartRate(), data.Interval{Low: 60 / interval.High, High: 60 / interval.Low}, why)
}

func medianOf(beats []Beat, of func(Beat) float64) data.Estimate {
	x := each(beats, of)
	interval, why := medianInterval(x)
	return estimate(median(x), interval, why)
}

func estimate(value float64, i data.Interval, why string) data.Estimate {
	if math.IsNaN(value) {
		why = "no used beat"
	}
	return data.Estimate{Value: value, Total: i, Random: i, Identified: !math.IsNaN(value), Why: why}
}

// Tally counts the beats that are not used by reason, in words: "11 too long, 1
// shape"; empty where all are used.
func Tally(beats []Beat) string {
	n := map[Reason]int{}
	for _, b := range beats {
		n[b.Rejected]++
	}
	var parts []string
	for _, r := range Reasons() {
		if n[r] > 0 {
			parts = append(parts, fmt.Sprintf("%d %s", n[r], r))
		}
	}
	return strings.Join(parts, ", ")
}
