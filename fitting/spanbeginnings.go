package fitting

// beginnings are the normal equations of the free values of a run at hand: H, p
// and what E makes of them, z = E⁻¹H, zp = E⁻¹p.
type beginnings struct {
	h, z  [maxShapes][maxLinear]float64
	p, zp [maxShapes]float64
}

func (p *spanMoments) beginnings() beginnings {
	var b beginnings
	n := p.model.Linear()
	for i := range n {
		var column [maxShapes]float64
		for a := range p.shapes {
			column[a] = p.mixed(i, func(k int) float64 { return p.one.eu[a][k] })
			b.h[a][i] = column[a]
		}
		column = p.solve(column)
		for a := range p.shapes {
			b.z[a][i] = column[a]
		}
	}
	b.p = p.one.ep
	b.zp = p.solve(b.p)
	return b
}

// solve is E⁻¹v; a beginning that is no different from the one before it is left
// out.
func (p *spanMoments) solve(v [maxShapes]float64) (x [maxShapes]float64) {
	e := &p.one.ee
	if !(e[0][0] > 0) {
		return x
	}
	if p.shapes == 2 {
		if left := e[1][1] - e[0][1]*e[0][1]/e[0][0]; left > independent*e[1][1] {
			x[1] = (v[1] - v[0]*e[0][1]/e[0][0]) / left
		}
	}
	x[0] = (v[0] - e[0][1]*x[1]) / e[0][0]
	return x
}

// eliminate takes out of the normal equations what the beginning of the run at
// hand can do.
func (p *spanMoments) eliminate(to *normal) {
	n := p.model.Linear()
	b := p.beginnings()
	for a := range p.shapes {
		to.total -= b.p[a] * b.zp[a]
		for i := range n {
			to.b[i] -= b.h[a][i] * b.zp[a]
			for j := range n {
				to.g[i][j] -= b.h[a][i] * b.z[a][j]
			}
		}
	}
	for s := range p.shapes {
		p.eliminateSlope(s, &b, to)
	}
}

// eliminateSlope does it for the derivatives with respect to ln shape[s]:
//
//	d(H'E⁻¹H) = dH'z + z'dH - z'dE z
func (p *spanMoments) eliminateSlope(s int, b *beginnings, to *normal) {
	n := p.model.Linear()
	var dh [maxShapes][maxLinear]float64
	for a := range p.shapes {
		for i := range n {
			dh[a][i] = p.mix[i][s] * p.one.ed[a][s]
			if a == s {
				dh[a][i] += p.mixed(i, func(k int) float64 { return p.one.deu[s][k] })
			}
		}
	}
	dp := p.one.dep[s] // only beginning s has a derivative
	bend := func(u, v func(a int) float64) float64 {
		sum := 0.0
		for a := range p.shapes {
			sum += p.one.dee[s][a] * (u(s)*v(a) + u(a)*v(s))
		}
		return sum
	}
	zp := func(a int) float64 { return b.zp[a] }
	to.dtotal[s] -= 2*dp*b.zp[s] - bend(zp, zp)
	for i := range n {
		zi := func(a int) float64 { return b.z[a][i] }
		to.db[s][i] -= dp*b.z[s][i] - bend(zi, zp)
		for a := range p.shapes {
			to.db[s][i] -= dh[a][i] * b.zp[a]
		}
		for j := range n {
			zj := func(a int) float64 { return b.z[a][j] }
			to.dg[s][i][j] += bend(zi, zj)
			for a := range p.shapes {
				to.dg[s][i][j] -= dh[a][i]*b.z[a][j] + b.z[a][i]*dh[a][j]
			}
		}
	}
}
