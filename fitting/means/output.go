package means

import (
	"context"

	"afterbeat/data"
	"afterbeat/fitting"
	"afterbeat/fitting/estimate"
)

// Pressure is a recorded pressure with a mean flow measured beside it.
type Pressure struct {
	Beats           [][]float64 // mmHg; beats x samples, from onset to onset
	Rate            float64     // Hz
	Output          float64     // mL/s
	OutflowPressure float64     // Pv, mmHg
	// Systematic are the errors; that of Flow is that of the output.
	Systematic fitting.Systematic
}

// FromOutput is the load of a pressure and an output: wk3 on the basis of means.
// reason says why there is none: diastole does not fall, or the mean pressure does
// not exceed Pv. Beats that differ in length panic.
func FromOutput(ctx context.Context, p Pressure, s fitting.Settings) (r fitting.Result, reason string, err error) {
	m, ok := fitting.ByName("wk3")
	if !ok {
		panic("means: no model wk3")
	}
	mean := average(p.Beats)
	if e := estimate.ByDecay(p.beat(mean, fitting.AsMeasured(p.OutflowPressure))); e.Reason != "" {
		return r, "no time constant of diastole: " + e.Reason, nil
	} else if e.Remark != "" {
		return r, e.Remark, nil
	}
	problem := problem{model: m, beats: p.Beats, rate: p.Rate, pv: p.OutflowPressure, systematic: p.Systematic, values: p.values}
	all, method, err := problem.replicates(ctx, s)
	if err != nil {
		return r, "", err
	}
	r = fitting.NewResult(m, fitting.BasisMeans, p.At(p.OutflowPressure, 1, 1), data.SiteRoot, p.OutflowPressure, "no wave was fitted, so that there is no residual")
	r = stated(r.WithReplicates(all, method, "a single beat: no scatter to judge by"))
	return r.WithOutflow(func(pv float64) fitting.Values { return p.At(pv, 1, 1) }), "", nil
}

// At is the load with an outflow pressure, mmHg, an output times a factor, and the
// pulse of the pressure times another, about its mean.
func (p Pressure) At(pv, output, pulse float64) fitting.Values {
	mean := average(p.Beats)
	level := data.Period{Samples: mean}.Mean()
	for k, v := range mean {
		mean[k] = level + pulse*(v-level)
	}
	c := fitting.AsMeasured(pv)
	c.FlowScale = output
	return p.values(mean, c, own{})
}

// beat is what the decay is read off.
func (p Pressure) beat(mean []float64, c fitting.Calibration) estimate.Beat {
	b := estimate.Beat{
		Pressure: data.Period{Samples: mean, Rate: p.Rate},
		Output:   p.Output * c.FlowScale, OutflowPressure: c.OutflowPressure,
	}
	if c.PressureScale != 1 || c.PressureOffset != 0 {
		b.Pressure.Samples = append([]float64(nil), mean...)
		for k, v := range mean {
			b.Pressure.Samples[k] = c.PressureScale*v + c.PressureOffset
		}
	}
	return b
}

func (p Pressure) values(mean []float64, c fitting.Calibration, e own) fitting.Values {
	decay := estimate.ByDecay(p.beat(mean, c))
	if decay.Reason != "" || decay.Remark != "" {
		return nothing()
	}
	v := split(decay.R, drawnShare(e[0]))
	v.C = decay.Tau / v.R
	return v
}

// TimeConstant is that of diastole of a pressure, s, of which no output is known,
// with its intervals; the errors of an output do not count.
func TimeConstant(ctx context.Context, p Pressure, s fitting.Settings) (tau data.Estimate, err error) {
	p.Output, p.Systematic.Flow = 1, 0
	mean := p.values(average(p.Beats), fitting.AsMeasured(p.OutflowPressure), own{})
	tau = data.Estimate{Value: mean.R * mean.C, Total: data.NoInterval(), Random: data.NoInterval(), Identified: sound(mean)}
	problem := problem{model: fitting.Model{}, beats: p.Beats, rate: p.Rate, pv: p.OutflowPressure, systematic: p.Systematic, values: p.values}
	all, _, err := problem.replicates(ctx, s)
	if err != nil || len(all.Random) == 0 {
		tau.Why = "a single beat: no scatter to judge by"
		return tau, err
	}
	of := func(v fitting.Values) float64 { return v.R * v.C }
	tau.Random, tau.Total = fitting.Percentiles(tau.Value, all.Random, of), fitting.Percentiles(tau.Value, all.Total, of)
	if tau.Total.Width() > tau.Value {
		tau.Identified, tau.Why = false, "its interval is wider than itself"
	}
	return tau, nil
}
