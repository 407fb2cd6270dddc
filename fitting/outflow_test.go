package fitting

import (
	"math"
	"strings"
	"testing"

	"afterbeat/data"
)

// R + Zc = (mean P - Pv)/mean Q, so a higher Pv takes R down by what it takes
// from the mean; the rest of the beat, and with it C, hardly moves.
func TestOutflowSensitivity(t *testing.T) {
	b := noisy(160, 12, 15)
	b.OutflowMeasured = false
	r := fit(t, model(t, "wk3"), b, Settings{Replicates: 20})
	pressure, flow := b.Average()
	if len(r.OutflowSensitivity) != 2 {
		t.Fatalf("%d rows", len(r.OutflowSensitivity))
	}
	for i, pv := range []float64{26.5, 10} {
		row := r.OutflowSensitivity[i]
		want := (pressure.Mean() - pv) / flow.Mean()
		if row.OutflowPressure != pv || math.Abs(row.Values.R+row.Values.Zc-want) > 1e-3 {
			t.Errorf("Pv %v: R + Zc = %v, want %v", row.OutflowPressure, row.Values.R+row.Values.Zc, want)
		}
		if math.Abs(row.C) > 0.02 || math.Abs(row.R-(row.Values.R/r.Values.R-1)) > 1e-12 {
			t.Errorf("Pv %v: R by %v, C by %v", pv, row.R, row.C)
		}
	}
	if !hasWarning(r, data.CodeOutflow) || !strings.Contains(r.outflowWords(), "26.5 mmHg R changes by -30") {
		t.Errorf("warnings %v, words %q", r.Warnings, r.outflowWords())
	}
	b.OutflowMeasured, b.OutflowPressure = true, 26.5
	if r := fit(t, model(t, "wk3"), b, Settings{Replicates: 20}); hasWarning(r, data.CodeOutflow) || r.OutflowSensitivity[0].OutflowPressure != 0 {
		t.Errorf("measured: %v, rows %v", r.Warnings, r.OutflowSensitivity)
	}
}
