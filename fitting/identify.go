package fitting

import (
	"fmt"
	"math"
	"slices"

	"afterbeat/data"
)

// judge decides which parameters the data determine, and adds the warnings and
// the criteria of choice.
func (f *beatFit) judge(r *Result) {
	f.identify(r)
	f.criteria(r)
	f.outflow(r)
	f.warn(r)
}

// identify decides which parameters the data determine.
func (f *fitted) identify(r *Result) {
	f.degenerate(r)
	for i, s := range f.model.Parameters() {
		p := &r.Parameters[i].Estimate
		doubtIf(p, f.undetermined(s))
		doubtIf(p, r.unsure(*p))
	}
	total := &r.TotalResistance
	if total.Value == 0 {
		doubtIf(total, onBound)
	}
	doubtIf(total, r.unsure(*total))
}

// degenerate marks the parameter of a fit that is another model in disguise.
func (f *fitted) degenerate(r *Result) {
	d, ok := f.model.Circuit.(interface {
		degenerate(v Values) (parameter, why string)
	})
	if !ok {
		return
	}
	name, why := d.degenerate(r.Values)
	for i := range r.Parameters {
		if r.Parameters[i].Name == name {
			doubtIf(&r.Parameters[i].Estimate, why)
		}
	}
}

// onBound is the reason of a parameter that a fit drives to 0.
const onBound = "it is 0, the end of its range"

// doubtIf keeps the first reason.
func doubtIf(e *data.Estimate, why string) {
	if why != "" && e.Identified {
		e.Identified, e.Why = false, why
	}
}

// unsure is what a value and its interval have against being identified; empty
// where they have nothing.
func (r *Result) unsure(e data.Estimate) string {
	switch {
	case !r.Converged || !finite(e.Value):
		return "the fit gave no number"
	case r.IntervalMethod == IntervalNone:
		return ""
	case !e.Random.Defined() || !e.Total.Defined():
		return "its replicates ended outside of numbers"
	case e.Random.Width() > math.Abs(e.Value):
		return fmt.Sprintf("its random interval is %.0f %% of it wide", 100*e.Random.Width()/math.Abs(e.Value))
	case e.Total.Width() > math.Abs(e.Value):
		return fmt.Sprintf("its interval is %.0f %% of it wide, systematic errors included", 100*e.Total.Width()/math.Abs(e.Value))
	}
	return ""
}

// undetermined is why the fit to the average beat does not determine a
// parameter; empty where it does.
func (f *fitted) undetermined(s Symbol) string {
	i := s.index
	if s.shape {
		i += f.model.Linear()
	}
	switch {
	case !s.shape && f.x[s.index] == 0:
		return onBound
	case s.shape && !slices.ContainsFunc(f.x[:], func(x float64) bool { return x > 0 }):
		return "nothing passes it: the fit has no impedance"
	case s.shape && !f.pulse:
		return "the flow has no pulse"
	case !f.curvature.felt(i):
		return "it has no effect on the pressure"
	case !f.curvature.free[i]:
		return fmt.Sprintf("its time constant is at the end of the range searched, %.3g s", math.Exp(f.theta[s.index]))
	case !(f.curvature.alone(i) > tooAlike):
		return "it trades against the other parameters"
	}
	return ""
}
