package estimate

import (
	"math"

	"afterbeat/data"
	"afterbeat/fitting/harmonic"
)

// The worked example of the tests (half-sine inflow, periodic): stroke volume
// 70 mL in Ts = 0.3 s, T = 0.8 s, so Qm = pi 70/(2 Ts); R = 1, C = 1.5, Zc =
// 0.05, L = 0.005. Its closed forms, and the estimates below, were computed
// independently of this program.
const (
	exampleT  = 0.8
	exampleTs = 0.3
	exampleQm = math.Pi * 70 / (2 * exampleTs)
	exampleR  = 1.0
	exampleC  = 1.5
	exampleZc = 0.05
	exampleL  = 0.005
)

func exampleFlow(t float64) float64 {
	if t < exampleTs {
		return exampleQm * math.Sin(math.Pi*t/exampleTs)
	}
	return 0
}

func exampleFlowSlope(t float64) float64 {
	if t < exampleTs {
		return exampleQm * math.Pi / exampleTs * math.Cos(math.Pi*t/exampleTs)
	}
	return 0
}

// relaxed is the periodic response of g/(1 + i w tau) to the half-sine.
func relaxed(g, tau, t float64) float64 {
	a := math.Pi / exampleTs
	k := exampleQm * g / tau / (1/(tau*tau) + a*a)
	p0 := k * a * (1 + math.Exp(-exampleTs/tau)) * math.Exp(-(exampleT-exampleTs)/tau) / (1 - math.Exp(-exampleT/tau))
	inflow := func(t float64) float64 {
		return p0*math.Exp(-t/tau) + k*(math.Sin(a*t)/tau-a*math.Cos(a*t)+a*math.Exp(-t/tau))
	}
	if t <= exampleTs {
		return inflow(t)
	}
	return inflow(exampleTs) * math.Exp(-(t-exampleTs)/tau)
}

// examplePressure is the closed form of pressure for each model.
var examplePressure = map[string]func(t float64) float64{
	"wk2": func(t float64) float64 { return relaxed(exampleR, exampleR*exampleC, t) },
	"wk3": func(t float64) float64 {
		return exampleZc*exampleFlow(t) + relaxed(exampleR, exampleR*exampleC, t)
	},
	"wk4p": func(t float64) float64 {
		return exampleZc*exampleFlow(t) - relaxed(exampleZc, exampleL/exampleZc, t) + relaxed(exampleR, exampleR*exampleC, t)
	},
	"wk4s": func(t float64) float64 {
		return exampleZc*exampleFlow(t) + exampleL*exampleFlowSlope(t) + relaxed(exampleR, exampleR*exampleC, t)
	},
}

// sample takes n samples of f over the period, from its start on.
func sample(f func(float64) float64, n int) data.Period {
	p := data.Period{Samples: make([]float64, n), Rate: float64(n) / exampleT}
	for j := range p.Samples {
		p.Samples[j] = f(float64(j) / p.Rate)
	}
	return p
}

// turned is the period begun at another sample.
func turned(p data.Period, by int) data.Period {
	return data.Period{Samples: append(append([]float64(nil), p.Samples[by:]...), p.Samples[:by]...), Rate: p.Rate}
}

// example is the beat of a model, begun at a sample.
func example(model string, n, turn int) Beat {
	b := Beat{Pressure: turned(sample(examplePressure[model], n), turn), Flow: turned(sample(exampleFlow, n), turn)}
	b.Harmonics = harmonic.Impedance([][]float64{b.Pressure.Samples}, [][]float64{b.Flow.Samples}, b.Flow.Rate)
	return b
}

// alone is a beat without its flow.
func alone(p data.Period, pv float64) Beat { return Beat{Pressure: p, OutflowPressure: pv} }
