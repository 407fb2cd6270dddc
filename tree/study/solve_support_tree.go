package study

import (
	"errors"

	"afterbeat/data"
	"afterbeat/tree"
	"afterbeat/tree/support"
)

// solveOnTree evaluates a spec whose load is a tree.
func (s *SolvedSupport) solveOnTree(read func(string) ([]byte, error)) error {
	coupling, err := s.Spec.treeCoupling()
	if err != nil {
		return err
	}
	if err := s.Spec.asked(); err != nil {
		return err
	}
	given := TreeSpec{Table: s.Spec.Tree, Density: s.Spec.Density, Viscosity: s.Spec.Viscosity, file: s.File, lines: s.Spec.lines}
	if s.Spec.OutflowPressure != nil {
		given.OutflowPressure = *s.Spec.OutflowPressure
	}
	if s.Network, err = given.network(read); err != nil {
		return err
	}
	k, err := support.NewCoupledTree(coupling, s.Network)
	if err != nil {
		return s.treeError(err)
	}
	s.Coupling = k.Coupling
	for _, speed := range s.Spec.Speeds {
		state, err := k.At(speed)
		if err != nil {
			return s.Spec.refuse("", "speeds", "%v", err)
		}
		s.States = append(s.States, state.CoupledState)
		s.Trees = append(s.Trees, treeState(state.Tree, len(s.Network.Segments)))
		s.Warnings = append(s.Warnings, state.Warnings...)
	}
	return s.follow(k)
}

// treeError puts the name of the table to an error about the tree, that of the
// spec to others.
func (s *SolvedSupport) treeError(err error) error {
	var fault *tree.SegmentError
	if errors.As(err, &fault) {
		return &data.FileError{File: s.Spec.Tree, What: err.Error(), Hint: fault.Hint}
	}
	return &data.FileError{File: s.File, What: err.Error()}
}
