package support

import (
	"math"

	"afterbeat/tree"
)

// BedRatios set a supported state of a bed, or of a site, against the native one
// of the same tree. What does not exist is NaN.
type BedRatios struct {
	// RetainedPressure is the pulse pressure and RetainedFlow the swing of flow,
	// supported over native; RetainedShear that of the amplitude of the wall shear
	// stress.
	RetainedPressure, RetainedFlow, RetainedShear float64
	// FlowAmplitude is the swing of flow, native over supported.
	FlowAmplitude float64
	// MeanFlow is supported over native.
	MeanFlow float64
	// Pulsatile losses, native over supported: in the segments that lead to the
	// bed alone, in R1 and in R2 of its terminals; NaN of a site.
	SegmentLoss, R1Loss, R2Loss float64
}

// Ratios compares a bed in two states.
func (supported BedState) Ratios(native BedState) BedRatios {
	r := ratiosOf(native.PulseFigures, supported.PulseFigures, native.ShearAmplitude, supported.ShearAmplitude)
	loss := func(of func(BedState) tree.Loss) float64 {
		return quotient(of(native).Pulsatile, of(supported).Pulsatile)
	}
	r.SegmentLoss = loss(func(b BedState) tree.Loss { return b.Segments })
	r.R1Loss = loss(func(b BedState) tree.Loss { return b.R1 })
	r.R2Loss = loss(func(b BedState) tree.Loss { return b.R2 })
	return r
}

// Ratios compares a site in two states.
func (supported SiteState) Ratios(native SiteState) BedRatios {
	r := ratiosOf(native.PulseFigures, supported.PulseFigures, native.ShearAmplitude, supported.ShearAmplitude)
	r.SegmentLoss, r.R1Loss, r.R2Loss = math.NaN(), math.NaN(), math.NaN()
	return r
}

func ratiosOf(native, supported PulseFigures, nativeShear, supportedShear float64) BedRatios {
	return BedRatios{
		RetainedPressure: quotient(supported.PulsePressure, native.PulsePressure),
		RetainedFlow:     quotient(supported.Swing, native.Swing),
		RetainedShear:    quotient(supportedShear, nativeShear),
		FlowAmplitude:    quotient(native.Swing, supported.Swing),
		MeanFlow:         quotient(supported.Flow.Mean, native.Flow.Mean),
	}
}
