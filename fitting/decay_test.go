package fitting

import (
	"math"
	"strings"
	"testing"

	"afterbeat/data"
)

// By hand: a fall from 100 to 75 mmHg in 0.45 s toward 0 has tau =
// 0.45/ln(100/75) = 1.5642 s; R = (93 - 3)/90 = 1, so C = 1.5642 mL/mmHg.
func TestDecayByHand(t *testing.T) {
	p := data.Period{Samples: make([]float64, 10), Rate: 9 / 0.45}
	for j := range p.Samples {
		p.Samples[j] = 100 * math.Pow(0.75, float64(j)/9)
	}
	tau, reason := decay(p, 0, 0, 9)
	if math.Abs(tau-1.5642) > 5e-5 || reason != "" {
		t.Errorf("tau %v, %s", tau, reason)
	}
	e := Estimator{Tau: tau}.WithResistance((93.0 - 3) / 90)
	if math.Abs(e.C-1.5642) > 5e-5 || e.R != 1 {
		t.Errorf("R %v, C %v", e.R, e.C)
	}
}

// The worked example: tau/R is 1.5 for wk2 and, with the total resistance,
// 1.428571 for wk3, since diastole is exactly exponential there, wherever in
// the beat the recording begins.
func TestDecayOfExample(t *testing.T) {
	for _, c := range []struct {
		model string
		total float64
		want  float64
	}{{"wk2", 1, 1.5}, {"wk3", 1.05, 1.428571}} {
		for _, n := range []int{50, 200, 1000} {
			p := sample(examplePressure[c.model], n, 0)
			for _, turn := range []int{0, n / 3, n - 1} {
				turned := data.Period{Samples: append(append([]float64(nil), p.Samples[turn:]...), p.Samples[:turn]...), Rate: p.Rate}
				if e := Decay(turned, 0).WithResistance(c.total); math.Abs(e.C-c.want) > 1e-6 || e.Reason != "" {
					t.Errorf("%s, %d samples turned by %d: C %v, want %v (%s)", c.model, n, turn, e.C, c.want, e.Reason)
				}
			}
		}
	}
}

// With an inertance the early part is not exponential, and the estimate depends
// on where it starts, as published for the example: tau/R of wk4p.
func TestDecayDependsOnItsStart(t *testing.T) {
	const n = 8000
	p := sample(examplePressure["wk4p"], n, 0)
	for from, want := range map[float64]float64{0.4: 1.69139, 0.5: 1.59762, 0.65: 1.54039} {
		if tau, _ := decay(p, 0, int(from/exampleT*n), n-1); math.Abs(tau/want-1) > 1e-3 {
			t.Errorf("from %v s: %v, want %v", from, tau, want)
		}
	}
}

// Pv counts: a decay toward 20 mmHg has its own tau above 20 only.
func TestDecayAboveOutflowPressure(t *testing.T) {
	p := sample(func(t float64) float64 { return 20 + examplePressure["wk2"](t) }, 200, 0)
	if e := Decay(p, 20); math.Abs(e.Tau-1.5) > 1e-9 {
		t.Errorf("tau %v", e.Tau)
	}
	if e := Decay(p, 0); e.Tau < 1.6 {
		t.Errorf("tau toward 0: %v", e.Tau)
	}
}

func TestDecayWhereItDoesNotApply(t *testing.T) {
	reversed := sample(func(t float64) float64 { return -examplePressure["wk2"](t) }, 200, 0)
	for _, c := range []struct {
		name string
		p    data.Period
		pv   float64
		why  string
	}{
		{"steady", sample(func(float64) float64 { return 90 }, 100, 0), 0, "does not fall"},
		{"rising", sample(func(t float64) float64 { return 80 + 50*t }, 100, 0), 0, "does not fall"},
		{"reversed", reversed, 0, "to the outflow pressure"},
		{"below outflow pressure", sample(examplePressure["wk2"], 100, 0), 80, "to the outflow pressure"},
		{"too few samples", sample(examplePressure["wk2"], 6, 0), 0, "too few"},
	} {
		e := Decay(c.p, c.pv)
		if !math.IsNaN(e.Tau) || !strings.Contains(e.Reason, c.why) {
			t.Errorf("%s: tau %v, reason %q", c.name, e.Tau, e.Reason)
		}
		if e = e.WithResistance(1); !math.IsNaN(e.C) || e.Reason == "" {
			t.Errorf("%s: C %v in spite of it", c.name, e.C)
		}
	}
	if e := Decay(sample(examplePressure["wk2"], 100, 0), 0).WithResistance(math.NaN()); !math.IsNaN(e.C) || e.Reason == "" {
		t.Errorf("no resistance: %+v", e)
	}
}
