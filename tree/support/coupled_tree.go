package support

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/fitting"
	"afterbeat/tree"
)

// CoupledTree couples a ventricle and a pump to a tree of arteries, by waveform
// relaxation. The impedance of the tree is split into a wk3, which is integrated
// with heart and pump,
//
//	Zc = rho c/A of the root,  R = Z(0) - Zc,  C the total compliance
//
// and the rest, which adds to root pressure what it makes of the root flow of the
// round before, harmonics up to [restBand]. The split is that of the tree, not of
// a model that somebody fitted: with another Zc it would not settle while the
// valve is open.
type CoupledTree struct {
	*Coupled
	Network  tree.Network
	solver   *tree.Solver
	fourier  *fitting.Fourier
	beyond   []complex128 // impedance of the rest at harmonic k
	samples  int
	spectrum []complex128
	unused   []complex128
}

const (
	// restBand is the highest frequency of the rest, Hz.
	restBand = 200
	// restSamples is the least number of samples of a beat that a round reads.
	restSamples = 4096
	// firstRounds is after how many rounds the corrections are halved; mostRounds
	// after how many the search is given up.
	firstRounds, mostRounds = 12, 60
	// restStill and flowStill are the changes of root pressure, mmHg, and of mean
	// flow, relative, from one round to the next, below which a state is settled.
	restStill, flowStill = 1e-5, 1e-8
)

// NewCoupledTree checks a coupling to a tree. What c says of its load is not
// looked at. Errors are for a person to read; those of the tree are of type
// [*tree.SegmentError].
func NewCoupledTree(c Coupling, n tree.Network) (*CoupledTree, error) {
	load, err := tree.NewLoad(n)
	if err != nil {
		return nil, err
	}
	zc := load.CharacteristicImpedance()
	c.Load = Windkessel{
		Kind:            WK3,
		Values:          fitting.Values{R: load.Resistance() - zc, C: load.Compliance(), Zc: zc},
		OutflowPressure: n.OutflowPressure,
	}
	if !(c.Load.R > 0) || math.IsInf(c.Load.R, 1) {
		return nil, fmt.Errorf("a tree whose resistance is %.3g mmHg s/mL, and rho c/A of its root %.3g, cannot be coupled", load.Resistance(), zc)
	}
	// Without a slope the line needs no flow; that comes from the tree.
	level := c
	level.Filling.Slope, level.Filling.Flow = 0, 0
	k := &CoupledTree{Network: n}
	if k.Coupled, err = NewCoupled(level); err != nil {
		return nil, err
	}
	if err := k.plan(load); err != nil {
		return nil, err
	}
	known := true
	if c.Filling.Slope > 0 && math.IsNaN(c.Filling.Flow) {
		native, err := k.At(0)
		if err != nil {
			return nil, err
		}
		c.Filling.Flow, known = native.Flow(), native.Settled
	}
	rest := k.shooter.rest
	if k.Coupled, err = NewCoupled(c); err != nil {
		return nil, err
	}
	k.shooter.rest, k.lineKnown = rest, known
	return k, nil
}

// aboveBand is the power of the root flow last read at frequencies that the
// tree does not see, Zc |Q|², mmHg mL/s: less than a hundredth of a milliwatt. It
// is booked in the segments, where such waves fade.
func (k *CoupledTree) aboveBand() float64 {
	power := 0.0
	for _, q := range k.spectrum[len(k.beyond):] {
		power += 2 * k.Load.Zc * (real(q)*real(q) + imag(q)*imag(q))
	}
	return power
}

// plan prepares transforms, the solver of the tree and the rest.
func (k *CoupledTree) plan(load *tree.Load) error {
	period := k.Ventricle.Period
	harmonics := max(1, int(math.Floor(restBand*period)))
	k.samples = restSamples
	for k.samples < 8*harmonics {
		k.samples *= 2
	}
	var err error
	if k.solver, err = tree.NewSolver(k.Network, k.samples, harmonics); err != nil {
		return err
	}
	k.fourier = fitting.NewFourier(k.samples)
	k.spectrum, k.unused = make([]complex128, k.samples/2+1), make([]complex128, k.samples/2+1)
	k.beyond = make([]complex128, harmonics+1)
	w := k.Load
	for j := 1; j <= harmonics; j++ {
		omega := 2 * math.Pi * float64(j) / period
		k.beyond[j] = load.Impedance(omega) - complex(w.Zc, 0) - complex(w.R, 0)/complex(1, omega*w.R*w.C)
	}
	k.shooter.rest = newRest(period, harmonics)
	return nil
}

