package study

import (
	"math"
	"math/cmplx"
	"slices"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/tree"
	"afterbeat/tree/anatomy"
)

// spread computes the waves of the measured flow in the refined tree, and the
// beds from them.
func (t *Tree) spread() error {
	flow := t.Fit.Beats.Flow.Period
	waves, root, err := anatomy.Spread(t.Network, flow)
	if err != nil {
		return err
	}
	t.Root = root
	order, parent, err := outline(t.Network)
	if err != nil {
		return err
	}
	at := make([]int, len(order)) // place in the outline, by index in the network
	for k, i := range order {
		at[i] = k
	}
	t.Segments = make([]TreeSegment, len(order))
	for k, i := range order {
		s := TreeSegment{
			Segment: t.Network.Segments[i], Index: i, Parent: -1, Terminal: t.Network.Segments[i].Terminal != nil, Waves: waves[i],
			PressureMeasures: beat.Measure(waves[i].Outlet.Pressure), FlowMeasures: beat.Measure(waves[i].Outlet.Flow),
		}
		speed := s.Speed((s.Radius+s.Segment.Outlet())/2, t.Network.Blood.Density)
		s.PathTime = s.Length / speed
		if p := parent[i]; p >= 0 {
			s.Parent, s.Depth = at[p], t.Segments[at[p]].Depth+1
			s.PathTime += t.Segments[at[p]].PathTime
		}
		s.Reflection = reflection(s, t.Network, flow.Omega(1))
		t.Segments[k] = s
	}
	t.gather()
	return nil
}

// reflection is the coefficient at the outlet of a segment at one frequency,
// (ZL - Zc)/(ZL + Zc), Zc = rho c/A there, ZL from the waves.
func reflection(s TreeSegment, n tree.Network, omega float64) complex128 {
	p, q := first(s.Waves.Outlet.Pressure), first(s.Waves.Outlet.Flow)
	zc := complex(anatomy.Characteristic(s.Segment, n.Blood.Density), 0)
	if q == 0 {
		return 1
	}
	load := p / q
	if cmplx.IsNaN(load) {
		return cmplx.NaN()
	}
	return (load - zc) / (load + zc)
}

// first is the first harmonic of a period.
func first(p data.Period) complex128 {
	var sum complex128
	n := float64(len(p.Samples))
	for j, v := range p.Samples {
		sum += complex(v, 0) * cmplx.Exp(complex(0, -2*math.Pi*float64(j)/n))
	}
	return sum / complex(n, 0)
}

// outline gives the indices of the segments, each before its daughters and all
// that hang on it next to it, and the index of each one's parent.
func outline(n tree.Network) (order, parent []int, err error) {
	all, parent, err := n.Order()
	if err != nil {
		return nil, nil, err
	}
	daughters := make([][]int, len(n.Segments))
	for _, i := range slices.Sorted(slices.Values(all)) {
		if p := parent[i]; p >= 0 {
			daughters[p] = append(daughters[p], i)
		}
	}
	stack := []int{all[0]}
	for len(stack) > 0 {
		i := stack[len(stack)-1]
		stack = stack[:len(stack)-1]
		order = append(order, i)
		for _, d := range slices.Backward(daughters[i]) {
			stack = append(stack, d)
		}
	}
	return order, parent, nil
}

// bedOf is the bed of a terminal: the one that the table names, else its own.
func bedOf(s TreeSegment) string {
	if s.Bed != "" {
		return s.Bed
	}
	return s.Called()
}

// usual is the order of the beds of the embedded table; others follow.
var usual = []string{"brain", "gut and liver", "kidneys", "arms", "legs", "trunk"}

// gather groups the terminals into beds.
func (t *Tree) gather() {
	index := map[string]int{}
	t.Beds = nil
	output := t.Fit.Beats.Flow.Period.Mean()
	for k, s := range t.Segments {
		if !s.Terminal {
			continue
		}
		name := bedOf(s)
		i, ok := index[name]
		if !ok {
			i = len(t.Beds)
			index[name] = i
			t.Beds = append(t.Beds, Bed{Name: name, Flow: data.Period{Samples: make([]float64, len(s.Waves.Outlet.Flow.Samples)), Rate: s.Waves.Outlet.Flow.Rate}})
		}
		b := &t.Beds[i]
		b.Terminals = append(b.Terminals, k)
		for j, v := range s.Waves.Outlet.Flow.Samples {
			b.Flow.Samples[j] += v
		}
	}
	for i := range t.Beds {
		b := &t.Beds[i]
		b.Measures = beat.Measure(b.Flow)
		b.Share = b.Measures.Mean / output
		for _, k := range b.Terminals {
			s := t.Segments[k]
			part := s.FlowMeasures.Mean / b.Measures.Mean
			b.PulsePressure += part * s.PressureMeasures.Amplitude
			b.MeanPressure += part * s.PressureMeasures.Mean
		}
	}
	rank := func(b Bed) int {
		if i := slices.Index(usual, b.Name); i >= 0 {
			return i
		}
		return len(usual)
	}
	slices.SortStableFunc(t.Beds, func(a, b Bed) int { return rank(a) - rank(b) })
}
