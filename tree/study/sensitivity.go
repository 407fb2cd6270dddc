package study

import (
	"context"
	"fmt"
	"math"

	"afterbeat/fitting"
)

// sensitivities moves one assumption at a time about a fit: the outflow
// pressure by 10 mmHg, the delay by 10 ms, the output by 20 %. Each is a fit to
// the average beat of its own, without replicates.
func sensitivities(ctx context.Context, r fitting.Result, b fitting.Beats) ([]Sensitivity, error) {
	var out []Sensitivity
	for _, move := range moves() {
		moved, err := refit(ctx, r.Model, b, move)
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

// refit fits a model to the average beat as it would be with one assumption
// moved. The delay moves the flow, so that pressures stay where they are.
func refit(ctx context.Context, m fitting.Model, b fitting.Beats, to move) (fitting.Result, error) {
	pressure, flow := b.Average()
	c := fitting.Calibration{FlowScale: 1, PressureScale: 1, OutflowPressure: b.OutflowPressure}
	to.to(&c)
	b.OutflowPressure = c.OutflowPressure
	b.Pressure = [][]float64{calibrated(pressure.Samples, c.PressureScale, c.PressureOffset)}
	b.Flow = [][]float64{calibrated(later(flow.Samples, c.Delay*b.Rate), c.FlowScale, 0)}
	return fitting.FitBeat(ctx, m, b, fitting.Settings{})
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
