package support

import (
	"errors"
	"fmt"
	"math"

	"afterbeat/tree/heart"
)

// Ejection is what a ventricle does natively, pump absent: what a set-up meets.
type Ejection struct {
	StrokeVolume float64 // net, mL
	Time         float64 // that the aortic valve is open, s
	EndDiastolic float64 // the largest volume, mL
	// Relaxation is Tr/Tes; 0: [DefaultRelaxation]. Tr ends with the beat at the
	// latest.
	Relaxation float64
}

// ErrNotMet is that no ventricle of a [Coupling] ejects as asked.
var ErrNotMet = errors.New("no ventricle ejects as asked")

const (
	// DefaultRelaxation is Tr/Tes of a ventricle that is set up (an assumption).
	DefaultRelaxation = 0.5
	// met is how near a set-up comes to what is asked, relative.
	met = 1e-6
	// leastLeft is what a set-up leaves in the ventricle above V0, mL.
	leastLeft = nearV0
)

// SetUp finds the ventricle that, with the load, V0, the valves and the filling
// pressure of c and without a pump, ejects as asked: Emax, Emin and Tes of a
// [heart.Cosine] with Tr = Relaxation Tes. The filling line is laid through that state.
// What c has of these is not looked at.
//
// Three unknowns for three conditions: at the end of ejection pressure is
// Emax (EDV - SV - V0), before contraction Emin (EDV - V0) comes near Pfill, and
// Tes makes the ejection long or short. They are found together with the
// periodic state, by Newton's method on the start of the beat. The error is
// [ErrNotMet], with the reason, where there is none.
func SetUp(c Coupling, e Ejection) (Coupling, error) {
	left := e.EndDiastolic - e.StrokeVolume - c.Ventricle.V0
	switch {
	case !(e.StrokeVolume > 0):
		return c, fmt.Errorf("%w: the stroke volume of %.3g mL is not above 0", ErrNotMet, e.StrokeVolume)
	case !(left > leastLeft):
		return c, fmt.Errorf("%w: an end-diastolic volume of %.3g mL, less %.3g mL ejected, leaves less than V0 and %d mL", ErrNotMet, e.EndDiastolic, e.StrokeVolume, leastLeft)
	case !(e.Time > 0 && e.Time < c.Ventricle.Period):
		return c, fmt.Errorf("%w: an ejection of %.3g s does not fit in a period of %.3g s", ErrNotMet, e.Time, c.Ventricle.Period)
	}
	if c.Tolerance == 0 {
		c.Tolerance = DefaultTolerance
	}
	s := newSetUp(c, e)
	if !s.newton() {
		return c, fmt.Errorf("%w: stroke volume %.3g mL in %.3g s from %.3g mL", ErrNotMet, e.StrokeVolume, e.Time, e.EndDiastolic)
	}
	c.Ventricle = s.circuit.heart
	c.Filling.Flow = e.StrokeVolume / c.Ventricle.Period
	return c, firstOf(errors.Join(c.Ventricle.Check(), c.Load.check(math.Inf(-1))))
}

// The unknowns of a set-up: the start of the beat, and the ventricle.
const (
	startVol = iota
	startPc
	startQx // wk4p only
	lnEmax
	lnEmin
	endSystole
	setUpSize
)

// setUp looks for a ventricle and its periodic state together.
type setUp struct {
	run
	ejection Ejection
	active   []int
	x        [setUpSize]float64
	slopes   [setUpSize][setUpSize]float64
	books    books
}

func newSetUp(c Coupling, e Ejection) *setUp {
	v := c.Ventricle
	v.Activation = heart.Cosine
	if e.Relaxation == 0 {
		e.Relaxation = DefaultRelaxation
	}
	s := &setUp{ejection: e}
	c.Ventricle = v
	s.run = run{circuit: circuitOf(c), tolerance: c.Tolerance}
	s.drive = drive{fill: c.Filling.Pressure}
	s.run.books = &s.books
	flow := e.StrokeVolume / v.Period
	mean := s.pv + s.r*flow
	s.x = [setUpSize]float64{
		startVol: e.EndDiastolic, startPc: s.pv + 0.8*(mean-s.pv), startQx: flow,
		lnEmax: math.Log(mean / (e.EndDiastolic - e.StrokeVolume - v.V0)),
		lnEmin: math.Log(c.Filling.Pressure / (e.EndDiastolic - v.V0)),
		// Ejection begins well after contraction, and ends about Tes.
		endSystole: 1.4 * e.Time,
	}
	s.active = []int{startVol, startPc, lnEmax, lnEmin, endSystole}
	if s.parallel {
		s.active = append(s.active, startQx)
	}
	return s
}

// place gives the circuit the ventricle of x.
func (s *setUp) place(x *[setUpSize]float64) {
	h := &s.circuit.heart
	h.Emax, h.Emin = math.Exp(x[lnEmax]), math.Exp(x[lnEmin])
	h.Tes = x[endSystole]
	h.Tr = min(s.ejection.Relaxation*h.Tes, h.Period-h.Tes)
	s.circuit.corners = h.Corners()
}

