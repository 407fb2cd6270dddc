package support

import "fmt"

// Step is [Coupled.Step] on a tree: the rest of the tree answers to the root flow
// of the beat before, which is exact once the beats are alike.
func (k *CoupledTree) Step(from, to float64, beats int) (StepResponse, error) {
	r := StepResponse{From: from, To: to}
	if beats < 1 {
		return r, fmt.Errorf("%d beats after a step are none to follow", beats)
	}
	if err := k.checkSpeed(to); err != nil {
		return r, err
	}
	state, err := k.At(from)
	if err != nil {
		return r, err
	}
	s := &k.shooter
	y, fill, flow := state.start, state.Filling, state.Flow()
	s.running, s.speed, s.fill = to > 0, to, fill
	if to == 0 {
		y[qp] = 0
	}
	root, pressure := make([]float64, k.samples), make([]float64, k.samples)
	for i := range beats {
		s.tape = k.tape(root, pressure)
		b, ok := k.lagged(&y, &fill, &flow)
		s.tape = nil
		if !ok {
			return r, nil
		}
		k.relax(root, 1)
		r.BeatEnd = append(r.BeatEnd, float64(i+1)*k.Ventricle.Period)
		r.Arterial = append(r.Arterial, b.of(sigPao).Mean)
		r.Flow = append(r.Flow, flow)
		r.Filling = append(r.Filling, b.of(sigFill).Mean)
	}
	r.Complete = state.Settled
	return r, nil
}
