package support

import (
	"fmt"
	"math"
)

// StepResponse is what follows a change of speed at the start of a beat: beat
// means, one a beat.
type StepResponse struct {
	From, To float64   // 1000/min
	BeatEnd  []float64 // s since the change
	Arterial []float64 // mean of Pao, mmHg
	Flow     []float64 // mean of Qav + Qp, mL/s
	Filling  []float64 // mean of Pfill, mmHg
	Complete bool      // the state before was settled, and every beat could be integrated
}

// Step changes the speed, 1000/min, of a settled state and follows a number of
// beats. Filling pressure draws nearer to the line at the mean flow of the beat
// before, with the lag of the coupling.
func (k *Coupled) Step(from, to float64, beats int) (StepResponse, error) {
	r := StepResponse{From: from, To: to}
	if beats < 1 {
		return r, fmt.Errorf("%d beats after a step are none to follow", beats)
	}
	if !k.Match.None() {
		return r, errTransient
	}
	if err := k.checkSpeed(to); err != nil {
		return r, err
	}
	o, err := k.orbitAt(from)
	if err != nil {
		return r, err
	}
	s := &k.shooter
	y, fill := o.start, o.start[out]
	s.fill = fill
	before := y
	if !s.beat(&before) {
		return r, nil
	}
	flow := before[out] / k.Ventricle.Period
	s.running, s.speed = to > 0, to
	if to == 0 {
		y[qp] = 0
	}
	for i := range beats {
		b, ok := k.lagged(&y, &fill, &flow)
		if !ok {
			return r, nil
		}
		r.BeatEnd = append(r.BeatEnd, float64(i+1)*k.Ventricle.Period)
		r.Arterial = append(r.Arterial, b.of(sigPao).Mean)
		r.Flow = append(r.Flow, flow)
		r.Filling = append(r.Filling, b.of(sigFill).Mean)
	}
	r.Complete = o.settled
	return r, nil
}

// lagged carries a state over a beat in which filling pressure draws nearer to
// the line, and brings fill and the mean flow up to date.
func (k *Coupled) lagged(y *vector, fill, flow *float64) (*books, bool) {
	s := &k.shooter
	var b books
	goal := k.Filling.At(*flow)
	s.drive.fill, s.gap, s.lag = goal, *fill-goal, k.FillingLag
	ok := s.booked(y, &b)
	s.gap = 0
	*fill = goal + (*fill-goal)*math.Exp(-k.Ventricle.Period/k.FillingLag)
	*flow = y[out] / k.Ventricle.Period
	return &b, ok
}
