package tree

import (
	"errors"
	"math"
	"strings"
	"testing"
)

func fork(first, second Terminal, b Blood) Network {
	return Network{Blood: b, OutflowPressure: 7, Segments: []Segment{
		{ID: "trunk", Length: 10, Radius: 1, WaveSpeed: 500},
		{ID: "one", Parent: "trunk", Length: 20, Radius: 0.5, WaveSpeed: 600, Terminal: &first},
		{ID: "two", Parent: "trunk", Length: 30, Radius: 0.4, WaveSpeed: 700, Terminal: &second},
	}}
}

// Mean flow divides as currents do: by hand for a fork, 8 mu l/(pi r⁴) each.
func TestMeanFlowDivides(t *testing.T) {
	n := fork(Terminal{R1: 1, R2: 3}, Terminal{R1: 0, R2: 6, C: 1}, thick)
	poiseuille := func(s Segment) float64 {
		return 8 * 0.04 * s.Length / (math.Pi * math.Pow(s.Radius, 4)) / 1333.22387415
	}
	trunk, one, two := poiseuille(n.Segments[0]), poiseuille(n.Segments[1])+4, poiseuille(n.Segments[2])+6
	near(t, "resistance", mustLoad(t, n).Resistance(), trunk+one*two/(one+two), 1e-14)
	flow := beat(32)
	state := mustSolve(t, n, flow)
	p, q := state.Coefficients(1, Outlet, 0)
	near(t, "flow of one", real(q), flow.Mean()*two/(one+two), 1e-13)
	near(t, "pressure of one", real(p), 7+4*real(q), 1e-13)
	p, _ = state.Coefficients(0, Inlet, 0)
	near(t, "pressure at the root", real(p), 7+flow.Mean()*(trunk+one*two/(one+two)), 1e-13)
}

// A closed terminal beside an open one takes no mean flow, and its mean pressure
// is that of the junction.
func TestClosedBesideOpen(t *testing.T) {
	for _, shut := range []Terminal{{R1: inf, R2: 1}, {R2: inf}, {R1: 1, R2: inf, C: 0.5}, {R1: inf, R2: inf, C: 1}} {
		state := mustSolve(t, fork(shut, Terminal{R2: 2}, thick), beat(32))
		p, q := state.Coefficients(1, Outlet, 0)
		junction, _ := state.Coefficients(0, Outlet, 0)
		if q != 0 || p != junction {
			t.Errorf("%+v: flow %v, pressure %v of %v", shut, q, p, junction)
		}
		if b := state.Ledger().Balance(); math.Abs(b) > 1e-12 {
			t.Errorf("%+v: balance %g", shut, b)
		}
	}
}

// Where all is closed, mean pressure has no value; the pulse has.
func TestAllClosed(t *testing.T) {
	n := fork(Terminal{R1: inf, R2: 1}, Terminal{R1: 2, R2: inf, C: 0.3}, thick)
	state := mustSolve(t, n, beat(32))
	pressure, flow := state.Ranges(1, Outlet)
	if !math.IsNaN(pressure.Mean) || !math.IsNaN(pressure.Min) || !(pressure.Pulse > 0) || flow.Mean != 0 {
		t.Errorf("pressure %+v, flow %+v at a closed end", pressure, flow)
	}
	if q := state.Flow(2, Outlet); math.IsNaN(q.Samples[3]) {
		t.Error("flow beside a mean pressure of no value is lost")
	}
	// Mean flow fills the tree by compliance: C of the second terminal over all.
	_, whole := state.Coefficients(0, Inlet, 0)
	_, q := state.Coefficients(2, Outlet, 0)
	near(t, "filling", real(q/whole), 0.3/mustLoad(t, n).Compliance(), 1e-12)
	if b := state.Ledger().Balance(); !math.IsNaN(b) {
		t.Error("a balance without mean pressure: ", b)
	}
}

// Two ways without any resistance leave open which takes the mean flow; one takes
// it all.
func TestUndeterminedMeanFlow(t *testing.T) {
	_, err := NewLoad(fork(Terminal{}, Terminal{C: 1}, ideal))
	var fault *SegmentError
	if !errors.As(err, &fault) || !strings.Contains(err.Error(), "not determined") {
		t.Errorf("two free ways: %v", err)
	}
	state := mustSolve(t, fork(Terminal{R2: 1}, Terminal{}, ideal), beat(32))
	_, one := state.Coefficients(1, Outlet, 0)
	p, two := state.Coefficients(2, Outlet, 0)
	if one != 0 || real(two) < 80 || real(p) != 7 {
		t.Errorf("one way takes %v, the free one %v at %v mmHg", one, two, p)
	}
}
