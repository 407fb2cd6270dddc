package beats

import (
	"math"
	"strings"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casenote"
	"afterbeat/tree/study"
)

// row is a number of a signal in words.
type row struct{ label, value, unit, interval string }

// rows are the heart rate of channel i, and the measures of the average beat of
// its signal. The intervals are of random error, from the scatter of the beats.
func rows(b study.Beats, i int, s signal) []row {
	var out []row
	for _, r := range b.Pulses[i].Section(b.Intake.Channels[i].Name, s.source.Unit).Rows {
		if n := r.Number; n != nil && n.Unit == "1/min" {
			out = append(out, row{r.Label, casenote.Format(n.Value, n.Total), n.Unit, casenote.FormatRange(n.Value, n.Total)})
		}
	}
	if s.average.Count == 0 {
		return out
	}
	for _, e := range b.Indices(s.ensemble) {
		if e.Index != beat.Augmentation || s.role == "pressure" && s.site == data.SiteRoot {
			out = append(out, measured(e, s.unit))
		}
	}
	return out
}

// measured writes an index; a remark on it stands behind its interval, or in its
// place where it is undefined.
func measured(e study.IndexEstimate, unit string) row {
	r := row{e.Label, casenote.Format(e.Value, e.Total), "", casenote.FormatRange(e.Value, e.Total)}
	switch e.Index {
	case "":
		r.unit = unit
	case beat.TimeToPeak:
		r.label, r.unit = string(e.Index), "s"
	case beat.MaxSlope:
		r.label, r.unit = string(e.Index), perSecond(unit)
	default:
		r.label = string(e.Index)
	}
	switch {
	case e.Why != "" && math.IsNaN(e.Value):
		r.interval = e.Why
	case e.Why != "":
		r.interval += "; " + e.Why
	}
	return r
}

// perSecond is the unit of a slope.
func perSecond(unit string) string {
	if of, ok := strings.CutSuffix(unit, "/s"); ok {
		return of + "/s2"
	}
	return unit + "/s"
}

// explained says in a few words what a reason means.
func explained(r beat.Reason) string {
	return map[beat.Reason]string{
		beat.Gap:        "it holds a sample that cannot be used",
		beat.Early:      "its onset came too early",
		beat.AfterEarly: "it follows one that came too early",
		beat.AfterPause: "it follows one that was too long",
		beat.TooShort:   "it was cut short by an early beat",
		beat.TooLong:    "a pause, or an onset that was missed",
		beat.Amplitude:  "its max - min is unlike those around it",
		beat.Level:      "its minimum is unlike those around it",
		beat.Shape:      "its shape is unlike the others",
	}[r]
}
