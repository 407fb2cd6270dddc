package support

import (
	"slices"
	"sort"
)

// ejection is a native flow prepared for thresholds: its positive samples in
// falling order v_1 >= v_2 >= .. >= v_m and their running sums S_j.
type ejection struct {
	flow []float64 // the native samples, mL/s
	v    []float64
	sums []float64 // sums[j-1] = S_j = v_1 + .. + v_j
	mean float64   // of the native flow
}

// of prepares e for a flow. What e holds is used again: no allocation once it
// has seen a flow as long.
func (e *ejection) of(flow []float64) {
	e.flow, e.v, e.sums = flow, e.v[:0], e.sums[:0]
	total := 0.0
	for _, x := range flow {
		total += x
		if x > 0 {
			e.v = append(e.v, -x)
		}
	}
	e.mean = total / float64(len(flow))
	slices.Sort(e.v)
	sum := 0.0
	for j := range e.v {
		e.v[j] = -e.v[j]
		sum += e.v[j]
		e.sums = append(e.sums, sum)
	}
}

// threshold solves sum max(0, v - q0) = (1-s) sum v for q0, exactly: between the
// samples v_{j+1} <= q0 <= v_j the left side is S_j - j q0, so
//
//	q0 = (S_j - (1-s) S_m)/j
//
// with the j at which it falls between the two. At a knot q0 = v_j the left
// side is S_j - j v_j, which rises with j, so j is found by bisection.
func (e *ejection) threshold(share float64) float64 {
	if share == 1 {
		return e.v[0] // nothing is ejected, not even a rounding error
	}
	m := len(e.v)
	ejected := (1 - share) * e.sums[m-1]
	// The knots 1..j lie at or above q0; knot 1 always does, since nothing
	// stands above the largest sample.
	j := 1 + sort.Search(m-1, func(i int) bool {
		knot := i + 2
		return e.sums[knot-1]-float64(knot)*e.v[knot-1] > ejected
	})
	below := 0.0
	if j < m {
		below = e.v[j]
	}
	return min(max((e.sums[j-1]-ejected)/float64(j), below), e.v[j-1])
}

// pose writes the flow into the arteries under a posing with a share to dst, and
// returns the threshold, 0 where the posing has none.
func (e *ejection) pose(dst []float64, posing Posing, share float64) (threshold float64) {
	pump := share * e.mean
	switch posing {
	case ScaledPosing:
		for j, x := range e.flow {
			dst[j] = (1-share)*x + pump
		}
	case LateValvePosing:
		threshold = e.threshold(share)
		for j, x := range e.flow {
			if x > 0 {
				dst[j] = max(0, x-threshold) + pump
			} else {
				dst[j] = (1-share)*x + pump
			}
		}
	default:
		panic("support: no share under the posing " + string(posing))
	}
	return threshold
}
