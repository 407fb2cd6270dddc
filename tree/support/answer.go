package support

import (
	"afterbeat/data"
	"afterbeat/fitting"
)

// Answer is a native state beside the supported states of one posing.
type Answer struct {
	Load            fitting.Load
	OutflowPressure float64 // Pv, mmHg
	// OutflowOrigin says where Pv comes from; Pose leaves it assumed.
	OutflowOrigin data.Origin
	Posing        Posing
	// PerArea tells that the flow is a velocity, in cm/s, and the load one per
	// unit area. Pose leaves it false; only units in print depend on it.
	PerArea bool

	Native    State
	Supported []State // one a share
	// Comparisons has one entry a supported state, in the same order.
	Comparisons []Comparison
}

// Pose answers for a load, its native flow in mL/s and its outflow pressure in
// mmHg what a steady pump leaves at each of the shares; errors are those of
// [Supported].
func Pose(l fitting.Load, flow data.Period, pv float64, posing Posing, shares []float64) (Answer, error) {
	supported, err := Sweep(l, flow, pv, posing, shares)
	if err != nil {
		return Answer{}, err
	}
	a := Answer{Load: l, OutflowPressure: pv, OutflowOrigin: data.Assumed, Posing: posing, Native: Native(l, flow, pv), Supported: supported}
	for _, s := range supported {
		a.Comparisons = append(a.Comparisons, Compare(a.Native, s))
	}
	return a, nil
}

// Shares are the pump's shares of the supported states.
func (a Answer) Shares() []float64 {
	shares := make([]float64, len(a.Supported))
	for i, s := range a.Supported {
		shares[i] = s.Share
	}
	return shares
}

// Warnings are those of all states, each code once a text.
func (a Answer) Warnings() []data.Warning {
	var all []data.Warning
	seen := map[data.Warning]bool{}
	for _, s := range append([]State{a.Native}, a.Supported...) {
		for _, w := range s.Warnings {
			if !seen[w] {
				seen[w] = true
				all = append(all, w)
			}
		}
	}
	return all
}
