package support

import (
	"math"
	"slices"
)

// orbit is a periodic state: what it begins with, in the places of [vector],
// and its filling pressure in the place [out].
type orbit struct {
	start   vector
	beats   int // integrated to find it
	settled bool
}

// shooter finds periodic states: starts z that come back after a number of
// beats, G(z) = z. Unknown are the states that the circuit has and, on a filling
// line with a slope, the filling pressure, whose equation is the line at the mean
// flow of the period. Newton's method is used, with a Jacobian by differences at the
// start and Broyden's updates after (Broyden 1965, Math Comp 19:577); where it
// does not draw nearer, by plain beats, which lose energy and so approach the
// periodic state at a given filling pressure.
type shooter struct {
	run
	line    fillLine
	window  int // beats of a period
	active  []int
	slopes  [5]vector // of G: row, column
	known   bool      // whether slopes holds any
	beats   int
	scratch [5]vector
}

// fillLine is the filling pressure as a function of mean flow.
type fillLine interface {
	At(flow float64) float64
	Highest() float64
}

const (
	// closed is how near to the periodic state a start must be, relative.
	closed      = 1e-8
	mostBeats   = 600
	nudge       = 1e-4
	typicalSize = 10 // mmHg, mL, mL/s: what an error is relative to
)

// unknowns sets which places are unknown.
func (s *shooter) unknowns(fill bool) {
	before := len(s.active)
	s.active = append(s.active[:0], vol, pc)
	if s.running {
		s.active = append(s.active, qp)
	}
	if s.parallel || s.series {
		s.active = append(s.active, qx)
	}
	if fill {
		s.active = append(s.active, out)
	}
	s.known = s.known && len(s.active) == before
}

// after is G: the state after a period, and the line at its mean flow.
func (s *shooter) after(z *vector) (vector, bool) {
	y := *z
	s.fill = z[out]
	total := 0.0
	for k := range s.window {
		s.since = float64(k) * s.heart.Period
		s.beats++
		if !s.beat(&y) {
			return y, false
		}
		total += y[out]
	}
	y[out] = s.line.At(total / (float64(s.window) * s.heart.Period))
	return y, finiteVector(&y)
}

// find looks for the periodic state from a start, on the filling line or, where
// that is false, at the filling pressure of the start.
func (s *shooter) find(z vector, onLine bool) orbit {
	s.beats = 0
	if !onLine {
		return s.settle(z)
	}
	s.unknowns(true)
	start := z
	if s.newton(&z) {
		return orbit{start: z, beats: s.beats, settled: true}
	}
	return s.bracket(start)
}

// settle looks for the periodic state at the filling pressure of the start.
func (s *shooter) settle(z vector) orbit {
	s.unknowns(false)
	for limit := s.beats + mostBeats; s.beats < limit; {
		if s.newton(&z) {
			return orbit{start: z, beats: s.beats, settled: true}
		}
		s.known = false
		for range 20 {
			y, ok := s.after(&z)
			if !ok {
				return orbit{start: z, beats: s.beats}
			}
			y[out] = z[out]
			z = y
		}
	}
	return orbit{start: z, beats: s.beats}
}

// bracket looks for the filling pressure on the line by halving its range: mean
// flow rises with filling pressure and the line falls with flow, so that there is
// one root. It is slow, and only for where Newton's method fails.
func (s *shooter) bracket(z vector) orbit {
	low, high := 0.0, s.line.Highest()
	var at orbit
	for high-low > closed*typicalSize {
		z[out] = (low + high) / 2
		if at = s.settle(z); !at.settled {
			return at
		}
		z = at.start
		if y, ok := s.after(&z); !ok || y[out] > z[out] {
			low = z[out]
		} else {
			high = z[out]
		}
	}
	at.beats = s.beats
	return at
}

