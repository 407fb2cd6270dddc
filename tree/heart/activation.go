package heart

import (
	"fmt"
	"math"
)

// Activation names the time course e(t) of contraction.
type Activation string

const (
	// Cosine rises and falls by half a cosine each; it needs Tes and Tr.
	Cosine Activation = "cosine"
	// Hill is the double Hill function; it scales with the period.
	Hill Activation = "hill"
)

// Activations lists them in the order of help texts.
func Activations() []Activation { return []Activation{Hill, Cosine} }

// The double Hill function (Stergiopulos, Meister and Westerhof 1996).
const (
	hillRise, hillRisePower = 0.303, 1.32
	hillFall, hillFallPower = 0.508, 21.9
	// hillScale is 1/max of the function without it; the maximum is at hillPeak.
	hillScale = 1.6721792154440462
	hillPeak  = 0.428389750973
)

// hill is e at x = t/T, 0 <= x <= 1.
func hill(x float64) float64 {
	if x <= 0 {
		return 0
	}
	ln := math.Log(x)
	rise := math.Exp(hillRisePower * (ln - lnRise))
	fall := math.Exp(hillFallPower * (ln - lnFall))
	return hillScale * rise / ((1 + rise) * (1 + fall))
}

var lnRise, lnFall = math.Log(hillRise), math.Log(hillFall)

// cosine is e at t, 0 <= t <= T.
func cosine(t, tes, tr float64) float64 {
	switch {
	case t < tes:
		return (1 - math.Cos(math.Pi*t/tes)) / 2
	case t < tes+tr:
		return (1 + math.Cos(math.Pi*(t-tes)/tr)) / 2
	}
	return 0
}

// check tells what is wrong with the times of an activation.
func (v Ventricle) checkActivation() error {
	switch v.Activation {
	case Hill:
		if v.Tes != 0 || v.Tr != 0 {
			return fmt.Errorf("activation hill takes its times from the period: Tes and Tr do not go with it")
		}
	case Cosine:
		if !(v.Tes > 0) || !(v.Tr > 0) {
			return fmt.Errorf("activation cosine needs Tes and Tr above 0 s, not %v and %v", v.Tes, v.Tr)
		}
		if v.Tes+v.Tr > v.Period*(1+1e-9) {
			return fmt.Errorf("the sum of Tes and Tr, %v s, is longer than the period of %v s", v.Tes+v.Tr, v.Period)
		}
	default:
		return fmt.Errorf("activation %q is none of %v", v.Activation, Activations())
	}
	return nil
}
