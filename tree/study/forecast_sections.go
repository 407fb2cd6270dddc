package study

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/data/unit"
	"afterbeat/tree/support"
)

// sections describe the forecast for a note.
func (f Forecast) sections() []casenote.Section {
	if f.Reason != "" {
		return []casenote.Section{{
			Title: "Forecast with a ventricle and a pump",
			Chief: true,
			Words: []data.Text{data.Clean(fmt.Sprintf("There is no forecast: %s.", f.Reason))},
		}}
	}
	out := []casenote.Section{f.ventricleSection(), f.pumpSection(), f.sweepSection(), f.powerSection()}
	if f.Modulated != nil {
		out = append(out, f.modulatedSection())
	}
	return append(out, f.leaningSection(), f.publishedSection())
}

func words(paragraphs ...string) []data.Text {
	all := make([]data.Text, len(paragraphs))
	for i, p := range paragraphs {
		all[i] = data.Clean(p)
	}
	return all
}

// ventricleSection lists the ventricle, and how near its native state comes to
// what was measured.
func (f Forecast) ventricleSection() casenote.Section {
	s := casenote.Section{Title: "Forecast: the ventricle", Words: words(f.ventricleWords()...)}
	for _, p := range f.Ventricle {
		s.Rows = append(s.Rows, casenote.Quantity(p.Symbol+", "+p.Meaning, p.Estimate, p.Unit, p.Origin))
	}
	t := casenote.Table{Header: []string{"native state, unit", "measured, in it", "of the model, in it", "model less measured, %"}, Foot: f.mismatchWords()}
	for _, m := range f.Mismatch {
		t.Rows = append(t.Rows, []casenote.Cell{
			{Words: data.Clean(m.Quantity + ", " + m.Unit)}, plain(m.Measured), plain(m.Modelled), plain(rounded(m.Percent())),
		})
	}
	s.Tables = append(s.Tables, t)
	return s
}

// ventricleWords say what is solved for, and what is drawn.
func (f Forecast) ventricleWords() []string {
	const drawn = "Arterial traces do not fix the rest. What has a range below is drawn evenly from it (assumptions), and every draw that meets the native state counts in the total intervals; the values stand for the middle of the ranges."
	switch {
	case f.own.whole:
		return []string{
			"A time-varying elastance, Plv = E(t) (V - V0), between two valves, as given in the case: nothing is solved for, and the native state is what it makes of the fitted load.",
			"What has a range below is drawn evenly from it (assumptions), and counts in the total intervals; the values stand for the middle of the ranges.",
		}
	case f.caseOf().EDVML == nil && f.caseOf().EF == nil:
		return []string{f.solvedWords(), drawn + " An end-diastolic volume (--edv-ml) or an ejection fraction (--ef) narrows them."}
	}
	return []string{f.solvedWords(), drawn}
}

func (f Forecast) solvedWords() string {
	return "A time-varying elastance, Plv = E(t) (V - V0), cosine in time, between two valves, that natively ejects into the fitted load what was measured: Emax, Emin and Tes are solved for stroke volume, ejection time and end-diastolic volume, and Tr for the pulse pressure, as far as 0.25 to 0.8 Tes (an assumption) allows."
}

// rounded drops what lies below the accuracy of a set-up, in percent.
func rounded(percent float64) float64 {
	if math.Abs(percent) < 0.01 {
		return 0
	}
	return percent
}

// mismatchWords say whether the native state is reproduced.
func (f Forecast) mismatchWords() string {
	worst := f.Mismatch[0]
	for _, m := range f.Mismatch {
		if math.Abs(m.Percent()) > math.Abs(worst.Percent()) {
			worst = m
		}
	}
	if math.Abs(worst.Percent()) < 0.5 {
		return "The model reproduces the native state."
	}
	return fmt.Sprintf("The largest difference is that of %s, %+.1f %%.%s Retained pulse below is that of the model against its own native state.", worst.Quantity, worst.Percent(), f.backWords())
}

// backWords say how much of the measured flow runs back, which a valve that shuts
// at once does not let.
func (f Forecast) backWords() string {
	flow := f.Comparison.Fit.Beats.Flow.Period
	forward, back := 0.0, 0.0
	for _, q := range flow.Samples {
		forward += max(0, q) / flow.Rate
		back += max(0, -q) / flow.Rate
	}
	if f.own.rar > 0 || !(back > 0.01*forward) {
		return ""
	}
	return fmt.Sprintf(" Of the measured flow %.2g mL a beat run back, mostly as the valve shuts; the valve of the model shuts at once, and so ejects %.0f %% less for the same net stroke volume.", back, 100*back/forward)
}

