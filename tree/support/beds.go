package support

import (
	"errors"

	"afterbeat/data"
	"afterbeat/tree"
	"afterbeat/tree/energy"
)

// Bed is a group of terminals of a tree whose flows add up, by the indices of
// their segments in the network.
type Bed struct {
	Name      string
	Terminals []int
}

// Site is one end of a segment, by the name of what is measured there.
type Site struct {
	Name    string
	Segment int
	End     tree.End
}

// PulseFigures are pressure and flow at a site, or of a bed: of a bed flow is the
// sum over its terminals, and pressure that at their inlets, each number weighted
// by the terminals' mean flows.
type PulseFigures struct {
	// Pressure, mmHg: mean, greatest, least; PulsePressure the difference of the
	// two, PressureGosling (max - min)/mean, PressurePourcelot (max - min)/max.
	Pressure                           Range
	PulsePressure                      float64
	PressureGosling, PressurePourcelot float64
	// Flow, mL/s; Swing is greatest less least, SwingPercent that of the mean.
	Flow                       Range
	Swing, SwingPercent        float64
	FlowGosling, FlowPourcelot float64
}

// BedState is a bed in one state.
type BedState struct {
	Name string
	PulseFigures
	// ShearAmplitude is half of the swing of the wall shear stress at the inlets
	// of the terminal segments, weighted as the pressures are, dyn/cm².
	ShearAmplitude float64
	// Losses in the segments that lead to this bed alone, and in R1 and R2 of its
	// terminals, mmHg mL/s. What the pulse loses is three numbers, never one.
	Segments, R1, R2 tree.Loss
}

// SiteState is a site in one state.
type SiteState struct {
	Name string
	PulseFigures
	ShearAmplitude float64 // dyn/cm²
}

// ArteryState is a tree under one flow at its root.
type ArteryState struct {
	Root   PulseFigures
	Beds   []BedState
	Sites  []SiteState
	Shared tree.Loss // in the segments that lead to more than one bed
	Ledger energy.Ledger
}

// Arteries solves a tree for flows at its root, and looks at its beds and sites.
// It is not safe for concurrent use.
type Arteries struct {
	solver *tree.Solver
	root   int
	beds   []Bed
	sites  []Site
	// leads has for each segment the bed that it leads to alone, -1: several.
	leads []int
	p, q  []float64
}

// NewArteries plans for flows of a number of samples at the root; harmonics as in
// [tree.NewSolver]. Every terminal of the network is in exactly one bed.
func NewArteries(n tree.Network, samples, harmonics int, beds []Bed, sites []Site) (*Arteries, error) {
	solver, err := tree.NewSolver(n, samples, harmonics)
	if err != nil {
		return nil, err
	}
	a := &Arteries{solver: solver, beds: beds, sites: sites, p: make([]float64, samples), q: make([]float64, samples)}
	a.leads, a.root, err = leads(n, beds)
	return a, err
}

// leads finds the bed that each segment leads to alone, and the root.
func leads(n tree.Network, beds []Bed) (bed []int, root int, err error) {
	order, parent, err := n.Order()
	if err != nil {
		return nil, 0, err
	}
	const none, several = -2, -1
	bed = make([]int, len(n.Segments))
	for i := range bed {
		bed[i] = none
	}
	for b, one := range beds {
		for _, i := range one.Terminals {
			if n.Segments[i].Terminal == nil || bed[i] != none {
				return nil, 0, errors.New("a bed has what is no terminal, or another bed has it too")
			}
			bed[i] = b
		}
	}
	for k := len(order) - 1; k > 0; k-- {
		i, up := order[k], parent[order[k]]
		switch {
		case bed[i] == none:
			return nil, 0, errors.New("a terminal is in no bed")
		case bed[up] == none:
			bed[up] = bed[i]
		case bed[up] != bed[i]:
			bed[up] = several
		}
	}
	return bed, order[0], nil
}

// Update takes over other values for the same segments.
func (a *Arteries) Update(n tree.Network) error { return a.solver.Update(n) }

// State is the tree under a flow at its root, mL/s, of the length planned for.
func (a *Arteries) State(flow data.Period) (ArteryState, error) {
	s, err := a.solver.Solve(flow)
	if err != nil {
		return ArteryState{}, err
	}
	out := ArteryState{Root: a.at(s, a.root, tree.Inlet), Ledger: s.Ledger()}
	for _, one := range a.sites {
		out.Sites = append(out.Sites, SiteState{one.Name, a.at(s, one.Segment, one.End), s.Shear(one.Segment).Amplitude})
	}
	for _, b := range a.beds {
		out.Beds = append(out.Beds, a.bed(s, b))
	}
	for i, b := range a.leads {
		loss := s.Loss(i)
		into := &out.Shared
		if b >= 0 {
			into = &out.Beds[b].Segments
		}
		into.Steady += loss.Steady
		into.Pulsatile += loss.Pulsatile
	}
	return out, nil
}

// at are the figures at one end of a segment.
func (a *Arteries) at(s *tree.State, segment int, e tree.End) PulseFigures {
	s.Waves(segment, e, a.p, a.q)
	return PulseFigures{}.ofPressure(rangeOf(a.p)).ofFlow(rangeOf(a.q))
}

// bed gathers the terminals of a bed.
func (a *Arteries) bed(s *tree.State, b Bed) BedState {
	out := BedState{Name: b.Name}
	total := make([]float64, len(a.q))
	var pressure Range
	weights := 0.0
	for _, i := range b.Terminals {
		s.Waves(i, tree.Outlet, a.p, a.q)
		for j, q := range a.q {
			total[j] += q
		}
		p, weight := rangeOf(a.p), max(rangeOf(a.q).Mean, 0)
		pressure.Mean += weight * p.Mean
		pressure.Min += weight * p.Min
		pressure.Max += weight * p.Max
		out.ShearAmplitude += weight * s.Shear(i).Amplitude
		weights += weight
		r1, r2 := s.TerminalLoss(i)
		out.R1 = tree.Loss{Steady: out.R1.Steady + r1.Steady, Pulsatile: out.R1.Pulsatile + r1.Pulsatile}
		out.R2 = tree.Loss{Steady: out.R2.Steady + r2.Steady, Pulsatile: out.R2.Pulsatile + r2.Pulsatile}
	}
	out.ShearAmplitude /= weights
	pressure = Range{Mean: pressure.Mean / weights, Min: pressure.Min / weights, Max: pressure.Max / weights}
	out.PulseFigures = PulseFigures{}.ofPressure(pressure).ofFlow(rangeOf(total))
	return out
}

func (f PulseFigures) ofPressure(p Range) PulseFigures {
	f.Pressure, f.PulsePressure = p, p.Swing()
	f.PressureGosling, f.PressurePourcelot = quotient(p.Swing(), p.Mean), quotient(p.Swing(), p.Max)
	return f
}

func (f PulseFigures) ofFlow(q Range) PulseFigures {
	f.Flow, f.Swing = q, q.Swing()
	f.FlowGosling, f.FlowPourcelot = quotient(q.Swing(), q.Mean), quotient(q.Swing(), q.Max)
	f.SwingPercent = 100 * f.FlowGosling
	return f
}

func rangeOf(x []float64) Range {
	p := data.Period{Samples: x}
	low, high := p.Extremes()
	return Range{Mean: p.Mean(), Min: low, Max: high}
}
