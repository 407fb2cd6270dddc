package tree

import "math"

// closed tells whether no mean flow passes the terminal.
func (t Terminal) closed() bool { return math.IsInf(t.R1+t.R2, 1) }

// storage is the compliance of the terminal that the tree can reach.
func (t Terminal) storage() float64 {
	if math.IsInf(t.R1, 1) {
		return 0
	}
	return t.C
}

// solveSteady finds how mean flow divides: the network of Poiseuille resistances
// at w = 0. Conductance comes from the leaves to the root, shares go from the
// root to the leaves. Where everything is closed, mean flow fills the tree for
// ever, and divides by compliance.
func (c *compiled) solveSteady(n Network) error {
	c.collectCompliance()
	c.compliance = c.into[0]
	c.collectConductance()
	c.resistance = 1 / c.into[0]
	if c.into[0] == 0 {
		c.collectCompliance()
		c.shareCompliance()
		return nil
	}
	if at := c.shareConductance(); at >= 0 {
		i := int(c.order[c.pieces[at].segment])
		return n.fault(i, "give one of them a resistance",
			"has no resistance, nor has one of its sisters: the mean flow through them is not determined")
	}
	return nil
}

// collectCompliance leaves in into the compliance of each piece and of all
// behind it, mL/mmHg.
func (c *compiled) collectCompliance() {
	clear(c.behind)
	for i := len(c.pieces) - 1; i >= 0; i-- {
		p := &c.pieces[i]
		c.into[i] = p.mass + c.behind[i]
		if p.terminal >= 0 {
			c.into[i] += c.terminals[p.terminal].storage()
		}
		if p.parent >= 0 {
			c.behind[p.parent] += c.into[i]
		}
	}
}

// collectConductance leaves in into the conductance at the inlet of each piece,
// mL/s/mmHg: 0 where it is closed, +Inf where nothing resists; in behind that of
// all its daughters.
func (c *compiled) collectConductance() {
	clear(c.behind)
	for i := len(c.pieces) - 1; i >= 0; i-- {
		p := &c.pieces[i]
		r := 1 / c.behind[i]
		if p.terminal >= 0 {
			r = c.terminals[p.terminal].R1 + c.terminals[p.terminal].R2
		}
		c.into[i] = 1 / (p.steady + r)
		if p.parent >= 0 {
			c.behind[p.parent] += c.into[i]
		}
	}
}

// shareConductance divides the flow at each junction by conductance. It returns
// a piece whose share is not determined, -1 where there is none.
func (c *compiled) shareConductance() (undetermined int) {
	c.shares[0] = 1
	for i := 1; i < len(c.pieces); i++ {
		p := c.pieces[i].parent
		part, whole := c.into[i], c.behind[p]
		switch {
		case math.IsInf(part, 1): // all of it, unless a sister takes all too
			if math.IsNaN(whole) {
				return i
			}
			c.shares[i], c.behind[p] = c.shares[p], math.NaN()
		case part == 0 || !(whole < math.Inf(1)):
			c.shares[i] = 0
		default:
			c.shares[i] = c.shares[p] * (part / whole)
		}
	}
	return -1
}

// shareCompliance divides the flow that fills a closed tree. A piece keeps what
// its own wall takes up.
func (c *compiled) shareCompliance() {
	c.shares[0] = 1
	for i := 1; i < len(c.pieces); i++ {
		c.shares[i] = c.shares[c.pieces[i].parent] * c.into[i] / c.into[c.pieces[i].parent]
	}
}
