package anatomy

import (
	"errors"
	"math"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"afterbeat/data"
	"afterbeat/tree"
)

// For any fitted load and body the tree has the fitted resistance and compliance,
// the organ table's flows, and no terminal is negative.
func TestTreeHasTheFittedLoad(t *testing.T) {
	optional := func(t *rapid.T, low, high float64, name string) float64 {
		if rapid.Bool().Draw(t, "known "+name) {
			return rapid.Float64Range(low, high).Draw(t, name)
		}
		return math.NaN()
	}
	rapid.Check(t, func(t *rapid.T) {
		l := Load{
			Resistance: rapid.Float64Range(0.6, 3).Draw(t, "R"), Compliance: rapid.Float64Range(0.3, 3).Draw(t, "C"),
			MeanFlow: rapid.Float64Range(25, 170).Draw(t, "flow"), OutflowPressure: rapid.Float64Range(0, 30).Draw(t, "Pv"),
		}
		b := Body{
			Height: optional(t, 140, 210, "height"), Weight: optional(t, 35, 160, "weight"), Age: optional(t, 18, 95, "age"),
			PulseWave: optional(t, 4, 18, "velocity"), RootDiameter: optional(t, 2, 4.5, "diameter"),
		}
		built, err := Systemic(b, l, 0)
		if err != nil {
			t.Fatal(err)
		}
		n := built.Network
		load, err := tree.NewLoad(n)
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(load.Resistance()/l.Resistance-1) > 1e-9 || math.Abs(load.Compliance()/l.Compliance-1) > 1e-9 {
			t.Fatalf("R %g of %g, C %g of %g", load.Resistance(), l.Resistance, load.Compliance(), l.Compliance)
		}
		parts := shares(published(true), 0)
		solver, err := tree.NewSolver(n, 3, 1)
		if err != nil {
			t.Fatal(err)
		}
		state, err := solver.Solve(period(1, 1, 1, 1))
		if err != nil {
			t.Fatal(err)
		}
		for i, s := range n.Segments {
			if s.Terminal == nil {
				continue
			}
			if x := s.Terminal; !(x.R1 > 0 && x.R2 > 0 && x.C > 0) || math.IsInf(x.R1+x.R2+x.C, 0) {
				t.Fatalf("%s: terminal %+v", s.Name, *x)
			}
			if _, q := state.Coefficients(i, tree.Outlet, 0); math.Abs(real(q)-parts[s.ID]) > 1e-9 {
				t.Fatalf("%s gets %g of the flow, want %g", s.Name, real(q), parts[s.ID])
			}
		}
	})
}

// Measured diameters are those of the tree, on both sides, and the load stays the
// fitted one; a site that is no artery is refused.
func TestMeasuredDiameters(t *testing.T) {
	l := Load{Resistance: 1, Compliance: 1.5, MeanFlow: 80}
	b := Unknown()
	b.Height, b.Weight, b.RootDiameter = 160, 60, 3.1
	b.Diameters = map[data.Site]float64{data.SiteCarotid: 0.62, data.SiteFemoral: 0.7}
	built, err := Systemic(b, l, 0)
	if err != nil {
		t.Fatal(err)
	}
	n := built.Network
	for name, want := range map[string]float64{"Ascending aorta": 3.1, "R. common carotid": 0.62, "L. common carotid": 0.62, "R. femoral": 0.7, "L. femoral": 0.7} {
		i := slices.IndexFunc(n.Segments, func(s tree.Segment) bool { return s.Name == name })
		if i < 0 || math.Abs(2*n.Segments[i].Radius/want-1) > 1e-12 {
			t.Errorf("%s: segment %d of %+v", name, i, n.Segments[max(i, 0)])
		}
	}
	load, err := tree.NewLoad(n)
	if err != nil || math.Abs(load.Resistance()-1) > 1e-9 || math.Abs(load.Compliance()-1.5) > 1e-9 {
		t.Errorf("%v: R %v, C %v", err, load.Resistance(), load.Compliance())
	}
	said := 0
	for _, s := range built.Scales {
		if s.Given && strings.Contains(s.Why, "measured") {
			said++
		}
	}
	if said != 3 {
		t.Errorf("scales %+v", built.Scales)
	}
	for _, site := range []data.Site{data.SitePump, data.SiteLVOT} {
		b.Diameters = map[data.Site]float64{site: 2}
		var refused *RefusedError
		if _, err := Systemic(b, l, 0); !errors.As(err, &refused) {
			t.Errorf("%s: %v", site, err)
		}
	}
}

// A measured velocity is that of the tree, unless the walls would take all of
// the compliance: then that is said.
func TestMeasuredVelocity(t *testing.T) {
	for _, c := range []struct {
		velocity, compliance float64
		warned               bool
	}{{6, 1.5, false}, {9, 1.5, false}, {9, 0.5, false}, {5, 0.5, true}} {
		b := Unknown()
		b.PulseWave = c.velocity
		built, err := Systemic(b, Load{Resistance: 1, Compliance: c.compliance, MeanFlow: 80}, 0)
		if err != nil {
			t.Fatal(err)
		}
		if warned := len(built.Warnings) > 0; warned != c.warned {
			t.Errorf("%+v: warnings %v", c, built.Warnings)
		}
		if v := PulseWaveVelocity(built.Network); math.Abs(v/c.velocity-1) > 1e-9 == !c.warned || v < c.velocity*(1-1e-9) {
			t.Errorf("%+v: the tree has %g m/s", c, v)
		}
	}
}

func TestHeightAndWeightScale(t *testing.T) {
	l := Load{Resistance: 1, Compliance: 1.2, MeanFlow: 80}
	small, err := Systemic(Body{Height: 155, Weight: 50, Age: math.NaN(), PulseWave: math.NaN(), RootDiameter: math.NaN()}, l, 0)
	if err != nil {
		t.Fatal(err)
	}
	usual, err := Systemic(Unknown(), l, 0)
	if err != nil {
		t.Fatal(err)
	}
	a, b := small.Network.Segments[20], usual.Network.Segments[20]
	area := SurfaceArea(155, 50) / SurfaceArea(175, 70)
	if math.Abs(a.Length/b.Length-155.0/175) > 1e-12 || math.Abs(a.Radius*a.Radius/b.Radius/b.Radius-area) > 1e-12 {
		t.Errorf("length %g of %g, radius %g of %g", a.Length, b.Length, a.Radius, b.Radius)
	}
}

// A resistance that the arteries on the way alone would take is refused with a
// cure.
func TestTooLowAResistanceIsRefused(t *testing.T) {
	_, err := Systemic(Body{Height: 175, Weight: 20, Age: math.NaN(), PulseWave: math.NaN(), RootDiameter: math.NaN()}, Load{Resistance: 0.05, Compliance: 1, MeanFlow: 100}, 0)
	var refused *RefusedError
	if !errors.As(err, &refused) || refused.Cure == "" {
		t.Errorf("error %v", err)
	}
}
