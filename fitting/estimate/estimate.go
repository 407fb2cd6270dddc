package estimate

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/fitting/harmonic"
)

// The names of the estimators.
const (
	Decay          = "decay"
	DecayAsymptote = "decay-asymptote"
	Area           = "area"
	TwoArea        = "two-area"
	PulsePressure  = "pulse-pressure"
	SVOverPP       = "sv-over-pp"
	ZcModulus      = "zc-modulus"
)

// Beat is what the estimators look at: an average beat, from onset to onset.
type Beat struct {
	Pressure data.Period // mmHg
	// Flow is in mL/s, of the same samples; without samples there is none.
	Flow data.Period
	// Output is a mean flow known without its wave, mL/s; 0 where there is none.
	// It counts where there is no Flow.
	Output          float64
	OutflowPressure float64 // Pv, mmHg
	// Rise is by how much the beat ends higher than it began, mmHg.
	Rise float64
	// Harmonics are those of [harmonic.Impedance], for zc-modulus.
	Harmonics []harmonic.Harmonic
}

// Estimate is what one method gives. What it does not give, or could not, is
// NaN.
type Estimate struct {
	Name      string
	R         float64 // total resistance, mmHg s/mL
	C         float64 // mL/mmHg
	Tau       float64 // s
	Asymptote float64 // mmHg; of decay-asymptote
	Zc        float64 // mmHg s/mL; of zc-modulus
	Index     float64 // mL/mmHg; of sv-over-pp
	// Reason says why the method does not apply; empty where it does. Remark is
	// what to mind about one that does.
	Reason, Remark string
}

func newEstimate(name string) Estimate {
	nan := math.NaN()
	return Estimate{Name: name, R: nan, C: nan, Tau: nan, Asymptote: nan, Zc: nan, Index: nan}
}

// without is the estimate with the reason why there is none.
func (e Estimate) without(format string, args ...any) Estimate {
	none := newEstimate(e.Name)
	none.Reason = fmt.Sprintf(format, args...)
	return none
}

// All are the estimates of all methods, in the order of tables. A beat without
// pressure panics.
func All(b Beat) []Estimate {
	if len(b.Pressure.Samples) == 0 {
		panic("estimate: All: no pressure")
	}
	return []Estimate{
		ByDecay(b), ByDecayAsymptote(b), ByArea(b), ByTwoArea(b), ByPulsePressure(b), ByStrokeVolume(b), ByModulus(b),
	}
}

// hasFlow tells whether there is the wave of a flow.
func (b Beat) hasFlow() bool { return len(b.Flow.Samples) > 0 }

// output is the mean flow, mL/s; 0 where none is known.
func (b Beat) output() float64 {
	if b.hasFlow() {
		return b.Flow.Mean()
	}
	return b.Output
}

// resistance is the total resistance; why says why there is none.
func (b Beat) resistance() (r float64, why string) {
	drop, q := b.Pressure.Mean()-b.OutflowPressure, b.output()
	switch {
	case q == 0 && !b.hasFlow():
		return math.NaN(), "R and C need a flow, or a cardiac output"
	case !(q > 0):
		return math.NaN(), fmt.Sprintf("a mean flow of %.3g gives no resistance", q)
	case !(drop > 0):
		return math.NaN(), fmt.Sprintf("the mean pressure does not exceed the outflow pressure of %.3g mmHg", b.OutflowPressure)
	}
	return drop / q, ""
}

// withResistance adds R and C = tau/R where the mean flow is known.
func (e Estimate) withResistance(b Beat) Estimate {
	r, why := b.resistance()
	if why != "" {
		e.Remark = why
		return e
	}
	e.R, e.C = r, e.Tau/r
	return e
}
