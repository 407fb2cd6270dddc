package study

import (
	"math"
	"testing"

	"afterbeat/data/casefile"
	"afterbeat/data/demo"
)

func moved(t *testing.T, s Study, assumption, change string) Sensitivity {
	t.Helper()
	for _, one := range s.Fit.Sensitivity {
		if one.Assumption == assumption && one.Change == change {
			return one
		}
	}
	t.Fatalf("no %s %s among %v", assumption, change, s.Fit.Sensitivity)
	return Sensitivity{}
}

// An output 20 % low gives R and Zc +25 % and C -20 %, exactly, since the load
// is linear (the design's page of models; Z goes with 1/Q).
func TestSensitivityToOutput(t *testing.T) {
	s := demoFitted(t, func(*casefile.Case) {})
	for change, want := range map[string][2]float64{"-20 %": {25, -20}, "+20 %": {-100. / 6, 20}} {
		p := moved(t, s, "output", change).Percent
		if !near(p.R, want[0], 1e-6) || !near(p.Zc, want[0], 1e-5) || !near(p.C, want[1], 1e-6) {
			t.Errorf("output %s: %+v", change, p)
		}
	}
}

// Z(0) mean Q = mean P - Pv: 10 mmHg of outflow pressure move R by the same part
// of what is above it, and Zc, which no mean determines, next to nothing.
func TestSensitivityToOutflowPressure(t *testing.T) {
	s := demoFitted(t, func(*casefile.Case) {})
	above := s.Beats.Pressure.Period.Mean() - demo.Truth().OutflowPressure
	total := s.Fit.Results[s.Fit.Chosen].TotalResistance.Value
	for change, mmHg := range map[string]float64{"-10 mmHg": -10, "+10 mmHg": 10} {
		m := moved(t, s, "outflow-pressure", change)
		if want := total * (1 - mmHg/above); !near(m.Values.R+m.Values.Zc, want, 1e-3) || math.Abs(m.Percent.C) > 1 {
			t.Errorf("outflow pressure %s: Z(0) %v, want %v; C %+.2f %%", change, m.Values.R+m.Values.Zc, want, m.Percent.C)
		}
	}
}

// Moving the delay by 10 ms in a table is what stating it 10 ms otherwise does,
// but for the beats at the ends and the closing of the period.
func TestSensitivityToDelay(t *testing.T) {
	s := demoFitted(t, func(*casefile.Case) {})
	for change, delay := range map[string]string{"-10 ms": "0.015", "+10 ms": "0.035"} {
		m := moved(t, s, "delay", change)
		r, c, zc := chosen(t, demoFitted(t, func(c *casefile.Case) { c.Delay, c.Model = delay, "wk3" }))
		if !near(m.Values.R, r, 0.005) || !near(m.Values.C, c, 0.02) || !near(m.Values.Zc, zc, 0.05) {
			t.Errorf("delay %s: %+v; stated: R %v, C %v, Zc %v", change, m.Values, r, c, zc)
		}
	}
}
