package heart

import (
	"fmt"
	"math"
)

// RampSlope is the fall of filling pressure with output, mmHg s/mL: 1.23 mmHg
// for 0.16 L/min a step (35 patients, JACC Heart Fail 2016;4:208).
const RampSlope = 1.23 / (0.16 * 1000 / 60)

// Filling is the line Pfill = max(0, P0 - slope (Qm - Q0)).
type Filling struct {
	Pressure float64 // P0, mmHg
	Flow     float64 // Q0, mL/s: mean output at P0
	Slope    float64 // mmHg s/mL, 0 or more; 0: constant
}

// Check tells why these cannot be the parameters of a filling line.
func (f Filling) Check() error {
	for _, p := range []struct {
		name  string
		value float64
	}{{"Pfill", f.Pressure}, {"filling_flow", f.Flow}, {"filling_slope", f.Slope}} {
		if !(p.value >= 0) || math.IsInf(p.value, 0) {
			return fmt.Errorf("%s = %v is not a number of 0 or more", p.name, p.value)
		}
	}
	return nil
}

// At is the filling pressure, mmHg, at a mean flow in mL/s.
func (f Filling) At(flow float64) float64 { return max(0, f.Pressure-f.Slope*(flow-f.Flow)) }

// Highest is the filling pressure, mmHg, of a heart without output: the line
// lies in 0..Highest wherever the mean flow is not negative.
func (f Filling) Highest() float64 { return f.At(0) }
