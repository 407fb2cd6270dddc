package fit

import (
	"fmt"
	"math"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/fitting"
	"afterbeat/fitting/estimate"
	"afterbeat/tree/study"
)

type warning = data.Warning

// sheet is the numbers of one model, in print.
type sheet struct {
	rows []row
}

// row is one number in print, with what x opens it into.
type row struct {
	name          string
	number        casenote.Number
	value, unit   string
	total, random string
	moved         []string // under each assumption of the study moved
	meaning       string
	equation      []string
	source        string
	method        string
	known         string   // the range published
	notes         []string // what else to know
}

// broken tells that the number does not stand in columns: it is not identified,
// or does not exist.
func (r row) broken() bool { return !r.number.Identified || math.IsNaN(r.number.Value) }

// sheets writes the numbers of every result; of the estimator where there is none.
func sheets(f study.Fit) []sheet {
	if len(f.Results) == 0 {
		if f.Reason == "" && len(f.Estimators) > 0 {
			return []sheet{{rows: []row{decayRow(f.Estimators[0])}}}
		}
		return nil
	}
	var all []sheet
	for i, r := range f.Results {
		var moved []study.Sensitivity
		if i == f.Chosen {
			moved = f.Sensitivity
		}
		all = append(all, sheet{rows: resultRows(r, moved)})
	}
	return all
}

func resultRows(r fitting.Result, moved []study.Sensitivity) []row {
	var rows []row
	for i, p := range r.Parameters {
		of := func(v fitting.Values) float64 { return v.Of(p.Name) }
		one := newRow(p.Name, p.Unit, p.Estimate)
		one.meaning = r.Model.Parameters()[i].Meaning
		rows = append(rows, one.from(r, of, moved))
	}
	total := newRow("Rtotal", rows[0].unit, r.TotalResistance)
	total.meaning = "total resistance, Z at frequency 0"
	return append(rows, total.from(r, r.Model.Resistance, moved))
}

// from adds what depends on the fit.
func (w row) from(r fitting.Result, of func(fitting.Values) float64, moved []study.Sensitivity) row {
	w.equation = r.Model.Equation()
	w.source = r.Model.Source()
	w.method = intervalWords(r)
	for _, s := range moved {
		w.moved = append(w.moved, movedWords(of(s.Values), w.number))
	}
	if text := published[w.name]; text != "" && r.Site.Systemic() && !r.PerArea {
		w.known = text
	}
	w.notes = append(w.notes, dominance(w.number.Estimate)...)
	if w.broken() {
		return w
	}
	var other []string
	for _, o := range r.OutflowSensitivity {
		other = append(other, fmt.Sprintf("%s: %s", exact(o.OutflowPressure), movedWords(of(o.Values), w.number)))
	}
	if len(other) > 0 {
		w.notes = append(w.notes, fmt.Sprintf("at outflow pressure, mmHg, %s", strings.Join(other, ", ")))
	}
	return w
}

func newRow(name, unit string, e data.Estimate) row {
	n := casenote.Number{Estimate: e, Unit: unit, Origin: data.Estimated}
	w := row{name: name, number: n, unit: unit, value: casenote.Format(e.Value, e.Total), total: casenote.FormatRange(e.Value, e.Total)}
	if e.Total.Defined() && e.Random.Defined() {
		w.random = casenote.Format(e.Random.Low, e.Total) + " to " + casenote.Format(e.Random.High, e.Total)
	}
	return w
}

// movedWords is a value under another assumption, with its change.
func movedWords(v float64, was casenote.Number) string {
	if math.IsNaN(v) || was.Value == 0 {
		return "undefined"
	}
	return fmt.Sprintf("%s (%s)", casenote.Format(v, was.Total), percent(100*(v/was.Value-1)))
}

// percent writes a change in percent.
func percent(change float64) string {
	switch {
	case math.IsNaN(change):
		return "undefined"
	case math.Abs(change) < 0.05:
		return "no change"
	}
	return fmt.Sprintf("%+.1f %%", change)
}

// dominance tells which kind of error makes the interval.
func dominance(e data.Estimate) []string {
	if !e.Identified || !e.Total.Defined() || !(e.Total.Width() > 0) || !e.Random.Defined() {
		return nil
	}
	share := e.Random.Width() / e.Total.Width()
	switch {
	case share < 0.5:
		return []string{fmt.Sprintf("mostly systematic: the random interval is %.0f %% as wide as the total", 100*share)}
	case share > 0.9:
		return []string{"mostly random: the two intervals are about as wide"}
	}
	return []string{fmt.Sprintf("both kinds of error: the random interval is %.0f %% as wide as the total", 100*share)}
}

// intervalWords is how the intervals of a fit came about.
func intervalWords(r fitting.Result) string {
	switch r.IntervalMethod {
	case fitting.IntervalBlocks:
		return fmt.Sprintf("%s, %d replicates; systematic errors drawn on top", r.IntervalMethod, len(r.Replicates.Random))
	case fitting.IntervalCovariance:
		return r.IntervalMethod + ": from the residual and its autocorrelation, for there are few beats"
	}
	return r.IntervalMethod + ": " + r.TotalResistance.Why
}

// decayRow is the time constant, all that a pressure alone gives.
func decayRow(e estimate.Estimate) row {
	w := newRow("tau", "s", data.Estimate{
		Value: e.Tau, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true,
		Why: "this method gives none",
	})
	w.meaning = "time constant of diastole, R times C"
	w.equation = []string{"ln(P - Pv) = a - t/tau"}
	w.source = "Frank 1899; Simon 1979"
	w.method = "none: this method gives no interval"
	w.notes = []string{"a straight line by least squares, from 35 % to 5 % of the period before the foot"}
	return w
}

// exact writes a number that was given.
func exact(v float64) string { return casenote.Format(v, data.Interval{Low: v, High: v}) }

// bare writes a number that carries no interval.
func bare(v float64) string { return casenote.Format(v, data.NoInterval()) }
