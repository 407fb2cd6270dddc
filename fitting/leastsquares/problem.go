package leastsquares

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// Problem is what is minimised.
type Problem struct {
	// Residuals writes r(x) to dst, which has as many entries as Count.
	Residuals func(dst, x []float64)
	// Jacobian writes dr_i/dx_j to dst, row i column j. nil: central differences.
	Jacobian func(dst *mat.Dense, x []float64)
	Count    int // of residuals
	// Low and High are bounds; nil: none. A bound may be infinite.
	Low, High []float64
}

// Settings of a search. The zero value works.
type Settings struct {
	// Evaluations of the residuals after which it gives up; those of differences
	// count. 0: 200000: hard problems need many, and each of them costs a call.
	Evaluations int
	// Tolerance is the share of |r| in the space of J's columns below which a point
	// counts as found. 0: 1e-9.
	Tolerance float64
}

// Status is how a search ended.
type Status string

// The ends of a search. Only the first is an answer.
const (
	Found        Status = "found"
	TooMany      Status = "gave up after as many evaluations as allowed"
	Stalled      Status = "no step lowers the sum of squares, and the point is no minimum to the tolerance"
	Interrupted  Status = "interrupted"
	NotANumber   Status = "the residuals at the start are not numbers"
	Undetermined Status = "found, but some parameters trade against each other or have no effect"
)

// Result is the best point, whatever the status.
type Result struct {
	X            []float64
	Residuals    []float64
	SumOfSquares float64
	Status       Status
	Evaluations  int // of the residuals
	Iterations   int // steps tried
	NonFinite    int // evaluations that were no numbers
	// OnBound tells which parameters a bound holds.
	OnBound []bool
	// Covariance is S/(n - p) (J'J)⁻¹ of the free parameters, 0 for those on a
	// bound; nil where it is undefined. It takes residuals for independent and of
	// one size.
	Covariance *mat.SymDense
}

// StandardError of parameter j; NaN where it is undefined, 0 on a bound.
func (r Result) StandardError(j int) float64 {
	if r.Covariance == nil {
		return math.NaN()
	}
	return math.Sqrt(r.Covariance.At(j, j))
}

// differences fills the Jacobian by central differences; one-sided at a bound.
func (s *search) differences() {
	x := append([]float64(nil), s.x...)
	for j := range x {
		h := math.Cbrt(2.2e-16) * math.Max(math.Abs(x[j]), s.typical[j])
		up, down := x[j]+h, x[j]-h
		if s.p.High != nil {
			up = math.Min(up, s.p.High[j])
		}
		if s.p.Low != nil {
			down = math.Max(down, s.p.Low[j])
		}
		keep := x[j]
		x[j] = up
		s.residuals(s.high, x)
		x[j] = down
		s.residuals(s.low, x)
		x[j] = keep
		for i := range s.r {
			s.j.Set(i, j, (s.high[i]-s.low[i])/(up-down))
		}
	}
}
