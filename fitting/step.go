package fitting

import "math"

// stepping is the exact solution over one step h of tau dy/dt = Q - y, where Q is
// linear between samples: with z = h/tau and phi = (1 - exp(-z))/z
//
//	y_{j+1} = decay y_j + here Q_j + next Q_{j+1}
//	decay = exp(-z),  here = phi - exp(-z),  next = 1 - phi
//
// and the derivatives of the three with respect to ln tau.
type stepping struct {
	decay, here, next    float64
	dDecay, dHere, dNext float64
	z                    float64
}

func newStepping(h, tau float64) stepping {
	z := h / tau
	s := stepping{z: z, decay: math.Exp(-z)}
	if z > 0.3 {
		phi := -math.Expm1(-z) / z
		s.here, s.next = phi-s.decay, 1-phi
	} else {
		s.here, s.next = smallStep(z)
	}
	s.dDecay, s.dHere, s.dNext = z*s.decay, s.here-z*s.decay, -s.here
	return s
}

// smallStep is here and next by their series, without the cancellation that the
// closed forms have for small z:
//
//	next = z/2 - z²/6 + z³/24 - ...,  here = z/2 - z²/3 + z³/8 - ...
func smallStep(z float64) (here, next float64) {
	term := 1.0 // (-z)^k/k!
	for k := 1.0; k < 14; k++ {
		term *= -z / k
		next -= term / (k + 1)
		here -= term * k / (k + 1)
	}
	return here, next
}

// relax writes y and its derivative with respect to ln tau at the samples of
// flow, going on from the last sample before them.
func (s stepping) relax(y, dy, flow []float64, from, dFrom, before float64) {
	v, d, q := from, dFrom, before
	for j, f := range flow {
		d = s.decay*d + s.dDecay*v + s.dHere*q + s.dNext*f
		v = s.decay*v + s.here*q + s.next*f
		y[j], dy[j], q = v, d, f
	}
}

// fade writes exp(-t/tau) and its derivative with respect to ln tau, at samples
// first, first + 1, ... of a run.
func (s stepping) fade(e, de []float64, first int) {
	v := math.Exp(-float64(first) * s.z)
	for j := range e {
		e[j], de[j] = v, float64(first+j)*s.z*v
		v *= s.decay
	}
}

// faded is the number of samples after which what a run began with is below
// rounding.
func (s stepping) faded(length int) int {
	if last := 42 / s.z; last < float64(length) {
		return int(last) + 1
	}
	return length
}
