package anatomy

import (
	"errors"
	"math"
	"math/cmplx"

	"afterbeat/data"
	"afterbeat/data/unit"
	"afterbeat/tree"
)

// Trace is an average beat that the tree is held against.
type Trace struct {
	Name     data.Text // of its channel
	Site     data.Site
	Quantity unit.Quantity // pressure; velocity and flow are compared over their means
	Beat     data.Period
	// HeldOut leaves the trace out of the refinement: it tests the tree.
	HeldOut bool
}

// Measurement is what a tree is refined against.
type Measurement struct {
	Flow     data.Period // at the root, mL/s
	Pressure Trace       // its level counts; those of Distal do not
	Distal   []Trace
	// Left are the same beats with one block of them left out in turn.
	Left   []Pair
	Errors Errors
}

// Pair is flow at the root and pressure over the same average beat.
type Pair struct{ Flow, Pressure data.Period }

// Errors are 95 % half-widths of systematic errors.
type Errors struct {
	Flow, PressureScale float64 // relative
	PressureOffset      float64 // mmHg
	Delay               float64 // s
	OutflowPressure     float64 // mmHg
}

// The limits of what is compared.
const (
	highest       = 25.0 // Hz
	mostCounted   = 10   // harmonics that count as independent
	carries       = 0.01 // of the largest harmonic, from which one carries the trace
	pressureFloor = 1.0  // mmHg: no such tree is truer
	shapeFloor    = 0.05 // of the mean, the same for a flow
)

// aim is a trace with where it lies, as it enters the sum of squares.
type aim struct {
	Trace
	at       Place
	spectrum []complex128 // 0 .. harmonics, over the mean where shape
	weight   []float64    // of each harmonic, by Parseval
	level    bool         // the mean counts
	counted  float64      // 2H + 1
	s        float64      // accuracy, mmHg or of the mean
	floor    float64
}

// IsPressure tells whether the trace is one of pressure.
func (t Trace) IsPressure() bool { return t.Quantity == unit.Pressure }

// newAim makes a trace ready.
func newAim(t Trace, at Place, harmonics int, level bool) aim {
	x := t.Beat.Spectrum()
	a := aim{Trace: t, at: at, level: level, floor: pressureFloor, spectrum: x[:harmonics+1], weight: make([]float64, harmonics+1)}
	largest := 0.0
	for k := 1; k <= harmonics; k++ {
		largest = max(largest, cmplx.Abs(x[k]))
	}
	h := 0
	for k := range a.weight {
		a.weight[k] = data.Weight(k, len(t.Beat.Samples))
		if k > 0 && cmplx.Abs(x[k]) >= carries*largest {
			h++
		}
	}
	if !t.IsPressure() {
		a.floor = shapeFloor
		a.spectrum = overMean(a.spectrum)
	}
	if !level {
		a.weight[0] = 0
	}
	a.counted, a.s = float64(2*min(h, mostCounted)+1), a.floor
	return a
}

// overMean is a spectrum over its mean.
func overMean(x []complex128) []complex128 {
	out := make([]complex128, len(x))
	for k, v := range x {
		out[k] = v / x[0]
	}
	return out
}

// factor on the differences of harmonic k.
func (a aim) scale(k int) float64 { return math.Sqrt(a.weight[k]*a.counted) / a.s }

// differences writes the weighted differences of harmonics, real and imaginary.
func (a aim) differences(out []float64, predicted []complex128) {
	for k, p := range predicted {
		d := (p - a.spectrum[k]) * complex(a.scale(k), 0)
		out[2*k], out[2*k+1] = real(d), imag(d)
	}
}

// refinement is a tree being held against a measurement.
type refinement struct {
	tree      Tree
	factors   []factor
	flow      []complex128 // at the root, 0 .. harmonics
	omega     []float64
	aims      []aim // those that count
	held      []aim
	work      tree.Network
	transfers *transfers
	failed    error
}

