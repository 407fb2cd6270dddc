package fitting

import "fmt"

// Values are the parameters of a lumped model; those the model lacks are 0.
type Values struct {
	R  float64 // mmHg s/mL, the resistor in parallel with C
	C  float64 // mL/mmHg
	Zc float64 // mmHg s/mL, characteristic impedance
	L  float64 // mmHg s²/mL, inertance
}

// Of returns the value of the parameter with that name, and panics where there
// is none.
func (v Values) Of(name string) float64 {
	switch name {
	case "R":
		return v.R
	case "C":
		return v.C
	case "Zc":
		return v.Zc
	case "L":
		return v.L
	}
	panic(fmt.Sprintf("fitting: no parameter %q", name))
}

// Symbol is a parameter's name and units.
type Symbol struct {
	Name    string // "R"
	Meaning string // "peripheral resistance"
	Unit    string // "mmHg s/mL"
	PerArea string // the unit where flow is velocity: "mmHg s/cm"
	// shape tells a parameter that goes to its bound with a shape parameter
	// from one that goes with a column; index counts either from 0.
	shape bool
	index int
}

// Model is a lumped model of the arterial load. Models are had from [Models]
// and [ByName] and may be compared with ==; the zero Model is none.
type Model struct {
	Name string // "wk2"
	Circuit
}

// Circuit is what the file of a model supplies. Its impedance is
// sum_j x_j c_j(w), x_j >= 0, where the columns c_j depend on the shapes.
type Circuit interface {
	// Source names the publication.
	Source() string
	// Parameters lists names and units in the order of reports.
	Parameters() []Symbol
	// Elements are the columns, at most 3. They are not to be changed.
	Elements() []Element
	// Shapes is the number of nonlinear shape parameters, at most 2. All are
	// times, s.
	Shapes() int
	// Unpack turns factors of the columns and shapes into parameters. Where a
	// factor of 0 leaves a parameter without effect, that parameter is 0.
	Unpack(linear, shape []float64) Values
	// Pack is the inverse of Unpack; it needs R > 0.
	Pack(v Values) (linear, shape []float64)
	// Equation is the circuit in words: over time, then as an impedance.
	Equation() []string
	// Series is the part of Z(w) that lies before R and C.
	Series(v Values, w float64) complex128
	// Resistance is Z(0).
	Resistance(v Values) float64
}

// Impedance is Z(w), the series elements and then R parallel to C:
//
//	Z(w) = Zseries(w) + R/(1 + i w R C)
func (m Model) Impedance(v Values, w float64) complex128 {
	return m.Series(v, w) + complex(v.R, 0)/complex(1, w*v.R*v.C)
}

// Models lists the models, the simplest first.
func Models() []Model {
	return []Model{{"wk2", wk2{}}, {"wk3", wk3{}}, {"wk4s", wk4s{}}, {"wk4p", wk4p{}}}
}

// ByName finds a model.
func ByName(name string) (Model, bool) {
	for _, m := range Models() {
		if m.Name == name {
			return m, true
		}
	}
	return Model{}, false
}

// The parameters that models share.
var (
	resistance = Symbol{Name: "R", Meaning: "peripheral resistance", Unit: "mmHg s/mL", PerArea: "mmHg s/cm"}
	compliance = Symbol{Name: "C", Meaning: "compliance", Unit: "mL/mmHg", PerArea: "cm/mmHg", shape: true}
	character  = Symbol{Name: "Zc", Meaning: "characteristic impedance", Unit: "mmHg s/mL", PerArea: "mmHg s/cm", index: 1}
)
