package support

import "math"

// orbit is a periodic state: what it begins with, in the places of [vector],
// and its filling pressure in the place [out].
type orbit struct {
	start   vector
	beats   int // integrated to find it
	settled bool
	missed  bool // settled, but what was to be matched is not
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
	line    aim
	window  int // beats of a period
	active  []int
	slopes  [5]vector // of G: row, column
	known   bool      // whether slopes holds any
	beats   int
	worst   float64 // gap before a move
	scratch [5]vector
}

const (
	// closed is how near to the periodic state a start must be, relative.
	closed = 1e-8
	// still is the gap of a state that does not change: where any is periodic, as
	// the volume of a ventricle whose valves stay shut, no move can be told.
	still = 1e-10
	// flat is a slope of G - z that is as good as none.
	flat = 1e-10
	// shorter is the part of a move that is tried where the whole does no good.
	shorter     = 0.3
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

// impose gives the circuit the filling pressure, and where it is matched the
// resistance, that the last place of a start stands for.
func (s *shooter) impose(z *vector) { s.fill, s.r = s.line.Impose(z[out]) }

// after is G: the state after a period, and what its mean flow makes of the last
// place.
func (s *shooter) after(z *vector) (vector, bool) {
	y := *z
	s.impose(z)
	total := 0.0
	for k := range s.window {
		s.since = float64(k) * s.heart.Period
		s.beats++
		if !s.beat(&y) {
			return y, false
		}
		total += y[out]
	}
	y[out] = s.line.Next(z[out], total/(float64(s.window)*s.heart.Period))
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
		return orbit{start: z, beats: s.beats, settled: s.stable(&z)}
	}
	if s.lost {
		return orbit{start: z, beats: s.beats}
	}
	return s.bracket(start)
}

// settle looks for the periodic state at the filling pressure of the start. The
// beats of the orbit are all since find.
func (s *shooter) settle(z vector) orbit {
	s.unknowns(false)
	for limit := s.beats + mostBeats; s.beats < limit; {
		if s.newton(&z) {
			return orbit{start: z, beats: s.beats, settled: s.stable(&z)}
		}
		if s.lost {
			break
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

// bracket looks for the last place by halving its range: mean flow rises with
// filling pressure and the line falls with flow, so that there is one root; of an
// aim that cannot be met there is none. It is slow, and only for where Newton's
// method fails.
func (s *shooter) bracket(z vector) orbit {
	low, high := s.line.Lowest(), s.line.Highest()
	for _, end := range []float64{low, high} {
		z[out] = end
		at := s.settle(z)
		if y, ok := s.after(&at.start); at.settled && ok && (y[out]-end)*(end-(low+high)/2) > 0 {
			at.missed = true
			return at
		}
	}
	for {
		z[out] = (low + high) / 2
		at := s.settle(z)
		if !at.settled {
			return at
		}
		if high-low < closed*typicalSize {
			return at
		}
		z = at.start
		if y, ok := s.after(&z); !ok || y[out] > z[out] {
			low = z[out]
		} else {
			high = z[out]
		}
	}
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

// cameBack tells whether a beat or a window ended where it began, the integral
// and the filling pressure apart.
func (s *shooter) cameBack(y, start *vector) bool {
	end := *y
	end[out] = start[out]
	return gap(&end, start, s.active) < 100*closed
}

func finiteVector(y *vector) bool {
	for _, x := range y {
		if math.IsNaN(x) || math.IsInf(x, 0) {
			return false
		}
	}
	return true
}
