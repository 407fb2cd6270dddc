package fitting

import (
	"context"
	"math"
	"testing"

	"afterbeat/data"
)

// The worked example of the tests (half-sine inflow, periodic): stroke volume
// 70 mL in Ts = 0.3 s, T = 0.8 s, so Qm = pi 70/(2 Ts); R = 1, C = 1.5, Zc =
// 0.05, L = 0.005. Its closed forms were computed independently of this program.
const (
	exampleT  = 0.8
	exampleTs = 0.3
	exampleQm = math.Pi * 70 / (2 * exampleTs)
)

var example = Values{R: 1, C: 1.5, Zc: 0.05, L: 0.005}

func exampleFlow(t float64) float64 {
	if t < exampleTs {
		return exampleQm * math.Sin(math.Pi*t/exampleTs)
	}
	return 0
}

// relaxed is the periodic response of g/(1 + i w tau) to the half-sine.
func relaxedExample(g, tau, t float64) float64 {
	a := math.Pi / exampleTs
	c := tau / g
	k := (exampleQm / c) / (1/(tau*tau) + a*a)
	p0 := k * a * (1 + math.Exp(-exampleTs/tau)) * math.Exp(-(exampleT-exampleTs)/tau) / (1 - math.Exp(-exampleT/tau))
	inflow := func(t float64) float64 {
		return p0*math.Exp(-t/tau) + k*(math.Sin(a*t)/tau-a*math.Cos(a*t)+a*math.Exp(-t/tau))
	}
	if t <= exampleTs {
		return inflow(t)
	}
	return inflow(exampleTs) * math.Exp(-(t-exampleTs)/tau)
}

// The closed form of pressure for each model.
var examplePressure = map[string]func(t float64) float64{
	"wk2": func(t float64) float64 { return relaxedExample(example.R, example.R*example.C, t) },
	"wk3": func(t float64) float64 {
		return example.Zc*exampleFlow(t) + relaxedExample(example.R, example.R*example.C, t)
	},
	"wk4p": func(t float64) float64 {
		return example.Zc*exampleFlow(t) - relaxedExample(example.Zc, example.L/example.Zc, t) + relaxedExample(example.R, example.R*example.C, t)
	},
}

// sample takes n samples of f over the period, the first at offset steps.
func sample(f func(float64) float64, n int, offset float64) data.Period {
	p := data.Period{Samples: make([]float64, n), Rate: float64(n) / exampleT}
	for j := range p.Samples {
		p.Samples[j] = f((float64(j) + offset) / p.Rate)
	}
	return p
}

// only makes beats of a single one.
func only(flow, pressure data.Period) Beats {
	return Beats{
		Rate: flow.Rate, Flow: [][]float64{flow.Samples}, Pressure: [][]float64{pressure.Samples},
		Site: data.SiteRoot, OutflowMeasured: true,
	}
}

func model(t testing.TB, name string) Model {
	t.Helper()
	m, ok := ByName(name)
	if !ok {
		t.Fatalf("no model %q", name)
	}
	return m
}

func fit(t testing.TB, m Model, b Beats, s Settings) Result {
	t.Helper()
	r, err := FitBeat(context.Background(), m, b, s)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// near fails where a parameter is off by more than tolerance, relative.
func near(t *testing.T, what string, got, want Values, tolerance float64) {
	t.Helper()
	for _, name := range []string{"R", "C", "Zc", "L"} {
		if g, w := got.Of(name), want.Of(name); math.Abs(g-w) > tolerance*math.Abs(w) {
			t.Errorf("%s: %s = %.12g, want %.12g (off by %.2g)", what, name, g, w, g/w-1)
		}
	}
}

// The closed form against the values stated with it.
func TestExampleItself(t *testing.T) {
	for _, c := range []struct {
		model string
		t     float64
		want  float64
	}{
		{"wk2", 0, 73.265898894},
		{"wk2", exampleTs, 102.250798832},
		{"wk2", 0.019095, 72.802104891},
		{"wk3", 0.215878, 113.636082132},
		{"wk4p", 0, 73.201132526},
		{"wk4p", exampleTs, 92.638618020},
		{"wk4p", 0.213339, 100.010683183},
	} {
		if got := examplePressure[c.model](c.t); math.Abs(got-c.want) > 1e-8 {
			t.Errorf("%s: P(%v) = %.9f, want %.9f", c.model, c.t, got, c.want)
		}
	}
}
