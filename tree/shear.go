package tree

import (
	"math"

	"afterbeat/data/womersley"
)

// Shear is the stress that blood exerts on the wall at the inlet of a segment,
// dyn/cm², positive along the flow.
type Shear struct {
	Mean, Min, Max float64
	Amplitude      float64 // (Max - Min)/2
	// Oscillatory is the oscillatory shear index (1 - |mean tau|/mean |tau|)/2,
	// from 0, always one way, to 1/2 (Ku et al. 1985, Arteriosclerosis 5:293, in
	// the form of He and Ku 1996; from memory). NaN without stress.
	Oscillatory float64
}

// Shear is the wall shear stress at the inlet of a segment, from the momentum of
// blood in Womersley's profile,
//
//	tau = (r/2)(Z' - i w rho/A) Q = (r/2) i w (rho/A) F10/(1 - F10) Q
//
// and 4 mu Q/(pi r³) of mean flow; that of all flow with the line "poiseuille".
func (s *State) Shear(segment int) Shear {
	c := s.solver.tree
	seg := &s.solver.network.Segments[segment]
	r := seg.Radius
	steady := 4 * c.viscosity / (math.Pi * r * r * r)
	for k := 1; k <= s.solver.harmonics; k++ {
		_, q := s.Coefficients(segment, Inlet, k)
		w := s.omega(k)
		per := complex(steady, 0)
		if c.viscosity > 0 && !c.poiseuille {
			alpha := r * math.Sqrt(w*c.density/c.viscosity)
			per = complex(0, w*c.density/(2*math.Pi*r)) * womersley.F10(alpha) / womersley.OneMinusF10(alpha)
		}
		s.a[k], s.b[k] = per*q, 0
	}
	_, q := s.Coefficients(segment, Inlet, 0)
	s.a[0], s.b[0] = complex(steady, 0)*q, 0
	s.synthesis.InversePair(s.x, s.y, s.a, s.b)
	out := Shear{Mean: real(s.a[0]), Min: math.Inf(1), Max: math.Inf(-1)}
	size := 0.0
	for _, v := range s.x {
		out.Min, out.Max = min(out.Min, v), max(out.Max, v)
		size += math.Abs(v) / float64(len(s.x))
	}
	out.Amplitude = (out.Max - out.Min) / 2
	out.Oscillatory = math.NaN()
	if size > 0 {
		out.Oscillatory = max(0, (1-math.Abs(out.Mean)/size)/2)
	}
	return out
}
