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
	"afterbeat/tui/explain"
)

// item is one way to the numbers, in print: a model fitted on a basis, or an
// estimator of the literature.
type item struct {
	name     string // "wk3", "pulse-pressure"
	group    string // the basis of a fit; empty of an estimator
	result   int    // of the study's; -1 of an estimator
	estimate estimate.Estimate
	load     string // what it describes: "systemic load"
	rows     []row
	remark   string // of an estimator: what to mind, or why it does not apply
}

// fitted tells that the item is a fit.
func (i item) fitted() bool { return i.result >= 0 }

// title names the item: "wk3, beat", "by pulse-pressure".
func (i item) title() string {
	if i.fitted() {
		return i.name + " " + i.group
	}
	return "by " + i.name
}

// row is one number of an item, in columns, with what enter opens it into.
type row struct {
	name          string
	number        explain.Number
	value, unit   string
	total, random string
	of            func(fitting.Values) float64 // nil of an estimator
}

// broken tells that the number does not stand in columns: it is not identified,
// or does not exist.
func (r row) broken() bool {
	return !r.number.Value.Identified || math.IsNaN(r.number.Value.Value)
}

// items are all ways to the numbers: the fits, and then the estimators.
func items(f study.Fit) []item {
	if f.Reason != "" {
		return nil
	}
	var all []item
	for i, r := range f.Results {
		_, load, _ := strings.Cut(r.Section().Title, ", ")
		all = append(all, item{name: r.Model.Name, group: r.Basis, result: i, load: load, rows: resultRows(r)})
	}
	for _, e := range f.Estimators {
		one := item{name: e.Name, result: -1, estimate: e, remark: f.Remark(e)}
		one.rows = estimateRows(f, e)
		all = append(all, one)
	}
	return all
}

func resultRows(r fitting.Result) []row {
	var rows []row
	for _, p := range r.Parameters {
		rows = append(rows, resultRow(r, p.Name, p.Unit, p.Estimate, func(v fitting.Values) float64 { return v.Of(p.Name) }))
	}
	return append(rows, resultRow(r, fitting.TotalResistanceName, rows[0].unit, r.TotalResistance, r.Model.Resistance))
}

func resultRow(r fitting.Result, name, unit string, e data.Estimate, of func(fitting.Values) float64) row {
	w := newRow(name, unit, e)
	w.of = of
	w.number.Of = fmt.Sprintf("%s, basis %s", r.Model.Name, r.Basis)
	w.number.Method = intervalWords(r)
	w.number.Account = r.Account(name)
	var other []string
	for _, o := range r.OutflowSensitivity {
		if !w.broken() {
			other = append(other, fmt.Sprintf("%s: %s", exact(o.OutflowPressure), movedWords(of(o.Values), w)))
		}
	}
	if len(other) > 0 {
		w.number.Notes = append(w.number.Notes, fmt.Sprintf("at outflow pressure, mmHg, %s", strings.Join(other, ", ")))
	}
	if math.IsNaN(r.AICc) {
		w.number.Notes = append(w.number.Notes, "no AICc: "+r.CriterionReason)
	}
	return w
}

func newRow(name, unit string, e data.Estimate) row {
	w := row{name: name, unit: unit, value: casenote.Format(e.Value, e.Total), total: casenote.FormatRange(e.Value, e.Total)}
	w.number = explain.Number{Name: name, Value: casenote.Number{Estimate: e, Unit: unit, Origin: data.Estimated}}
	if e.Total.Defined() && e.Random.Defined() {
		w.random = casenote.Format(e.Random.Low, e.Total) + " to " + casenote.Format(e.Random.High, e.Total)
	}
	return w
}

// estimateRows are what an estimator gives; nothing where it does not apply.
func estimateRows(f study.Fit, e estimate.Estimate) []row {
	var rows []row
	add := func(name, unit string, v float64) {
		if math.IsNaN(v) {
			return
		}
		w := newRow(name, unit, data.Estimate{
			Value: v, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: "this method gives none",
		})
		w.number.Of, w.number.Method = e.Name, "none: this method gives no interval"
		w.number.Account = e.Account(name)
		if said := f.Remark(e); said != "" {
			w.number.Notes = append(w.number.Notes, said)
		}
		rows = append(rows, w)
	}
	add("R", unitOf(f, "R"), e.R)
	add("C", unitOf(f, "C"), e.C)
	add("tau", "s", e.Tau)
	add("Zc", unitOf(f, "R"), e.Zc)
	add("index", unitOf(f, "C"), e.Index)
	add("Pinf", "mmHg", e.Asymptote)
	return rows
}

// unitOf is the unit of a parameter of the fits, or what it is where none has it.
func unitOf(f study.Fit, parameter string) string {
	for _, r := range f.Results {
		if p, ok := r.Parameter(parameter); ok {
			return p.Unit
		}
	}
	return map[string]string{"R": "mmHg s/mL", "C": "mL/mmHg"}[parameter]
}

// movedWords is a value under another assumption, with its change.
func movedWords(v float64, was row) string {
	e := was.number.Value.Estimate
	if math.IsNaN(v) || e.Value == 0 {
		return "undefined"
	}
	return fmt.Sprintf("%s (%s)", casenote.Format(v, e.Total), percent(100*(v/e.Value-1)))
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

// intervalWords is how the intervals of a fit came about.
func intervalWords(r fitting.Result) string {
	switch r.IntervalMethod {
	case fitting.IntervalCovariance:
		return r.IntervalMethod + ": from the residual and its autocorrelation, for there are few beats"
	case fitting.IntervalNone:
		return r.IntervalMethod + ": " + r.TotalResistance.Why
	}
	return fmt.Sprintf("%s, %d replicates; systematic errors drawn on top", r.IntervalMethod, len(r.Replicates.Random))
}

// exact writes a number that was given.
func exact(v float64) string { return casenote.Format(v, data.Interval{Low: v, High: v}) }

// bare writes a number that carries no interval.
func bare(v float64) string { return casenote.Format(v, data.NoInterval()) }
