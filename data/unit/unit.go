package unit

// Quantity is what a channel measures.
type Quantity string

// The quantities. Other is everything that afterbeat does not use: a pulse
// oximeter's trace, a heart rate, a partial pressure of a gas.
const (
	Pressure Quantity = "pressure"
	Flow     Quantity = "flow"
	Velocity Quantity = "velocity"
	Speed    Quantity = "speed"
	Volume   Quantity = "volume"
	ECG      Quantity = "ecg"
	Other    Quantity = "other"
)

// DynPerMmHg is 1 mmHg in dyn/cm² (conventional millimetre of mercury, ISO 80000-4).
const DynPerMmHg = 1333.22387415

// MilliwattPerMmHgMLPerS is 1 mmHg mL/s in mW.
const MilliwattPerMmHgMLPerS = 0.133322387415

// Unit is a unit as a file may name it. Internal value = Factor times the
// value in this unit.
type Unit struct {
	Name     string // as printed: "mmHg", "L/min", "kPa", "V"
	Quantity Quantity
	Factor   float64
	// Calibrated is false where the unit is none of the quantity's: a pressure
	// in volts. Factor is then 1 and the numbers have no absolute meaning.
	Calibrated bool
}

// Internal is the internal unit of q; of Other, a unit without a name.
func Internal(q Quantity) Unit {
	return Unit{Name: internalNames[q], Quantity: q, Factor: 1, Calibrated: q != Other}
}

var internalNames = map[Quantity]string{
	Pressure: "mmHg", Flow: "mL/s", Velocity: "cm/s", Speed: "1000/min", Volume: "mL", ECG: "mV",
}