func (f Forecast) pumpSection() casenote.Section {
	p := f.Pump
	t := casenote.Table{Header: []string{"", "a, mmHg min2/10^6", "b, mmHg s min/(mL 1000)", "c, mmHg s2/mL2", "Rc, mmHg s/mL", "Lc, mmHg s2/mL"}}
	cells := []casenote.Cell{{Words: data.Clean("value")}}
	for _, c := range []struct {
		symbol string
		value  float64
	}{{"a", p.A}, {"b", p.B}, {"c", p.C}, {"Rc", p.Resistance}, {"Lc", p.Inertance}} {
		cells = append(cells, casenote.Cell{Number: &casenote.Number{Estimate: data.Exact(c.value), Origin: p.origin(c.symbol)}})
	}
	t.Rows = [][]casenote.Cell{cells}
	from := "the ventricle"
	if p.Inlet == support.InletAtrium {
		from = "the left atrium, which is at the filling pressure,"
	}
	return casenote.Section{
		Title: "Forecast: the pump",
		Words: words(fmt.Sprintf("H = a n^2 - b n Q - c Q|Q|, from %s to the root, behind cannulas of resistance Rc and inertance Lc; n in 1000/min.", from)),
		Rows: []casenote.Row{
			casenote.Words("set of coefficients", p.Name+" ("+p.Origin+")"),
			casenote.Words("range of speed", fmt.Sprintf("%g to %g, 1000/min", p.Low, p.High)),
		},
		Tables: []casenote.Table{t},
	}
}

// sweepSection has tables with a row a speed, and the valve limit.
func (f Forecast) sweepSection() casenote.Section {
	s := casenote.Section{
		Title: "Forecast: native and supported, coupled",
		Chief: true,
		Words: words(
			fmt.Sprintf("Ventricle, pump and load settle among themselves what each does; a forecast as far as arteries, heart rate and contractility stay as they are. Speed 0 is the native state of the model. Total intervals: %d draws of the fit's replicates, the ranges of the ventricle and the filling slope together; random ones: the replicates of random error alone, at the nominal ventricle.", f.Draws),
			f.match.words(),
		),
		Rows: []casenote.Row{casenote.Quantity("valve limit", f.ValveLimit, "1000/min", data.Estimated)},
		Tables: []casenote.Table{
			f.pulseTable(),
			f.speedTable(
				speedEstimate{"mean pressure, mmHg", func(s *ForecastState) data.Estimate { return s.MeanPressure }},
				speedEstimate{"output, L/min", func(s *ForecastState) data.Estimate { return times(s.Output, litresPerMinute) }},
				speedEstimate{"filling pressure, mmHg", func(s *ForecastState) data.Estimate { return s.FillingPress }},
			),
			f.speedTable(
				speedEstimate{"valve open, ms a beat", func(s *ForecastState) data.Estimate { return times(s.ValveOpenTime, 1000) }},
				speedEstimate{"surplus energy, erg/cm3", func(s *ForecastState) data.Estimate { return s.SurplusEnergy }},
				speedEstimate{"swing of pump flow, mL/s", func(s *ForecastState) data.Estimate { return s.PumpSwing }},
			),
		},
	}
	if f.match.byResistance() {
		s.Tables = append(s.Tables, f.speedTable(speedEstimate{"resistance R, of native", func(s *ForecastState) data.Estimate { return s.Resistance }}))
	}
	if f.own.rar > 0 {
		s.Words = append(s.Words, data.Clean("The aortic valve leaks: what runs back goes round through ventricle and pump and does not reach the body. Output is what reaches it; the pump moves more."))
		s.Tables = append(s.Tables, f.loopTable())
	}
	return s
}

// loopTable tells the flow that goes round from that which reaches the body.
func (f Forecast) loopTable() casenote.Table {
	t := casenote.Table{Header: []string{"speed, 1000/min", "through the pump, L/min", "back through the valve, L/min", "into the body, L/min"}, Foot: "Of the nominal ventricle, mean over the beat."}
	for i := range len(f.Speeds) + 1 {
		s := f.state(i)
		t.Rows = append(t.Rows, []casenote.Cell{
			speedCell(s), plain(litresPerMinute * s.CoupledState.PumpFlow.Mean), plain(litresPerMinute * s.Loop), plain(litresPerMinute * s.Flow()),
		})
	}
	return t
}

