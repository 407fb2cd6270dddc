package study

import (
	"context"
	"fmt"
	"math"
	"slices"

	"afterbeat/fitting"
)

// sensitivities moves one assumption at a time about a fit: the outflow
// pressure by 10 mmHg, the delay by 10 ms, the output by 20 %. Each is a fit of its
// own on the same basis.
func sensitivities(ctx context.Context, r fitting.Result, d fitting.Span) ([]Sensitivity, error) {
	var out []Sensitivity
	for _, move := range moves() {
		moved, err := refit(ctx, r, d, move)
		if err != nil {
			return out, err
		}
		out = append(out, move.effect(moved, r))
	}
	return out, nil
}

// move is one assumption moved.
type move struct {
	assumption, change string
	by                 float64
	to                 func(c *fitting.Calibration)
}

func (m move) effect(moved, was fitting.Result) Sensitivity {
	return Sensitivity{
		Assumption: m.assumption, Change: m.change, By: m.by,
		Values: moved.Values, Percent: percent(moved.Values, was.Values),
	}
}

func moves() []move {
	var out []move
	for _, d := range []float64{-10, 10} {
		out = append(out, outflowMove(d))
	}
	for _, d := range []float64{-0.010, 0.010} {
		out = append(out, delayMove(d))
	}
	for _, d := range []float64{-0.2, 0.2} {
		out = append(out, flowMove("output", d, 1+d))
	}
	return out
}

func outflowMove(d float64) move {
	return move{"outflow-pressure", fmt.Sprintf("%+g mmHg", d), d, func(c *fitting.Calibration) { c.OutflowPressure += d }}
}

func delayMove(d float64) move {
	return move{"delay", fmt.Sprintf("%+g ms", 1000*d), d, func(c *fitting.Calibration) { c.Delay += d }}
}

// flowMove is something relative moved by d, which makes the flow scale times as
// large.
func flowMove(assumption string, d, scale float64) move {
	return move{assumption, fmt.Sprintf("%+.3g %%", 100*d), d, func(c *fitting.Calibration) { c.FlowScale *= scale }}
}

// pressureMove is an error of the pressure of a size in print.
func pressureMove(assumption, unit string, size float64, to func(c *fitting.Calibration)) move {
	return move{assumption, fmt.Sprintf("%+.3g %s", size, unit), size, to}
}

// refit fits the model of a result on its basis as it would be with one assumption
// moved. The delay moves the flow, so that pressures stay where they are.
func refit(ctx context.Context, was fitting.Result, d fitting.Span, to move) (fitting.Result, error) {
	c := fitting.Calibration{FlowScale: 1, PressureScale: 1, OutflowPressure: d.OutflowPressure}
	to.to(&c)
	d.OutflowPressure = c.OutflowPressure
	once := fitting.Settings{Replicates: 1}
	move := func(pressure, flow []float64) ([]float64, []float64) {
		return calibrated(pressure, c.PressureScale, c.PressureOffset), calibrated(flow, c.FlowScale, 0)
	}
	p, q := d.Average()
	p.Samples, q.Samples = move(p.Samples, later(q.Samples, c.Delay*d.Rate))
	d.Pressure, d.Flow = [][]float64{p.Samples}, [][]float64{q.Samples}
	if was.Basis != fitting.BasisSpan {
		return fitting.FitBeat(ctx, was.Model, d.Beats, once)
	}
	d.Runs = slices.Clone(d.Runs)
	for i, r := range d.Runs {
		d.Runs[i].Pressure, d.Runs[i].Flow = move(r.Pressure, laterInRun(r.Flow, c.Delay*d.Rate))
	}
	return fitting.FitSpan(ctx, was.Model, d, once)
}

// laterInRun is a run moved later by a number of samples, linear between them; at
// its ends it stays as it is.
func laterInRun(values []float64, shift float64) []float64 {
	out := make([]float64, len(values))
	for j := range out {
		out[j] = readAt(values, max(0, min(float64(len(values)-1), float64(j)-shift)))
	}
	return out
}

// percent is the change of each parameter, in percent of what it was.
func percent(moved, was fitting.Values) fitting.Values {
	change := func(a, b float64) float64 {
		if b == 0 {
			return math.NaN()
		}
		return 100 * (a/b - 1)
	}
	return fitting.Values{R: change(moved.R, was.R), C: change(moved.C, was.C), Zc: change(moved.Zc, was.Zc), L: change(moved.L, was.L)}
}
