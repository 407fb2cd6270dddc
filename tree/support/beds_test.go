package support

import (
	"math"
	"math/rand/v2"
	"strconv"
	"testing"

	"afterbeat/data"
	"afterbeat/tree"
)

// forked is an invented tree of three beds: a trunk that forks, and one branch
// that forks again into two terminals of one bed, beside a third.
func forked() (tree.Network, []Bed) {
	n := tree.Network{Blood: tree.StandardBlood(), OutflowPressure: 6, Segments: []tree.Segment{
		{ID: "a", Length: 12, Radius: 1.3, WaveSpeed: 500},
		{ID: "b", Parent: "a", Length: 20, Radius: 0.4, WaveSpeed: 700, Terminal: &tree.Terminal{R1: 0.9, R2: 4, C: 0.1}},
		{ID: "c", Parent: "a", Length: 30, Radius: 0.9, WaveSpeed: 600},
		{ID: "d", Parent: "c", Length: 25, Radius: 0.5, WaveSpeed: 800, Terminal: &tree.Terminal{R1: 0.5, R2: 3, C: 0.2}},
		{ID: "e", Parent: "c", Length: 35, Radius: 0.4, WaveSpeed: 900, Terminal: &tree.Terminal{R1: 0.7, R2: 5, C: 0.1}},
		{ID: "f", Parent: "a", Length: 10, Radius: 0.3, WaveSpeed: 900, Terminal: &tree.Terminal{R1: 1, R2: 9, C: 0.05}},
	}}
	return n, []Bed{{"head", []int{1}}, {"legs", []int{3, 4}}, {"gut", []int{5}}}
}

