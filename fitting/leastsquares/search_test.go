package leastsquares

import (
	"context"
	"math"
	"testing"

	"gonum.org/v1/gonum/mat"
)

// decay is y = b0 exp(-b1 t) at t = 0, 0.1, ..., with y from the truth (3, 2).
func decay() Problem {
	return Problem{Count: 20, Residuals: func(dst, b []float64) {
		for i := range dst {
			t := 0.1 * float64(i)
			dst[i] = b[0]*math.Exp(-b[1]*t) - 3*math.Exp(-2*t)
		}
	}}
}

func TestJacobianOfTheCallerIsUsed(t *testing.T) {
	p := decay()
	called := 0
	p.Jacobian = func(dst *mat.Dense, b []float64) {
		called++
		for i := range p.Count {
			t := 0.1 * float64(i)
			dst.Set(i, 0, math.Exp(-b[1]*t))
			dst.Set(i, 1, -t*b[0]*math.Exp(-b[1]*t))
		}
	}
	r := Minimise(t.Context(), p, []float64{1, 1}, Settings{})
	if r.Status != Found || called == 0 || math.Abs(r.X[0]-3) > 1e-9 || math.Abs(r.X[1]-2) > 1e-9 {
		t.Errorf("%s at %v after %d Jacobians", r.Status, r.X, called)
	}
}

// With b1 kept above 2.5 the best b0 is that of the linear problem which is left.
func TestBoundsHold(t *testing.T) {
	p := decay()
	p.Low, p.High = []float64{0, 2.5}, []float64{10, math.Inf(1)}
	r := Minimise(t.Context(), p, []float64{1, 5}, Settings{})
	var product, square float64
	for i := range p.Count {
		e := math.Exp(-0.25 * float64(i))
		product, square = product+3*math.Exp(-0.2*float64(i))*e, square+e*e
	}
	if r.Status != Found || r.X[1] != 2.5 || !r.OnBound[1] || r.OnBound[0] || math.Abs(r.X[0]-product/square) > 1e-8 {
		t.Errorf("%s at %v, bounds %v, want b0 %v", r.Status, r.X, r.OnBound, product/square)
	}
	if se := r.StandardError(1); se != 0 {
		t.Errorf("standard error on a bound: %v", se)
	}
}

// What is no answer says so, and hands back the best point.
func TestEndsThatAreNoAnswers(t *testing.T) {
	over, cancel := context.WithCancel(t.Context())
	cancel()
	nan := Problem{Count: 3, Residuals: func(dst, b []float64) { dst[0], dst[1], dst[2] = math.Sqrt(b[0]), 1, 1 }}
	alike := Problem{Count: 3, Residuals: func(dst, b []float64) {
		for i := range dst {
			dst[i] = (b[0]+b[1])*float64(i+1) - float64(i*i)
		}
	}}
	for name, c := range map[string]struct {
		ctx   context.Context
		p     Problem
		start []float64
		set   Settings
		want  Status
	}{
		"interrupted":   {over, decay(), []float64{1, 1}, Settings{}, Interrupted},
		"too few":       {t.Context(), decay(), []float64{1, 9}, Settings{Evaluations: 8}, TooMany},
		"not a number":  {t.Context(), nan, []float64{-1}, Settings{}, NotANumber},
		"trading":       {t.Context(), alike, []float64{1, 2}, Settings{}, Undetermined},
		"without slope": {t.Context(), Problem{Count: 2, Residuals: func(dst, _ []float64) { dst[0], dst[1] = 1, 2 }}, []float64{1}, Settings{}, Undetermined},
	} {
		r := Minimise(c.ctx, c.p, c.start, c.set)
		if r.Status != c.want || len(r.X) != len(c.start) || r.Covariance != nil {
			t.Errorf("%s: %s at %v, want %s", name, r.Status, r.X, c.want)
		}
	}
}
