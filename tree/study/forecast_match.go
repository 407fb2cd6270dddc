package study

import (
	"fmt"
	"math"
	"slices"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree/support"
)

// Matching is what is made equal to the native state wherever the pump runs.
type Matching string

// The ways to match. Without any, output and pressure follow from ventricle,
// pump and load.
const (
	MatchNone     Matching = "none"
	MatchFlow     Matching = "flow"     // the mean flow, by the filling pressure
	MatchPressure Matching = "pressure" // the mean pressure, by the resistance, or where that is held by the filling pressure
)

// Matchings lists them.
func Matchings() []Matching { return []Matching{MatchNone, MatchFlow, MatchPressure} }

// matching is what the case says of it.
type matching struct {
	what   Matching
	factor float64 // R on support over R; 1 unless held otherwise
	held   bool    // that the factor was given
}

// The range of a factor on the resistance that makes sense.
const leastFactor, mostFactor = 0.2, 5

func matchingOf(c casefile.Case) (matching, error) {
	m := matching{what: MatchNone, factor: 1}
	if c.Match != "" {
		m.what = Matching(c.Match)
	}
	if !slices.Contains(Matchings(), m.what) {
		return m, &ChoiceError{Key: "match", What: fmt.Sprintf("%q is nothing to match", data.Clean(c.Match)), Hint: "flow, pressure, or none"}
	}
	if f := c.HoldResistance; f != nil {
		if !(*f >= leastFactor && *f <= mostFactor) {
			return m, &ChoiceError{Key: "hold_resistance", What: fmt.Sprintf("%v is not between %g and %g", *f, leastFactor, float64(mostFactor)), Hint: "the resistance on support over the native one, for instance --hold-resistance 0.8"}
		}
		m.factor, m.held = *f, true
	}
	return m, nil
}

// byResistance tells that the resistance is what meets the match.
func (m matching) byResistance() bool { return m.what == MatchPressure && !m.held }

// byFilling tells that the filling pressure is.
func (m matching) byFilling() bool { return m.what == MatchFlow || m.what == MatchPressure && m.held }

// of is the match for a native coupling, whose filling line passes through its
// native state.
func (m matching) of(native support.Coupling) support.Match {
	l, flow := native.Load, native.Filling.Flow
	over := (l.R + l.SeriesResistance()) * flow // pressure above outflow
	out := support.Match{}
	if m.held {
		out.Factor = m.factor
	}
	switch {
	case m.what == MatchFlow:
		out.Flow = flow
	case m.what == MatchPressure && m.held:
		out.Flow = over / (l.R*m.factor + l.SeriesResistance())
	case m.what == MatchPressure:
		out.Pressure = l.OutflowPressure + over
	}
	return out
}

// words say what is matched and by what.
func (m matching) words() string {
	held := ""
	if m.held {
		held = fmt.Sprintf(" Resistance R is %.4g times the native one wherever the pump runs (given).", m.factor)
	}
	switch {
	case m.what == MatchFlow:
		return "Mean flow is matched: at every speed it is the native one, and the filling pressure is changed to make it so, off the filling line." + held
	case m.byFilling():
		return "Mean pressure is matched: at every speed it is the native one, and the filling pressure is changed to make it so, off the filling line." + held
	case m.byResistance():
		return "Mean pressure is matched: at every speed it is the native one, and the resistance R is changed to make it so; filling pressure follows the line through the native state."
	}
	return "Mean flow and mean pressure are not matched: they follow from ventricle, pump and load. Filling pressure follows the line through the native state." + held
}

// MatchWords say what is matched at every speed, and by what.
func (f *Forecast) MatchWords() string { return f.match.words() }

// supported is a native coupling with the pump in it, at rest where the speed is
// 0, and what is matched.
func (f *Forecast) supported(native support.Coupling) support.Coupling {
	native.Pump, native.Inlet = f.Pump.Pump, f.Pump.Inlet
	native.Match = f.match.of(native)
	return native
}

// missing is why a state has no numbers; empty where it has.
func missing(s *support.CoupledState) string {
	switch {
	case !s.Settled:
		return "no periodic state was found"
	case s.Missed || math.IsNaN(s.Arterial.Mean):
		return "what is to be matched cannot be met at this speed"
	}
	return ""
}
