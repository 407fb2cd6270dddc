package heart

import (
	"fmt"
	"math"
)

// Ventricle is a time-varying elastance between two valves. Its fields are
// checked by [Ventricle.Check]; the zero Ventricle is none.
type Ventricle struct {
	Period     float64 // T, s
	Activation Activation
	Tes, Tr    float64 // s; of the cosine only
	Emax, Emin float64 // mmHg/mL
	V0         float64 // mL
	Rmv, Rav   float64 // mmHg s/mL, mitral and aortic valve
	Rar        float64 // mmHg s/mL, aortic valve to flow back; 0: it does not leak
}

// Check tells why these cannot be the parameters of a ventricle: an error for a
// person to read.
func (v Ventricle) Check() error {
	for _, p := range []struct {
		name  string
		value float64
		ok    bool
		want  string
	}{
		{"period_s", v.Period, v.Period > 0, "above 0"},
		{"Emin", v.Emin, v.Emin >= 0, "0 or more"},
		{"Emax", v.Emax, v.Emax > 0 && v.Emax >= v.Emin, "above 0 and at least Emin"},
		{"V0", v.V0, v.V0 >= 0, "0 or more"},
		{"Rmv", v.Rmv, v.Rmv > 0, "above 0"},
		{"Rav", v.Rav, v.Rav > 0, "above 0"},
		{"Rar", v.Rar, v.Rar >= 0, "0 or more"},
	} {
		if !p.ok || math.IsInf(p.value, 0) {
			return fmt.Errorf("%s = %v is not a number %s", p.name, p.value, p.want)
		}
	}
	return v.checkActivation()
}

// Activity is e at a time in 0..T after contraction began, between 0 and 1.
func (v *Ventricle) Activity(t float64) float64 {
	if v.Activation == Hill {
		return fastHill(hillTable(), t/v.Period)
	}
	return cosine(t, v.Tes, v.Tr)
}

// Elastance is E at a time in 0..T after contraction began, mmHg/mL.
func (v *Ventricle) Elastance(t float64) float64 {
	return v.Emin + (v.Emax-v.Emin)*v.Activity(t)
}

// Pressure is Plv at that time and a volume in mL, mmHg.
func (v *Ventricle) Pressure(t, volume float64) float64 { return v.Elastance(t) * (volume - v.V0) }

// MitralFlow is Qmv, mL/s, of the pressures before and behind the valve, mmHg.
func (v *Ventricle) MitralFlow(pfill, plv float64) float64 { return max(0, (pfill-plv)/v.Rmv) }

// AorticFlow is Qav, mL/s, of the pressures before and behind the valve, mmHg;
// negative where the valve leaks.
func (v *Ventricle) AorticFlow(plv, pao float64) float64 {
	if plv < pao && v.Rar > 0 {
		return (plv - pao) / v.Rar
	}
	return max(0, (plv-pao)/v.Rav)
}

// Corners are the times in 0..T at which E(t) is not smooth, in order, T last.
func (v *Ventricle) Corners() []float64 {
	var all []float64
	if v.Activation == Cosine {
		all = append(all, v.Tes)
		if end := v.Tes + v.Tr; end < v.Period {
			all = append(all, end)
		}
	}
	return append(all, v.Period)
}
