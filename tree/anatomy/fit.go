package anatomy

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// problem is a sum of squares over residuals in n unknowns.
type problem struct {
	n, m     int
	residual func(out, theta []float64)
}

// The limits of a search.
const (
	differenceStep = 1e-4
	mostSteps      = 40
	leastGain      = 1e-7 // of the sum of squares
	firstDamping   = 1e-3
)

// solution is where a search ended, with the residuals and their derivatives.
type solution struct {
	theta, residual []float64
	jacobian        *mat.Dense
	evaluations     int
	converged       bool
}

// minimise searches from the origin by Levenberg-Marquardt steps,
// (J'J + damping diag J'J) step = -J'r, the damping divided by 10 after a step
// that gains and multiplied by 10 after one that does not (Marquardt 1963).
func (p problem) minimise(start []float64) solution {
	s := solution{theta: append([]float64(nil), start...), residual: make([]float64, p.m), jacobian: mat.NewDense(p.m, p.n, nil)}
	p.residual(s.residual, s.theta)
	s.evaluations++
	damping, cost := firstDamping, squares(s.residual)
	trial, at := make([]float64, p.m), make([]float64, p.n)
	for range mostSteps {
		p.differentiate(&s)
		gained := false
		for damping < 1e8 {
			step := p.step(s, damping)
			for k := range at {
				at[k] = s.theta[k] + max(-1, min(1, step[k]))
			}
			p.residual(trial, at)
			s.evaluations++
			if now := squares(trial); now < cost {
				gained = cost-now > leastGain*cost
				cost, damping = now, damping/10
				copy(s.theta, at)
				copy(s.residual, trial)
				break
			}
			damping *= 10
		}
		if !gained {
			s.converged = !math.IsNaN(cost)
			break
		}
	}
	p.differentiate(&s)
	return s
}

// differentiate takes differences forward.
func (p problem) differentiate(s *solution) {
	out, at := make([]float64, p.m), append([]float64(nil), s.theta...)
	for k := range at {
		at[k] += differenceStep
		p.residual(out, at)
		s.evaluations++
		at[k] = s.theta[k]
		for i, v := range out {
			s.jacobian.Set(i, k, (v-s.residual[i])/differenceStep)
		}
	}
}

func (p problem) step(s solution, damping float64) []float64 {
	h := s.normal()
	for k := range p.n {
		h.SetSym(k, k, h.At(k, k)*(1+damping))
	}
	return solveFor(h, s.gradient(s.residual))
}

// normal is J'J.
func (s solution) normal() *mat.SymDense {
	var h mat.SymDense
	h.SymOuterK(1, s.jacobian.T())
	return &h
}

// gradient is J'r of residuals r.
func (s solution) gradient(r []float64) []float64 {
	var g mat.VecDense
	g.MulVec(s.jacobian.T(), mat.NewVecDense(len(r), r))
	return g.RawVector().Data
}

// moved is by how much a small change of the residuals moves the solution.
func (s solution) moved(change []float64) []float64 { return solveFor(s.normal(), s.gradient(change)) }

// covariance of the unknowns, where residuals have variance 1.
func (s solution) covariance() *mat.SymDense {
	var c mat.Cholesky
	var inverse mat.SymDense
	if !c.Factorize(s.normal()) || c.InverseTo(&inverse) != nil {
		return nil
	}
	return &inverse
}

// solveFor is -h⁻¹ g; zeros where h is singular.
func solveFor(h *mat.SymDense, g []float64) []float64 {
	var c mat.Cholesky
	var x mat.VecDense
	if !c.Factorize(h) || c.SolveVecTo(&x, mat.NewVecDense(len(g), g)) != nil {
		return make([]float64, len(g))
	}
	x.ScaleVec(-1, &x)
	return x.RawVector().Data
}

func squares(r []float64) float64 {
	sum := 0.0
	for _, v := range r {
		sum += v * v
	}
	return sum
}
