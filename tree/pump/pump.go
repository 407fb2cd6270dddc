package pump

import (
	"fmt"
	"math"
)

// Curve holds the coefficients of H = a n² - b n Q - c Q|Q|.
type Curve struct {
	A float64 // mmHg per (1000/min)²
	B float64 // mmHg s/mL per 1000/min
	C float64 // mmHg s²/mL²
}

// Head is H, mmHg, at a speed in 1000/min and a flow in mL/s.
func (k Curve) Head(speed, flow float64) float64 {
	return k.A*speed*speed - k.B*speed*flow - k.C*flow*math.Abs(flow)
}

// Pump is a curve and what the cannulas take.
type Pump struct {
	Curve
	Resistance float64 // Rc, mmHg s/mL
	Inertance  float64 // Lc, mmHg s²/mL
}

// Check tells why these cannot be the parameters of a pump: an error for a
// person to read.
func (p Pump) Check() error {
	for _, c := range []struct {
		name  string
		value float64
	}{{"a", p.A}, {"b", p.B}, {"c", p.C}, {"Rc", p.Resistance}} {
		if !(c.value >= 0) || math.IsInf(c.value, 0) {
			return fmt.Errorf("%s = %v is not a number of 0 or more", c.name, c.value)
		}
	}
	if !(p.Inertance > 0) || math.IsInf(p.Inertance, 0) {
		return fmt.Errorf("inertance Lc = %v is not a number above 0: the blood in pump and cannulas has a mass", p.Inertance)
	}
	return nil
}

// SteadyFlow is the flow, mL/s, at which the pump at that speed, 1000/min, holds
// a steady pressure from inlet to outlet, mmHg: the root of H - Rc Q = rise.
// Negative where the rise is more than the pump can hold. It is NaN where
// nothing limits the flow.
func (p Pump) SteadyFlow(speed, rise float64) float64 {
	drive := p.A*speed*speed - rise
	linear := p.Resistance + p.B*speed
	// c Q² + linear |Q| = |drive|, in the form without cancellation.
	q := 2 * math.Abs(drive) / (linear + math.Sqrt(linear*linear+4*p.C*math.Abs(drive)))
	return math.Copysign(q, drive)
}