func arteries(t testing.TB, n tree.Network, beds []Bed, sites ...Site) *Arteries {
	t.Helper()
	a, err := NewArteries(n, 200, 0, beds, sites)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

func stateUnder(t testing.TB, a *Arteries, flow data.Period) ArteryState {
	t.Helper()
	s, err := a.State(flow)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// What the beds get is what enters the root; what they and the shared segments
// lose is what the ledger of the tree has.
func TestBedsAddUp(t *testing.T) {
	n, beds := forked()
	s := stateUnder(t, arteries(t, n, beds), halfSine(200))
	flow := 0.0
	segments, r1, r2 := s.Shared, tree.Loss{}, tree.Loss{}
	add := func(to *tree.Loss, l tree.Loss) { to.Steady += l.Steady; to.Pulsatile += l.Pulsatile }
	for _, b := range s.Beds {
		flow += b.Flow.Mean
		add(&segments, b.Segments)
		add(&r1, b.R1)
		add(&r2, b.R2)
	}
	if math.Abs(flow-s.Root.Flow.Mean) > 1e-9 || math.Abs(flow-87.5) > 1 {
		t.Errorf("beds get %v mL/s, the root %v", flow, s.Root.Flow.Mean)
	}
	for name, got := range map[string]tree.Loss{"segments": segments, "terminal R1": r1, "terminal R2": r2} {
		want, ok := s.Ledger.Term(name)
		if !ok || math.Abs(got.Steady-want.Steady) > 1e-9*s.Ledger.Input || math.Abs(got.Pulsatile-want.Pulsatile) > 1e-9*s.Ledger.Input {
			t.Errorf("%s: %v, the ledger has %v", name, got, want)
		}
		if !(got.Pulsatile > 0) {
			t.Errorf("%s: no pulsatile loss", name)
		}
	}
	if math.Abs(s.Ledger.Balance()) > 1e-9 {
		t.Errorf("balance %v", s.Ledger.Balance())
	}
}

// A bed of one terminal has its segment's figures; of two, flow is the sum.
func TestABedIsItsTerminals(t *testing.T) {
	n, beds := forked()
	flow := halfSine(200)
	a := arteries(t, n, beds, Site{"branch", 2, tree.Inlet}, Site{"end of head", 1, tree.Outlet})
	s := stateUnder(t, a, flow)
	solver, err := tree.NewSolver(n, 200, 0)
	if err != nil {
		t.Fatal(err)
	}
	whole, err := solver.Solve(flow)
	if err != nil {
		t.Fatal(err)
	}
	p, q := whole.Ranges(1, tree.Outlet)
	if head := s.Beds[0]; !close(head.PulsePressure, p.Pulse) || !close(head.Swing, q.Pulse) || !close(head.Flow.Min, q.Min) ||
		!close(head.Pressure.Mean, p.Mean) || !close(head.ShearAmplitude, whole.Shear(1).Amplitude) || head.PulseFigures != s.Sites[1].PulseFigures {
		t.Errorf("head is %+v, pressure %+v, flow %+v", head, p, q)
	}
	d, e := whole.Flow(3, tree.Outlet).Samples, whole.Flow(4, tree.Outlet).Samples
	sum := data.Period{Samples: make([]float64, len(d)), Rate: flow.Rate}
	for j := range d {
		sum.Samples[j] = d[j] + e[j]
	}
	low, high := sum.Extremes()
	if legs := s.Beds[1]; !close(legs.Flow.Max, high) || !close(legs.Flow.Min, low) || !close(legs.SwingPercent, 100*(high-low)/sum.Mean()) {
		t.Errorf("legs are %+v, want flow %v to %v", legs, low, high)
	}
	if p, q := whole.Ranges(2, tree.Inlet); !close(s.Sites[0].Swing, q.Pulse) || !close(s.Sites[0].PulsePressure, p.Pulse) {
		t.Errorf("the site is %+v", s.Sites[0])
	}
	if p, _ := whole.Ranges(0, tree.Inlet); !close(s.Root.PulsePressure, p.Pulse) {
		t.Errorf("the root is %+v", s.Root)
	}
}

func close(got, want float64) bool { return math.Abs(got-want) <= 1e-9*math.Abs(want) }

// Of the scaled posing what is retained is 1-s in every bed, and the pulsatile
// loss falls with its square: by construction, on any linear tree.
func TestScaledIsAnIdentityInEveryBed(t *testing.T) {
	for name, n := range map[string]func() (tree.Network, []Bed){"forked": forked, "random": random} {
		net, beds := n()
		flow := halfSine(200)
		a := arteries(t, net, beds, Site{"somewhere", len(net.Segments) / 2, tree.Outlet})
		native := stateUnder(t, a, flow)
		for _, s := range []float64{0.25, 0.5, 0.9} {
			supported := stateUnder(t, a, Scaled(flow, s))
			for i, b := range supported.Beds {
				r := b.Ratios(native.Beds[i])
				for what, got := range map[string]float64{
					"pressure": r.RetainedPressure, "flow": r.RetainedFlow, "shear": r.RetainedShear, "amplitude": 1 / r.FlowAmplitude,
					"R1": 1 / math.Sqrt(r.R1Loss), "R2": 1 / math.Sqrt(r.R2Loss), "segments": 1 / math.Sqrt(r.SegmentLoss),
				} {
					if math.Abs(got-(1-s)) > 1e-9 {
						t.Errorf("%s, share %v, %s: retained %s is %v", name, s, b.Name, what, got)
					}
				}
				if math.Abs(r.MeanFlow-1) > 1e-12 {
					t.Errorf("%s: mean flow of %s changes by %v", name, b.Name, r.MeanFlow)
				}
			}
			if r := supported.Sites[0].Ratios(native.Sites[0]); math.Abs(r.RetainedFlow-(1-s)) > 1e-9 || !math.IsNaN(r.R1Loss) {
				t.Errorf("%s: the site retains %+v", name, r)
			}
		}
	}
}

// random is an invented tree of some twenty segments, each terminal a bed.
func random() (tree.Network, []Bed) {
	rng := rand.New(rand.NewPCG(3, 3))
	n := tree.Network{Blood: tree.StandardBlood(), Segments: []tree.Segment{{ID: "0", Length: 5, Radius: 1.4, WaveSpeed: 450}}}
	for i := 1; i < 19; i++ {
		up := n.Segments[(i-1)/2]
		n.Segments = append(n.Segments, tree.Segment{
			ID: strconv.Itoa(i), Parent: up.ID, Length: 3 + 20*rng.Float64(), Radius: up.Radius * (0.6 + 0.3*rng.Float64()), WaveSpeed: up.WaveSpeed * (1 + 0.3*rng.Float64()),
		})
	}
	var beds []Bed
	for i := 9; i < 19; i++ {
		n.Segments[i].Terminal = &tree.Terminal{Matched: true, R2: 3 + 10*rng.Float64(), C: 0.1 * rng.Float64()}
		beds = append(beds, Bed{n.Segments[i].ID, []int{i}})
	}
	return n, beds
}

// A later valve leaves less swing in every bed, and a steady flow none.
func TestLateValveInEveryBed(t *testing.T) {
	n, beds := forked()
	flow := halfSine(200)
	a := arteries(t, n, beds)
	native := stateUnder(t, a, flow)
	before := 1.0
	for _, s := range []float64{0.3, 0.6, 1} {
		q, _ := LateValve(flow, s)
		now := stateUnder(t, a, q).Beds[1].Ratios(native.Beds[1]).RetainedFlow
		if !(now < before) || s == 1 && now > 1e-9 {
			t.Errorf("share %v retains %v, before %v", s, now, before)
		}
		before = now
	}
}

func TestBedsAreRefused(t *testing.T) {
	n, beds := forked()
	for name, wrong := range map[string][]Bed{
		"a terminal is missing":  beds[:2],
		"no terminal":            append([]Bed{{"trunk", []int{0}}}, beds...),
		"a terminal in two beds": append([]Bed{{"again", []int{5}}}, beds...),
	} {
		if _, err := NewArteries(n, 100, 0, wrong, nil); err == nil {
			t.Errorf("%s: no error", name)
		}
	}
}
