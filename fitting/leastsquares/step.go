package leastsquares

import (
	"errors"
	"math"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"
)

// tooAlike is the part of a column that the columns before it must leave for it to
// count as a column of its own: above the error of central differences.
const tooAlike = 1e-9

// step solves min |J step + r|² + lambda |D step|² over the free parameters by
// Householder's reflections. inside is the norm of the part of r in the space of
// the columns, full tells that they are independent; a column that is not is left
// where it is.
func (s *search) step(lambda float64, r []float64) (step []float64, inside float64, full bool) {
	columns, free := s.free(lambda)
	rhs := make([]float64, len(r), len(r)+len(free))
	for i, v := range r {
		rhs[i] = -v
	}
	if lambda > 0 {
		rhs = append(rhs, make([]float64, len(free))...)
	}
	n := len(free)
	diagonal, dead := make([]float64, n), make([]bool, n)
	full = n == s.loose()
	for k := range n {
		v := columns[k][k:]
		norm, whole := floats.Norm(v, 2), floats.Norm(columns[k], 2)
		if !(norm > tooAlike*whole) {
			dead[k], full = true, false
			continue
		}
		diagonal[k] = -math.Copysign(norm, v[0])
		v[0] -= diagonal[k]
		size := floats.Dot(v, v)
		for _, c := range append(columns[k+1:n:n], rhs) {
			floats.AddScaled(c[k:], -2*floats.Dot(v, c[k:])/size, v)
		}
	}
	step = make([]float64, len(s.x))
	solved := make([]float64, n)
	for k := n - 1; k >= 0; k-- {
		if dead[k] {
			continue
		}
		inside = math.Hypot(inside, rhs[k])
		v := rhs[k]
		for m := k + 1; m < n; m++ {
			v -= columns[m][k] * solved[m]
		}
		solved[k] = v / diagonal[k]
		step[free[k]] = solved[k] / s.scale[free[k]]
	}
	return step, inside, full
}

// loose is the number of parameters that no bound holds.
func (s *search) loose() int {
	n := 0
	for _, held := range s.held {
		if !held {
			n++
		}
	}
	return n
}

// free are the scaled columns of the free parameters, over sqrt(lambda) times the
// unit matrix, and which they are.
func (s *search) free(lambda float64) (columns [][]float64, free []int) {
	for k := range s.x {
		if !s.held[k] && s.scale[k] > 0 {
			free = append(free, k)
		}
	}
	for n, k := range free {
		c := mat.Col(nil, k, s.j)
		floats.Scale(1/s.scale[k], c)
		if lambda > 0 {
			c = append(c, make([]float64, len(free))...)
			c[len(s.r)+n] = math.Sqrt(lambda)
		}
		columns = append(columns, c)
	}
	return columns, free
}

func (s *search) result(status Status) Result {
	r := Result{
		X: s.x, Residuals: s.r, SumOfSquares: s.sum, Status: status,
		Evaluations: s.evaluations, Iterations: s.tried, NonFinite: s.nonsense, OnBound: s.held,
	}
	if status == Found && len(s.r) > len(s.x) {
		r.Covariance = s.covariance()
	}
	return r
}

// covariance is S/(n - p) (J'J)⁻¹ of the free parameters; nil where J'J has no
// inverse.
func (s *search) covariance() *mat.SymDense {
	columns, free := s.free(0)
	if len(free) == 0 {
		return nil
	}
	j := mat.NewDense(len(s.r), len(free), nil)
	for k, c := range columns {
		j.SetCol(k, c)
	}
	var qr mat.QR
	qr.Factorize(j)
	var r, inverse mat.Dense
	qr.RTo(&r)
	if err := inverse.Inverse(r.Slice(0, len(free), 0, len(free))); err != nil {
		if bad := mat.Condition(0); !errors.As(err, &bad) {
			return nil
		}
	}
	variance := s.sum / float64(len(s.r)-len(free))
	cov := mat.NewSymDense(len(s.x), nil)
	for a, p := range free {
		for b, q := range free {
			v := floats.Dot(inverse.RawRowView(a), inverse.RawRowView(b))
			cov.SetSym(p, q, variance*v/(s.scale[p]*s.scale[q]))
		}
	}
	return cov
}
