package tree

import (
	"math"
	"unicode"
)

// Values of a segment lie between smallest and largest, in their units, so that
// no power of them leaves what a number can hold.
const (
	smallest = 1e-12
	largest  = 1e12
)

// checkValues looks at the fields of one segment.
func (n Network) checkValues(i int) error {
	s := &n.Segments[i]
	for _, text := range []string{s.ID, s.Parent, s.Name, s.Bed} {
		for _, r := range text {
			if unicode.IsControl(r) {
				return n.fault(i, "", "its id, parent, name or bed has a control character")
			}
		}
	}
	if s.ID == "" {
		return n.fault(i, "", "has no id")
	}
	if s.ID[0] == '#' {
		return n.fault(i, "", "its id begins with #, which is a comment in a table")
	}
	for _, v := range []struct {
		name  string
		value float64
		blank bool // 0 stands for absent
	}{
		{"length_cm", s.Length, false},
		{"radius_cm", s.Radius, false},
		{"radius_distal_cm", s.RadiusDistal, true},
		{"the wave speed", s.WaveSpeed, true},
		{"eh_dyn_per_cm", s.Eh, true},
	} {
		if v.blank && v.value == 0 {
			continue
		}
		if !(v.value >= smallest && v.value <= largest) {
			return n.fault(i, "", "%s is %g, not a number between %g and %g", v.name, v.value, smallest, largest)
		}
	}
	switch {
	case s.WaveSpeed > 0 && s.Eh > 0:
		return n.fault(i, "", "has both a wave speed and eh_dyn_per_cm: one of them")
	case s.WaveSpeed == 0 && s.Eh == 0:
		return n.fault(i, "", "has neither a wave speed nor eh_dyn_per_cm")
	case !(s.Poisson >= 0 && s.Poisson <= 0.5):
		return n.fault(i, "", "poisson is %g, not a number between 0 and 0.5", s.Poisson)
	}
	return n.checkTerminal(i, s.Terminal)
}

func (n Network) checkTerminal(i int, t *Terminal) error {
	if t == nil {
		return nil
	}
	for _, v := range []struct {
		name    string
		value   float64
		mayShut bool
	}{{"r1", t.R1, true}, {"r2", t.R2, true}, {"c", t.C, false}} {
		if v.mayShut && math.IsInf(v.value, 1) {
			continue
		}
		if !(v.value >= 0 && v.value <= largest) {
			return n.fault(i, "", "%s is %g, not a number of 0 or more, %g at most", v.name, v.value, largest)
		}
	}
	return nil
}

// checkBlood looks at what all segments share.
func (n Network) checkBlood() error {
	fault := func(what string) error { return &SegmentError{Index: -1, What: what} }
	switch b := n.Blood; {
	case !(b.Density >= smallest && b.Density <= largest):
		return fault("the density of blood is not a positive number")
	case !(b.Viscosity >= 0 && b.Viscosity <= largest):
		return fault("the viscosity of blood is not a number of 0 or more")
	case math.IsNaN(n.OutflowPressure) || math.Abs(n.OutflowPressure) > largest:
		return fault("the outflow pressure is not a number")
	case !(n.WallTau >= 0 && n.WallTau <= largest):
		return fault("the time constant of the wall is not a number of 0 or more")
	case n.Line != "" && n.Line != Womersley && n.Line != Poiseuille:
		return fault("the line is none of womersley, poiseuille")
	}
	return nil
}
