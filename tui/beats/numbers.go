package beats

import (
	"fmt"
	"math"
	"strings"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casenote"
	"afterbeat/tree/study"
	"afterbeat/tui/explain"
)

// row is a number of a signal in words, and what enter opens it into.
type row struct {
	label, value, unit, interval string
	number                       explain.Number
}

// rows are the heart rate of channel i, and the measures of the average beat of
// its signal. The intervals are of random error, from the scatter of the beats.
func rows(b study.Beats, i int, s signal) []row {
	var out []row
	for _, r := range b.Pulses[i].Section(b.Intake.Channels[i].Name, s.source.Unit).Rows {
		if n := r.Number; n != nil && n.Unit == "1/min" {
			one := row{r.Label, casenote.Format(n.Value, n.Total), n.Unit, casenote.FormatRange(n.Value, n.Total), s.explained(beat.HeartRateOf, n.Estimate, n.Unit)}
			one.number.Method = "order statistics of the intervals between the onsets used"
			out = append(out, one)
		}
	}
	if s.average.Count == 0 {
		return out
	}
	for _, e := range b.Indices(s.ensemble) {
		if e.Index != beat.Augmentation || s.role == "pressure" && s.site == data.SiteRoot {
			out = append(out, s.measured(e))
		}
	}
	return out
}

// measured writes an index; a remark on it stands behind its interval, or in its
// place where it is undefined.
func (s signal) measured(e study.IndexEstimate) row {
	r := row{label: e.Label, value: casenote.Format(e.Value, e.Total), interval: casenote.FormatRange(e.Value, e.Total)}
	index := e.Index
	switch e.Index {
	case "":
		r.unit, index = s.unit, beat.Index(e.Label)
	case beat.TimeToPeak:
		r.label, r.unit = string(e.Index), "s"
	case beat.MaxSlope:
		r.label, r.unit = string(e.Index), perSecond(s.unit)
	default:
		r.label = string(e.Index)
	}
	switch {
	case e.Why != "" && math.IsNaN(e.Value):
		r.interval = e.Why
	case e.Why != "":
		r.interval += "; " + e.Why
	}
	r.number = s.explained(index, e.Estimate, r.unit)
	return r
}

// explained is a measure with what stands behind it.
func (s signal) explained(i beat.Index, e data.Estimate, unit string) explain.Number {
	n := explain.Number{
		Name: string(i), Of: fmt.Sprintf("the average %s, site %s", s.role, s.site),
		Value:      casenote.Number{Estimate: e, Unit: unit, Origin: data.Measured},
		Method:     "from the scatter of the beats, a block left out in turn (jackknife); calibration is not in it",
		RandomOnly: true,
		Account:    beat.Account(i, s.quantity, s.site),
	}
	if s.gain != 1 {
		n.Notes = append(n.Notes, "a flow made of a velocity: "+s.made())
	}
	return n
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
