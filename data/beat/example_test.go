package beat_test

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/unit"
)

// Two channels of one recording: a pressure and a flow that leads it by 20 ms.
func Example() {
	const rate = 200.0
	pressure, flow := make([]float64, 6000), make([]float64, 6000)
	for i := range pressure {
		u := math.Mod(float64(i)/rate, 0.8)
		if u < 0.3 {
			flow[i] = 360 * math.Sin(math.Pi*u/0.3)
		}
		later := math.Mod(u+0.8-0.02, 0.8)
		pressure[i] = 80 + 40*math.Exp(-(later-0.15)*(later-0.15)/0.01)
	}

	pulse := beat.Find(flow, rate, unit.Flow)
	fmt.Printf("%.0f beats a minute, %d used\n", pulse.HeartRate(), pulse.Used())

	beats := beat.Match(pulse, beat.Find(pressure, rate, unit.Pressure))
	cut := beat.Cut(beats, rate, beat.Signal{Values: pressure, Delay: 0.02}, beat.Signal{Values: flow})
	m := beat.Measure(cut.Average(1).Period)
	fmt.Printf("average beat of %d samples; Gosling PI, flow %.2f\n", cut.N, m.GoslingPI)
	// Output:
	// 75 beats a minute, 36 used
	// average beat of 160 samples; Gosling PI, flow 4.19
}

// Hand check: systolic 100, diastolic 20, mean 45 cm/s.
func ExampleMeasure() {
	m := beat.Measure(data.Period{Samples: []float64{20, 100, 35, 25}, Rate: 5})
	fmt.Printf("PI %.4f, RI %.1f, S/D %.0f\n", m.GoslingPI, m.PourcelotRI, m.SystolicRatio)
	// Output: PI 1.7778, RI 0.8, S/D 5
}
