package study

import (
	"context"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

// Study is everything computed for a case, as far as it has come: a stage that
// has not been computed is nil.
type Study struct {
	Inputs     Inputs
	Intake     *Intake
	Beats      *Beats
	Fit        *Fit
	Comparison *Comparison
}

// Stage names a stage of the work that is computed.
type Stage string

// The stages that [Study.Next] computes, in their order.
const (
	StageIntake  Stage = "intake"
	StageBeats   Stage = "beats"
	StageFit     Stage = "fit"
	StageSupport Stage = "support"
	StageDone    Stage = ""
)

// Pending is the stage that Next would compute; StageDone where none is left.
func (s Study) Pending() Stage {
	switch {
	case s.Intake == nil:
		return StageIntake
	case s.Beats == nil:
		return StageBeats
	case s.Fit == nil:
		return StageFit
	case s.Comparison == nil:
		return StageSupport
	}
	return StageDone
}

// Next computes the pending stage. The Study given is not changed.
func (s Study) Next(ctx context.Context) (Study, error) {
	switch s.Pending() {
	case StageIntake:
		t, err := TakeIn(s.Inputs)
		s.Intake = &t
		return s, err
	case StageBeats:
		b, err := FindBeats(ctx, *s.Intake)
		s.Beats = &b
		return s, err
	case StageFit:
		f, err := FitLoad(ctx, *s.Beats)
		s.Fit = &f
		return s, err
	case StageSupport:
		c, err := Compare(ctx, *s.Fit)
		s.Comparison = &c
		return s, err
	}
	return s, nil
}

// Run computes a study up to and with the stage last; StageDone for all.
func Run(ctx context.Context, in Inputs, last Stage) (Study, error) {
	s := Study{Inputs: in}
	for s.Pending() != StageDone {
		stage := s.Pending()
		if err := ctx.Err(); err != nil {
			return s, err
		}
		var err error
		if s, err = s.Next(ctx); err != nil || stage == last {
			return s, err
		}
	}
	return s, nil
}

// With is the study after a change of the case: the stages that the change
// bears on are to be computed again, the others stay.
func (s Study) With(c casefile.Case) Study {
	before := s.Inputs.Case
	s.Inputs.Case = c
	switch firstTouched(before, c) {
	case StageIntake:
		return Study{Inputs: s.Inputs}
	case StageFit:
		s.Fit, s.Comparison = nil, nil
	case StageSupport:
		s.Comparison = nil
	}
	return s
}

// Warnings are those of all stages computed, each once, in the order of the work.
func (s Study) Warnings() []data.Warning {
	var all []data.Warning
	if s.Beats != nil {
		all = append(all, s.Beats.AllWarnings()...)
	}
	if s.Fit != nil {
		all = append(all, s.Fit.Warnings...)
	}
	if s.Comparison != nil {
		all = append(all, s.Comparison.Warnings...)
	}
	return once(all)
}

// once keeps the first of warnings that say the same.
func once(all []data.Warning) []data.Warning {
	seen := map[data.Warning]bool{}
	var out []data.Warning
	for _, w := range all {
		if !seen[w] {
			seen[w] = true
			out = append(out, w)
		}
	}
	return out
}