// newRefinement finds the places of the traces and the factors they speak of.
func newRefinement(t Tree, m Measurement) (*refinement, error) {
	harmonics := min(int(highest*m.Flow.Duration()), (len(m.Flow.Samples)-1)/2)
	if harmonics < 1 {
		return nil, errors.New("too few samples in a beat")
	}
	r := &refinement{tree: t, factors: t.factors(), work: t.Network.Clone()}
	r.flow = m.Flow.Spectrum()[:harmonics+1]
	for k := range r.flow {
		r.omega = append(r.omega, m.Flow.Omega(k))
	}
	at, ok := Find(t.Network, m.Pressure.Site)
	if !ok {
		return nil, errors.New("the tree has no segment for the site of the pressure, " + string(m.Pressure.Site))
	}
	r.aims = append(r.aims, newAim(m.Pressure, at, harmonics, true))
	regions := map[Region]bool{}
	for _, d := range m.Distal {
		at, ok := Find(t.Network, d.Site)
		if !ok {
			continue
		}
		a := newAim(d, at, harmonics, false)
		if d.HeldOut {
			r.held = append(r.held, a)
			continue
		}
		r.aims = append(r.aims, a)
		region := sites[d.Site].region
		if !regions[region] {
			regions[region] = true
			if f := t.regional(region, at); len(f.on) > 0 {
				r.factors = append(r.factors, f)
			}
		}
	}
	var err error
	r.transfers, err = newTransfers(t.Network, m.Flow, harmonics, append(append([]aim(nil), r.aims...), r.held...))
	return r, err
}

// predicted is the spectrum of aim j in the tree last solved.
func (r *refinement) predicted(j int, a aim, flow []complex128) []complex128 {
	out := make([]complex128, len(flow))
	for k, q := range flow {
		out[k] = r.transfers.of(j, k) * q
	}
	if a.IsPressure() {
		out[0] += complex(r.tree.Network.OutflowPressure, 0)
		return out
	}
	return overMean(out)
}

// residuals of the aims and of the factors' doubts.
func (r *refinement) residuals(out, theta []float64) {
	r.tree.apply(&r.work, r.factors, theta)
	if err := r.transfers.solve(r.work); err != nil {
		r.failed = err
		for i := range out {
			out[i] = math.NaN()
		}
		return
	}
	next := 0
	for j, a := range r.aims {
		a.differences(out[next:], r.predicted(j, a, r.flow))
		next += 2 * len(r.flow)
	}
	for k, f := range r.factors {
		out[next+k] = theta[k] / f.doubt
	}
}

// rounds is how often the accuracy of the traces is taken from what is left.
const rounds = 4

// search minimises, and takes the accuracy s of each trace from what is left.
func (r *refinement) search() (solution, error) {
	p := problem{n: len(r.factors), m: 2*len(r.aims)*len(r.flow) + len(r.factors), residual: r.residuals}
	theta, evaluations := make([]float64, p.n), 0
	var s solution
	for range rounds {
		s = p.minimise(theta)
		evaluations += s.evaluations
		s.evaluations, theta = evaluations, s.theta
		if r.failed != nil {
			return s, r.failed
		}
		if !r.sharpen(s) {
			break
		}
	}
	r.residuals(s.residual, s.theta)
	return s, r.failed
}

// sharpen takes s from the residuals; false where it hardly changes.
func (r *refinement) sharpen(s solution) bool {
	changed := false
	for j := range r.aims {
		a := &r.aims[j]
		left := squares(s.residual[2*j*len(r.flow):2*(j+1)*len(r.flow)]) / a.counted // of (MSE/s²)
		free := a.counted / max(1, a.counted-float64(len(r.factors)))
		now := max(a.floor, a.s*math.Sqrt(left*free))
		if math.Abs(now/a.s-1) > 0.02 {
			changed = true
		}
		a.s = now
	}
	return changed
}
