package tree

import (
	"math"

	"afterbeat/data/unit"
)

// maxTaper is the largest change of radius, relative, within a uniform piece of
// a tapering segment. The impedance of an artery of the arm is then right to 2e-4
// at 1.25 Hz and to 3e-3 at 12.5 Hz.
const maxTaper = 0.02

// piece is a uniform tube: a segment, or a part of one that tapers.
type piece struct {
	parent   int32 // piece it hangs on; -1 of the root
	segment  int32 // position of its segment in the order of the tree
	terminal int32 // at its end; -1: none
	opens    bool  // it begins its segment
	ends     bool  // it ends its segment
	first    bool  // of the daughters of its parent, the one that the sweep meets first
	alpha    float64
	transit  float64
	y0       float64
	steady   float64
	mass     float64
	radius   float64
}

// compiled is a network in the order and the units in which it is computed.
// Of a piece, with its radius r:
//
//	alpha    r sqrt(rho/mu), s^{1/2}: the Womersley number is alpha sqrt(w); 0: no viscosity
//	transit  l/c, s
//	y0       A/(rho c), mL/s/mmHg, the admittance without viscosity
//	steady   8 mu l/(pi r⁴), mmHg s/mL
//	mass     transit y0, mL/mmHg: its compliance
type compiled struct {
	shape
	place      []int32 // position in the order, of each segment of the network
	pieces     []piece // every parent before its daughters
	lastPiece  []int32 // piece that ends a segment, by position
	terminals  []Terminal
	density    float64
	viscosity  float64
	outflow    float64
	wallTau    float64
	poiseuille bool
	resistance float64 // of the whole at w = 0; +Inf: closed
	compliance float64
	rootZc     float64
	shares     []float64 // mean flow at the inlet of a piece over that at the root
	into       []float64 // at the inlet of a piece: conductance, or compliance where all is closed
	behind     []float64 // the same of its daughters
}

// compile checks a network and brings it into the order of computation.
func compile(n Network) (*compiled, error) {
	s, err := n.shape()
	if err != nil {
		return nil, err
	}
	c := &compiled{shape: s, place: make([]int32, len(s.order)), lastPiece: make([]int32, len(s.order))}
	for at, i := range s.order {
		c.place[i] = int32(at)
	}
	count, ends := 0, 0
	for i, seg := range n.Segments {
		count += seg.pieces()
		if s.leaf[i] {
			ends++
		}
	}
	c.pieces = make([]piece, 0, count)
	c.terminals = make([]Terminal, 0, ends)
	return c, c.fill(n)
}

// pieces is the number of uniform pieces of a segment.
func (s Segment) pieces() int {
	if s.Outlet() == s.Radius {
		return 1
	}
	return max(1, int(math.Ceil(math.Abs(math.Log(s.Outlet()/s.Radius))/math.Log(1+maxTaper)-1e-9)))
}

// fill takes over the values of a network of the shape of c. It allocates
// nothing unless there are more pieces than before.
func (c *compiled) fill(n Network) error {
	c.density, c.viscosity, c.outflow = n.Blood.Density, n.Blood.Viscosity, n.OutflowPressure
	c.wallTau, c.poiseuille = n.WallTau, n.Line == Poiseuille
	c.pieces, c.terminals = c.pieces[:0], c.terminals[:0]
	for at, i := range c.order {
		c.addSegment(int32(at), &n.Segments[i], c.parent[i])
	}
	if len(c.shares) != len(c.pieces) {
		count := len(c.pieces)
		c.shares, c.into, c.behind = make([]float64, count), make([]float64, count), make([]float64, count)
	}
	clear(c.shares)
	for i := len(c.pieces) - 1; i >= 0; i-- { // shares mark who was met
		p := &c.pieces[i]
		if p.parent >= 0 {
			p.first = c.shares[p.parent] == 0
			c.shares[p.parent] = 1
		}
	}
	root := &n.Segments[c.order[0]]
	speed := root.Speed(root.Radius, c.density)
	c.rootZc = c.density * speed / (math.Pi * root.Radius * root.Radius * unit.DynPerMmHg)
	return c.solveSteady(n)
}

// addSegment appends the pieces of a segment. Radii of neighbouring pieces have
// one ratio; lengths follow from the even taper; the radius of a piece is that
// in its middle.
func (c *compiled) addSegment(at int32, s *Segment, parent int32) {
	hangs := int32(-1)
	if parent >= 0 {
		hangs = c.lastPiece[c.place[parent]]
	}
	count := s.pieces()
	inlet, outlet := s.Radius, s.Outlet()
	for j := range count {
		from, to, length := inlet, outlet, s.Length
		if count > 1 {
			from = inlet * math.Pow(outlet/inlet, float64(j)/float64(count))
			to = inlet * math.Pow(outlet/inlet, float64(j+1)/float64(count))
			length = s.Length * (to - from) / (outlet - inlet)
		}
		p := c.tube(s, (from+to)/2, length)
		p.parent, p.segment, p.terminal = hangs, at, -1
		p.opens, p.ends = j == 0, j == count-1
		hangs = int32(len(c.pieces))
		c.pieces = append(c.pieces, p)
	}
	c.lastPiece[at] = hangs
	if s.Terminal == nil {
		return
	}
	t := *s.Terminal
	if t.Matched {
		t.R1 = c.density * s.Speed(outlet, c.density) / (math.Pi * outlet * outlet * unit.DynPerMmHg)
	}
	c.pieces[hangs].terminal = int32(len(c.terminals))
	c.terminals = append(c.terminals, t)
}

// tube gives a piece its constants.
func (c *compiled) tube(s *Segment, radius, length float64) piece {
	area := math.Pi * radius * radius
	speed := s.Speed(radius, c.density)
	p := piece{
		radius:  radius,
		transit: length / speed,
		y0:      area * unit.DynPerMmHg / (c.density * speed),
		steady:  8 * c.viscosity * length * math.Pi / (area * area * unit.DynPerMmHg),
	}
	p.mass = p.transit * p.y0
	if c.viscosity > 0 {
		p.alpha = radius * math.Sqrt(c.density/c.viscosity)
	}
	return p
}
