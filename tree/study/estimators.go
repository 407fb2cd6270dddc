package study

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/fitting/estimate"
	"afterbeat/fitting/harmonic"
)

// estimators are the ways of the literature to the load of the average beat,
// each with the reason where it does not apply.
func estimators(b Beats, impedance []harmonic.Harmonic) []estimate.Estimate {
	output := 0.0
	if b.Flow.Count == 0 {
		output, _ = cardiacOutput(b.Intake.Case) // checked before the fit
	}
	return estimate.All(estimate.Beat{
		Pressure: b.Pressure.Period, Flow: b.Flow.Period,
		OutflowPressure: outflow(b), Rise: b.Pressure.EndMinusStart,
		Harmonics: impedance, Output: output,
	})
}

// estimatorSection sets the estimators side by side, with what there is to say of
// each above the table.
func (f Fit) estimatorSection() casenote.Section {
	s := casenote.Section{
		Title: "Other ways to the same numbers",
		Words: words(fmt.Sprintf("All take the outflow pressure for %g mmHg. R is the total resistance, Zc included.", outflow(f.Beats))),
	}
	t := casenote.Table{Header: []string{"method", "tau, s", "R, " + f.unitOf("R"), "C, " + f.unitOf("C")}}
	for _, e := range f.Estimators {
		if r := f.remark(e); r != "" {
			s.Rows = append(s.Rows, casenote.Words(e.Name, r))
		}
		t.Rows = append(t.Rows, []casenote.Cell{{Words: data.Clean(e.Name)}, orDash(e.Tau), orDash(e.R), orDash(e.C)})
	}
	s.Tables = []casenote.Table{t}
	return s
}

// orDash is a cell of a number without an interval; a dash where there is none.
func orDash(v float64) casenote.Cell {
	if math.IsNaN(v) {
		return casenote.Cell{Words: data.Clean("-")}
	}
	return plain(v)
}

// remark is what there is to say of an estimate in print: what it gives beside
// tau, R and C, what to mind, or why there is none.
func (f Fit) remark(e estimate.Estimate) string {
	number := func(v float64, unit string) string { return casenote.Format(v, data.NoInterval()) + " " + unit }
	said := ""
	switch {
	case e.Reason != "":
		return "does not apply: " + e.Reason
	case !math.IsNaN(e.Zc):
		said = "Zc " + number(e.Zc, f.unitOf("R"))
	case !math.IsNaN(e.Index):
		said = "index " + number(e.Index, f.unitOf("C"))
	}
	if said != "" && e.Remark != "" {
		said += ": "
	}
	return said + e.Remark
}

func estimatorReport(e estimate.Estimate) EstimatorReport {
	return EstimatorReport{
		Name: e.Name, R: Number(e.R), C: Number(e.C), Tau: Number(e.Tau),
		Zc: Number(e.Zc), Index: Number(e.Index), Asymptote: Number(e.Asymptote),
		Reason: reason(e.Reason), Remark: reason(e.Remark),
	}
}