// miss is by how much x misses the periodic state and what is asked, relative.
func (s *setUp) miss(x *[setUpSize]float64) (m [setUpSize]float64, ok bool) {
	if !(x[endSystole] > 0 && x[endSystole] < 0.95*s.heart.Period) || !(x[lnEmin] < x[lnEmax]) {
		return m, false
	}
	s.place(x)
	y := vector{vol: x[startVol], pc: x[startPc]}
	if s.parallel {
		y[qx] = x[startQx]
	}
	s.books.begin()
	if !s.beat(&y) || !finiteVector(&y) {
		return m, false
	}
	m = [setUpSize]float64{
		startVol: (y[vol] - x[startVol]) / 100, startPc: (y[pc] - x[startPc]) / 100, startQx: (y[qx] - x[startQx]) / 100,
		lnEmax:     y[out]/s.ejection.StrokeVolume - 1,
		lnEmin:     s.books.high[sigVolume]/s.ejection.EndDiastolic - 1,
		endSystole: s.books.open/s.ejection.Time - 1,
	}
	return m, true
}

// scales of the unknowns, for differences and steps.
var setUpScale = [setUpSize]float64{startVol: 100, startPc: 100, startQx: 100, lnEmax: 1, lnEmin: 1, endSystole: 0.3}

// newton draws nearer until what is asked is met, or fails: with slopes by
// differences at the start and where it gets on badly, and Broyden's updates in
// between (see [shooter]).
func (s *setUp) newton() bool {
	m, ok := s.miss(&s.x)
	known := false
	for round := 0; ok && round < 60; round++ {
		far := s.worst(&m)
		if far < met {
			s.place(&s.x)
			return true
		}
		if !known && !s.differences(&m) {
			return false
		}
		move, solved := s.solve(&m)
		if !solved {
			return false
		}
		before, was := s.x, m
		if m, ok = s.along(&move, far); !ok {
			if !known {
				return false
			}
			s.x, m, ok, known = before, was, true, false
			continue
		}
		known = s.worst(&m) < 0.3*far
		s.update(&before, &was, &m)
	}
	return false
}

// update is Broyden's: the slopes that explain the last move and differ least
// from the old ones, in the units of the scales.
func (s *setUp) update(before, was, m *[setUpSize]float64) {
	length := 0.0
	var along [setUpSize]float64
	for _, k := range s.active {
		along[k] = (s.x[k] - before[k]) / setUpScale[k]
		length += square(along[k])
	}
	if length == 0 {
		return
	}
	for _, row := range s.active {
		off := m[row] - was[row]
		for _, col := range s.active {
			off -= s.slopes[row][col] * along[col]
		}
		for _, col := range s.active {
			s.slopes[row][col] += off * along[col] / length
		}
	}
}

// along takes the move, or the part of it after which x misses by less.
func (s *setUp) along(move *[setUpSize]float64, far float64) (m [setUpSize]float64, ok bool) {
	share := 1.0
	for _, k := range s.active {
		if limit := 0.5 * setUpScale[k]; math.Abs(move[k]) > limit {
			share = min(share, limit/math.Abs(move[k]))
		}
	}
	for range 8 {
		to := s.x
		for _, k := range s.active {
			to[k] += share * move[k]
		}
		if m, ok = s.miss(&to); ok && s.worst(&m) < far {
			s.x = to
			return m, true
		}
		share /= 2
	}
	return m, false
}

// differences fills the slopes of the misses: row, column, in the units of the
// scales.
func (s *setUp) differences(m *[setUpSize]float64) bool {
	for _, col := range s.active {
		at := s.x
		at[col] += nudge * setUpScale[col]
		there, ok := s.miss(&at)
		if !ok {
			return false
		}
		for _, row := range s.active {
			s.slopes[row][col] = (there[row] - m[row]) / nudge
		}
	}
	return true
}

// solve gives the move that takes the misses away, by elimination with pivoting.
func (s *setUp) solve(m *[setUpSize]float64) (move [setUpSize]float64, ok bool) {
	n := len(s.active)
	var a [setUpSize][setUpSize + 1]float64
	for i, row := range s.active {
		for j, col := range s.active {
			a[i][j] = s.slopes[row][col]
		}
		a[i][n] = -m[row]
	}
	for i := range n {
		pivot := i
		for k := i + 1; k < n; k++ {
			if math.Abs(a[k][i]) > math.Abs(a[pivot][i]) {
				pivot = k
			}
		}
		a[i], a[pivot] = a[pivot], a[i]
		if a[i][i] == 0 {
			return move, false
		}
		for k := i + 1; k < n; k++ {
			f := a[k][i] / a[i][i]
			for j := i; j <= n; j++ {
				a[k][j] -= f * a[i][j]
			}
		}
	}
	var z [setUpSize]float64
	for i := n - 1; i >= 0; i-- {
		x := a[i][n]
		for j := i + 1; j < n; j++ {
			x -= a[i][j] * z[j]
		}
		z[i] = x / a[i][i]
		if math.IsNaN(z[i]) || math.IsInf(z[i], 0) {
			return move, false
		}
		move[s.active[i]] = z[i] * setUpScale[s.active[i]]
	}
	return move, true
}

// worst is the largest of the misses.
func (s *setUp) worst(m *[setUpSize]float64) float64 {
	most := 0.0
	for _, k := range s.active {
		most = max(most, math.Abs(m[k]))
	}
	return most
}
