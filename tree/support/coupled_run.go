package support

import "math"

// run integrates the circuit, one beat after the other. It is one of a kind for
// one goroutine, and allocates nothing.
type run struct {
	*circuit
	drive
	tolerance float64
	mode      mode
	step      step
	dense     dense
	now       instant
	least     [3]float64 // of each margin, over the stages of a step
	most      [3]float64
	size      float64 // of the next step, s
	slack     float64 // see turn
	lost      bool    // a beat could not be followed to its end
	books     *books  // nil: nobody asks
	tape      *tape   // nil: nobody asks
}

// The fewest steps of a beat, so that no short event is stepped over; and the most
// steps and events of one beat: far more than a beat needs, so that one that
// passes them has no answer.
const (
	fewestSteps = 50
	mostSteps   = 200_000
	mostTurns   = 6 * manyTurns
)

var infinite = math.Inf(1)

// slope implements [system].
func (r *run) slope(_ int, t float64, y, dy *vector) {
	i := &r.now
	r.look(t, y, r.mode, &r.drive, i)
	q := i.qav + y[qp]
	dy[vol] = i.qmv - i.qav
	if !r.atrial {
		dy[vol] -= y[qp]
	}
	dy[pc] = (q - (y[pc]-r.pv)/r.r) / r.c
	dy[qp], dy[qx], dy[out] = i.dqp, i.dqx, q
	for e, margin := range &i.margin {
		r.least[e], r.most[e] = min(r.least[e], margin), max(r.most[e], margin)
	}
}

// beat carries a state over one beat, and tells whether it could.
func (r *run) beat(y *vector) bool {
	s := &r.step
	y[out] = 0
	s.t, s.start = 0, *y
	r.mode = r.modeAt(0, y, &r.drive)
	r.slope(0, 0, &s.start, &s.k[0])
	r.size, r.slack = r.heart.Period/2000, firstSlack
	steps, turns := 0, 0
	for s.t < r.heart.Period {
		corner := r.corner(s.t)
		s.h = min(r.size, corner-s.t)
		if steps++; steps > mostSteps || turns > mostTurns || !(s.h > 0) {
			r.lost = true
			return false
		}
		r.least, r.most = [3]float64{infinite, infinite, infinite}, [3]float64{-infinite, -infinite, -infinite}
		err := s.take(r, r.tolerance)
		if !(err <= 1) {
			if math.IsNaN(err) {
				err = math.Inf(1)
			}
			r.size = next(s.h, err)
			continue
		}
		size := min(next(s.h, err), r.heart.Period/fewestSteps)
		share, event := r.turn()
		if event < 0 {
			r.accept(s.t+s.h, corner)
			r.size = size
			continue
		}
		if turns++; turns%manyTurns == 0 {
			r.slack *= 10
		}
		if share > 0 {
			s.h *= share
			s.take(r, r.tolerance)
			r.accept(s.t+s.h, corner)
		}
		r.flip(event)
		r.size = min(size, r.size)
	}
	*y = s.start
	return true
}

// booked is a beat with books, integrated more finely: what is added up over it
// is then good to the tolerance.
func (r *run) booked(y *vector, b *books) bool {
	b.begin()
	tolerance := r.tolerance
	r.books, r.tolerance = b, tolerance/100
	ok := r.beat(y)
	r.books, r.tolerance = nil, tolerance
	return ok && finiteVector(y)
}

// corner is the next time after t at which a given function of time is bent:
// the elastance, the speed, or the end of the beat.
func (r *run) corner(t float64) float64 {
	near := 1e-12 * r.heart.Period
	end := r.heart.Period
	for _, at := range r.corners {
		if at > t+near {
			end = min(end, at)
		}
	}
	if r.modulation != nil {
		end = min(end, r.modulation.next(r.since+t+near)-r.since)
	}
	return end
}

// accept ends a step and begins the next one where it ends.
func (r *run) accept(end, corner float64) {
	s := &r.step
	if r.books != nil {
		r.books.add(r)
	}
	if r.tape != nil {
		r.tape.add(r)
	}
	s.t = end
	if corner-end < 1e-12*r.heart.Period {
		s.t = corner
	}
	s.start, s.k[0] = s.end, s.k[6]
}
