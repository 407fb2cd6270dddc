package estimate

import "fmt"

// The harmonics whose impedance is averaged, and how many of them must stand out
// of their scatter.
const (
	firstHarmonic, lastHarmonic = 4, 10
	leastHarmonics              = 3
)

// ByModulus estimates Zc as the mean of |Z| over the harmonics 4 to 10 that stand
// out of the scatter of their flow (Murgo et al. 1980, Circulation 62:105; from
// memory). On a wk3 load it errs upwards by a few percent, since C is not quite a
// short circuit there; a delay between the channels does not bear on it.
func ByModulus(b Beat) Estimate {
	e := newEstimate(ZcModulus)
	if !b.hasFlow() {
		return e.without("it needs the wave of the flow")
	}
	sum, count := 0.0, 0
	for _, h := range b.Harmonics {
		if h.Shown && firstHarmonic <= h.K && h.K <= lastHarmonic {
			sum, count = sum+h.Modulus(), count+1
		}
	}
	if count < leastHarmonics {
		return e.without("%d of the harmonics %d to %d stand out of the scatter of their flow, and %d are needed", count, firstHarmonic, lastHarmonic, leastHarmonics)
	}
	e.Zc = sum / float64(count)
	e.Remark = fmt.Sprintf("mean of %d harmonics", count)
	return e
}