// CoupledTreeState is a [CoupledState] on a tree, and what it is in the tree. Its
// Energy has what is lost in segments and terminals in place of Zc and R.
type CoupledTreeState struct {
	CoupledState
	RootFlow data.Period // Qav + Qp, mL/s
	Tree     *tree.State // of the root flow up to [restBand]; until the next state is looked for
}

// At is the periodic state at a speed in 1000/min, as [Coupled.At].
func (k *CoupledTree) At(speed float64) (CoupledTreeState, error) {
	out := CoupledTreeState{}
	flow, pressure := make([]float64, k.samples), make([]float64, k.samples)
	before := make([]float64, k.samples)
	var o orbit
	beats, rounds, settled, lastMean := 0, 0, false, math.NaN()
	share := 1.0
	for rounds < mostRounds && !settled {
		var err error
		if o, err = k.orbitAt(speed); err != nil {
			return out, err
		}
		beats += o.beats
		if rounds++; rounds == firstRounds {
			share = 0.5
		}
		if !o.settled || k.shooter.lost {
			break
		}
		k.read(&o, flow, pressure)
		mean := k.relax(flow, share)
		change := 0.0
		for j, p := range pressure {
			change = max(change, math.Abs(p-before[j]))
		}
		copy(before, pressure)
		settled = rounds > 1 && change < restStill && math.Abs(mean-lastMean) < flowStill*max(1, math.Abs(mean))
		lastMean = mean
	}
	o.beats, o.settled = beats, settled && o.settled
	return k.describe(o, speed, rounds, flow)
}

// read fills the waves of an orbit.
func (k *CoupledTree) read(o *orbit, flow, pressure []float64) {
	s := &k.shooter
	y := o.start
	s.fill, s.tape = o.start[out], k.tape(flow, pressure)
	s.beat(&y)
	s.tape = nil
}

// tape reads root flow and root pressure, and leaves the other signals in room
// that nobody reads.
func (k *CoupledTree) tape(flow, pressure []float64) *tape {
	t := &tape{step: k.Ventricle.Period / float64(k.samples)}
	spare := make([]float64, k.samples)
	for i := range t.signals {
		t.signals[i] = spare
	}
	t.signals[sigRoot], t.signals[sigPao] = flow, pressure
	return t
}

// relax moves the rest towards what the root flow makes of it, by a share of the
// way, and returns the mean flow.
func (k *CoupledTree) relax(flow []float64, share float64) (mean float64) {
	k.fourier.Pair(k.spectrum, k.unused, flow, flow)
	r := k.shooter.rest
	for j := 1; j < len(k.beyond); j++ {
		r.amplitude[j] += complex(share, 0) * (2*k.beyond[j]*k.spectrum[j] - r.amplitude[j])
	}
	return real(k.spectrum[0])
}

// describe is the state of an orbit, with the tree under its root flow.
func (k *CoupledTree) describe(o orbit, speed float64, rounds int, flow []float64) (CoupledTreeState, error) {
	var b books
	if k.shooter.lost {
		b.void()
	} else {
		y := o.start
		k.shooter.fill = o.start[out]
		held := k.shooter.booked(&y, &b)
		o.settled = o.settled && held && k.shooter.cameBack(&y, &o.start)
	}
	state := CoupledTreeState{
		CoupledState: k.stateOf(o, speed, &b),
		RootFlow:     data.Period{Samples: flow, Rate: float64(k.samples) / k.Ventricle.Period},
	}
	state.Rounds = rounds
	// The samples have the mean of the continuous flow, which kinks at the valve.
	shift := state.Flow() - state.RootFlow.Mean()
	for j := range flow {
		flow[j] += shift
	}
	solved, err := k.solver.Solve(state.RootFlow)
	if err != nil {
		return state, err
	}
	state.Tree = solved
	e, period := &state.Energy, k.Ventricle.Period
	ledger := solved.Ledger()
	for name, into := range map[string]*float64{"segments": &e.Segments, "terminal R1": &e.TerminalR1, "terminal R2": &e.TerminalR2, "outflow": &e.Outflow} {
		term, _ := ledger.Term(name)
		*into = term.Total() * period
	}
	e.Segments += k.aboveBand() * period
	e.Zc, e.R = 0, 0
	state.Warnings = k.warnings(&state.CoupledState)
	return state, nil
}
