package tree

import "math"

// Segment is one artery of a tree: a tube, uniform or evenly tapering.
type Segment struct {
	ID     string // unique in its network, not empty
	Parent string // ID of the segment it hangs on; empty: it is the root
	Name   string
	Bed    string // the vascular bed that it feeds, or belongs to; may be empty
	// Length and Radius, the radius at the inlet, cm; both above 0.
	Length, Radius float64
	// RadiusDistal is the radius at the outlet, cm. 0: as Radius.
	RadiusDistal float64
	// WaveSpeed is the inviscid wave speed c, cm/s, the same along the segment.
	// 0: it follows from Eh and Poisson.
	WaveSpeed float64
	// Eh is Young's modulus times the thickness of the wall, dyn/cm, the same
	// along the segment. 0: WaveSpeed is given.
	Eh float64
	// Poisson is the ratio sigma of the wall, 0 to 0.5; it counts with Eh only.
	Poisson float64
	// Terminal is the load at the outlet of a segment without daughters; nil
	// for all others.
	Terminal *Terminal
}

// Terminal is the load of a vascular bed, R1 + R2/(1 + i w R2 C) against the
// outflow pressure. The zero value is an open end: no resistance at all.
type Terminal struct {
	// R1 and R2, mmHg s/mL, 0 or more; +Inf: closed.
	R1, R2 float64
	// Matched tells that R1 is rho c/A of the segment at its outlet, with the
	// elastic wave speed, whatever the field R1 says.
	Matched bool
	C       float64 // mL/mmHg, 0 or more
}

// Blood is what flows: its density, g/mL, and viscosity, poise. A viscosity of
// 0 is an ideal fluid.
type Blood struct{ Density, Viscosity float64 }

// StandardBlood is blood of density 1.06 g/mL and viscosity 0.035 poise, unless
// a case says otherwise (common practice).
func StandardBlood() Blood { return Blood{Density: 1.06, Viscosity: 0.035} }

// Outlet is the radius at the outlet, cm.
func (s Segment) Outlet() float64 {
	if s.RadiusDistal > 0 {
		return s.RadiusDistal
	}
	return s.Radius
}

// Speed is the inviscid wave speed c, cm/s, where the radius is r, cm, of blood
// of density rho, g/mL:
//
//	c² = E h/(2 rho r (1 - sigma²))
//
// or the one given.
func (s Segment) Speed(r, rho float64) float64 {
	if s.WaveSpeed > 0 {
		return s.WaveSpeed
	}
	return math.Sqrt(s.Eh / (2 * rho * r * (1 - s.Poisson*s.Poisson)))
}

// Line is the law of a segment's resistance to oscillating flow.
type Line string

// The lines.
const (
	Womersley  Line = "womersley"  // Z' = i w (rho/A)/(1 - F10); also the zero value
	Poiseuille Line = "poiseuille" // Z' = 8 mu/(pi r⁴) + i w rho/A, for comparison
)

// Network is a tree of segments, the blood in it and what it flows against.
type Network struct {
	Segments        []Segment // in any order
	Blood           Blood
	OutflowPressure float64 // Pv behind every terminal, mmHg
	WallTau         float64 // s; the wall has E (1 + i w WallTau); 0: elastic
	Line            Line
}

// Clone is a copy that shares nothing with n, terminals included.
func (n Network) Clone() Network {
	segments := make([]Segment, len(n.Segments))
	terminals := make([]Terminal, len(n.Segments))
	for i, s := range n.Segments {
		if s.Terminal != nil {
			terminals[i] = *s.Terminal
			s.Terminal = &terminals[i]
		}
		segments[i] = s
	}
	n.Segments = segments
	return n
}

// Find is the index of the segment with that id, -1 where there is none.
func (n Network) Find(id string) int {
	for i := range n.Segments {
		if n.Segments[i].ID == id {
			return i
		}
	}
	return -1
}
