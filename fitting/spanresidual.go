package fitting

import "gonum.org/v1/gonum/floats"

// stretch is a part of a run, with what a fit leaves of it.
type stretch struct {
	run, from int
	residual  []float64 // (P - Pv) less the model, mmHg
	// effects are the derivatives of the model with respect to the factors of the
	// columns, then to ln shape, less what the beginning of the run can do of them.
	effects [maxUnknowns][]float64
}

// residuals hands over the whole span, stretch by stretch, in its order. A stretch
// is only good until the next one.
func (p *spanMoments) residuals(shape, x []float64, each func(stretch)) {
	for s := range p.shapes {
		p.steps[s] = newStepping(p.h, shape[s])
	}
	unknowns := len(x) + p.shapes
	s := stretch{residual: make([]float64, chunk)}
	for i := range unknowns {
		s.effects[i] = make([]float64, chunk)
	}
	for i, r := range p.runs {
		p.one = spanSums{}
		p.sum(r)
		b := p.beginnings()
		var q [maxShapes]float64 // factors of the beginnings
		for a := range p.shapes {
			q[a] = b.zp[a]
			for k, v := range x {
				q[a] -= b.z[a][k] * v
			}
		}
		imitated := p.imitated(x, q, b)
		var last, dLast [maxShapes]float64
		for from := 0; from < len(r.flow); from += chunk {
			to := min(from+chunk, len(r.flow))
			p.advance(r, from, to, &last, &dLast)
			s.run, s.from = i, from
			s.fill(p, r, to-from, x, q, imitated)
			each(s)
		}
	}
}

// imitated is how much of each effect the beginnings of the run can do: E⁻¹ e'u.
func (p *spanMoments) imitated(x []float64, q [maxShapes]float64, b beginnings) (w [maxUnknowns][maxShapes]float64) {
	for i := range x {
		for a := range p.shapes {
			w[i][a] = b.z[a][i]
		}
	}
	for s := range p.shapes {
		var v [maxShapes]float64
		for a := range p.shapes {
			v[a] = q[s] * p.one.dee[s][a]
			for i, f := range x {
				v[a] += f * p.mix[i][s] * p.one.ed[a][s]
			}
		}
		w[len(x)+s] = p.solve(v)
	}
	return w
}

// fill computes a stretch of n samples.
func (s *stretch) fill(p *spanMoments, r spanRun, n int, x []float64, q [maxShapes]float64, imitated [maxUnknowns][maxShapes]float64) {
	s.residual = s.residual[:n]
	copy(s.residual, r.pressure[s.from:s.from+n])
	for a := range p.shapes {
		e, de := p.e[a][:n], p.de[a][:n]
		p.steps[a].fade(e, de, s.from)
		addScaled(s.residual, -q[a], e)
	}
	for i := range len(x) + p.shapes {
		u := s.effects[i][:n]
		clear(u)
		if i < len(x) {
			for k := range p.signals {
				addScaled(u, p.mix[i][k], p.signal(r, k, s.from, s.from+n))
			}
			addScaled(s.residual, -x[i], u)
		} else {
			a := i - len(x)
			for j, v := range x {
				addScaled(u, v*p.mix[j][a], p.dy[a][:n])
			}
			addScaled(u, q[a], p.de[a][:n])
		}
		for a := range p.shapes {
			addScaled(u, -imitated[i][a], p.e[a][:n])
		}
		s.effects[i] = u
	}
}

func addScaled(to []float64, by float64, x []float64) {
	if by != 0 {
		floats.AddScaled(to, by, x)
	}
}
