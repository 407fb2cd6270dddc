package fitting

import (
	"fmt"
	"math"
	"math/cmplx"
)

// criteria fills in
//
//	AICc = n ln(S/N) + 2 k + 2 k (k + 1)/(n - k - 1)
//	BIC  = n ln(S/N) + k ln n
//
// (Hurvich and Tsai 1989, Biometrika 76:297; Schwarz 1978, Ann Stat 6:461) with
// k the parameters and one for the variance, and n = 2 H + 1 instead of the N
// samples, since only H harmonics carry a flow that stands out of its scatter.
func (f *beatFit) criteria(r *Result) {
	r.AICc, r.BIC = math.NaN(), math.NaN()
	k := len(r.Parameters) + 1
	n := 2*f.source.harmonics() + 1
	switch {
	case f.beats.Count() == 1:
		r.CriterionReason = "a single beat does not tell how many harmonics stand out of its scatter"
	case n <= k+1:
		r.CriterionReason = fmt.Sprintf("%d harmonics stand out of the scatter of the flow, too few for %d parameters", (n-1)/2, k-1)
	case !(r.SumOfSquares > 0) || !finite(r.SumOfSquares):
		r.CriterionReason = "the sum of squares has no logarithm"
	default:
		N, fn, fk := float64(len(r.Residual)), float64(n), float64(k)
		fit := fn * math.Log(r.SumOfSquares/N)
		r.AICc = fit + 2*fk + 2*fk*(fk+1)/(fn-fk-1)
		r.BIC = fit + fk*math.Log(fn)
	}
}

// harmonics counts the harmonics of the average flow, the Nyquist bin left out,
// that exceed three times their standard deviation over the beats.
func (s *source) harmonics() int {
	count, largest := 0, 0.0
	for _, v := range s.flow[1:] {
		largest = max(largest, cmplx.Abs(v))
	}
	for k := 1; 2*k < s.plan.n; k++ {
		variance := 0.0
		for _, beat := range s.flows {
			d := beat[k] - s.flow[k]
			variance += (real(d)*real(d) + imag(d)*imag(d)) / float64(len(s.flows)-1)
		}
		// The floor is rounding, where beats do not differ at all.
		if a := cmplx.Abs(s.flow[k]); a > 3*math.Sqrt(variance) && a > 1e-12*largest {
			count++
		}
	}
	return count
}
