package study

import (
	"errors"
	"math"

	"afterbeat/data"
	"afterbeat/tree"
	"afterbeat/tree/energy"
)

// SolvedTree is a given tree under a given flow: what `solve tree` gives.
type SolvedTree struct {
	Spec       TreeSpec
	File       string
	Network    tree.Network
	Harmonics  int
	Inflow     data.Period
	Frequency  []float64    // Hz, from the first harmonic
	Impedance  []complex128 // at the root, mmHg s/mL
	Resistance float64      // mmHg s/mL; +Inf where every way is closed
	Compliance float64      // mL/mmHg
	Pulsing    TreeState
	Steady     *TreeState     // nil where not asked for
	Response   *tree.Response // nil where not asked for, or where a bed does not settle
	Warnings   []data.Warning
}

// TreeState is pressure, flow and loss of every segment, in the order of the
// table.
type TreeState struct {
	Segments []SegmentState
	Power    energy.Power // into the root
	Ledger   energy.Ledger
}

// SegmentState is one segment of a state.
type SegmentState struct {
	InletPressure, InletFlow   tree.Range
	OutletPressure, OutletFlow tree.Range
	Loss                       tree.Loss
	Shear                      tree.Shear
}

// SolveTree evaluates a spec. file is its name, for errors; read gives the bytes
// of table and inflow by the names that the spec gives them.
func SolveTree(file string, spec TreeSpec, read func(string) ([]byte, error)) (SolvedTree, error) {
	out := SolvedTree{Spec: spec, File: file}
	var err error
	if out.Network, err = spec.network(read); err != nil {
		return out, err
	}
	if spec.Inflow == "" {
		return out, spec.refuse("inflow", "name a file with the columns time_s,flow_mL_s", "inflow is missing")
	}
	content, err := read(spec.Inflow)
	if err != nil {
		return out, err
	}
	if out.Inflow, err = ReadPeriod(spec.Inflow, content); err != nil {
		return out, err
	}
	if out.Harmonics, err = spec.harmonics(len(out.Inflow.Samples)); err != nil {
		return out, err
	}
	err = out.solve()
	return out, err
}

func (s *SolvedTree) solve() error {
	load, err := tree.NewLoad(s.Network)
	if err != nil {
		return s.inTable(err)
	}
	s.Resistance, s.Compliance = load.Resistance(), load.Compliance()
	solver, err := tree.NewSolver(s.Network, len(s.Inflow.Samples), s.Harmonics)
	if err != nil {
		return s.inTable(err)
	}
	state, err := solver.Solve(s.Inflow)
	if err != nil {
		return s.inTable(err)
	}
	for k := 1; k <= s.Harmonics; k++ {
		s.Frequency = append(s.Frequency, state.Frequency(k))
		s.Impedance = append(s.Impedance, state.RootImpedance(k))
	}
	s.Pulsing = treeState(state, len(s.Network.Segments))
	s.checkBalance(s.Pulsing)
	if s.Spec.Steady {
		if err := s.solveSteady(); err != nil {
			return err
		}
	}
	if s.Spec.Response {
		s.respond()
	}
	return nil
}

// solveSteady answers for the same mean flow, steady.
func (s *SolvedTree) solveSteady() error {
	solver, err := tree.NewSolver(s.Network, 1, 0)
	if err != nil {
		return s.inTable(err)
	}
	state, err := solver.Solve(data.Period{Samples: []float64{s.Inflow.Mean()}, Rate: 1 / s.Inflow.Duration()})
	if err != nil {
		return s.inTable(err)
	}
	steady := treeState(state, len(s.Network.Segments))
	s.Steady = &steady
	s.checkBalance(steady)
	return nil
}

func (s *SolvedTree) respond() {
	r, err := tree.Respond(s.Network)
	if err != nil {
		s.Warnings = append(s.Warnings, data.Warning{
			Code: data.CodeNotSettled, Text: "no response to a step: " + err.Error(), Cure: "look for a resistance or a compliance that is far too large",
		})
		return
	}
	s.Response = &r
}

// checkBalance warns where the ledger does not close. Where mean pressure has no
// value, or nothing goes in, there is none.
func (s *SolvedTree) checkBalance(state TreeState) {
	if !math.IsNaN(state.Ledger.Balance()) {
		s.Warnings = append(s.Warnings, state.Ledger.Warnings()...)
	}
}

// inTable puts the table's name to an error about the tree.
func (s *SolvedTree) inTable(err error) error {
	e := &data.FileError{File: s.Spec.Table, What: err.Error()}
	var fault *tree.SegmentError
	if errors.As(err, &fault) {
		e.Hint = fault.Hint
	}
	return e
}

func treeState(state *tree.State, segments int) TreeState {
	out := TreeState{Segments: make([]SegmentState, segments), Power: state.Power(), Ledger: state.Ledger()}
	for i := range out.Segments {
		s := &out.Segments[i]
		s.InletPressure, s.InletFlow = state.Ranges(i, tree.Inlet)
		s.OutletPressure, s.OutletFlow = state.Ranges(i, tree.Outlet)
		s.Loss, s.Shear = state.Loss(i), state.Shear(i)
	}
	return out
}

// Reason is nil: a tree that could be evaluated has an answer.
func (s SolvedTree) Reason() *string { return nil }
