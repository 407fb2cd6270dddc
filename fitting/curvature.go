package fitting

import "math"

const maxUnknowns = maxLinear + maxShapes

// curvature is the Gauss-Newton matrix of a fit in its unknowns, the factors x
// of the columns and then the logarithms of the shapes:
//
//	a_ij = sum_k q Re(conj(u_i) u_j),  u the column, or the slope of Z with ln shape
//
// so that the sum of squares over N samples bends by 2 N a.
type curvature struct {
	n    int
	a    [maxUnknowns][maxUnknowns]float64
	x    [maxUnknowns]float64
	free [maxUnknowns]bool // not on a bound
}

func newCurvature(m *moments, shape, x []float64) *curvature {
	linear, shapes := m.Linear(), m.Shapes()
	c := &curvature{n: linear + shapes}
	var u, slope [maxUnknowns]complex128
	for k, w := range m.omega {
		m.columns(w, shape, u[:linear])
		for s := range shapes {
			m.slopes(w, shape, s, slope[:linear])
			u[linear+s] = 0
			for j, v := range x {
				u[linear+s] += complex(v, 0) * slope[j]
			}
		}
		m.onlyReal(k, u[:c.n])
		for i := range c.n {
			for j := range c.n {
				c.a[i][j] += m.q[k] * dot(u[i], u[j])
			}
		}
	}
	c.bounds(x)
	return c
}

// bounds takes in the factors of the columns, and which of them are free.
func (c *curvature) bounds(x []float64) {
	for i := range c.n {
		c.x[i], c.free[i] = 1, true
		if i < len(x) {
			c.x[i], c.free[i] = x[i], x[i] > 0
		}
	}
}

// unfelt is the part of the model's mean square pressure that an unknown must
// move, squared, to count as having an effect: rounding stays below it.
const unfelt = 1e-20

// felt tells whether unknown i has an effect on the pressure.
func (c *curvature) felt(i int) bool {
	all := 0.0
	for j := range c.n {
		all += c.a[j][j] * c.x[j] * c.x[j]
	}
	return c.a[i][i]*c.x[i]*c.x[i] > unfelt*all
}

// alone is the part of the effect of unknown i (squared) that the other free
// unknowns cannot imitate, from 0 (it trades against them) to 1.
func (c *curvature) alone(i int) float64 {
	var l [maxUnknowns][maxUnknowns]float64
	var order [maxUnknowns]int
	count := 0
	for j := range c.n {
		if j != i && c.free[j] {
			order[count] = j
			count++
		}
	}
	order[count] = i
	used := order[:count+1]
	left := 0.0
	for p, row := range used {
		left = c.a[row][row]
		for q, column := range used[:p] {
			if l[q][q] == 0 {
				continue
			}
			v := c.a[row][column]
			for k := range q {
				v -= l[p][k] * l[q][k]
			}
			l[p][q] = v / l[q][q]
			left -= l[p][q] * l[p][q]
		}
		if left > independent*c.a[row][row] {
			l[p][p] = math.Sqrt(left)
		}
	}
	return max(0, left/c.a[i][i])
}

// bend is how the reduced sum of squares bends along unknown i, the others at
// their best.
func (c *curvature) bend(i int) float64 {
	if !c.felt(i) {
		return 0
	}
	return 2 * c.a[i][i] * c.alone(i)
}

// tooAlike is the part of an unknown's effect below which it trades against the
// others.
const tooAlike = 1e-8

// determined tells whether unknown i is free, felt, and not imitated.
func (c *curvature) determined(i int) bool {
	return c.free[i] && c.felt(i) && c.alone(i) > tooAlike
}
