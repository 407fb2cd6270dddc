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
	Tree       *Tree
	Comparison *Comparison
	Forecast   *Forecast
}

// Stage names a stage of the work that is computed.
type Stage string

// The stages that [Study.Next] computes, in their order.
const (
	StageIntake   Stage = "intake"
	StageBeats    Stage = "beats"
	StageFit      Stage = "fit"
	StageTree     Stage = "tree"
	StageSupport  Stage = "support"  // the yardsticks
	StageForecast Stage = "forecast" // ventricle, pump and load
	StageDone     Stage = ""
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
	case s.Tree == nil:
		return StageTree
	case s.Comparison == nil:
		return StageSupport
	case s.Forecast == nil:
		return StageForecast
	}
	return StageDone
}

// Next computes the pending stage. The Study given is not changed; where the
// stage gives an error, it is returned as it was.
func (s Study) Next(ctx context.Context) (Study, error) {
	next, err := s, error(nil)
	switch s.Pending() {
	case StageIntake:
		next.Intake, err = pointer(TakeIn(s.Inputs))
	case StageBeats:
		next.Beats, err = pointer(FindBeats(ctx, *s.Intake))
	case StageFit:
		next.Fit, err = pointer(FitLoad(ctx, *s.Beats))
	case StageTree:
		next.Tree, err = pointer(GrowTree(ctx, *s.Fit))
		if err == nil && s.Forecast != nil { // nothing after it is computed any more
			next.Tree, err = pointer(next.Tree.WithResponse(ctx))
		}
	case StageSupport:
		next.Comparison, err = pointer(Compare(ctx, *s.Fit))
	case StageForecast:
		next.Forecast, err = pointer(Predict(ctx, *s.Comparison))
		if err == nil {
			next.Tree, err = pointer(s.Tree.WithResponse(ctx))
		}
	}
	if err != nil {
		return s, err
	}
	return next, nil
}

func pointer[T any](v T, err error) (*T, error) { return &v, err }

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
// bears on are to be computed again, the others stay, and speak of the case as
// it is now. Files are not read again: where the change names others, or says
// otherwise how they are read, [Read] them and begin anew.
func (s Study) With(c casefile.Case) Study {
	touched := firstTouched(s.Inputs.Case, c)
	beside := firstTouched(withoutTree(s.Inputs.Case), withoutTree(c)) // what is not of the tree
	aged := ageOf(s.Inputs.Case) != ageOf(c)                           // of the tree and of the forecast
	s.Inputs.Case = c
	if touched == StageIntake {
		return Study{Inputs: s.Inputs}
	}
	if touched == StageFit {
		s.Fit = nil
	}
	if touched == StageFit || touched == StageTree {
		s.Tree = nil
	}
	if beside == StageFit || beside == StageSupport {
		s.Comparison = nil
	}
	if beside != StageDone || aged {
		s.Forecast = nil
	}
	return s.carrying()
}

// carrying is the study with the case of its inputs in every stage: each holds
// those before it.
func (s Study) carrying() Study {
	if s.Intake != nil {
		t := *s.Intake
		t.Case = s.Inputs.Case
		s.Intake = &t
	}
	if s.Beats != nil {
		b := *s.Beats
		b.Intake = *s.Intake
		s.Beats = &b
	}
	if s.Fit != nil {
		f := *s.Fit
		f.Beats = *s.Beats
		s.Fit = &f
	}
	if s.Tree != nil {
		t := *s.Tree
		t.Fit = *s.Fit
		s.Tree = &t
	}
	if s.Comparison != nil {
		k := *s.Comparison
		k.Fit = *s.Fit
		s.Comparison = &k
	}
	if s.Forecast != nil {
		f := *s.Forecast
		f.Comparison = *s.Comparison
		s.Forecast = &f
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
	if s.Tree != nil {
		all = append(all, s.Tree.Warnings...)
	}
	if s.Comparison != nil {
		all = append(all, s.Comparison.Warnings...)
	}
	if s.Forecast != nil {
		all = append(all, s.Forecast.Warnings...)
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
