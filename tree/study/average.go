package study

import (
	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casenote"
	"afterbeat/data/unit"
)

// some is the average beat of the pressure, or of the flow where there is none.
func (b Beats) some() beat.Average {
	if b.Pressure.Count > 0 {
		return b.Pressure
	}
	return b.Flow
}

// averageSection describes the average beat and its indices.
func (b Beats) averageSection() casenote.Section {
	s := casenote.Section{Title: "Average beat"}
	exact := func(label string, v float64, unit string) {
		s.Rows = append(s.Rows, casenote.Quantity(label, data.Exact(v), unit, data.Measured))
	}
	some := b.some()
	exact("beats averaged", float64(some.Count), "")
	if dropped := beat.Tally(b.Beats); dropped != "" {
		s.Rows = append(s.Rows, casenote.Words("thrown away", dropped))
	}
	if b.Ensemble.Dropped > 0 {
		exact("cut by an end or a gap", float64(b.Ensemble.Dropped), "")
	}
	exact("samples", float64(len(some.Period.Samples)), "")
	exact("period", some.Period.Duration(), "s")
	if b.Pressure.Count > 0 {
		e := data.Estimate{Value: b.Pressure.EndMinusStart, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: "mean over the beats"}
		s.Rows = append(s.Rows, casenote.Quantity("pressure, end less start", e, b.pressureUnit(), data.Measured))
	}
	s.Tables = append(s.Tables, b.indexTable())
	return s
}

// indexTable has a row an index and a column a signal. An undefined index has
// its reason below the table.
func (b Beats) indexTable() casenote.Table {
	t := casenote.Table{Header: []string{"index of the average beat"}}
	var columns [][]IndexEstimate
	add := func(name, unit string, a beat.Average) {
		if a.Count > 0 {
			t.Header = append(t.Header, name+", "+unit)
			columns = append(columns, b.Indices(len(columns)))
		}
	}
	add("pressure", b.pressureUnit(), b.Pressure)
	add("flow", b.flowUnit(), b.Flow)
	for i, row := range indexRows() {
		cells := []casenote.Cell{{Words: data.Clean(row.label)}}
		for _, c := range columns {
			cells = append(cells, casenote.Cell{Number: &casenote.Number{Estimate: c[i].Estimate, Origin: data.Measured}})
		}
		t.Rows = append(t.Rows, cells)
	}
	t.Foot = "Intervals are of random error, from the scatter of blocks of beats; calibration is not in them."
	return t
}

// IndexEstimate is an index of an average beat with its interval of random
// error; Why is what there is to say of it, or why it is undefined.
type IndexEstimate struct {
	Label string
	Index beat.Index // empty for mean, maximum, minimum and their difference
	data.Estimate
}

// Indices are those of the average beat of a signal of the ensemble, in the order
// of the note's table: signal 0 is the pressure, or the flow where there is none.
func (b Beats) Indices(signal int) []IndexEstimate {
	a := b.Flow
	if signal == 0 {
		a = b.some()
	}
	c := indexColumn{beat.Measure(a.Period), b.Ensemble.LeaveOut(signal), 1 / a.Period.Rate}
	var out []IndexEstimate
	for _, row := range indexRows() {
		out = append(out, IndexEstimate{row.label, row.index, c.estimate(row)})
	}
	return out
}

// indexColumn is the measures of one signal's average beat, and those with one
// block of beats left out in turn.
type indexColumn struct {
	measures beat.Measures
	leftOut  []beat.Measures
	sample   float64 // s
}

// estimate is an index with its interval.
func (c indexColumn) estimate(row indexRow) data.Estimate {
	values := make([]float64, len(c.leftOut))
	for i, m := range c.leftOut {
		values[i] = row.of(m)
	}
	interval := beat.JackknifeInterval(row.of(c.measures), values)
	if row.index == beat.TimeToPeak { // read off to a sample
		interval.Low, interval.High = interval.Low-c.sample/2, interval.High+c.sample/2
	}
	return data.Estimate{Value: row.of(c.measures), Total: interval, Random: interval, Identified: true, Why: c.measures.Remark(row.index)}
}

// indexRow is one row of the table of indices.
type indexRow struct {
	label string
	index beat.Index // "" for one that is always defined
	of    func(beat.Measures) float64
}

func indexRows() []indexRow {
	return []indexRow{
		{"mean", "", func(m beat.Measures) float64 { return m.Mean }},
		{"maximum", "", func(m beat.Measures) float64 { return m.Max }},
		{"minimum", "", func(m beat.Measures) float64 { return m.Min }},
		{"maximum less minimum", "", func(m beat.Measures) float64 { return m.Amplitude }},
		{"Gosling PI, (max-min)/mean", beat.GoslingPI, func(m beat.Measures) float64 { return m.GoslingPI }},
		{"Pourcelot RI, (max-min)/max", beat.PourcelotRI, func(m beat.Measures) float64 { return m.PourcelotRI }},
		{"S/D, max/min", beat.SystolicRatio, func(m beat.Measures) float64 { return m.SystolicRatio }},
		{"form factor, (mean-min)/(max-min)", beat.FormFactor, func(m beat.Measures) float64 { return m.FormFactor }},
		{"pulsatile power index, sum (A_k/A_0)^2", beat.PulsatilePower, func(m beat.Measures) float64 { return m.PulsatilePower }},
		{"time to peak, s", beat.TimeToPeak, func(m beat.Measures) float64 { return m.TimeToPeak }},
		{"maximum slope, per s", beat.MaxSlope, func(m beat.Measures) float64 { return m.MaxSlope }},
		{"augmentation index", beat.Augmentation, func(m beat.Measures) float64 { return m.Augmentation }},
	}
}

// pressureUnit is the unit of the pressure: its own where it is uncalibrated.
func (b Beats) pressureUnit() string {
	if ch, ok := b.Intake.Chosen(b.Intake.Selection.Pressure); ok {
		return unitOfValues(ch)
	}
	return unit.Internal(unit.Pressure).Name
}
