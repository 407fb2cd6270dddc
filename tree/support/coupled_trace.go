package support

import (
	"fmt"

	"afterbeat/data"
)

// Trace is a periodic state in samples, of one period each.
type Trace struct {
	Arterial    data.Period // Pao, mmHg
	Flow        data.Period // Qav + Qp, mL/s
	PumpFlow    data.Period // Qp, mL/s
	Ventricular data.Period // Plv, mmHg
	Volume      data.Period // V, mL
}

// Trace samples a state that this coupling was found in, at n instants of the
// beat. Extremes between the samples are in the state, not here. It panics where
// n is not positive.
func (k *Coupled) Trace(s CoupledState, n int) Trace {
	if n < 1 {
		panic(fmt.Sprintf("support: %d samples of a beat", n))
	}
	t := newTrace(n, 1, k.Ventricle.Period)
	r := &k.shooter.run
	r.drive = drive{running: s.Speed > 0, speed: s.Speed, fill: s.Filling}
	b := books{trace: t}
	r.r = s.Resistance
	y := s.start
	r.booked(&y, &b)
	return *t
}

// newTrace has room for n samples in each of a number of beats of a period, s.
func newTrace(n, beats int, period float64) *Trace {
	empty := func() data.Period {
		return data.Period{Samples: make([]float64, 0, n*beats), Rate: float64(n) / period}
	}
	return &Trace{empty(), empty(), empty(), empty(), empty()}
}

// add samples the step just taken, its end excluded.
func (t *Trace) add(r *run) {
	s := &r.step
	for {
		at := float64(len(t.Arterial.Samples))/t.Arterial.Rate - r.since
		if at >= s.t+s.h || len(t.Arterial.Samples) == cap(t.Arterial.Samples) {
			return
		}
		r.peek(max(0, (at-s.t)/s.h))
		i, y := &r.now, &s.y
		for _, put := range []struct {
			p *data.Period
			x float64
		}{{&t.Arterial, i.pao}, {&t.Flow, i.qav + y[qp]}, {&t.PumpFlow, y[qp]}, {&t.Ventricular, i.plv}, {&t.Volume, y[vol]}} {
			put.p.Samples = append(put.p.Samples, put.x)
		}
	}
}
