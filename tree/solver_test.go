package tree

import (
	"math"
	"math/cmplx"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/fitting"
	"afterbeat/tree/energy"
)

// The waves are the samples of the spectra, by the library's transform; power and
// ledger are those of the waves.
func TestWavesAreTheirSpectra(t *testing.T) {
	n := tree55(t, false)
	n.OutflowPressure = 6
	flow := beat(90)
	state := mustSolve(t, n, flow)
	for _, i := range []int{0, 11, 54} {
		for _, e := range []End{Inlet, Outlet} {
			x := make([]complex128, 46)
			for k := range 45 {
				x[k], _ = state.Coefficients(i, e, k)
			}
			want := data.FromSpectrum(x, 90, flow.Rate)
			got := state.Pressure(i, e)
			for j, p := range want.Samples {
				if math.Abs(got.Samples[j]-p) > 1e-11 {
					t.Fatalf("segment %d, sample %d: %g, want %g", i, j, got.Samples[j], p)
				}
			}
			low, high := want.Extremes()
			r, _ := state.Ranges(i, e)
			near(t, "mean", r.Mean, want.Mean(), 1e-13)
			near(t, "least", r.Min, low, 1e-12)
			near(t, "greatest", r.Max, high, 1e-12)
			near(t, "pulse", r.Pulse, high-low, 1e-12)
		}
	}
	in, out := energy.PowerOf(state.Pressure(11, Inlet), state.Flow(11, Inlet)), energy.PowerOf(state.Pressure(11, Outlet), state.Flow(11, Outlet))
	near(t, "pulsatile loss", state.Loss(11).Pulsatile, in.Pulsatile-out.Pulsatile, 1e-9)
	near(t, "steady loss", state.Loss(11).Steady, in.Steady-out.Steady, 1e-9)
	ledger := state.Ledger()
	near(t, "input", ledger.Input, energy.PowerOf(state.Pressure(0, Inlet), state.Flow(0, Inlet)).Input, 1e-12)
	if b := ledger.Balance(); math.Abs(b) > 1e-13 {
		t.Errorf("balance %g", b)
	}
}

// The tree as a load answers a flow with the pressure of the solver at its root.
func TestLoadAnswersAsTheSolver(t *testing.T) {
	n := tree55(t, true)
	flow := beat(77)
	want := mustSolve(t, n, flow).Pressure(0, Inlet)
	got := fitting.Respond(mustLoad(t, n), flow, n.OutflowPressure)
	for j, p := range want.Samples {
		if math.Abs(got.Samples[j]-p) > 1e-10 {
			t.Fatalf("sample %d: %g, want %g", j, got.Samples[j], p)
		}
	}
	l := mustLoad(t, n)
	if z := l.Impedance(-8); z != cmplx.Conj(l.Impedance(8)) {
		t.Error("impedance at a negative frequency: ", z)
	}
}

func TestSolverTakesNewValues(t *testing.T) {
	n := tree55(t, true)
	flow := beat(64)
	s, err := NewSolver(n, 64, 20)
	if err != nil {
		t.Fatal(err)
	}
	softer := n.Clone()
	for i := range softer.Segments {
		softer.Segments[i].Eh *= 0.7
		softer.Segments[i].Radius *= 1.1
		softer.Segments[i].RadiusDistal *= 1.1
	}
	allocations := testing.AllocsPerRun(3, func() {
		if err := s.Update(softer); err != nil {
			t.Fatal(err)
		}
		if _, err := s.Solve(flow); err != nil {
			t.Fatal(err)
		}
	})
	if allocations > 0 {
		t.Errorf("%g allocations a solution", allocations)
	}
	fresh, err := NewSolver(softer, 64, 20)
	if err != nil {
		t.Fatal(err)
	}
	want, _ := fresh.Solve(flow)
	for i := range softer.Segments {
		p, q := want.Coefficients(i, Outlet, 3)
		if gotP, gotQ := s.state.Coefficients(i, Outlet, 3); gotP != p || gotQ != q {
			t.Fatalf("segment %d: %v, %v, want %v, %v", i, gotP, gotQ, p, q)
		}
	}
	softer.Segments[3].RadiusDistal = 0.2 // more pieces than before
	if err := s.Update(softer); err != nil {
		t.Fatal(err)
	}
	if _, err := s.Solve(flow); err != nil {
		t.Fatal(err)
	}
	softer.Segments[2].Parent = "55"
	if err := s.Update(softer); err == nil {
		t.Error("another tree was taken for the same")
	}
}

// On several workers every number comes out the same as on one.
func TestWorkersMakeNoDifference(t *testing.T) {
	flow := beat(129)
	one, err := NewSolver(grown(300), 129, 64)
	if err != nil {
		t.Fatal(err)
	}
	many, err := NewSolver(grown(300), 129, 64)
	if err != nil {
		t.Fatal(err)
	}
	many.nodes = [][]node{many.nodes[0], make([]node, 300), make([]node, 300)}
	a, _ := one.Solve(flow)
	b, _ := many.Solve(flow)
	for j, e := range a.spectra {
		if b.spectra[j] != e {
			t.Fatalf("spectrum %d: %v and %v", j, e, b.spectra[j])
		}
	}
}

