package beat

import (
	"math"
	"math/rand/v2"
)

// invented is a trace whose onsets are known: upstrokes (1 - cos)/2 of 0.12 s
// (less at high rates), an exponential fall and a dicrotic wave.
type invented struct {
	rate, seconds float64
	heartRate     float64 // 1/min
	scatter       float64 // SD of the intervals over their mean
	amplitude     float64
	noise         float64 // SD of white noise
	breathing     float64 // amplitude of a wave of 0.25 Hz under the pulse
	drift         float64 // per s
	offset        float64
	step          float64 // of the recorder; 0: none
	flow          bool    // half sine ejection, reversal, then nil
}

// make returns the trace and the times of its onsets, s.
func (v invented) make(seed uint64) (x, onsets []float64) {
	rng := rand.New(rand.NewPCG(seed, 1))
	x = make([]float64, int(v.rate*v.seconds))
	period := 60 / v.heartRate
	for t := -2 * period; t < v.seconds; {
		interval := period * math.Max(0.5, math.Min(1.8, 1+v.scatter*rng.NormFloat64()))
		onsets = append(onsets, t)
		v.add(x, t, interval)
		t += interval
	}
	for i := range x {
		t := float64(i) / v.rate
		x[i] += v.offset + v.drift*t + v.breathing*math.Sin(2*math.Pi*0.25*t) + v.noise*rng.NormFloat64()
		if v.step > 0 {
			x[i] = math.Round(x[i]/v.step) * v.step
		}
	}
	return x, onsets
}

func (v invented) add(x []float64, onset, interval float64) {
	for i := max(0, int(math.Ceil(onset*v.rate))); i < len(x); i++ {
		u := float64(i)/v.rate - onset
		if u > 6 {
			break
		}
		if v.flow {
			x[i] += v.amplitude * ejection(u, interval)
		} else {
			x[i] += v.amplitude * pressurePulse(u, interval)
		}
	}
}

// rise is the time of the upstroke, s.
func rise(interval float64) float64 { return min(0.12, 0.3*interval) }

func pressurePulse(u, interval float64) float64 {
	up := rise(interval)
	if u < up {
		return (1 - math.Cos(math.Pi*u/up)) / 2
	}
	d := (u - up - 0.25*interval) / 0.04
	return math.Exp(-(u-up)/0.4) + 0.08*math.Exp(-d*d)
}

// ejection is a half sine over 0.35 of the interval or 0.35 s, then a reversal
// of an eighth of it over 0.06 s.
func ejection(u, interval float64) float64 {
	up := min(0.35, 0.35*interval)
	switch {
	case u < up:
		return math.Sin(math.Pi * u / up)
	case u < up+0.06:
		return -0.125 * math.Sin(math.Pi*(u-up)/0.06)
	}
	return 0
}

// nothings are traces without a pulse.
var nothings = map[string]func(seed uint64, rate, seconds float64) []float64{
	"white noise":      func(s uint64, r, d float64) []float64 { return autoregressive(s, r, d, 0) },
	"AR(1) 0.5":        func(s uint64, r, d float64) []float64 { return autoregressive(s, r, d, 0.5) },
	"AR(1) 0.9":        func(s uint64, r, d float64) []float64 { return autoregressive(s, r, d, 0.9) },
	"AR(1) 0.99":       func(s uint64, r, d float64) []float64 { return autoregressive(s, r, d, 0.99) },
	"random walk":      func(s uint64, r, d float64) []float64 { return autoregressive(s, r, d, 1) },
	"slow breathing":   breathing,
	"ramp with noise":  ramp,
	"mains hum":        hum,
	"rounded constant": flicker,
}

// autoregressive is x(i) = phi x(i-1) + white noise.
func autoregressive(seed uint64, rate, seconds, phi float64) []float64 {
	rng := rand.New(rand.NewPCG(seed, 2))
	x := make([]float64, int(rate*seconds))
	last := 0.0
	if phi < 1 {
		last = rng.NormFloat64() / math.Sqrt(1-phi*phi)
	}
	for i := range x {
		last = phi*last + rng.NormFloat64()
		x[i] = last
	}
	return x
}

// breathing is one wave of 6 to 22 breaths a minute with a second harmonic, and noise.
func breathing(seed uint64, rate, seconds float64) []float64 {
	rng := rand.New(rand.NewPCG(seed, 3))
	f := 0.1 + 0.27*rng.Float64()
	noise := 0.05 * math.Pow(20, rng.Float64())
	phase := rng.Float64()
	x := make([]float64, int(rate*seconds))
	for i := range x {
		a := 2 * math.Pi * (f*float64(i)/rate + phase)
		x[i] = 80 + 5*math.Sin(a) + 1*math.Sin(2*a+1) + noise*rng.NormFloat64()
	}
	return x
}

func ramp(seed uint64, rate, seconds float64) []float64 {
	x := autoregressive(seed, rate, seconds, 0)
	for i := range x {
		x[i] = 100 - 3*float64(i)/rate + 0.2*x[i]
	}
	return x
}

// hum is 50 or 60 Hz upon a constant, with a little noise.
func hum(seed uint64, rate, seconds float64) []float64 {
	x := autoregressive(seed, rate, seconds, 0)
	f := 50 + 10*float64(seed%2)
	if alias := math.Abs(math.Remainder(f, rate)); alias < 5 { // indistinguishable from a slow wave
		f = 0.4 * rate
	}
	for i := range x {
		x[i] = 80 + 0.5*math.Sin(2*math.Pi*f*float64(i)/rate) + 0.05*x[i]
	}
	return x
}

// flicker is a constant halfway between two steps of the recorder.
func flicker(seed uint64, rate, seconds float64) []float64 {
	x := autoregressive(seed, rate, seconds, 0)
	for i := range x {
		x[i] = math.Round(80.5 + 0.3*x[i])
	}
	return x
}
