package support

import (
	"fmt"
	"math"

	"afterbeat/fitting"
)

// LoadKind names the circuit of a [Windkessel].
type LoadKind string

// The lumped loads that can be coupled; see package fitting for the sketches.
const (
	WK2  LoadKind = "wk2"
	WK3  LoadKind = "wk3"
	WK4S LoadKind = "wk4s" // L in series with Zc
	WK4P LoadKind = "wk4p" // L parallel to Zc
)

// LoadKinds lists them, the simplest first.
func LoadKinds() []LoadKind { return []LoadKind{WK2, WK3, WK4S, WK4P} }

// Symbols are the names of the parameters that a load of that kind has.
func (k LoadKind) Symbols() []string {
	switch k {
	case WK2:
		return []string{"R", "C"}
	case WK3:
		return []string{"R", "C", "Zc"}
	case WK4S, WK4P:
		return []string{"R", "C", "Zc", "L"}
	}
	return nil
}

// Windkessel is a lumped load with its values.
type Windkessel struct {
	Kind LoadKind
	fitting.Values
	OutflowPressure float64 // Pv, mmHg
}

// Check tells why these cannot be the values of a load: an error for a person
// to read.
func (w Windkessel) Check() error { return w.check(0) }

// check is Check with the least outflow pressure that passes. A drawn one may be
// below 0, as the error of a given one says.
func (w Windkessel) check(leastPv float64) error {
	if w.Kind.Symbols() == nil {
		return fmt.Errorf("model %q is none of %v", w.Kind, LoadKinds())
	}
	for _, p := range []struct {
		name  string
		value float64
		ok    bool
		want  string
	}{
		{"R", w.R, w.R > 0, "above 0"},
		{"C", w.C, w.C > 0, "above 0"},
		{"Zc", w.Zc, w.Zc >= 0, "of 0 or more"},
		{"L", w.L, w.L >= 0, "of 0 or more"},
		{"Pv", w.OutflowPressure, w.OutflowPressure >= leastPv, "of 0 or more"},
	} {
		if !p.ok || math.IsInf(p.value, 0) {
			return fmt.Errorf("%s = %v is not a number %s", p.name, p.value, p.want)
		}
	}
	return nil
}
