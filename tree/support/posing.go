package support

import (
	"errors"
	"fmt"
	"math"

	"afterbeat/data"
)

// Posing names the rule by which the pump takes its share of the flow.
type Posing string

const (
	// NativePosing is no posing: the flow as it was measured.
	NativePosing Posing = "native"
	// ScaledPosing is the native flow scaled down, on a steady one.
	ScaledPosing Posing = "scaled"
	// LateValvePosing is what the native flow has above a threshold, on a steady one.
	LateValvePosing Posing = "late-valve"
	// CoupledPosing is no rule: ventricle, pump and load settle what each does.
	CoupledPosing Posing = "coupled"
	// ModulatedPosing is the same with a speed that changes over time.
	ModulatedPosing Posing = "modulated"
)

// Posings lists the posings that take a share, in the order of help texts.
func Posings() []Posing { return []Posing{ScaledPosing, LateValvePosing} }

// ByConstruction tells whether the retained pulse follows from the posing alone,
// on any linear load.
func (p Posing) ByConstruction() bool { return p == ScaledPosing }

// Scaled is (1-s) Q + s mean Q, mL/s, of a native flow q and a share s. It
// panics where s is not in 0..1.
func Scaled(q data.Period, share float64) data.Period {
	root, _ := pose(q, ScaledPosing, share)
	return root
}

// LateValve is max(0, Q+ - q0) + (1-s) Q- + s mean Q, mL/s, of a native flow q
// with a positive mean and a share s, and the threshold q0, mL/s. The mean of q
// is kept to rounding. It panics where s is not in 0..1 or mean flow is not
// positive.
func LateValve(q data.Period, share float64) (root data.Period, threshold float64) {
	if !(q.Mean() > 0) {
		panic(fmt.Sprintf("support: mean flow %v is not positive", q.Mean()))
	}
	return pose(q, LateValvePosing, share)
}

// pose is the flow into the arteries under a posing.
func pose(q data.Period, posing Posing, share float64) (root data.Period, threshold float64) {
	if !isShare(share) {
		panic(fmt.Sprintf("support: share %v is not in 0..1", share))
	}
	var e ejection
	e.of(q.Samples)
	root = data.Period{Samples: make([]float64, len(q.Samples)), Rate: q.Rate}
	threshold = e.pose(root.Samples, posing, share)
	return root, threshold
}

func isShare(s float64) bool { return s >= 0 && s <= 1 }

// check tells why a flow cannot be posed about: an error for a person to read.
func check(q data.Period, posing Posing, shares []float64) error {
	if posing != ScaledPosing && posing != LateValvePosing {
		return fmt.Errorf("%q is no posing with a share: there are %s and %s", posing, ScaledPosing, LateValvePosing)
	}
	for _, s := range shares {
		if !isShare(s) {
			return fmt.Errorf("share %v of the pump is not between 0 and 1", s)
		}
	}
	mean := q.Mean()
	switch {
	case len(q.Samples) == 0:
		return errors.New("the flow has no samples")
	case math.IsNaN(mean) || math.IsInf(mean, 0):
		return errors.New("the flow has samples without a value: nothing to compare")
	case mean <= 0:
		return fmt.Errorf("mean flow %.4g is not positive: a share of it means nothing; the channel may be inverted", mean)
	}
	return nil
}
