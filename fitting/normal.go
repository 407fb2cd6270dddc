package fitting

import "math"

// The largest problem: wk4s has three columns, wk4p two shapes.
const (
	maxLinear = 3
	maxShapes = 2
)

// normal holds the normal equations of a problem that is linear in x >= 0 for a
// given shape,
//
//	S(x) = x'G x - 2 b'x + total
//
// and the derivatives of G and b with respect to the logarithm of each shape.
type normal struct {
	n     int // length of x
	g     [maxLinear][maxLinear]float64
	b     [maxLinear]float64
	dg    [maxShapes][maxLinear][maxLinear]float64
	db    [maxShapes][maxLinear]float64
	total float64
	// dtotal is the derivative of total, where free values have been put in.
	dtotal [maxShapes]float64
}

// solve returns the x >= 0 that minimises S, and S there. With at most three
// unknowns every set of positive ones can be tried: the first try, all of them,
// is nearly always the answer; else the best of the rest is (the problem is
// convex, so the minimum is the stationary point of its own set). A set whose
// columns are not independent is left out.
func (e *normal) solve() (x [maxLinear]float64, s float64) {
	all := 1<<e.n - 1
	if x, gain, ok := e.stationary(all); ok {
		return x, e.total - gain
	}
	best := 0.0
	for set := 1; set < all; set++ {
		if try, gain, ok := e.stationary(set); ok && gain > best {
			x, best = try, gain
		}
	}
	return x, e.total - best
}

// independent is the smallest part of a column's square, left after taking out
// the columns before it, for which it still counts as a column of its own.
const independent = 1e-13

// stationary minimises S over the unknowns whose bit is in set, the others 0,
// by Cholesky's factors; ok tells whether they came out positive. The gain is
// total - S.
func (e *normal) stationary(set int) (x [maxLinear]float64, gain float64, ok bool) {
	var l [maxLinear][maxLinear]float64
	var y [maxLinear]float64
	for i := range e.n {
		if set>>i&1 == 0 {
			continue
		}
		d, r := e.g[i][i], e.b[i]
		for j := range i {
			if set>>j&1 == 0 {
				continue
			}
			v := e.g[i][j]
			for k := range j {
				v -= l[i][k] * l[j][k]
			}
			l[i][j] = v / l[j][j]
			d -= l[i][j] * l[i][j]
			r -= l[i][j] * y[j]
		}
		if !(d > independent*e.g[i][i]) {
			return x, 0, false
		}
		l[i][i] = math.Sqrt(d)
		y[i] = r / l[i][i]
		gain += y[i] * y[i]
	}
	for i := e.n - 1; i >= 0; i-- {
		if set>>i&1 == 0 {
			continue
		}
		v := y[i]
		for j := i + 1; j < e.n; j++ {
			v -= l[j][i] * x[j]
		}
		x[i] = v / l[i][i]
		if !(x[i] > 0) {
			return [maxLinear]float64{}, 0, false
		}
	}
	return x, gain, true
}

// slope is the derivative of the minimum of S with respect to ln shape[s], at
// the minimising x: that x moves too does not matter at a minimum.
func (e *normal) slope(s int, x [maxLinear]float64) float64 {
	sum := e.dtotal[s]
	for i := range e.n {
		for j := range e.n {
			sum += x[i] * x[j] * e.dg[s][i][j]
		}
		sum -= 2 * x[i] * e.db[s][i]
	}
	return sum
}
