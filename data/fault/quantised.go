package fault

import (
	"fmt"
	"math"

	"afterbeat/data"
)

// leastLevels is how few steps in the pulse are warned of.
const leastLevels = 100

// quantised finds values that come in coarse steps.
func (t Trace) quantised(s scale) []Finding {
	if s.step == 0 || s.pulse >= leastLevels*s.step {
		return nil
	}
	return []Finding{{
		Code: data.CodeQuantised, Number: s.step,
		Text: fmt.Sprintf("values come in steps of %.3g %s, %.0f of them in the pulse: rounding alone is a noise of %.2g %s", s.step, t.Unit, s.pulse/s.step, s.step/math.Sqrt(12), t.Unit),
		Cure: "export with more digits or a finer scale; averaging beats lessens it, and a fit cannot leave less",
	}}
}