// A chain of 100 000 segments is solved without recursion and without overflow,
// and its steady loss is Poiseuille's.
func TestLongChain(t *testing.T) {
	n := Network{Blood: thick, Segments: chain(100_000)}
	state := mustSolve(t, n, beat(9))
	for k := 1; k <= state.Harmonics(); k++ {
		if z := state.RootImpedance(k); cmplx.IsNaN(z) || cmplx.Abs(z) > 10 {
			t.Fatalf("harmonic %d: %v", k, z)
		}
	}
	want := 100_000 * 8 * 0.04 * 2 / (math.Pi * math.Pow(0.3, 4)) / 1333.22387415
	near(t, "resistance", mustLoad(t, n).Resistance(), want+11, 1e-9)
	if b := state.Ledger().Balance(); math.Abs(b) > energy.Tolerance {
		t.Errorf("balance %g", b)
	}
}

func TestSolverRefuses(t *testing.T) {
	n := tree55(t, false)
	for _, c := range []struct {
		samples, harmonics int
		want               string
	}{{0, 0, "a period needs samples"}, {10, 5, "10 samples carry 1 to 4 harmonics, not 5"}, {10, -1, "10 samples carry 1 to 4 harmonics, not -1"}} {
		if _, err := NewSolver(n, c.samples, c.harmonics); err == nil || err.Error() != c.want {
			t.Errorf("%+v: %v", c, err)
		}
	}
	// A quarter of a wave in an ideal open tube under Poiseuille's mean: Zin is
	// infinite where tan is; the nearest number is finite and huge, or an error.
	s, err := NewSolver(tube(1.25, 1, 500, Terminal{R2: 0}, ideal), 9, 1)
	if err != nil {
		t.Fatal(err)
	}
	flow := beat(9)
	flow.Rate = 900 // 100 Hz: a wave of 5 cm
	if state, err := s.Solve(flow); err == nil && cmplx.Abs(state.RootImpedance(1)) < 1e9 {
		t.Error("a resonance without loss is finite: ", state.RootImpedance(1))
	} else if err != nil && !strings.Contains(err.Error(), "resonates") {
		t.Error(err)
	}
}

// The index of one that never turns back is 0, of one without mean 1/2; the mean
// is 4 mu Q/(pi r³), and at small alpha the whole wave is (closed forms).
func TestShear(t *testing.T) {
	const radius = 0.02
	flow := beat(64)
	for _, line := range []Line{Womersley, Poiseuille} {
		n := tube(1, radius, 900, Terminal{R2: 1}, thick)
		n.Line = line
		state := mustSolve(t, n, flow)
		shear := state.Shear(0)
		per := 4 * 0.04 / (math.Pi * radius * radius * radius)
		near(t, "mean", shear.Mean, per*flow.Mean(), 1e-12)
		_, q := state.Ranges(0, Inlet)
		near(t, "greatest at small alpha", shear.Max, per*q.Max, 2e-3)
		if shear.Oscillatory > 1e-3 {
			t.Errorf("oscillatory index %g of a flow that does not turn", shear.Oscillatory)
		}
	}
	for j := range flow.Samples {
		flow.Samples[j] = math.Sin(2 * math.Pi * float64(j) / 64)
	}
	shear := mustSolve(t, tube(1, 1, 500, Terminal{R2: 1}, thick), flow).Shear(0)
	near(t, "oscillatory index without mean", shear.Oscillatory, 0.5, 1e-9)
	near(t, "amplitude", shear.Amplitude, (shear.Max-shear.Min)/2, 1e-14)
	// At alpha = sqrt(w rho/mu) = 14.36 the amplitude by its definition.
	w := 2 * math.Pi / 0.8
	alpha := math.Sqrt(w * 1.05 / 0.04)
	factor := cmplx.Abs(complex(0, w*1.05/(2*math.Pi)) * f10(alpha) / (1 - f10(alpha)))
	near(t, "amplitude of a sine", shear.Amplitude, factor, 2e-3)
	if s := mustSolve(t, tube(1, 1, 500, Terminal{R2: 1}, ideal), flow).Shear(0); !math.IsNaN(s.Oscillatory) || s.Max != 0 {
		t.Errorf("an ideal fluid drags: %+v", s)
	}
}

// f10 by 2/z - 1/z² and so on, good enough at alpha of 10 and above: the first three terms
// of its expansion in 1/lambda (Womersley 1957).
func f10(alpha float64) complex128 {
	x := cmplx.Rect(1/alpha, -math.Pi/4)
	return 2*x - x*x - x*x*x/4
}
