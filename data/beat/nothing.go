package beat

import (
	"fmt"
	"math"
	"slices"
)

// What kind of trace has no periodic component.
const (
	flatSteps   = 2    // of the recorder, that all but a hundredth of the samples move by
	slowPart    = 0.05 // of the standard deviation of a trace, that its running mean leaves over
	slowestWave = 0.4  // s, width of the running mean
)

// aperiodic says in what way the trace has no pulse: it moves between
// neighbouring steps of the recorder, it has only slow changes, as what was
// averaged over beats has, or it is noise.
func (t *trace) aperiodic(values []float64) string {
	none := fmt.Sprintf("no periodic component between %g and %g Hz", 1/longestPeriod, 1/shortestPeriod)
	if step, n := recorderStep(values); n <= flatSteps {
		return fmt.Sprintf("flat: it moves by no more than %d steps of %.2g of the recorder", n, step)
	}
	y := straightened(slices.Clone(t.coarse))
	width := samplesIn(slowestWave, t.rateOfCoarse())
	rest := make([]float64, len(y))
	for i, slow := range smooth(y, width) {
		rest[i] = y[i] - slow
	}
	_, all := meanSD(y)
	margin := min(width, len(y)/4) // where the running mean leans to one side
	if _, fast := meanSD(rest[margin : len(rest)-margin]); fast < slowPart*all {
		return "already averaged over beats? it changes slowly, with " + none
	}
	return none
}

// recorderStep is the smallest step between two values of a trace, and how many
// of them it moves by, but for a hundredth of its samples.
func recorderStep(values []float64) (step float64, steps int) {
	s := slices.DeleteFunc(slices.Clone(values), func(v float64) bool { return !finite(v) })
	slices.Sort(s)
	low, high := s[len(s)/200], s[len(s)-1-len(s)/200]
	step = math.Inf(1)
	for i := 1; i < len(s); i++ {
		if d := s[i] - s[i-1]; d > 1e-9*max(math.Abs(s[i]), math.Abs(s[i-1])) {
			step = min(step, d)
		}
	}
	if steps := (high - low) / step; steps < math.MaxInt32 {
		return step, int(math.Round(steps))
	}
	return step, math.MaxInt32
}
