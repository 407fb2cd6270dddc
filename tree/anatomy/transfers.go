package anatomy

import (
	"afterbeat/data"
	"afterbeat/tree"
)

// transfers are pressure and flow at the places of some traces, over the flow at
// the root, of a tree whose values change and whose segments do not.
type transfers struct {
	aims    []aim
	solver  *tree.Solver
	impulse data.Period // whose coefficients are all 1/N
	value   [][]complex128
}

// newTransfers plans for the harmonics of a flow, 0 to harmonics.
func newTransfers(n tree.Network, flow data.Period, harmonics int, aims []aim) (*transfers, error) {
	t := &transfers{aims: aims, value: make([][]complex128, len(aims))}
	for j := range t.value {
		t.value[j] = make([]complex128, harmonics+1)
	}
	count := 2*harmonics + 1
	t.impulse = data.Period{Samples: make([]float64, count), Rate: float64(count) / flow.Duration()}
	t.impulse.Samples[0] = 1
	var err error
	t.solver, err = tree.NewSolver(n, count, harmonics)
	return t, err
}

// solve takes over the values of n.
func (t *transfers) solve(n tree.Network) error {
	if err := t.solver.Update(n); err != nil {
		return err
	}
	state, err := t.solver.Solve(t.impulse)
	if err != nil {
		return err
	}
	per := complex(float64(len(t.impulse.Samples)), 0)
	for j, a := range t.aims {
		end := tree.Inlet
		if a.at.Outlet {
			end = tree.Outlet
		}
		for k := range t.value[j] {
			p, q := state.Coefficients(a.at.Segment, end, k)
			if k == 0 {
				p -= complex(n.OutflowPressure, 0)
			}
			if a.IsPressure() {
				q = p
			}
			t.value[j][k] = per * q
		}
	}
	return nil
}

// of is the transfer to trace j at harmonic k.
func (t *transfers) of(j, k int) complex128 { return t.value[j][k] }
