package anatomy

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"

	"afterbeat/data"
)

// doubts are the half-widths of the logarithms of something: random and total.
type doubts struct{ random, total []float64 }

// changes are ways in which the residuals may be off, each with its change of
// the solution.
type changes struct {
	covariance func(i, j int) float64
	left       [][]float64 // by block of beats left out
	systematic [][]float64 // by 95 % half-width
}

// normal95 is 1.96.
var normal95 = distuv.UnitNormal.Quantile(0.975)

// changesOf pushes every error through the solution, to first order.
func (r *refinement) changesOf(s solution, m Measurement) changes {
	var c changes
	if v := s.covariance(); v != nil {
		c.covariance = v.At
	}
	base := r.predicted(0, r.aims[0], r.flow)
	for _, pair := range m.Left {
		q, p := pair.Flow.Spectrum(), pair.Pressure.Spectrum()
		now := r.predicted(0, r.aims[0], q[:len(r.flow)])
		c.left = append(c.left, s.moved(r.change(s, func(j, k int) complex128 {
			if j > 0 {
				return 0
			}
			return now[k] - base[k] - (p[k] - r.aims[0].spectrum[k])
		})))
	}
	for _, change := range r.systematic(m.Errors) {
		c.systematic = append(c.systematic, s.moved(r.change(s, change)))
	}
	return c
}

// change is the change of the residuals where the difference of predicted and
// measured harmonic k of aim j changes.
func (r *refinement) change(s solution, of func(j, k int) complex128) []float64 {
	out := make([]float64, len(s.residual))
	for j, a := range r.aims {
		for k := range r.flow {
			d := of(j, k) * complex(a.scale(k), 0)
			out[2*(j*len(r.flow)+k)], out[2*(j*len(r.flow)+k)+1] = real(d), imag(d)
		}
	}
	return out
}

// systematic are the changes that systematic errors of one half-width make.
func (r *refinement) systematic(e Errors) []func(j, k int) complex128 {
	predicted := make([][]complex128, len(r.aims))
	for j, a := range r.aims {
		predicted[j] = r.predicted(j, a, r.flow)
		predicted[j][0] -= complex(r.tree.Network.OutflowPressure, 0)
	}
	pressures := func(of func(j, k int) complex128) func(j, k int) complex128 {
		return func(j, k int) complex128 {
			if !r.aims[j].IsPressure() {
				return 0
			}
			return of(j, k)
		}
	}
	steady := func(by float64) func(j, k int) complex128 {
		return pressures(func(_, k int) complex128 {
			if k > 0 {
				return 0
			}
			return complex(by, 0)
		})
	}
	return []func(j, k int) complex128{
		pressures(func(j, k int) complex128 { return complex(e.Flow, 0) * predicted[j][k] }),
		pressures(func(j, k int) complex128 { return complex(e.PressureScale, 0) * r.aims[j].spectrum[k] }),
		func(j, k int) complex128 { return complex(0, -e.Delay*r.omega[k]) * predicted[j][k] },
		steady(e.PressureOffset), steady(e.OutflowPressure),
	}
}

// halfWidths of sum_k g_k theta_k: random from the spread of the beats and what
// the data leave open, total with the systematic errors in quadrature.
func (c changes) halfWidths(g []float64) (random, total float64) {
	if c.covariance == nil {
		return math.NaN(), math.NaN()
	}
	variance := 0.0
	for i, a := range g {
		for j, b := range g {
			variance += a * b * c.covariance(i, j)
		}
	}
	random = normal95 * math.Sqrt(variance)
	if n := float64(len(c.left)); n >= 2 {
		sum, square := 0.0, 0.0
		for _, one := range c.left {
			d := dot(g, one)
			sum, square = sum+d, square+d*d
		}
		spread := max(0, square-sum*sum/n) * (n - 1) / n
		random = math.Hypot(random, distuv.StudentsT{Sigma: 1, Nu: n - 1}.Quantile(0.975)*math.Sqrt(spread))
	}
	total = random
	for _, one := range c.systematic {
		total = math.Hypot(total, dot(g, one))
	}
	return random, total
}

func dot(a, b []float64) float64 {
	sum := 0.0
	for i := range a {
		sum += a[i] * b[i]
	}
	return sum
}

// estimate is a positive value whose logarithm has these half-widths.
func estimate(value, random, total float64) data.Estimate {
	e := data.Estimate{Value: value, Identified: true, Random: data.NoInterval(), Total: data.NoInterval()}
	if math.IsNaN(random + total) {
		e.Why = "the search left it open"
		return e
	}
	e.Random = data.Interval{Low: value * math.Exp(-random), High: value * math.Exp(random)}
	e.Total = data.Interval{Low: value * math.Exp(-total), High: value * math.Exp(total)}
	return e
}
