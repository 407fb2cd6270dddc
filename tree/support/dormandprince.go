package support

import "math"

// vector is the state of the coupled circuit; see [circuit].
type vector [5]float64

// The method of Dormand and Prince of order 5, with an estimate of the error of
// order 4 and a continuous solution of order 4 between the steps (Dormand and
// Prince 1980, J Comput Appl Math 6:19; the continuous solution as in Hairer,
// Norsett and Wanner 1993, Solving Ordinary Differential Equations I, II.6).
const (
	c2, c3, c4, c5 = 1.0 / 5, 3.0 / 10, 4.0 / 5, 8.0 / 9

	a21                          = 1.0 / 5
	a31, a32                     = 3.0 / 40, 9.0 / 40
	a41, a42, a43                = 44.0 / 45, -56.0 / 15, 32.0 / 9
	a51, a52, a53, a54           = 19372.0 / 6561, -25360.0 / 2187, 64448.0 / 6561, -212.0 / 729
	a61, a62, a63, a64, a65      = 9017.0 / 3168, -355.0 / 33, 46732.0 / 5247, 49.0 / 176, -5103.0 / 18656
	a71, a73, a74, a75, a76      = 35.0 / 384, 500.0 / 1113, 125.0 / 192, -2187.0 / 6784, 11.0 / 84
	er1, er3, er4, er5, er6, er7 = 71.0 / 57600, -71.0 / 16695, 71.0 / 1920, -17253.0 / 339200, 22.0 / 525, -1.0 / 40

	d1, d3, d4 = -12715105075.0 / 11282082432, 87487479700.0 / 32700410799, -10690763975.0 / 1880347072
	d5, d6, d7 = 701980252875.0 / 199316789632, -1453857185.0 / 822651844, 69997945.0 / 29380423
)

// step is one step of the method: the slopes at its stages, and the states at
// both ends. k[6] is the slope at the end.
type step struct {
	t, h       float64
	start, end vector
	k          [7]vector
	y          vector // of the stage at hand
}

// system gives the slope dy of a state y at a time; stage 1 to 6 are those of a
// step, 6 its end.
type system interface {
	slope(stage int, t float64, y, dy *vector)
}

// take fills a step of a system from start and its slope k[0]. It returns the
// norm of the error, 1 being what the tolerance allows.
func (s *step) take(of system, tolerance float64) float64 {
	t, h, k, y := s.t, s.h, &s.k, &s.y
	for i, x := range &s.start {
		y[i] = x + h*a21*k[0][i]
	}
	of.slope(1, t+c2*h, y, &k[1])
	for i, x := range &s.start {
		y[i] = x + h*(a31*k[0][i]+a32*k[1][i])
	}
	of.slope(2, t+c3*h, y, &k[2])
	for i, x := range &s.start {
		y[i] = x + h*(a41*k[0][i]+a42*k[1][i]+a43*k[2][i])
	}
	of.slope(3, t+c4*h, y, &k[3])
	for i, x := range &s.start {
		y[i] = x + h*(a51*k[0][i]+a52*k[1][i]+a53*k[2][i]+a54*k[3][i])
	}
	of.slope(4, t+c5*h, y, &k[4])
	for i, x := range &s.start {
		y[i] = x + h*(a61*k[0][i]+a62*k[1][i]+a63*k[2][i]+a64*k[3][i]+a65*k[4][i])
	}
	of.slope(5, t+h, y, &k[5])
	for i, x := range &s.start {
		s.end[i] = x + h*(a71*k[0][i]+a73*k[2][i]+a74*k[3][i]+a75*k[4][i]+a76*k[5][i])
	}
	of.slope(6, t+h, &s.end, &k[6])
	return s.error(tolerance)
}

// error is the norm of the estimated error over what the tolerance allows: it
// is relative, to the value and to floor.
func (s *step) error(tolerance float64) float64 {
	const floor = 10 // mL, mmHg or mL/s
	sum := 0.0
	for i := range s.end {
		k := &s.k
		e := s.h * (er1*k[0][i] + er3*k[2][i] + er4*k[3][i] + er5*k[4][i] + er6*k[5][i] + er7*k[6][i])
		sum += square(e / (floor + max(math.Abs(s.start[i]), math.Abs(s.end[i]))))
	}
	return math.Sqrt(sum/float64(len(s.end))) / tolerance
}

// next is the size of the step after one with that error.
func next(h, err float64) float64 {
	return h * min(5, max(0.2, 0.9*math.Pow(err, -0.2)))
}

// dense is the continuous solution over a step.
type dense [5]vector

// between prepares the continuous solution.
func (s *step) between(d *dense) {
	k := &s.k
	for i := range &s.start {
		rise := s.end[i] - s.start[i]
		bend := s.h*k[0][i] - rise
		d[0][i], d[1][i], d[2][i], d[3][i] = s.start[i], rise, bend, rise-s.h*k[6][i]-bend
		d[4][i] = s.h * (d1*k[0][i] + d3*k[2][i] + d4*k[3][i] + d5*k[4][i] + d6*k[5][i] + d7*k[6][i])
	}
}

// at is the state at a share of the step, 0..1.
func (d *dense) at(share float64, y *vector) {
	left := 1 - share
	for i := range y {
		y[i] = d[0][i] + share*(d[1][i]+left*(d[2][i]+share*(d[3][i]+left*d[4][i])))
	}
}
