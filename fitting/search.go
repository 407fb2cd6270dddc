package fitting

import "math"

// problem is a least-squares problem in x >= 0 and a few positive shapes; it
// fills the normal equations in x for a given shape.
type problem interface {
	normal(shape []float64, to *normal)
}

// search minimises a problem over its shapes. Everything is in ln shape: the
// reduced sum of squares is made of Lorentzians in it, about two units wide, so
// a grid of steps below one misses no valley. Two shapes are searched one
// inside the other. A search allocates nothing once made.
type search struct {
	problem
	shapes      int
	low, high   [maxShapes]float64 // of ln shape
	tolerance   float64            // of ln shape
	near        bool               // walk downhill from where theta stands, instead of scanning
	bend        [maxShapes]float64 // second derivative, for the first step of the walk; 0: not known
	theta       [maxShapes]float64 // ln shape last looked at
	shape       [maxShapes]float64
	x           [maxLinear]float64
	sum         float64
	evaluations int
	equations   normal
}

// gridStep is the largest step of the scan, in ln shape.
const gridStep = 0.8

// point is the reduced sum of squares along one shape.
type point struct{ theta, sum, slope float64 }

// run finds the minimum; theta, shape, x and sum are left standing there. It
// reports false where the numbers stopped being numbers.
func (s *search) run() bool {
	at := s.minimise(s.shapes - 1)
	return !math.IsNaN(at.sum) && !math.IsInf(at.sum, 0)
}

// at looks at one value of shape number level, the ones below it at their best.
func (s *search) at(level int, theta float64) point {
	s.theta[level], s.shape[level] = theta, math.Exp(theta)
	if level > 0 {
		below := s.minimise(level - 1)
		return point{theta, below.sum, s.equations.slope(level, s.x)}
	}
	s.evaluations++
	s.problem.normal(s.shape[:s.shapes], &s.equations)
	s.x, s.sum = s.equations.solve()
	return point{theta, s.sum, s.equations.slope(0, s.x)}
}

func (s *search) minimise(level int) point {
	var best point
	if s.near {
		best = s.walk(level)
	} else {
		best = s.scan(level)
	}
	if s.theta[level] != best.theta {
		best = s.at(level, best.theta)
	}
	return best
}

// scan looks at the whole range and goes to the bottom of every valley: between
// neighbours whose slopes turn from down to up, and at an end that slopes
// outward.
func (s *search) scan(level int) point {
	low, high := s.low[level], s.high[level]
	steps := int(math.Ceil((high - low) / gridStep))
	left := s.at(level, low)
	best := left
	for i := 1; i <= steps; i++ {
		right := s.at(level, low+(high-low)*float64(i)/float64(steps))
		bottom := right
		if left.slope < 0 && right.slope > 0 {
			bottom = s.root(level, left, right)
		}
		if bottom.sum < best.sum {
			best = bottom
		}
		left = right
	}
	return best
}

// walk goes downhill from theta in growing steps until the slope turns.
func (s *search) walk(level int) point {
	here := s.at(level, s.theta[level])
	step := gridStep
	if s.bend[level] > 0 {
		step = max(s.tolerance, min(step, math.Abs(here.slope)/s.bend[level]))
	}
	for here.slope != 0 && !math.IsNaN(here.slope) {
		next := here.theta - math.Copysign(step, here.slope)
		next = max(s.low[level], min(s.high[level], next))
		if next == here.theta {
			break // on the end of the range
		}
		there := s.at(level, next)
		if here.slope < 0 != (there.slope < 0) {
			return s.root(level, here, there)
		}
		here, step = there, 2*step
	}
	return here
}

// root closes in on the zero of the slope between a and b, where it has
// opposite signs, by Chandrupatla's hybrid of inverse quadratic interpolation
// and bisection (Chandrupatla 1997, Adv Eng Softw 28:145).
func (s *search) root(level int, a, b point) point {
	if b.slope == 0 {
		return b
	}
	t := max(0.05, min(0.95, a.slope/(a.slope-b.slope))) // the secant's
	for range 100 {
		next := s.at(level, a.theta+t*(b.theta-a.theta))
		c := a
		if next.slope < 0 != (a.slope < 0) {
			c, b = b, a
		}
		a = next
		best := a
		if math.Abs(b.slope) < math.Abs(a.slope) {
			best = b
		}
		limit := (s.tolerance + 4e-16*math.Abs(best.theta)) / math.Abs(b.theta-a.theta)
		if best.slope == 0 || !(limit < 0.5) {
			return best
		}
		t = 0.5
		xi, phi := (a.theta-b.theta)/(c.theta-b.theta), (a.slope-b.slope)/(c.slope-b.slope)
		if phi*phi < xi && (1-phi)*(1-phi) < 1-xi {
			t = a.slope/(b.slope-a.slope)*c.slope/(b.slope-c.slope) +
				(c.theta-a.theta)/(b.theta-a.theta)*a.slope/(c.slope-a.slope)*b.slope/(c.slope-b.slope)
		}
		t = max(limit, min(1-limit, t))
	}
	return a
}
