package tree

import (
	"math"

	"afterbeat/data/womersley"
)

// node is what a sweep knows of one piece.
type node struct {
	yin complex128 // admittance at the inlet, mL/s/mmHg
	t   complex128 // pressure at the outlet over that at the inlet
	// yl is flow over pressure at the outlet; of a piece with a terminal it is
	// flow at the outlet over pressure at the inlet, since a terminal may have no
	// resistance at all.
	yl complex128
	p  complex128 // pressure at the outlet
}

// ends are pressure and flow at both ends of a segment, mmHg and mL/s.
type ends struct{ pin, qin, pout, qout complex128 }

// tone is one complex frequency s, with what all pieces need of it.
type tone struct {
	s      complex128
	rootW  float64    // sqrt(w) of s = i w; 0: s is any with Re s > 0
	wall   complex128 // sqrt(1 + s WallTau)
	stiff  bool       // wall is 1
	fitted *womersley.Fit
}

// harmonic is the tone s = i w.
func (c *compiled) harmonic(w float64) tone {
	t := c.laplace(complex(0, w))
	t.rootW = math.Sqrt(w)
	return t
}

// laplace is the tone of a complex frequency.
func (c *compiled) laplace(s complex128) tone {
	return tone{s: s, wall: root(1 + s*complex(c.wallTau, 0)), stiff: c.wallTau == 0, fitted: womersley.Fitted()}
}

// up goes from the leaves to the root. With m = sqrt(1 - F10), y = A/(rho c) and a
// wall of E (1 + s tau), of each piece
//
//	gamma l = s (l/c)/(m sqrt(1 + s tau)),   Y0 = y m/sqrt(1 + s tau)
//	a = Y0 + YL,  b = (Y0 - YL) exp(-2 gamma l)
//	Yin = Y0 (a - b)/(a + b),  Pout/Pin = 2 Y0 exp(-gamma l)/(a + b)
//
// which is the reflection form of the package documentation: no exponential
// grows, and one division serves both. It returns the admittance at the root.
func (c *compiled) up(t tone, nodes []node) complex128 {
	for i := len(c.pieces) - 1; i >= 0; i-- {
		p, n := &c.pieces[i], &nodes[i]
		m := c.root(p, t)
		y0 := complex(p.y0*real(m), p.y0*imag(m))
		if !t.stiff {
			y0 = y0 * invert(t.wall)
			m *= t.wall
		}
		x := t.s * invert(m)
		e1 := decay(-p.transit*real(x), -p.transit*imag(x))
		e2 := e1 * e1
		if p.terminal >= 0 {
			n.end(&c.terminals[p.terminal], t.s, y0, e1, e2)
		} else {
			a, b := y0+n.yl, (y0-n.yl)*e2
			quotient := y0 * invert(a+b)
			n.yin = quotient * (a - b)
			n.t = quotient * (e1 + e1)
		}
		if p.parent >= 0 {
			if p.first {
				nodes[p.parent].yl = n.yin
			} else {
				nodes[p.parent].yl += n.yin
			}
		}
	}
	return nodes[0].yin
}

// end is up of a piece with a terminal, in the impedance of the terminal unless
// that is closed.
func (n *node) end(t *Terminal, s, y0, e1, e2 complex128) {
	z, closed := t.impedance(s)
	if closed {
		quotient := invert(1 + e2)
		n.yin, n.t, n.yl = y0*(1-e2)*quotient, (e1+e1)*quotient, 0
		return
	}
	zy := z * y0
	a, b := 1+zy, (zy-1)*e2
	quotient := y0 * invert(a+b)
	n.yin = quotient * (a - b)
	n.yl = quotient * (e1 + e1)
	n.t = z * n.yl
}

// impedance is that of the terminal at s, mmHg s/mL.
func (t *Terminal) impedance(s complex128) (z complex128, closed bool) {
	switch {
	case math.IsInf(t.R1, 1) || math.IsInf(t.R2, 1) && t.C == 0:
		return 0, true
	case math.IsInf(t.R2, 1):
		return complex(t.R1, 0) + 1/(s*complex(t.C, 0)), false
	case t.C == 0:
		return complex(t.R1+t.R2, 0), false
	}
	return complex(t.R1, 0) + complex(t.R2, 0)*invert(1+s*complex(t.R2*t.C, 0)), false
}

// root is sqrt(1 - F10) of a piece.
func (c *compiled) root(p *piece, t tone) complex128 {
	switch {
	case p.alpha == 0:
		return 1
	case c.poiseuille: // Z' = R' + s rho/A, so that 1 - F10 becomes 1/(1 + 8/q), q = r² s rho/mu
		return root(invert(1 + 8*invert(t.s*complex(p.alpha*p.alpha, 0))))
	case t.rootW > 0:
		return t.fitted.Root(p.alpha * t.rootW)
	}
	return root(womersley.OneMinusF(t.s * complex(p.alpha*p.alpha, 0)))
}

// down goes from the root, where the pressure is p, to the leaves, and writes
// what is at both ends of every segment.
func (c *compiled) down(p complex128, nodes []node, to []ends) {
	for i := range c.pieces {
		piece, n := &c.pieces[i], &nodes[i]
		pin := p
		if piece.parent >= 0 {
			pin = nodes[piece.parent].p
		}
		n.p = n.t * pin
		e := &to[piece.segment]
		if piece.opens {
			e.pin, e.qin = pin, n.yin*pin
		}
		if !piece.ends {
			continue
		}
		e.pout = n.p
		if piece.terminal >= 0 {
			e.qout = n.yl * pin
		} else {
			e.qout = n.yl * n.p
		}
	}
}

// invert is 1/z. The values of a tree stay far from the squares that a number
// cannot hold.
func invert(z complex128) complex128 {
	d := 1 / (real(z)*real(z) + imag(z)*imag(z))
	return complex(real(z)*d, -imag(z)*d)
}

// decay is exp(x + iy).
func decay(x, y float64) complex128 {
	sin, cos := math.Sincos(y)
	size := math.Exp(x)
	return complex(size*cos, size*sin)
}

// root is the square root with a real part of 0 or more.
func root(z complex128) complex128 {
	size := math.Sqrt(real(z)*real(z) + imag(z)*imag(z))
	if size == 0 {
		return 0
	}
	if re := real(z); re >= 0 {
		x := math.Sqrt((size + re) / 2)
		return complex(x, imag(z)/(2*x))
	}
	y := math.Copysign(math.Sqrt((size-real(z))/2), imag(z))
	return complex(imag(z)/(2*y), y)
}
