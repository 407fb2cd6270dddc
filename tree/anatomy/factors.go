package anatomy

import (
	"math"
	"strings"

	"afterbeat/tree"
)

// Region is a part of the tree that a distal trace can speak of.
type Region string

// The regions.
const (
	Neck  Region = "neck"
	Brain Region = "brain"
	Arm   Region = "arms"
	Leg   Region = "legs"
	Belly Region = "kidneys"
)

// Kind is what a factor multiplies.
type Kind string

// The factors.
const (
	Stiffness          Kind = "wall stiffness"
	Resistance         Kind = "resistance"
	TerminalCompliance Kind = "terminal compliance"
	RootCalibre        Kind = "root calibre"
)

// factor is one factor on a tree.
type factor struct {
	kind   Kind
	region Region // empty: the whole tree
	doubt  float64
	on     []int // segments
}

func (f factor) name() string {
	if f.region == "" {
		return string(f.kind)
	}
	return string(f.kind) + ", " + string(f.region)
}

// meaning says what the factor does.
func (f factor) meaning() string {
	switch f.kind {
	case Stiffness:
		return "on the square of the wave speeds"
	case Resistance:
		return "on the terminals' resistances"
	case TerminalCompliance:
		return "on the terminals' compliances"
	}
	return "on the radii of the trunk that begins at the root"
}

// factors are those of a tree without regions, on the whole of it.
func (t Tree) factors() []factor {
	all := make([]int, len(t.Network.Segments))
	for i := range all {
		all[i] = i
	}
	return []factor{
		{kind: Stiffness, doubt: t.Stiffness, on: all},
		{kind: Resistance, doubt: wideDoubt, on: all},
		{kind: TerminalCompliance, doubt: wideDoubt, on: all},
		{kind: RootCalibre, doubt: t.Calibre, on: trunk(t.Network)},
	}
}

// regional is the factor that a trace at a place in a region speaks of: the
// stiffness of the segments on its side of the trunk and of all that is beyond,
// or of the brain the compliance of its terminals, which shapes its flow.
func (t Tree) regional(r Region, at Place) factor {
	n := t.Network
	if r == Brain {
		return factor{kind: TerminalCompliance, region: r, doubt: wideDoubt, on: t.inBed("brain", at)}
	}
	main := map[int]bool{}
	for _, i := range aorta(n) {
		main[i] = true
	}
	names, ids := map[string]bool{}, map[string]bool{}
	for _, i := range path(n, at.Segment) {
		if !main[i] {
			names[bothSides(n.Segments[i].Name)] = true
			ids[n.Segments[i].ID] = true
		}
	}
	order, _, err := n.Order()
	if err != nil {
		return factor{}
	}
	var on []int
	for _, i := range order {
		s := n.Segments[i]
		if !main[i] && (ids[s.ID] || ids[s.Parent] || s.Name != "" && names[bothSides(s.Name)]) {
			ids[s.ID] = true
			on = append(on, i)
		}
	}
	return factor{kind: Stiffness, region: r, doubt: calibreDoubt, on: on}
}

// bothSides is a name without the side of the body.
func bothSides(name string) string {
	for _, side := range []string{"R.", "L.", "right", "left", "Right", "Left"} {
		name = strings.TrimPrefix(name, side)
	}
	return name
}

// inBed are the terminals of a bed, or that at the place where no bed is named.
func (t Tree) inBed(bed string, at Place) []int {
	var out []int
	for i, s := range t.Network.Segments {
		if s.Terminal != nil && s.Bed == bed {
			out = append(out, i)
		}
	}
	if len(out) == 0 {
		out = append(out, at.Segment)
	}
	return out
}

// apply writes the base network with the factors exp(theta) into n, whose
// segments are those of base.
func (t Tree) apply(n *tree.Network, factors []factor, theta []float64) {
	base := t.Network
	for i, s := range base.Segments {
		terminal := n.Segments[i].Terminal
		n.Segments[i] = s
		if s.Terminal != nil {
			*terminal = *s.Terminal
		}
		n.Segments[i].Terminal = terminal
	}
	for k, f := range factors {
		m := math.Exp(theta[k])
		for _, i := range f.on {
			s := &n.Segments[i]
			switch f.kind {
			case Stiffness:
				s.WaveSpeed *= math.Sqrt(m)
				s.Eh *= m
			case RootCalibre:
				s.Radius *= m
				s.RadiusDistal *= m
				s.Eh *= m // the wave speed stays
			case Resistance:
				if s.Terminal != nil {
					s.Terminal.R1 *= m
					s.Terminal.R2 *= m
				}
			case TerminalCompliance:
				if s.Terminal != nil {
					s.Terminal.C *= m
				}
			}
		}
	}
	if t.Own {
		return
	}
	for i := range n.Segments {
		if p := n.Segments[i].Terminal; p != nil {
			setResistance(n, i, p.R1+p.R2)
		}
	}
}