// speedEstimate is a column of a table with a row a speed.
type speedEstimate struct {
	header string
	of     func(*ForecastState) data.Estimate
}

func speedCell(s *ForecastState) casenote.Cell {
	return casenote.Cell{Words: data.Clean(fmt.Sprintf("%.4g", s.Speed))}
}

func (f Forecast) speedTable(columns ...speedEstimate) casenote.Table {
	t := casenote.Table{Header: []string{"speed, 1000/min"}}
	for _, c := range columns {
		t.Header = append(t.Header, c.header)
	}
	for i := range len(f.Speeds) + 1 {
		s := f.state(i)
		cells := []casenote.Cell{speedCell(s)}
		for _, c := range columns {
			cells = append(cells, forecastCell(c.of(s)))
		}
		t.Rows = append(t.Rows, cells)
	}
	return t
}

// pulseTable is the sweep in short: the pulse, and whether the valve opens.
func (f Forecast) pulseTable() casenote.Table {
	t := f.speedTable(
		speedEstimate{"pulse pressure, mmHg", func(s *ForecastState) data.Estimate { return s.PulsePressure }},
		speedEstimate{"retained pulse, of native", func(s *ForecastState) data.Estimate { return s.RetainedPulse }},
	)
	t.Header = append(t.Header, "valve opens")
	for i := range t.Rows {
		t.Rows[i] = append(t.Rows[i], casenote.Cell{Words: data.Clean(fmt.Sprintf("%.0f %%", 100*f.state(i).ValveOpenDraws))})
	}
	t.Foot = "Valve opens: the part of the draws in which the aortic valve opens at all. The valve limit is the lowest speed at which it stays shut over the whole beat; below it the model opens in every beat, a patient near it in some."
	return t
}

// powerSection has what enters the arteries beside what is spent.
func (f Forecast) powerSection() casenote.Section {
	milliwatt := func(of func(*ForecastState) data.Estimate) func(*ForecastState) data.Estimate {
		return func(s *ForecastState) data.Estimate { return times(of(s), unit.MilliwattPerMmHgMLPerS) }
	}
	period := f.Comparison.Fit.Beats.Flow.Period.Duration()
	t := casenote.Table{
		Header: []string{"speed, 1000/min", "from ventricle, mW", "from pump, mW", "from filling, mW", "valves, cannulas, mW"},
		Foot:   "Of the nominal ventricle, mean over the beat.",
	}
	for i := range len(f.Speeds) + 1 {
		s, e := f.state(i), f.state(i).Energy
		cells := []casenote.Cell{{Words: data.Clean(fmt.Sprintf("%.4g", s.Speed))}}
		for _, energy := range []float64{e.Ventricle, e.Pump, e.Filling, e.Mitral + e.Aortic + e.Cannula} {
			cells = append(cells, plain(math.Round(energy/period*unit.MilliwattPerMmHgMLPerS)))
		}
		t.Rows = append(t.Rows, cells)
	}
	return casenote.Section{
		Title: "Forecast: power",
		Words: words("What enters the arteries, and what ventricle and pump spend on the blood; the power that the pump's motor takes is more, and is not known here. A lumped load knows the pulsatile power that enters it, and not where in the body it is lost."),
		Tables: []casenote.Table{
			f.speedTable(
				speedEstimate{"power in, mW", milliwatt(func(s *ForecastState) data.Estimate { return s.InputPower })},
				speedEstimate{"pulsatile part, mW", milliwatt(func(s *ForecastState) data.Estimate { return s.PulsatilePower })},
				speedEstimate{"energy-equivalent pressure, mmHg", func(s *ForecastState) data.Estimate { return s.EEPressure }},
			),
			t,
		},
	}
}

func forecastCell(e data.Estimate) casenote.Cell {
	return casenote.Cell{Number: &casenote.Number{Estimate: e, Origin: data.Estimated}}
}

// times is an estimate in another unit.
func times(e data.Estimate, factor float64) data.Estimate {
	e.Value *= factor
	for _, i := range []*data.Interval{&e.Total, &e.Random} {
		i.Low, i.High = factor*i.Low, factor*i.High
	}
	return e
}
