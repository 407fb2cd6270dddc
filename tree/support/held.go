package support

import (
	"afterbeat/data"
	"afterbeat/data/unit"
)

// Held is a quantity that is the same natively and with the pump running.
type Held struct {
	Quantity string
	Value    float64
	Unit     string
	Origin   data.Origin
}

// Held lists what is held equal in all states of the answer. Mean pressure is
// not among it: it follows, mean P = Pv + Z(0) mean Q.
func (a Answer) Held() []Held {
	u := a.units()
	return []Held{
		{"total resistance Z(0)", a.Load.Resistance(), u.resistance, data.Estimated},
		{"compliance", a.Load.Compliance(), u.compliance, data.Estimated},
		{"characteristic impedance", a.Load.CharacteristicImpedance(), u.resistance, data.Estimated},
		{"outflow pressure", a.OutflowPressure, "mmHg", a.OutflowOrigin},
		{"heart period", a.Native.Flow.Duration(), "s", data.Measured},
		{"mean flow", a.Native.Flow.Mean(), u.flow, data.Measured},
	}
}

// units are the units in print that depend on what the flow is.
type units struct {
	flow, resistance, compliance, power string
}

func (a Answer) units() units {
	if a.PerArea {
		return units{unit.Internal(unit.Velocity).Name, "mmHg s/cm", "cm/mmHg", "mW/cm2"}
	}
	return units{unit.Internal(unit.Flow).Name, "mmHg s/mL", "mL/mmHg", "mW"}
}
