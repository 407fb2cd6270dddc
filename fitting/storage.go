package fitting

import "math"

// storage repairs what is broken where beats are taken out of their order. Over
// a recording the pressure at the end of a beat is that at the start of the
// next, so that what C stores in one beat it gives to another, and only the two
// ends of the recording remain. Blocks drawn anew have ends of their own, and
// without repair the interval of R would be two to three times too wide where
// stroke volume varies. A beat that ends d higher than it began is the periodic
// one less a transient of time constant tau,
//
//	P_periodic = P + d exp(-t/tau)/(1 - exp(-T/tau)),
//
// and that is added for the d of the draw, less that of the average beat.
type storage struct {
	start, end []float64    // of each beat above the average beat, mmHg
	transient  []complex128 // spectrum for d = 1 mmHg
}

// storageEdge is the part of a beat at either end over which its pressure is
// averaged: long enough against noise, short against the filling of C.
const storageEdge = 1.0 / 16

func newStorage(s *source, tau float64) *storage {
	n := s.plan.n
	edge := max(1, int(storageEdge*float64(n)))
	mean := meanOf(s.beats.Pressure)
	st := &storage{transient: make([]complex128, n/2+1)}
	for _, beat := range s.beats.Pressure {
		start, end := 0.0, 0.0
		for j := range edge {
			start += (beat[j] - mean[j]) / float64(edge)
			end += (beat[n-1-j] - mean[n-1-j]) / float64(edge)
		}
		st.start, st.end = append(st.start, start), append(st.end, end)
	}
	decay, zero := make([]float64, n), make([]float64, n)
	step := 1 / (s.beats.Rate * tau)
	for j := range decay {
		decay[j] = math.Exp(-float64(j)*step) / -math.Expm1(-float64(n)*step)
	}
	s.plan.pair(st.transient, make([]complex128, n/2+1), decay, zero)
	return st
}

// rise is by how much pressure rises, beyond that of the average beat, over count
// successive beats from one on, counted round the end, mmHg.
func (st *storage) rise(from, count int) float64 {
	if st == nil {
		return 0
	}
	n := len(st.start)
	if past := from + count - n; past > 0 {
		return st.end[n-1] - st.start[from] + st.end[past-1] - st.start[0]
	}
	return st.end[from+count-1] - st.start[from]
}

// repair adds the transient to a sum of beats that rise by d mmHg in all.
func (st *storage) repair(pressure []complex128, d float64) {
	if st == nil {
		return
	}
	for k, v := range st.transient {
		pressure[k] += complex(d*real(v), d*imag(v))
	}
}
