package study

import (
	"fmt"
	"math"

	"afterbeat/data/casefile"
	"afterbeat/tree/heart"
)

// ownVentricle is what the case gives of the ventricle beyond the ranges of what
// is free.
type ownVentricle struct {
	// whole tells that elastance and times are given: nothing is solved for.
	whole      bool
	activation heart.Activation
	emax, emin float64 // mmHg/mL
	tes, tr    float64 // s
	rar        float64 // mmHg s/mL; 0: the aortic valve does not leak
	slope      float64 // of the filling line, mmHg s/mL
	slopeGiven bool
}

// elastance are the symbols that are given together or not at all.
var elastance = []string{"Emax", "Emin", "Tes", "Tr"}

// ventricleOf reads what the case gives of the ventricle; period in s.
func ventricleOf(c casefile.Case, period float64) (ownVentricle, error) {
	o := ownVentricle{activation: heart.Cosine, slope: heart.RampSlope}
	own, err := numbersOf("ventricle", c.Ventricle)
	if err != nil {
		return o, err
	}
	for name, v := range own {
		if v < 0 || v == 0 && (name == "Pfill" || name == "Rmv" || name == "Rav") {
			return o, &ChoiceError{Key: "ventricle." + name, What: fmt.Sprintf("%v is too small", v), Hint: "pressures in mmHg, volumes in mL, elastances in mmHg/mL, resistances in mmHg s/mL"}
		}
	}
	o.rar = own["Rar"]
	if v, ok := own["filling_slope"]; ok {
		o.slope, o.slopeGiven = v, true
	}
	return o, o.times(c, own, period)
}

// times reads elastance and activation.
func (o *ownVentricle) times(c casefile.Case, own map[string]float64, period float64) error {
	if a := c.Ventricle["activation"]; a != "" {
		o.activation = heart.Activation(a)
	}
	needed := elastance
	if o.activation == heart.Hill {
		needed = elastance[:2]
	}
	var missing string
	for _, symbol := range elastance {
		if _, ok := own[symbol]; ok {
			o.whole = true
		}
	}
	for _, symbol := range needed {
		if _, ok := own[symbol]; !ok && missing == "" {
			missing = symbol
		}
	}
	switch {
	case !o.whole && c.Ventricle["activation"] != "":
		return &ChoiceError{Key: "ventricle.activation", What: "it goes with Emax and Emin, which are not given", Hint: "leave it out: what is solved for is a cosine"}
	case !o.whole:
		return nil
	case missing != "":
		return &ChoiceError{Key: "ventricle", What: fmt.Sprintf("%s is missing beside what is given", missing), Hint: fmt.Sprintf("give %s together, or none of them: they are solved for then", list(needed))}
	case c.EDVML != nil || c.EF != nil:
		return &ChoiceError{Key: "ventricle", What: "it is given whole, so that its volume follows", Hint: "leave out --edv-ml and --ef"}
	}
	o.emax, o.emin, o.tes, o.tr = own["Emax"], own["Emin"], own["Tes"], own["Tr"]
	v := heart.Ventricle{Period: period, Activation: o.activation, Tes: o.tes, Tr: o.tr, Emax: o.emax, Emin: o.emin, V0: own["V0"], Rmv: 1, Rav: 1}
	if err := v.Check(); err != nil {
		return &ChoiceError{Key: "ventricle", What: err.Error(), Hint: "the period is that of the recording"}
	}
	return nil
}

// into gives a ventricle what the case gives.
func (o ownVentricle) into(v *heart.Ventricle) {
	v.Rar = o.rar
	if !o.whole {
		return
	}
	v.Activation, v.Emax, v.Emin, v.Tes, v.Tr = o.activation, o.emax, o.emin, o.tes, o.tr
	if total := v.Tes + v.Tr; total > v.Period { // of a drawn period, a little shorter
		v.Tr = math.Max(0.01*v.Period, v.Period-v.Tes)
	}
}
