package main

import (
	"math"
	"testing"

	"afterbeat/data/demo"
)

// Without noise the foot of the velocity is where it leaves 0, and that of the
// pressure where it leaves the decay toward Pv, a factor exp(-dt/(R C)) a
// sample. The feet of every beat are the delay apart, to the sample.
func TestPressureIsLateByTheDelay(t *testing.T) {
	p := demo.Truth()
	tr := clean(p)
	decay := math.Exp(-1 / (p.Rate * p.R * p.C))
	var velocityFeet, pressureFeet []float64
	quiet := 0 // steps of undisturbed decay up to here
	for i := range len(tr.time) - 1 {
		if tr.velocity[i] == 0 && tr.velocity[i+1] > 0 {
			velocityFeet = append(velocityFeet, tr.time[i])
		}
		ratio := (tr.pressure[i+1] - p.OutflowPressure) / (tr.pressure[i] - p.OutflowPressure)
		if math.Abs(ratio-decay) < 1e-9 {
			quiet++
			continue
		}
		if quiet >= 10 {
			pressureFeet = append(pressureFeet, tr.time[i])
		}
		quiet = 0
	}
	if len(velocityFeet) != p.Beats+1 || len(pressureFeet) != p.Beats+1 {
		t.Fatalf("%d feet of velocity and %d of pressure, want %d", len(velocityFeet), len(pressureFeet), p.Beats+1)
	}
	for k := range velocityFeet {
		near(t, "delay", pressureFeet[k]-velocityFeet[k], p.Delay, 1e-9)
	}
}

func TestClocksOfTraceAndBeatsAgree(t *testing.T) {
	p := demo.Truth()
	tr := clean(p)
	all := beats(p)
	near(t, "start", tr.start+lead, all[runIn].onset, 1e-12)
	near(t, "end", tr.time[len(tr.time)-1], all[runIn+p.Beats].onset+tail-tr.start, 1/p.Rate)
	for i := 1; i < len(tr.time); i++ {
		near(t, "step", tr.time[i]-tr.time[i-1], 1/p.Rate, 1e-12)
	}
}

// What spoiling adds has the sizes stated: white noise and half the square of
// the swing of breathing in the variance; the white part is gone from the
// covariance of neighbours. Over some 4400 samples the variances are good to a
// tenth or so (about 110 independent values of the wandering part).
func TestNoiseHasItsSize(t *testing.T) {
	p := demo.Truth()
	before := clean(p)
	after := before.spoil(p)
	n := len(before.time)
	var pressure, velocity []float64
	for i := range n {
		pressure = append(pressure, after.pressure[i]-before.pressure[i]-chest*breathing(p, before.start+before.time[i]))
		velocity = append(velocity, after.velocity[i]-before.velocity[i])
	}
	near(t, "SD of velocity", math.Sqrt(covariance(velocity, 0)), velocityNoise, 0.03)
	near(t, "lag 1 of velocity", covariance(velocity, 1), 0, 0.05)
	white := covariance(pressure, 0) - covariance(pressure, 1)
	near(t, "SD of pressure, white", math.Sqrt(white), pressureNoise, 0.03)
	near(t, "SD of pressure, wandering", math.Sqrt(covariance(pressure, 1)), wander, 0.1)
	near(t, "lag 1 s of pressure", covariance(pressure, int(p.Rate)), 0, 0.08)
}

// covariance is the mean product of values lag samples apart.
func covariance(x []float64, lag int) float64 {
	sum := 0.0
	for i := lag; i < len(x); i++ {
		sum += x[i] * x[i-lag]
	}
	return sum / float64(len(x)-lag)
}
