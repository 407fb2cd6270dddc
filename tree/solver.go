package tree

import (
	"fmt"
	"math/cmplx"
	"runtime"
	"sync"

	"afterbeat/data"
	"afterbeat/fitting"
)

// Solver computes periodic states of one network. It is made once for a network
// and a length of period; then neither [Solver.Solve] nor [Solver.Update]
// allocates, but for the start of workers where the tree is big. A Solver is not
// safe for concurrent use.
type Solver struct {
	tree      *compiled
	network   Network
	samples   int
	harmonics int
	fourier   *fitting.Fourier
	nodes     [][]node // one set a worker
	flow      []complex128
	unused    []complex128
	zero      []float64
	state     State
}

// manyPieces is the number of pieces times harmonics from which on the harmonics
// are shared out among cores; each comes out the same on any number of cores.
const manyPieces = 50_000

// NewSolver plans for periods of a number of samples and the harmonics 1 to
// harmonics; 0: all there are, (samples-1)/2 rounded down, which is also the
// most. The network is checked (see [Network.Check]) and copied.
func NewSolver(n Network, samples, harmonics int) (*Solver, error) {
	most := (samples - 1) / 2
	switch {
	case samples < 1:
		return nil, fmt.Errorf("a period needs samples")
	case harmonics == 0:
		harmonics = most
	case harmonics < 0 || harmonics > most:
		return nil, fmt.Errorf("%d samples carry 1 to %d harmonics, not %d", samples, most, harmonics)
	}
	n = n.Clone()
	c, err := compile(n)
	if err != nil {
		return nil, err
	}
	workers := 1
	if len(c.pieces)*harmonics >= manyPieces {
		workers = min(runtime.GOMAXPROCS(0), harmonics)
	}
	s := &Solver{
		tree: c, network: n, samples: samples, harmonics: harmonics,
		fourier: fitting.NewFourier(samples), nodes: make([][]node, workers),
		flow: make([]complex128, samples/2+1), unused: make([]complex128, samples/2+1), zero: make([]float64, samples),
	}
	for i := range s.nodes {
		s.nodes[i] = make([]node, len(c.pieces))
	}
	s.state.plan(s)
	return s, nil
}

// Update takes over other values for the same segments: ids and parents must be
// those of the network that the solver was made for, in the same order.
func (s *Solver) Update(n Network) error {
	if len(n.Segments) != len(s.network.Segments) {
		return fmt.Errorf("the tree has %d segments, the solver was made for %d", len(n.Segments), len(s.network.Segments))
	}
	if err := n.checkBlood(); err != nil {
		return err
	}
	for i := range n.Segments {
		seg, was := &n.Segments[i], &s.network.Segments[i]
		if seg.ID != was.ID || seg.Parent != was.Parent || (seg.Terminal == nil) != (was.Terminal == nil) {
			return n.fault(i, "", "is not where the solver was made for it")
		}
		if err := n.checkValues(i); err != nil {
			return err
		}
		terminal := was.Terminal
		*was = *seg
		if was.Terminal = terminal; terminal != nil {
			*terminal = *seg.Terminal
		}
	}
	segments := s.network.Segments
	s.network = n
	s.network.Segments = segments
	err := s.tree.fill(s.network)
	for i := range s.nodes {
		if len(s.nodes[i]) != len(s.tree.pieces) {
			s.nodes[i] = make([]node, len(s.tree.pieces))
		}
	}
	return err
}

// Solve computes the periodic state in which inflow, mL/s, enters the root. The
// harmonics above those planned for are left out. The state belongs to the
// solver and holds until the next call. It panics on an inflow of another length
// than planned for. An error tells that a tree without losses resonates.
func (s *Solver) Solve(inflow data.Period) (*State, error) {
	if len(inflow.Samples) != s.samples || !(inflow.Rate > 0) {
		panic("tree: the inflow does not have the samples that the solver was made for")
	}
	s.fourier.Pair(s.flow, s.unused, inflow.Samples, s.zero)
	s.state.begin(inflow.Rate, real(s.flow[0]))
	if len(s.nodes) == 1 {
		for k := 1; k <= s.harmonics; k++ {
			s.harmonic(k, s.nodes[0])
		}
	} else {
		s.share()
	}
	for k, z := range s.state.impedance {
		if cmplx.IsNaN(z) || cmplx.IsInf(z) || cmplx.IsNaN(s.state.at(k + 1)[0].pin) {
			return nil, fmt.Errorf("at harmonic %d the tree resonates without loss: give the blood a viscosity", k+1)
		}
	}
	return &s.state, nil
}

// share computes the harmonics with all workers, each taking every n-th.
func (s *Solver) share() {
	var wait sync.WaitGroup
	for i, nodes := range s.nodes {
		wait.Add(1)
		go func() {
			defer wait.Done()
			for k := 1 + i; k <= s.harmonics; k += len(s.nodes) {
				s.harmonic(k, nodes)
			}
		}()
	}
	wait.Wait()
}

// harmonic computes one harmonic.
func (s *Solver) harmonic(k int, nodes []node) {
	t := s.tree.harmonic(s.state.omega(k))
	z := invert(s.tree.up(t, nodes))
	s.state.impedance[k-1] = z
	s.tree.down(z*s.flow[k], nodes, s.state.at(k))
}
