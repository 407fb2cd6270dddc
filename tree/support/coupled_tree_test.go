package support

import (
	"math"
	"math/cmplx"
	"testing"

	"afterbeat/fitting"
	"afterbeat/tree"
	"afterbeat/tree/heart"
	"afterbeat/tree/pump"
)

// treeCoupling is an invented failing heart with a pump, and twoBeds an invented tree.
func treeCoupling() Coupling {
	return Coupling{
		Ventricle: heart.Ventricle{Period: 0.8, Activation: heart.Hill, Emax: 0.7, Emin: 0.1, V0: 10, Rmv: 0.01, Rav: 0.005},
		Filling:   heart.Filling{Pressure: 20, Slope: 0.46, Flow: 60},
		Pump:      pump.Pump{Curve: pump.Curve{A: 1.05, B: 0.013, C: 0.0006}, Resistance: 0.12, Inertance: 0.035},
	}
}

func twoBeds() tree.Network {
	return tree.Network{Blood: tree.StandardBlood(), OutflowPressure: 5, Segments: []tree.Segment{
		{ID: "aorta", Length: 40, Radius: 1.2, WaveSpeed: 550},
		{ID: "upper", Parent: "aorta", Length: 20, Radius: 0.5, WaveSpeed: 700, Terminal: &tree.Terminal{Matched: true, R2: 3, C: 0.3}},
		{ID: "lower", Parent: "aorta", Length: 50, Radius: 0.6, WaveSpeed: 800, Terminal: &tree.Terminal{Matched: true, R2: 1.5, C: 0.5}},
	}}
}

func mustTree(t *testing.T, c Coupling, n tree.Network) *CoupledTree {
	t.Helper()
	k, err := NewCoupledTree(c, n)
	if err != nil {
		t.Fatal(err)
	}
	return k
}

// A tree that is a matched tube of no length before R and C is the lumped wk3: the states
// must be the same.
func TestTreeThatIsLumped(t *testing.T) {
	n := tree.Network{Blood: tree.Blood{Density: 1.06}, OutflowPressure: 5, Segments: []tree.Segment{
		{ID: "a", Length: 1e-6, Radius: 1.2, WaveSpeed: 550, Terminal: &tree.Terminal{Matched: true, R2: 1.1, C: 1.3}},
	}}
	zc := 1.06 * 550 / (math.Pi * 1.44) / 1333.22387415
	lumped := treeCoupling()
	lumped.Load = Windkessel{Kind: WK3, Values: fitting.Values{R: 1.1, C: 1.3, Zc: zc}, OutflowPressure: 5}
	lumped.Filling.Flow = math.NaN()
	c := treeCoupling()
	c.Filling.Flow = math.NaN()
	k, err := NewCoupled(lumped)
	if err != nil {
		t.Fatal(err)
	}
	on := mustTree(t, c, n)
	if math.Abs(on.Filling.Flow-k.Filling.Flow) > 1e-4 {
		t.Errorf("flow of the filling line %g on the tree, %g lumped", on.Filling.Flow, k.Filling.Flow)
	}
	for _, speed := range []float64{0, 9} {
		want, err := k.At(speed)
		if err != nil {
			t.Fatal(err)
		}
		got, err := on.At(speed)
		if err != nil {
			t.Fatal(err)
		}
		if !got.Settled || got.Rounds < 2 {
			t.Errorf("speed %g: settled %v in %d rounds", speed, got.Settled, got.Rounds)
		}
		for name, d := range map[string]float64{
			"mean": got.Arterial.Mean - want.Arterial.Mean, "max": got.Arterial.Max - want.Arterial.Max,
			"flow": got.Flow() - want.Flow(), "R": (got.Energy.TerminalR2 - want.Energy.R) / want.Energy.R,
			"Zc": (got.Energy.TerminalR1 - want.Energy.Zc) / want.Energy.Zc,
		} {
			if math.Abs(d) > 1e-3 {
				t.Errorf("speed %g, %s: off by %g", speed, name, d)
			}
		}
	}
}

