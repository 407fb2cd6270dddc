package anatomy

import (
	"afterbeat/data"
	"afterbeat/tree"
)

// End is pressure and flow at one end of a segment over a beat.
type End struct{ Pressure, Flow data.Period }

// Waves are pressure and flow at both ends of a segment.
type Waves struct{ Inlet, Outlet End }

// Spread is the pressure and flow of flow at the root at both ends of every
// segment, by index, and the impedance at the root by harmonic, 0 first.
func Spread(n tree.Network, flow data.Period) ([]Waves, []complex128, error) {
	solver, err := tree.NewSolver(n, len(flow.Samples), 0)
	if err != nil {
		return nil, nil, err
	}
	state, err := solver.Solve(flow)
	if err != nil {
		return nil, nil, err
	}
	load, err := tree.NewLoad(n)
	if err != nil {
		return nil, nil, err
	}
	root := []complex128{complex(load.Resistance(), 0)}
	for k := 1; k <= state.Harmonics(); k++ {
		root = append(root, state.RootImpedance(k))
	}
	out := make([]Waves, len(n.Segments))
	end := func(i int, e tree.End) End {
		p, q := make([]float64, len(flow.Samples)), make([]float64, len(flow.Samples))
		state.Waves(i, e, p, q)
		return End{data.Period{Samples: p, Rate: flow.Rate}, data.Period{Samples: q, Rate: flow.Rate}}
	}
	for i := range out {
		out[i] = Waves{Inlet: end(i, tree.Inlet), Outlet: end(i, tree.Outlet)}
	}
	return out, root, nil
}
