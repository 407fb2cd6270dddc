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
	pressure, flow := b.Average()
	b.Pressure, b.Flow = [][]float64{pressure.Samples}, [][]float64{flow.Samples}
	var out []Sensitivity
	for _, move := range moves() {
		moved, err := fitting.FitBeat(ctx, r.Model, move.apply(b), fitting.Settings{})
		if err != nil {
			return out, err
		}
		out = append(out, Sensitivity{
			Assumption: move.assumption, Change: move.change, By: move.by,
			Values: moved.Values, Percent: percent(moved.Values, r.Values),
		})
	}
	return out, nil
}

// move is one assumption moved.
type move struct {
	assumption, change string
	by                 float64
	apply              func(fitting.Beats) fitting.Beats
}

func moves() []move {
	var out []move
	for _, d := range []float64{-10, 10} {
		out = append(out, move{"outflow-pressure", fmt.Sprintf("%+g mmHg", d), d, func(b fitting.Beats) fitting.Beats {
			b.OutflowPressure += d
			return b
		}})
	}
	for _, d := range []float64{-0.010, 0.010} {
		out = append(out, move{"delay", fmt.Sprintf("%+g ms", 1000*d), d, func(b fitting.Beats) fitting.Beats {
			b.Flow = [][]float64{later(b.Flow[0], d*b.Rate)}
			return b
		}})
	}
	for _, f := range []float64{0.8, 1.2} {
		out = append(out, move{"output", fmt.Sprintf("%+.0f %%", 100*(f-1)), f - 1, func(b fitting.Beats) fitting.Beats {
			b.Flow = [][]float64{calibrated(b.Flow[0], f, 0)}
			return b
		}})
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
