package support

import "afterbeat/data"

// Waves are the signals of a coupled state over one beat, from the onset of
// contraction, in even steps.
type Waves struct {
	Pressure    data.Period // Pao, mmHg
	RootFlow    data.Period // Qav + Qp, mL/s
	PumpFlow    data.Period // mL/s
	Ventricular data.Period // Plv, mmHg
	Volume      data.Period // of the ventricle, mL
}

// Waves are those of the periodic state at a speed in 1000/min, in that many
// samples. It panics on none. Errors are those of [Coupled.At].
func (k *Coupled) Waves(speed float64, samples int) (Waves, error) {
	if samples < 1 {
		panic("support: a wave needs at least one sample")
	}
	o, err := k.orbitAt(speed)
	if err != nil {
		return Waves{}, err
	}
	t := &tape{step: k.Ventricle.Period / float64(samples)}
	for i := range t.signals {
		t.signals[i] = make([]float64, samples)
	}
	s := &k.shooter
	y := o.start
	s.impose(&o.start)
	s.tape = t
	s.beat(&y)
	s.tape = nil
	period := func(signal int) data.Period { return data.Period{Samples: t.signals[signal], Rate: 1 / t.step} }
	return Waves{
		Pressure: period(sigPao), RootFlow: period(sigRoot), PumpFlow: period(sigPump),
		Ventricular: period(sigPlv), Volume: period(sigVolume),
	}, nil
}

// tape reads the signals at even steps while a beat is integrated.
type tape struct {
	step    float64 // s
	next    int     // the sample to be read next
	signals [signals][]float64
}

// add reads the samples that lie in the step just taken.
func (t *tape) add(r *run) {
	s := &r.step
	if t.next >= len(t.signals[0]) || float64(t.next)*t.step >= s.t+s.h {
		return
	}
	s.between(&r.dense)
	for ; t.next < len(t.signals[0]) && float64(t.next)*t.step < s.t+s.h; t.next++ {
		r.peek(max(0, (float64(t.next)*t.step-s.t)/s.h))
		for k, x := range r.signals() {
			t.signals[k][t.next] = x
		}
	}
}
