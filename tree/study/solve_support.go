package study

import (
	"afterbeat/data"
	"afterbeat/tree"
	"afterbeat/tree/support"
)

// SolvedSupport is a given ventricle, load and pump in their periodic states:
// what `solve support` gives.
type SolvedSupport struct {
	Spec     SupportSpec
	File     string
	Coupling support.Coupling // with the flow of the filling line settled
	States   []support.CoupledState
	Network  tree.Network          // where the load is a tree
	Trees    []TreeState           // of the states, where the load is a tree
	Step     *support.StepResponse // nil where none was asked for
	Modular  *support.Modulated
	Warnings []data.Warning
}

// SolveSupport evaluates a spec. file is its name, for errors; read gives the
// bytes of the modulation by the name that the spec gives it.
func SolveSupport(file string, spec SupportSpec, read func(string) ([]byte, error)) (SolvedSupport, error) {
	out := SolvedSupport{Spec: spec, File: file}
	if spec.Tree != "" {
		err := out.solveOnTree(read)
		return out, err
	}
	coupling, err := spec.Coupling()
	if err != nil {
		return out, err
	}
	if err := spec.asked(); err != nil {
		return out, err
	}
	k, err := support.NewCoupled(coupling)
	if err != nil {
		return out, &data.FileError{File: file, What: err.Error()}
	}
	out.Coupling = k.Coupling
	if out.States, err = k.Sweep(spec.Speeds); err != nil {
		return out, spec.refuse("", "speeds", "%v", err)
	}
	for _, s := range out.States {
		out.Warnings = append(out.Warnings, s.Warnings...)
	}
	if err := out.follow(k); err != nil {
		return out, err
	}
	return out, out.modulate(k, read)
}

// asked tells whether the spec asks for anything.
func (s SupportSpec) asked() error {
	if len(s.Speeds) == 0 && s.Step == nil && s.Modulation == "" {
		return &data.FileError{File: s.file, What: "nothing is asked for", Hint: "add speeds = [0, 8, 9], a step or a modulation"}
	}
	return nil
}

// stepper is a coupling whose speed can change.
type stepper interface {
	Step(from, to float64, beats int) (support.StepResponse, error)
}

// follow answers for a step of speed.
func (s *SolvedSupport) follow(k stepper) error {
	step := s.Spec.Step
	switch {
	case step == nil:
		return nil
	case step.From == nil || step.To == nil || step.Beats == nil:
		return s.Spec.refuse("", "step", "a step needs from, to and beats")
	}
	r, err := k.Step(*step.From, *step.To, *step.Beats)
	if err != nil {
		return s.Spec.refuse("", "step", "%v", err)
	}
	if !r.Complete {
		s.unsettled("the step")
	}
	s.Step = &r
	return nil
}

// modulate answers for a speed that changes over time.
func (s *SolvedSupport) modulate(k *support.Coupled, read func(string) ([]byte, error)) error {
	name := s.Spec.Modulation
	switch {
	case name == "" && s.Spec.Locked != nil:
		return s.Spec.refuse("", "locked", "locked goes with a modulation, and there is none")
	case name == "":
		return nil
	case s.Spec.Locked == nil:
		return s.Spec.refuse("", "modulation", "a modulation needs locked: the beats of its period, or 0 where it is free")
	}
	content, err := read(name)
	if err != nil {
		return err
	}
	m, err := ReadModulation(name, content)
	if err != nil {
		return err
	}
	r, err := k.Modulate(m, *s.Spec.Locked)
	if err != nil {
		return s.Spec.refuse("", "modulation", "%v", err)
	}
	if !r.Settled {
		s.unsettled("the modulation")
	}
	s.Modular = &r
	return nil
}

func (s *SolvedSupport) unsettled(what string) {
	s.Warnings = append(s.Warnings, data.Warning{
		Code: data.CodeNotSettled, Text: "of " + what + " no periodic state was found",
		Cure: "do not use it; check the parameters for extreme values",
	})
}

// Reason is nil: what was asked for has an answer, or a warning.
func (s SolvedSupport) Reason() *string { return nil }