// The settled state answers to both sides: its root pressure is, harmonic by
// harmonic, the impedance of the tree times its root flow (to 0.005 mmHg in all), and
// heart, pump and valves integrate to that flow; the energy of the beat closes.
func TestCoupledTreeAnswersToBothSides(t *testing.T) {
	n := twoBeds()
	k := mustTree(t, treeCoupling(), n)
	load, err := tree.NewLoad(n)
	if err != nil {
		t.Fatal(err)
	}
	for _, speed := range []float64{0, 8, 10} {
		s, err := k.At(speed)
		if err != nil {
			t.Fatal(err)
		}
		if !s.Settled {
			t.Errorf("speed %g does not settle in %d rounds", speed, s.Rounds)
		}
		waves, err := k.Waves(speed, restSamples)
		if err != nil {
			t.Fatal(err)
		}
		p, q := waves.Pressure.Spectrum(), waves.RootFlow.Spectrum()
		off := cmplx.Abs(p[0] - 5 - q[0]*complex(load.Resistance(), 0))
		for j := 1; j <= 160; j++ {
			off += 2 * cmplx.Abs(p[j]-q[j]*load.Impedance(2*math.Pi*float64(j)/0.8))
		}
		if off > 5e-3 {
			t.Errorf("speed %g: root pressure misses the tree's by %g mmHg", speed, off)
		}
		if b := s.Energy.Balance(); math.Abs(b) > 2e-7 {
			t.Errorf("speed %g: balance %g", speed, b)
		}
		_, flow := s.Tree.Coefficients(0, tree.Inlet, 0)
		if d := real(flow) - s.Flow(); math.Abs(d) > 1e-5 {
			t.Errorf("speed %g: %g mL/s more in the tree than from heart and pump", speed, d)
		}
		t.Logf("speed %g: %d rounds, %d beats, pressure off by %.1e mmHg, balance %.1e", speed, s.Rounds, s.Beats, off, s.Energy.Balance())
	}
}

// Where nothing changes, nothing moves; after a step the beats end in the state of the
// new speed.
func TestStepOnATree(t *testing.T) {
	c := treeCoupling()
	c.FillingLag = 3
	k := mustTree(t, c, twoBeds())
	still, err := k.Step(9, 9, 3)
	if err != nil || !still.Complete {
		t.Fatal(still, err)
	}
	if d := still.Arterial[2] - still.Arterial[0]; math.Abs(d) > 1e-3 {
		t.Errorf("a step of nothing moves pressure by %g", d)
	}
	step, err := k.Step(9, 10, 40)
	if err != nil || len(step.Arterial) != 40 {
		t.Fatal(step, err)
	}
	after, err := k.At(10)
	if err != nil {
		t.Fatal(err)
	}
	if d := step.Arterial[39] - after.Arterial.Mean; math.Abs(d) > 0.02 {
		t.Errorf("the step ends %g mmHg from the state of its speed", d)
	}
}

func TestCoupledTreeRefuses(t *testing.T) {
	shut := twoBeds()
	shut.Segments[1].Terminal.R2, shut.Segments[2].Terminal.R2 = math.Inf(1), math.Inf(1)
	if _, err := NewCoupledTree(treeCoupling(), shut); err == nil {
		t.Error("a closed tree was coupled")
	}
	broken := twoBeds()
	broken.Segments[1].Parent = "nobody"
	if _, err := NewCoupledTree(treeCoupling(), broken); err == nil {
		t.Error("a broken tree was coupled")
	}
	if _, err := mustTree(t, treeCoupling(), twoBeds()).At(-1); err == nil {
		t.Error("a negative speed was run")
	}
}

// The rest is the sum of its harmonics, at any time.
func TestRestIsItsSeries(t *testing.T) {
	r := newRest(0.8, 3)
	r.amplitude[1], r.amplitude[2], r.amplitude[3] = 3-2i, 0.5i, -0.25
	for _, at := range []float64{0, 0.1, 0.37, 0.79} {
		want := 0.0
		for k, a := range r.amplitude {
			want += real(a * cmplx.Exp(complex(0, 2*math.Pi*float64(k)*at/0.8)))
		}
		if math.Abs(r.at(at)-want) > 1e-13 {
			t.Errorf("%g s: %g, want %g", at, r.at(at), want)
		}
	}
}
