package fitting

// Load is what lumped models and arterial trees have in common: the relation
// between flow into the arterial system and pressure above Pv at the same place.
type Load interface {
	// Impedance is Z(w), mmHg s/mL, w in rad/s.
	Impedance(w float64) complex128
	// Resistance is the total resistance Z(0), mmHg s/mL.
	Resistance() float64
	// CharacteristicImpedance is the resistive part that Z keeps at high
	// frequency, mmHg s/mL.
	CharacteristicImpedance() float64
	// Compliance is the total compliance, mL/mmHg.
	Compliance() float64
}

// Lumped is a lumped model with its parameters.
type Lumped struct {
	Model  Model
	Values Values
}

var _ Load = Lumped{}

// Impedance is Z(w) of the model.
func (l Lumped) Impedance(w float64) complex128 { return l.Model.Impedance(l.Values, w) }

// Resistance is Z(0) of the model.
func (l Lumped) Resistance() float64 { return l.Model.Resistance(l.Values) }

// CharacteristicImpedance is Zc; 0 for wk2.
func (l Lumped) CharacteristicImpedance() float64 { return l.Values.Zc }

// Compliance is C.
func (l Lumped) Compliance() float64 { return l.Values.C }
