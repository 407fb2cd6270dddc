package fault

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/unit"
)

const (
	wrapJump   = 0.6 // of the range of the trace, in one sample
	wrapAfter  = 0.5 // of the range of the scale, that no jump may exceed once unwrapped
	leastWraps = 4   // jumps: there and back twice
)

// Unwrap undoes the folding of a Doppler scale whose range is given: wherever the
// velocity jumps by more than half of it from one sample to the next, the range is
// added or taken off from there on. It is exact as long as the true velocity never
// does. Most samples stay where they are, and missing ones are stepped over. values is
// not changed.
func Unwrap(values []float64, scale float64) []float64 {
	out := make([]float64, len(values))
	turns, last := 0, math.NaN()
	count := map[int]int{}
	for i, v := range values {
		switch d := v - last; {
		case d > scale/2:
			turns--
		case d < -scale/2:
			turns++
		}
		if !math.IsNaN(v) {
			last = v
			count[turns]++
		}
		out[i] = v + float64(turns)*scale
	}
	most := 0
	for k, n := range count {
		if n > count[most] || n == count[most] && k < most {
			most = k
		}
	}
	if most != 0 {
		for i := range out {
			out[i] -= float64(most) * scale
		}
	}
	return out
}

// aliased finds velocities that a Doppler scale has folded, with the range of the
// scale: each jump lacks the step that the velocity would have made, which is the
// mean of those before and after.
func (t Trace) aliased() []Finding {
	if t.Quantity != unit.Velocity {
		return nil
	}
	x := t.Values
	low, high := math.Inf(1), math.Inf(-1)
	for _, v := range x {
		if !math.IsNaN(v) {
			low, high = min(low, v), max(high, v)
		}
	}
	var ranges []float64
	var runs []Run
	back := 0
	for i := 2; i+1 < len(x); i++ {
		if d := x[i] - x[i-1]; math.Abs(d) > wrapJump*(high-low) {
			step := (x[i-1] - x[i-2] + x[i+1] - x[i]) / 2
			ranges = append(ranges, math.Abs(d-step))
			runs = append(runs, Run{i - 1, i + 1})
			if d > 0 {
				back++
			}
		}
	}
	if len(ranges) < leastWraps || back == 0 || back == len(ranges) {
		return nil
	}
	scale := median(ranges)
	y := Unwrap(x, scale)
	for i := 1; i < len(y); i++ {
		if math.Abs(y[i]-y[i-1]) > wrapAfter*scale {
			return nil
		}
	}
	return []Finding{{
		Code: data.CodeAliased, Number: scale, Runs: runs,
		Text: fmt.Sprintf("the velocity is folded at the ends of its scale, %d times; the range of the scale is about %.4g %s, by the jumps", len(ranges), scale, t.Unit),
		Cure: fmt.Sprintf("it is unfolded with that; state the exact range with --velocity-range %s=VALUE, or record with a wider scale", t.Name),
	}}
}
