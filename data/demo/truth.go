package demo

// Patient is the invented adult, and how the recording was made.
type Patient struct {
	R               float64 // mmHg s/mL, in parallel with C
	C               float64 // mL/mmHg
	Zc              float64 // mmHg s/mL
	OutflowPressure float64 // Pv, mmHg
	Diameter        float64 // of the outflow tract, cm
	Delay           float64 // s, by which pressure is late

	StrokeVolume float64 // mL, net, averaged over breathing
	Period       float64 // s, averaged over breathing
	Ejection     float64 // s, of a usual beat

	Rate      float64 // samples a second
	Beats     int     // complete, from onset to onset
	Ectopic   int     // the premature beat, counted from 0
	Breathing float64 // Hz
	Seed      uint64
}

// Truth is what the demo recording was made from. R + Zc is 1.05 mmHg s/mL and
// the output 4 L/min, so that mean pressure is near 7 + 1.05 66.7 = 77 mmHg.
// All of it is invented; package cmd/demodata's tests hold it against published
// ranges.
func Truth() Patient {
	return Patient{
		R: 0.98, C: 1.2, Zc: 0.07,
		OutflowPressure: 7,
		Diameter:        2.2,
		Delay:           0.025,

		StrokeVolume: 48,
		Period:       0.72,
		Ejection:     0.27,

		Rate:      200,
		Beats:     30,
		Ectopic:   15,
		Breathing: 0.25,
		Seed:      1,
	}
}
