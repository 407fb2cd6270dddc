package means

import (
	"context"
	"math"

	"afterbeat/data"
	"afterbeat/fitting"
	"afterbeat/fitting/estimate"
)

// Cuff is a reading of a cuff, mmHg.
type Cuff struct {
	Systolic, Diastolic float64
	Mean                float64 // 0: a third of the pulse above the diastolic
	Error               float64 // 95 % half-width of each of the readings
}

// MeanPressure is the mean of the reading: the one given, or diastolic plus a third of
// the pulse (form factor of the brachial artery, 0.33; published for the root: 0.45).
func (c Cuff) MeanPressure() float64 {
	if c.Mean != 0 {
		return c.Mean
	}
	return c.Diastolic + (c.Systolic-c.Diastolic)/3
}

// Pulse is the pulse pressure, mmHg.
func (c Cuff) Pulse() float64 { return c.Systolic - c.Diastolic }

// Flow is a recorded flow with a reading of a cuff.
type Flow struct {
	Beats           [][]float64 // mL/s; beats x samples
	Rate            float64     // Hz
	Cuff            Cuff
	OutflowPressure float64 // Pv, mmHg
	Site            data.Site
	Systematic      fitting.Systematic // of flow, pressure and Pv; Delay does not count
}

// thinned is the number of samples that a beat is thinned to for the draws, since
// what it takes to match a pulse grows with them.
const thinned = 256

// FromCuff is the load of a flow and a cuff: wk2, and wk3 with a stated Zc, on the
// basis of means. reason says why there is none.
func FromCuff(ctx context.Context, f Flow, s fitting.Settings) (results []fitting.Result, reason string, err error) {
	for _, name := range []string{"wk2", "wk3"} {
		m, ok := fitting.ByName(name)
		if !ok {
			panic("means: no model " + name)
		}
		v, why := f.At(name, f.OutflowPressure, 1, 1)
		if why != "" {
			reason = why
			continue
		}
		r := fitting.NewResult(m, fitting.BasisMeans, v, f.Site, f.OutflowPressure, "no wave of the pressure was recorded, so that there is no residual")
		r.Modelled = fitting.Respond(r.Load(), data.Period{Samples: average(f.Beats), Rate: f.Rate}, f.OutflowPressure)
		draws := f.problem(m)
		all, method, err := draws.replicates(ctx, s)
		if err != nil {
			return results, "", err
		}
		r = stated(r.WithReplicates(all, method, "a single beat: no scatter to judge by"))
		results = append(results, r.WithOutflow(func(pv float64) fitting.Values { v, _ := f.At(name, pv, 1, 1); return v }))
	}
	if len(results) > 0 {
		reason = ""
	}
	return results, reason, nil
}

// At is the load of a model with an outflow pressure, mmHg, a flow times a factor,
// and the pulse of the cuff times another; why says why there is none.
func (f Flow) At(model string, pv, flow, pulse float64) (v fitting.Values, why string) {
	mean := average(f.Beats)
	for k := range mean {
		mean[k] *= flow
	}
	return match(estimate.NewMatcher(len(mean), f.Rate, model), mean, f.Cuff.MeanPressure()-pv, f.Cuff.Pulse()*pulse, f.part(model, 0))
}

// part is the share of Zc: none in wk2.
func (f Flow) part(model string, e float64) float64 {
	if model == "wk2" {
		return 0
	}
	return drawnShare(e)
}

// match is the load that carries a mean pressure drop and has a pulse.
func match(m *estimate.Matcher, flow []float64, drop, pulse, part float64) (v fitting.Values, why string) {
	mean := data.Period{Samples: flow}.Mean()
	switch {
	case !(mean > 0):
		return nothing(), "the mean flow is not positive"
	case !(drop > 0):
		return nothing(), "the mean pressure does not exceed the outflow pressure"
	}
	v = split(drop/mean, part)
	if v.C, why = m.Match(flow, v.R, v.Zc, pulse); why != "" {
		return nothing(), why
	}
	return v, ""
}

// problem is how draws of a model are answered.
func (f Flow) problem(m fitting.Model) problem {
	n := len(f.Beats[0])
	short := min(n, thinned)
	matcher := estimate.NewMatcher(short, f.Rate*float64(short)/float64(n), m.Name)
	flow := make([]float64, short)
	return problem{
		model: m, beats: f.Beats, rate: f.Rate, pv: f.OutflowPressure, systematic: f.Systematic, flow: true,
		values: func(mean []float64, c fitting.Calibration, e own) fitting.Values {
			thin(flow, mean, c.FlowScale)
			cuff := f.Cuff
			reading := cuff.Error / z95
			high, low := cuff.Systolic+reading*e[1], cuff.Diastolic+reading*e[2]
			level := cuff.MeanPressure() + low - cuff.Diastolic + (high-low-cuff.Pulse())/3
			v, _ := match(matcher, flow, c.PressureScale*level+c.PressureOffset-c.OutflowPressure, c.PressureScale*(high-low), f.part(m.Name, e[0]))
			return v
		},
	}
}

// thin writes a beat, times a factor, with fewer samples, by straight lines, and
// keeps its mean.
func thin(to, from []float64, factor float64) {
	n := len(from)
	for k := range to {
		at := float64(k) * float64(n) / float64(len(to))
		j := int(math.Floor(at))
		w := at - float64(j)
		to[k] = factor * ((1-w)*from[j] + w*from[(j+1)%n])
	}
	miss := factor*data.Period{Samples: from}.Mean() - data.Period{Samples: to}.Mean()
	for k := range to {
		to[k] += miss
	}
}
