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
	m, leftOut := beat.Measure(s.average.Period), b.Ensemble.LeaveOut(s.ensemble)
	for _, x := range measures(s) {
		out = append(out, x.row(m, leftOut))
	}
	return out
}

// measure is a number of the average beat.
type measure struct {
	name beat.Index
	unit string
	of   func(beat.Measures) float64
}

func measures(s signal) []measure {
	out := []measure{
		{"mean", s.unit, func(m beat.Measures) float64 { return m.Mean }},
		{"maximum", s.unit, func(m beat.Measures) float64 { return m.Max }},
		{"minimum", s.unit, func(m beat.Measures) float64 { return m.Min }},
		{"max - min", s.unit, func(m beat.Measures) float64 { return m.Amplitude }},
		{beat.GoslingPI, "", func(m beat.Measures) float64 { return m.GoslingPI }},
		{beat.PourcelotRI, "", func(m beat.Measures) float64 { return m.PourcelotRI }},
		{beat.SystolicRatio, "", func(m beat.Measures) float64 { return m.SystolicRatio }},
		{beat.FormFactor, "", func(m beat.Measures) float64 { return m.FormFactor }},
		{beat.PulsatilePower, "", func(m beat.Measures) float64 { return m.PulsatilePower }},
		{beat.TimeToPeak, "s", func(m beat.Measures) float64 { return m.TimeToPeak }},
		{beat.MaxSlope, perSecond(s.unit), func(m beat.Measures) float64 { return m.MaxSlope }},
	}
	if s.role == "pressure" && s.site == data.SiteRoot {
		out = append(out, measure{beat.Augmentation, "", func(m beat.Measures) float64 { return m.Augmentation }})
	}
	return out
}

// perSecond is the unit of a slope.
func perSecond(unit string) string {
	if of, ok := strings.CutSuffix(unit, "/s"); ok {
		return of + "/s2"
	}
	return unit + "/s"
}

// row writes a measure; a remark on it stands behind its interval, or in its
// place where it is undefined.
func (x measure) row(m beat.Measures, leftOut []beat.Measures) row {
	values := make([]float64, len(leftOut))
	for i, l := range leftOut {
		values[i] = x.of(l)
	}
	v := x.of(m)
	i := beat.JackknifeInterval(v, values)
	interval := casenote.FormatRange(v, i)
	switch why := m.Remark(x.name); {
	case why != "" && math.IsNaN(v):
		interval = why
	case why != "":
		interval += "; " + why
	}
	return row{string(x.name), casenote.Format(v, i), x.unit, interval}
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
