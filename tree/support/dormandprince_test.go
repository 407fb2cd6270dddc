package support

import (
	"math"
	"testing"
)

// oscillator is the oscillator y0” = -y0, whose solution is known.
type oscillator struct{}

func (oscillator) slope(_ int, _ float64, y, dy *vector) { *dy = vector{y[1], -y[0]} }

// drift is a polynomial of time of degree 5, which a method of order 5 meets
// exactly.
type drift struct{}

func (drift) slope(_ int, t float64, _, dy *vector) { *dy = vector{5 * t * t * t * t, 1} }

// one takes a step from (0, 1) at t = 0.
func one(of system, h float64) (*step, dense) {
	s := &step{h: h, start: vector{0, 1}}
	of.slope(0, 0, &s.start, &s.k[0])
	s.take(of, 1)
	var d dense
	s.between(&d)
	return s, d
}

// Halving a step divides its error by 2^6 at the end (order 5), and by 2^5
// between (order 4).
func TestOrderOfTheMethod(t *testing.T) {
	errors := func(h float64) (end, between float64) {
		s, d := one(oscillator{}, h)
		end = math.Hypot(s.end[0]-math.Sin(h), s.end[1]-math.Cos(h))
		for _, share := range []float64{0.2, 0.4, 0.6, 0.8} {
			var y vector
			d.at(share, &y)
			between = math.Max(between, math.Hypot(y[0]-math.Sin(share*h), y[1]-math.Cos(share*h)))
		}
		return end, between
	}
	end1, between1 := errors(0.2)
	end2, between2 := errors(0.1)
	if order := math.Log2(end1 / end2); math.Abs(order-6) > 0.3 {
		t.Errorf("the error of a step is of order %v", order)
	}
	if order := math.Log2(between1 / between2); math.Abs(order-5) > 0.3 {
		t.Errorf("the error between is of order %v", order)
	}
}

func TestPolynomialsAreMet(t *testing.T) {
	s, d := one(drift{}, 2)
	if math.Abs(s.end[0]-32) > 1e-12 {
		t.Errorf("t^5 at 2 is %v", s.end[0])
	}
	for _, share := range []float64{0, 1} {
		var y vector
		d.at(share, &y)
		if want := 32 * math.Pow(share, 5); math.Abs(y[0]-want) > 1e-12 {
			t.Errorf("the continuous solution at %v is %v, want %v", share, y[0], want)
		}
	}
}

// The estimated error is of the size of the true one, and of order 5.
func TestEstimatedError(t *testing.T) {
	estimate := func(h float64) float64 {
		s := &step{h: h, start: vector{0, 1}}
		oscillator{}.slope(0, 0, &s.start, &s.k[0])
		return s.take(oscillator{}, 1)
	}
	if order := math.Log2(estimate(0.2) / estimate(0.1)); math.Abs(order-5) > 0.5 {
		t.Errorf("the estimate is of order %v", order)
	}
	if next(1, 1) != 0.9 || next(1, 0) != 5 || next(1, math.Inf(1)) != 0.2 {
		t.Errorf("the next step is %v, %v, %v", next(1, 1), next(1, 0), next(1, math.Inf(1)))
	}
}
