package tree

import (
	"math"
	"math/cmplx"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
)

const degree = math.Pi / 180

func near(t *testing.T, what string, got, want, relative float64) {
	t.Helper()
	if !(math.Abs(got-want) <= relative*math.Abs(want)) {
		t.Errorf("%s = %.12g, want %.12g within %g relative", what, got, want, relative)
	}
}

func mustLoad(t testing.TB, n Network) *Load {
	t.Helper()
	l, err := NewLoad(n)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

func mustSolve(t testing.TB, n Network, flow data.Period) *State {
	t.Helper()
	s, err := NewSolver(n, len(flow.Samples), 0)
	if err != nil {
		t.Fatal(err)
	}
	state, err := s.Solve(flow)
	if err != nil {
		t.Fatal(err)
	}
	return state
}

// The values below were computed from the unrounded table by an independent
// program; the stored one is rounded, hence 2e-6 and 2e-5 degrees.
func TestTree55AtRest(t *testing.T) {
	n := tree55(t, false)
	conductance, terminal, aorta := 0.0, 0.0, 0.0
	for _, s := range n.Segments {
		wall := math.Pi * s.Radius * s.Radius * s.Length * unit.DynPerMmHg / (1.05 * math.Pow(s.Speed(s.Radius, 1.05), 2))
		switch s.ID {
		case "1", "2", "14", "18", "27", "28", "35", "37", "39", "41":
			aorta += wall
		}
		if s.Terminal != nil {
			conductance += 1 / (s.Terminal.R1 + s.Terminal.R2)
			terminal += s.Terminal.C
		}
	}
	near(t, "terminals in parallel", 1/conductance, 1.00660, 5e-6)
	near(t, "terminal compliance", terminal, 0.56, 1e-12)
	near(t, "compliance of the aorta", aorta, 0.4066, 2e-4)
	l := mustLoad(t, n)
	near(t, "input resistance", l.Resistance(), 1.05006461, 2e-6)
	near(t, "compliance", l.Compliance(), 0.6401+0.56, 1e-4)
	near(t, "characteristic impedance", l.CharacteristicImpedance(), 1.05*533/(math.Pi*1.455*1.455*unit.DynPerMmHg), 2e-3)

	state := mustSolve(t, n, beat(64))
	_, whole := state.Coefficients(0, Inlet, 0)
	sum := 0.0
	for id, share := range map[string]float64{"34": 0.14949, "36": 0.12245, "38": 0.12242, "26": 0.09473, "33": 0.05959, "31": 0.03811, "32": 0.02535, "6": 0.02279, "12": 0.00962, "10": 0.00160} {
		_, q := state.Coefficients(n.Find(id), Outlet, 0)
		if got := real(q / whole); math.Abs(got-share) > 6e-6 {
			t.Errorf("segment %s takes %.6f of mean flow, want %.5f", id, got, share)
		}
	}
	for i, s := range n.Segments {
		if s.Terminal != nil {
			_, q := state.Coefficients(i, Outlet, 0)
			sum += real(q / whole)
		}
	}
	near(t, "all shares", sum, 1, 1e-12)
}

func TestImpedanceOfTree55(t *testing.T) {
	l := mustLoad(t, tree55(t, false))
	for _, row := range []struct{ f, modulus, phase float64 }{
		{1.25, 0.13035008, -56.878435},
		{2.5, 0.09847371, -29.480158},
		{3.75, 0.10989965, -33.701030},
		{5, 0.09068910, -49.801950},
		{6.25, 0.05631339, -52.428438},
		{7.5, 0.04242246, -28.998176},
		{10, 0.03633487, -1.583634},
		{12.5, 0.07174145, 15.656179},
	} {
		z := l.Impedance(2 * math.Pi * row.f)
		near(t, "modulus", cmplx.Abs(z), row.modulus, 2e-6)
		if got := cmplx.Phase(z) / degree; math.Abs(got-row.phase) > 2e-5 {
			t.Errorf("phase at %g Hz %.6f degrees, want %.6f", row.f, got, row.phase)
		}
	}
}

// Flow at the inlet of five segments over that at the root, 1.25 Hz.
func TestTransferOfTree55(t *testing.T) {
	n := tree55(t, false)
	state := mustSolve(t, n, beat(64))
	_, whole := state.Coefficients(0, Inlet, 1)
	for _, row := range []struct {
		id             string
		modulus, phase float64
	}{
		{"12", 0.004372, -21.08}, {"34", 0.101854, -20.53}, {"36", 0.047254, -46.62}, {"7", 0.057099, -1.02}, {"46", 0.025021, -53.35},
	} {
		_, q := state.Coefficients(n.Find(row.id), Inlet, 1)
		h := q / whole
		if math.Abs(cmplx.Abs(h)-row.modulus) > 5e-7+5e-6*row.modulus || math.Abs(cmplx.Phase(h)/degree-row.phase) > 6e-3 {
			t.Errorf("segment %s: %.6f, %.2f degrees, want %.6f, %.2f", row.id, cmplx.Abs(h), cmplx.Phase(h)/degree, row.modulus, row.phase)
		}
	}
	near(t, "root impedance of the state", cmplx.Abs(state.RootImpedance(1)), 0.13035008, 2e-6)
}

// Reflection into the junctions, (Yp - sum Yd)/(Yp + sum Yd) of the inviscid
// admittances.
func TestJunctionsOfTree55(t *testing.T) {
	n := tree55(t, false)
	y := func(s Segment) float64 { return s.Radius * s.Radius / s.Speed(s.Radius, 1.05) }
	for id, want := range map[string]float64{"1": 0.149, "14": 0.400, "5": 0.778, "15": 0.778, "7": 0.362, "30": -0.538} {
		parent, daughters := n.Segments[n.Find(id)], 0.0
		if id == "14" { // thoracic I is its daughter; the step is below that
			parent = n.Segments[n.Find("18")]
		}
		for _, s := range n.Segments {
			if s.Parent == parent.ID {
				daughters += y(s)
			}
		}
		got := (y(parent) - daughters) / (y(parent) + daughters)
		if math.Abs(got-want) > 6e-4 {
			t.Errorf("reflection into %s: %.4f, want %.3f", parent.Name, got, want)
		}
	}
}

// The in-vitro network: resistance of the terminals and total compliance.
func TestTree37(t *testing.T) {
	n := tree37(t)
	l := mustLoad(t, n)
	conductance := 0.0
	for _, s := range n.Segments {
		if s.Terminal != nil {
			conductance += 1 / s.Terminal.R2
		}
	}
	near(t, "terminals in parallel", 1/conductance, 1.6865, 1e-4)
	if l.Resistance() < 1/conductance {
		t.Error("the tubes add no resistance")
	}
	near(t, "compliance", l.Compliance(), 0.965, 5e-2)
}
