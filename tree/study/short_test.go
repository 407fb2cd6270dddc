package study

import (
	"math"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

// The study in short says of the demo what its places below say, in the units
// of the wards: 48 mL in 0.72 s are 4.0 L/min.
func TestInShort(t *testing.T) {
	s := demoFitted(t, func(c *casefile.Case) { c.Share = []float64{0.2, 0.45, 0.9} })
	rows := labelled(s.shortSection())
	r := s.Fit.Results[s.Fit.Chosen]
	c, _ := r.Parameter("C")
	for label, want := range map[string]string{
		"heart rate":          "83.4 1/min",
		"mean pressure":       "76.8 mmHg",
		"pulse pressure":      "37.6 mmHg",
		"mean flow":           "3.99 L/min",
		"C (wk3), compliance": "1.19",
	} {
		found := false
		for got, row := range rows {
			if got == label {
				found = strings.HasPrefix(row, want)
			}
		}
		if !found {
			t.Errorf("%s: want %q among %v", label, want, rows)
		}
	}
	if row := rows["yardstick, share 0.45, late-valve: retained pulse"]; row == "" { // the share nearest to one half
		t.Errorf("%v", rows)
	}
	if !near(c.Value, 1.2, 0.02) {
		t.Error(c)
	}
}

// Errors of calibration widen the interval of what was measured, in quadrature;
// they are not those of an uncalibrated channel.
func TestInShortCarriesCalibration(t *testing.T) {
	e := withSystematic(data.Estimate{Value: 100, Random: data.Interval{Low: 96, High: 103}, Total: data.Interval{Low: 96, High: 103}}, 0.03, 0)
	if math.Abs(e.Total.Low-95) > 1e-12 || math.Abs(e.Total.High-(100+math.Hypot(3, 3))) > 1e-12 {
		t.Errorf("%+v", e)
	}
	volts := fitted(t, inventedCase(), invented(column{"ao_pressure_V", noisy(scaled(halfPressure, 0.01, 0), 0.003)}))
	row := labelled(volts.shortSection())["mean pressure"]
	if !strings.HasPrefix(row, "0.91") || !strings.Contains(row, " V, ") || strings.Contains(row, "random") {
		t.Errorf("mean pressure in volts: %q", row)
	}
	flow := fitted(t, inventedCase(), invented(column{"ao_flow_V", noisy(scaled(halfFlow, 0.01, 0), 0.01)}))
	if row, ok := labelled(flow.shortSection())["mean flow"]; ok {
		t.Errorf("mean flow of a channel in volts: %q", row)
	}
}
