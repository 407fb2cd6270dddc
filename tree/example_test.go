package tree_test

import (
	"fmt"
	"math/cmplx"
	"strings"

	"afterbeat/data"
	"afterbeat/tree"
)

// A fork of two arteries under one harmonic of flow. All values are invented.
func Example() {
	const table = `id,parent,name,length_cm,radius_cm,wave_speed_m_s,r1,c,r2
trunk,,Trunk,20,1.0,5.0,,,
head,trunk,To the head,20,0.4,6.5,,0.3,2
legs,trunk,To the legs,60,0.5,8.0,,0.5,1.5
`
	network, err := tree.Read("fork.csv", strings.NewReader(table))
	if err != nil {
		fmt.Println(err)
		return
	}
	flow := data.Period{Samples: []float64{120, 100, 80, 60, 80, 100}, Rate: 6 / 0.8}
	solver, err := tree.NewSolver(network, len(flow.Samples), 0)
	if err != nil {
		fmt.Println(err)
		return
	}
	state, err := solver.Solve(flow)
	if err != nil {
		fmt.Println(err)
		return
	}
	p, _ := state.Ranges(network.Find("head"), tree.Outlet)
	fmt.Printf("mean %.1f, pulse %.1f mmHg\n", p.Mean, p.Pulse)
	fmt.Printf("impedance at %.2f Hz %.4f mmHg s/mL\n", state.Frequency(1), cmplx.Abs(state.RootImpedance(1)))
	// Output:
	// mean 118.6, pulse 15.0 mmHg
	// impedance at 1.25 Hz 0.2631 mmHg s/mL
}
