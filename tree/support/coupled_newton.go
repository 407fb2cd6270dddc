package support

import (
	"math"
	"slices"
)

// newton draws nearer to the periodic state until it is reached, or fails.
func (s *shooter) newton(z *vector) bool {
	y, ok := s.after(z)
	for range 25 {
		if !ok {
			return false
		}
		if gap(&y, z, s.active) < still {
			return true
		}
		if !s.known && !s.differences(z, &y) {
			return false
		}
		move := s.solve(z, &y)
		to := s.moved(z, &move, 1)
		if size(&move, z) < closed {
			if gap(&y, z, s.active) < 100*closed {
				*z = to
				return true
			}
			s.known = false // the slopes tell of no way out: they are wrong
			continue
		}
		y, ok = s.follow(z, &to, &y)
		if !ok || gap(&y, &to, s.active) <= s.worst {
			*z = to
			continue
		}
		to = s.moved(z, &move, shorter)
		y, ok = s.after(&to)
		*z = to
	}
	return false
}

// follow evaluates G at the place that a move led to, and learns its slopes from
// it where the move did well: where it left less than half of the gap.
func (s *shooter) follow(z, to, y *vector) (vector, bool) {
	there, ok := s.after(to)
	if !ok {
		return there, false
	}
	s.worst = gap(y, z, s.active)
	if gap(&there, to, s.active) < s.worst/2 {
		s.update(z, to, y, &there)
	} else {
		s.known = false
	}
	return there, true
}

// moved is z + share move, with a filling pressure within the line.
func (s *shooter) moved(z, move *vector, share float64) vector {
	to := *z
	for _, k := range s.active {
		to[k] += share * move[k]
	}
	if s.series && s.heart.Rar == 0 { // the valve does not leak
		to[qx] = max(0, to[qx])
	}
	if slices.Contains(s.active, out) {
		to[out] = min(max(s.line.Lowest(), to[out]), s.line.Highest())
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

// solve gives the move of Newton's method, (1 - slopes) move = y - z, by
// elimination with pivoting. In a direction in which G leaves everything as it
// is, as it does the volume of a ventricle whose valves stay shut, there is no
// move.
func (s *shooter) solve(z, y *vector) vector {
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
		a[i], a[pivot] = a[pivot], a[i]
		b[i], b[pivot] = b[pivot], b[i]
		if math.Abs(a[i][i]) < flat {
			a[i], b[i] = vector{}, 0
			a[i][i] = 1
		}
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
	return move
}

// stable tells whether a periodic state draws near what is near it, at its
// filling pressure: whether powers of the slopes of G vanish. A ventricle that
// stiffens and slackens can rock blood in a pump that resists little higher with
// every beat, and the periodic state is then one that nobody sees.
func (s *shooter) stable(z *vector) bool {
	if s.radius() < 0.9 {
		return true
	}
	y, ok := s.after(z)
	return ok && s.differences(z, &y) && s.radius() < 1.001
}

// radius is the size of the largest eigenvalue of the slopes of G, from the norm
// of their 64th power; those of the filling pressure apart.
func (s *shooter) radius() float64 {
	m := s.slopes
	states := s.active
	if states[len(states)-1] == out {
		states = states[:len(states)-1]
	}
	ln := 0.0
	for range 6 {
		var square [5]vector
		most := 0.0
		for _, i := range states {
			for _, j := range states {
				for _, k := range states {
					square[i][j] += m[i][k] * m[k][j]
				}
				most = max(most, math.Abs(square[i][j]))
			}
		}
		if most == 0 {
			return 0
		}
		for _, i := range states {
			for _, j := range states {
				m[i][j] = square[i][j] / most
			}
		}
		ln = 2*ln + math.Log(most)
	}
	return math.Exp(ln / 64)
}
