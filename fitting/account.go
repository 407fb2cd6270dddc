package fitting

import (
	"slices"

	"afterbeat/data"
)

// TotalResistanceName is the name of Z(0) beside those of the parameters.
const TotalResistanceName = "Rtotal"

// Account is what stands behind a parameter of the result, or behind its total
// resistance: the equations of the model, its source, and what is published of
// people. Of a load that is regional, or per unit area, nothing is at hand.
func (r Result) Account(name string) data.Account {
	a := data.Account{Equation: r.Model.Equation(), Source: r.Model.Source()}
	if name == TotalResistanceName {
		a.Meaning = "total resistance, Z at frequency 0"
	}
	for _, s := range r.Model.Parameters() {
		if s.Name == name {
			a.Meaning = s.Meaning
		}
	}
	if !r.Site.Systemic() || r.PerArea {
		return a
	}
	for _, p := range publications() {
		if p.of == name && (len(p.models) == 0 || slices.Contains(p.models, r.Model.Name)) {
			a.Published = append(a.Published, p.Published)
		}
	}
	return a
}

// publication is a published number of a parameter of the whole body's load, of
// some models only where it names them.
type publication struct {
	of     string
	models []string
	data.Published
}

// publications are in the units of this package: 1 mmHg s/mL is 1333.224
// dyn s/cm^5, and 1e-3 cm^5/dyn is 1.33322 mL/mmHg.
func publications() []publication {
	const (
		murgo   = "Murgo 1980, Circulation 62:105"
		nichols = "Nichols 1977, Circ Res 40:451"
		laskey  = "Laskey 1990, J Appl Physiol 69:112"
		segers  = "Segers 2002, Am J Physiol 282:H1041"
		stiff   = "stiffness index 4.4 to 6.5, n 40 (abstract)"
	)
	seen := func(of, group, words, source string) publication {
		return publication{of, nil, data.Published{Group: group, Words: words, Source: source, Seen: true}}
	}
	resistance := []publication{
		seen("R", data.Healthy, "0.853 +- 0.029 mmHg s/mL (SEM), n 18", murgo),
		seen("R", data.Mixed, "0.6 to 1.8 mmHg s/mL", segers),
		seen("R", data.OnSupport, "mean pressure +16.2 mmHg at +1.29 L/min, n 8: R hardly changed", "before and after: Eur J Heart Fail 2021;23:1955"),
	}
	all := slices.Clone(resistance)
	for _, p := range resistance {
		p.of = TotalResistanceName
		all = append(all, p)
	}
	return append(
		all,
		seen("C", data.Healthy, "2.12 +- 0.67 mL/mmHg (SD), wk3, n 11; 1.53 +- 0.36 by decay", laskey),
		seen("C", data.Ill, "dilated hearts 1.84 +- 0.80 mL/mmHg, wk3, n 10; 1.57 +- 0.72 by decay", laskey),
		seen("C", data.Mixed, "0.5 to 2.0 mL/mmHg", segers),
		seen("C", data.OnSupport, "the aorta stiffens over months: C falls by about a third (inferred)", stiff),
		seen("Zc", data.Healthy, "0.0353 +- 0.0030 mmHg s/mL (SEM), n 18", murgo),
		seen("Zc", data.Healthy, "0.040 mmHg s/mL at age 32, n 5", nichols),
		seen("Zc", data.Ill, "coronary disease 0.071, with hypertension 0.152 mmHg s/mL, age 48", nichols),
		publication{"L", []string{"wk4p"}, data.Published{Group: data.Healthy, Words: "about 0.005, 0.003 to 0.01 mmHg s2/mL", Source: "Stergiopulos 1999, Am J Physiol 276:H81"}},
		seen("L", data.Mixed, "in 12 % of 2404 people the fit gave an impossible L", "Segers 2008, Proc IMechE H 222:417"),
	)
}
