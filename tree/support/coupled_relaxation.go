package support

import "math"

// The range in which Tr/Tes is looked for (an assumption), and how near to the
// pulse pressure it comes, mmHg.
const (
	QuickestRelaxation, SlowestRelaxation = 0.25, 0.8
	relaxedWithin                         = 0.05
)

// RelaxTo is the Tr/Tes with which the ventricle that [SetUp] finds has a pulse
// pressure, mmHg: a slower relaxation draws the end of ejection out and so makes
// its flow more uneven, which raises the pulse. Where none from
// [QuickestRelaxation] to [SlowestRelaxation] has it, it is the one that comes
// nearest. Errors are those of SetUp with [DefaultRelaxation].
func RelaxTo(c Coupling, e Ejection, pulse float64) (float64, error) {
	over := func(relaxation float64) (float64, error) {
		e.Relaxation = relaxation
		set, err := SetUp(c, e)
		if err != nil {
			return math.NaN(), err
		}
		k, err := NewCoupled(set)
		if err != nil {
			return math.NaN(), err
		}
		s, err := k.At(0)
		return s.PulsePressure() - pulse, err
	}
	low, high := DefaultRelaxation, SlowestRelaxation
	atLow, err := over(DefaultRelaxation)
	if err != nil || math.Abs(atLow) < relaxedWithin {
		return DefaultRelaxation, err
	}
	atHigh := atLow
	if atLow > 0 {
		low, high = QuickestRelaxation, DefaultRelaxation
		atLow, _ = over(low)
	} else {
		atHigh, _ = over(high)
	}
	for range 12 {
		switch {
		case math.IsNaN(atLow) || math.IsNaN(atHigh): // no ventricle at that end
			return DefaultRelaxation, nil
		case atLow >= 0:
			return low, nil
		case atHigh <= 0:
			return high, nil
		}
		at := low + (high-low)*min(max(-atLow/(atHigh-atLow), 0.05), 0.95)
		miss, _ := over(at)
		switch {
		case math.Abs(miss) < relaxedWithin:
			return at, nil
		case miss < 0:
			low, atLow = at, miss
		default:
			high, atHigh = at, miss
		}
	}
	return (low + high) / 2, nil
}