// newton draws nearer to the periodic state until it is reached, or fails.
func (s *shooter) newton(z *vector) bool {
	y, ok := s.after(z)
	if !ok {
		return false
	}
	for range 25 {
		if !s.known && !s.differences(z, &y) {
			return false
		}
		move, ok := s.solve(z, &y)
		if !ok {
			return false
		}
		far := size(&move, z)
		to := s.moved(z, &move, 1)
		if far < closed {
			*z = to
			return true
		}
		there, ok := s.after(&to)
		if !ok {
			return false
		}
		if gap(&there, &to, s.active) > 0.5*gap(&y, z, s.active) {
			s.known = false
			if gap(&there, &to, s.active) > gap(&y, z, s.active) {
				to = s.moved(z, &move, 0.3)
				if there, ok = s.after(&to); !ok {
					return false
				}
			}
		} else {
			s.update(z, &to, &y, &there)
		}
		*z, y = to, there
	}
	return false
}

// moved is z + share move, with a filling pressure within the line.
func (s *shooter) moved(z, move *vector, share float64) vector {
	to := *z
	for _, k := range s.active {
		to[k] += share * move[k]
	}
	if s.series { // the valve does not leak
		to[qx] = max(0, to[qx])
	}
	if slices.Contains(s.active, out) {
		to[out] = min(max(0, to[out]), s.line.Highest())
	}
	return to
}

// differences fills the slopes of G at z, where G is y.
func (s *shooter) differences(z, y *vector) bool {
	for _, col := range s.active {
		step := nudge * (typicalSize + math.Abs(z[col]))
		at := *z
		at[col] += step
		there, ok := s.after(&at)
		if !ok {
			return false
		}
		for _, row := range s.active {
			s.slopes[row][col] = (there[row] - y[row]) / step
		}
	}
	s.known = true
	return true
}

// update is Broyden's: the slopes that explain the last move and differ least
// from the old ones, in relative units.
func (s *shooter) update(z, to, y, there *vector) {
	length := 0.0
	var unit vector
	for _, k := range s.active {
		unit[k] = typicalSize + math.Abs(z[k])
		length += square((to[k] - z[k]) / unit[k])
	}
	if length == 0 {
		return
	}
	for _, row := range s.active {
		miss := there[row] - y[row]
		for _, col := range s.active {
			miss -= s.slopes[row][col] * (to[col] - z[col])
		}
		for _, col := range s.active {
			s.slopes[row][col] += miss * (to[col] - z[col]) / square(unit[col]) / length
		}
	}
}

// solve gives the move of Newton's method: (1 - slopes) move = y - z, by
// elimination with pivoting.
func (s *shooter) solve(z, y *vector) (vector, bool) {
	n := len(s.active)
	a := &s.scratch
	var b vector
	for i, row := range s.active {
		for j, col := range s.active {
			a[i][j] = -s.slopes[row][col]
		}
		a[i][i]++
		b[i] = y[row] - z[row]
	}
	for i := range n {
		pivot := i
		for k := i + 1; k < n; k++ {
			if math.Abs(a[k][i]) > math.Abs(a[pivot][i]) {
				pivot = k
			}
		}
		if a[pivot][i] == 0 {
			return b, false
		}
		a[i], a[pivot] = a[pivot], a[i]
		b[i], b[pivot] = b[pivot], b[i]
		for k := i + 1; k < n; k++ {
			f := a[k][i] / a[i][i]
			for j := i; j < n; j++ {
				a[k][j] -= f * a[i][j]
			}
			b[k] -= f * b[i]
		}
	}
	var move vector
	for i := n - 1; i >= 0; i-- {
		x := b[i]
		for j := i + 1; j < n; j++ {
			x -= a[i][j] * move[s.active[j]]
		}
		move[s.active[i]] = x / a[i][i]
	}
	return move, finiteVector(&move)
}

// size is the largest part of a move, relative to z.
func size(move, z *vector) float64 {
	most := 0.0
	for k := range move {
		most = max(most, math.Abs(move[k])/(typicalSize+math.Abs(z[k])))
	}
	return most
}

// gap is how far G is from z.
func gap(y, z *vector, active []int) float64 {
	most := 0.0
	for _, k := range active {
		most = max(most, math.Abs(y[k]-z[k])/(typicalSize+math.Abs(z[k])))
	}
	return most
}

func finiteVector(y *vector) bool {
	for _, x := range y {
		if math.IsNaN(x) || math.IsInf(x, 0) {
			return false
		}
	}
	return true
}
