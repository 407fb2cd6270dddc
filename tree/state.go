package tree

import (
	"math"

	"afterbeat/data"
	"afterbeat/fitting"
)

// End is one of the two ends of a segment.
type End int

// The ends.
const (
	Inlet  End = iota // towards the root
	Outlet            // away from it
)

// State is pressure and flow at both ends of every segment, periodic in time.
// Segments are named by their index in Network.Segments. It belongs to a
// [Solver]: the next Solve overwrites it.
type State struct {
	solver    *Solver
	rate      float64
	mean      float64      // flow at the root, mL/s
	impedance []complex128 // at the root, of each harmonic
	spectra   []ends       // of harmonic k and the segment at position p: (k-1) segments + p
	means     []meanEnds   // by position
	losses    []Loss       // by position
	lossesOf  bool         // losses are those of this state
	a, b      []complex128 // spectra on their way to waves
	x, y      []float64
	synthesis *fitting.Fourier
}

// meanEnds are mean pressure and flow at both ends of a segment.
type meanEnds struct{ pin, qin, pout, qout float64 }

func (s *State) plan(of *Solver) {
	segments := len(of.tree.order)
	*s = State{
		solver: of, impedance: make([]complex128, of.harmonics),
		spectra: make([]ends, of.harmonics*segments), means: make([]meanEnds, segments), losses: make([]Loss, segments),
		a: make([]complex128, of.samples/2+1), b: make([]complex128, of.samples/2+1),
		x: make([]float64, of.samples), y: make([]float64, of.samples), synthesis: of.fourier,
	}
}

// begin fills the means, and is ready for the harmonics.
func (s *State) begin(rate, mean float64) {
	s.rate, s.mean, s.lossesOf = rate, mean, false
	c := s.solver.tree
	at := c.outflow + c.resistance*mean
	if math.IsInf(c.resistance, 1) {
		at = math.NaN()
	}
	for i := range c.pieces {
		p := &c.pieces[i]
		q := mean * c.shares[i]
		m := &s.means[p.segment]
		if p.opens {
			m.pin, m.qin = at, q
			if p.parent >= 0 {
				m.pin = s.means[c.pieces[p.parent].segment].pout
			}
			m.pout = m.pin
		}
		m.pout -= p.steady * q
		m.qout = q
		if math.IsInf(c.resistance, 1) {
			m.qout = q * (1 - p.mass/c.into[i])
		}
	}
}

// at are the ends of all segments, by position, at harmonic k.
func (s *State) at(k int) []ends {
	segments := len(s.means)
	return s.spectra[(k-1)*segments : k*segments]
}

// omega is the angular frequency of harmonic k, rad/s.
func (s *State) omega(k int) float64 {
	return 2 * math.Pi * float64(k) * s.rate / float64(s.solver.samples)
}

// Harmonics is the number of harmonics above the mean.
func (s *State) Harmonics() int { return s.solver.harmonics }

// Frequency is that of harmonic k, Hz.
func (s *State) Frequency(k int) float64 { return float64(k) * s.rate / float64(s.solver.samples) }

// RootImpedance is the input impedance of the tree at harmonic k of 1 to
// Harmonics, mmHg s/mL.
func (s *State) RootImpedance(k int) complex128 { return s.impedance[k-1] }

// Coefficients are pressure, mmHg, and flow, mL/s, of a segment at one end:
// coefficient k of [data.Period.Spectrum], k from 0 to Harmonics. The mean pressure
// of a tree that is closed everywhere is NaN.
func (s *State) Coefficients(segment int, e End, k int) (p, q complex128) {
	at := s.solver.tree.place[segment]
	if k == 0 {
		m := s.means[at]
		if e == Inlet {
			return complex(m.pin, 0), complex(m.qin, 0)
		}
		return complex(m.pout, 0), complex(m.qout, 0)
	}
	v := s.at(k)[at]
	if e == Inlet {
		return v.pin, v.qin
	}
	return v.pout, v.qout
}

// Waves writes pressure, mmHg, and flow, mL/s, of a segment at one end, over the
// samples of the period. It allocates nothing.
func (s *State) Waves(segment int, e End, pressure, flow []float64) {
	for k := 0; k <= s.solver.harmonics; k++ {
		s.a[k], s.b[k] = s.Coefficients(segment, e, k)
	}
	shut := math.IsNaN(real(s.a[0])) // keep it from the flow, which shares the transform
	if shut {
		s.a[0] = 0
	}
	s.synthesis.InversePair(pressure, flow, s.a, s.b)
	if shut {
		for j := range pressure {
			pressure[j] = math.NaN()
		}
	}
}

// Pressure is pressure at one end of a segment, mmHg.
func (s *State) Pressure(segment int, e End) data.Period {
	p := make([]float64, s.solver.samples)
	s.Waves(segment, e, p, s.y)
	return data.Period{Samples: p, Rate: s.rate}
}

// Flow is flow at one end of a segment, mL/s, away from the root.
func (s *State) Flow(segment int, e End) data.Period {
	q := make([]float64, s.solver.samples)
	s.Waves(segment, e, s.x, q)
	return data.Period{Samples: q, Rate: s.rate}
}

// Range is the mean of a wave, and its least and greatest sample. Of pressure in
// a tree that is closed everywhere all three are NaN; Pulse is not.
type Range struct{ Mean, Min, Max, Pulse float64 }

// Ranges are those of pressure and of flow at one end of a segment. It allocates
// nothing.
func (s *State) Ranges(segment int, e End) (pressure, flow Range) {
	for k := 0; k <= s.solver.harmonics; k++ {
		s.a[k], s.b[k] = s.Coefficients(segment, e, k)
	}
	meanP, meanQ := real(s.a[0]), real(s.b[0])
	s.a[0], s.b[0] = 0, 0
	s.synthesis.InversePair(s.x, s.y, s.a, s.b)
	return rangeAbout(meanP, s.x), rangeAbout(meanQ, s.y)
}

func rangeAbout(mean float64, wave []float64) Range {
	low, high := data.Period{Samples: wave}.Extremes()
	return Range{Mean: mean, Min: mean + low, Max: mean + high, Pulse: high - low}
}
