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
	for i, s := range f.model.Parameters() {
		r.Parameters[i].doubt(f.undetermined(s, r.Values))
	}
	total := &r.TotalResistance
	if total.Value == 0 {
		doubtIf(total, "it is 0, the end of its range")
	}
	doubtIf(total, tooWide(*total))
	if !r.Converged {
		for i := range r.Parameters {
			r.Parameters[i].doubt("the fit gave no number")
		}
		doubtIf(total, "the fit gave no number")
	}
	f.criteria(r)
	f.outflow(r)
	f.warn(r)
}

// doubt marks a parameter as not identified where there is a reason to, its
// interval included.
func (p *Parameter) doubt(why string) {
	doubtIf(&p.Estimate, why)
	doubtIf(&p.Estimate, tooWide(p.Estimate))
}

// doubtIf keeps the first reason.
func doubtIf(e *data.Estimate, why string) {
	if why != "" && e.Identified {
		e.Identified, e.Why = false, why
	}
}

// tooWide is the reason of an interval that is wider than the value.
func tooWide(e data.Estimate) string {
	switch {
	case !finite(e.Value):
		return "the fit gave no number"
	case e.Random.Defined() && e.Random.Width() > math.Abs(e.Value):
		return fmt.Sprintf("its random interval is %.0f %% of it wide", 100*e.Random.Width()/math.Abs(e.Value))
	}
	return ""
}

// undetermined is why the fit to the average beat does not determine a
// parameter; empty where it does.
func (f *beatFit) undetermined(s Symbol, v Values) string {
	i := s.index
	if s.shape {
		i += f.model.Linear()
	}
	switch {
	case !s.shape && f.x[s.index] == 0:
		return "it is 0, the end of its range"
	case s.shape && !slices.ContainsFunc(f.x[:], func(x float64) bool { return x > 0 }):
		return "nothing passes it: the fit has no impedance"
	case s.shape && !f.moments.pulsatile():
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
