package tree

import (
	"math"
	"math/bits"
	"runtime"
	"sync"

	"afterbeat/fitting"
)

// series inverts transforms F(s) on the span 0 to T by a damped Fourier series of
// period 2T,
//
//	f(t) = exp(a t)/T (F(a)/2 + sum_k sigma_k Re(F(a + i k pi/T) exp(i k pi t/T)))
//
// (Dubner and Abate 1968). The error of the period is exp(-2 a T). sigma_k =
// exp(-36 (k/N)^6) lets the series end without ripples away from fronts.
type series struct {
	span    float64 // T
	terms   int     // N
	damping float64 // a, 1/s
	spectra [][]complex128
}

const (
	finestStep = 1.2e-4 // s, of the first span
	fewTerms   = 4096
	manyTerms  = 1 << 17
	damped     = 10.0 // a T
	usable     = 0.7  // part of the span in which times are looked for
	spanGrowth = 8
)

func newSeries(span float64) *series {
	terms := fewTerms
	if span < 64 { // beyond, nothing moves within a millisecond
		terms = min(manyTerms, max(fewTerms, 1<<bits.Len(uint(span/finestStep/8))))
	}
	return &series{span: span, terms: terms, damping: damped / span}
}

// at is the complex frequency of term k.
func (s *series) at(k int) complex128 {
	return complex(s.damping, float64(k)*math.Pi/s.span)
}

// sigma is the factor of term k that ends the series.
func (s *series) sigma(k int) float64 {
	x := float64(k) / float64(s.terms)
	x *= x
	return math.Exp(-36 * x * x * x)
}

// fill computes the transforms of all courses: quantities of the beds by step of
// flow, then of pressure.
func (s *series) fill(c *compiled, beds []int) {
	s.spectra = make([][]complex128, 2*len(beds)*quantities)
	for i := range s.spectra {
		s.spectra[i] = make([]complex128, s.terms+1)
	}
	workers := min(runtime.GOMAXPROCS(0), s.terms)
	var wait sync.WaitGroup
	for first := range workers {
		wait.Add(1)
		go func() {
			defer wait.Done()
			nodes, to := make([]node, len(c.pieces)), make([]ends, len(c.order))
			row := make([]complex128, len(s.spectra))
			for k := first; k < s.terms; k += workers {
				c.transforms(s.at(k), beds, nodes, to, row)
				factor := complex(s.sigma(k)/(2*s.span), 0)
				for i, v := range row {
					s.spectra[i][k] = v * factor
				}
			}
		}()
	}
	wait.Wait()
}

// transforms writes the transforms of all courses at one complex frequency, of
// steps 1/s.
func (c *compiled) transforms(at complex128, beds []int, nodes []node, to []ends, row []complex128) {
	z := invert(c.up(c.laplace(at), nodes))
	c.down(1, nodes, to)
	for step, drive := range []complex128{z / at, 1 / at} {
		for i, bed := range beds {
			position := int(c.place[bed])
			e, t := &to[position], c.at(position)
			q := drive * e.qout
			into := row[(step*len(beds)+i)*quantities:]
			into[inflow], into[pressure], into[outflow] = q, drive*e.pout, 0
			if !math.IsInf(t.R2, 1) {
				into[outflow] = q * invert(1+at*complex(t.R2*t.C, 0))
			}
		}
	}
}

// search looks for the times of all courses from a time on, and tells whether
// all are found.
func (s *series) search(courses []course, from float64) bool {
	plan := fitting.NewFourier(2 * s.terms)
	a, b := make([]float64, 2*s.terms), make([]float64, 2*s.terms)
	zero := make([]complex128, s.terms+1)
	all := true
	for i := 0; i < len(courses); i += 2 {
		other := zero
		if i+1 < len(courses) {
			other = s.spectra[i+1]
		}
		plan.InversePair(a, b, s.spectra[i], other)
		for j, f := range [][]float64{a, b} {
			if i+j < len(courses) && !courses[i+j].done() {
				s.undamp(f)
				courses[i+j].find(f, s.step(), from)
				all = all && courses[i+j].done()
			}
		}
	}
	return all
}

// step is the time between values, s.
func (s *series) step() float64 { return s.span / float64(s.terms) }

// undamp turns sums of the series into f(t) over the usable part of the span.
func (s *series) undamp(f []float64) {
	for j := range int(usable*float64(s.terms)) + 3 {
		f[j] *= math.Exp(s.damping * float64(j) * s.step())
	}
	f[0] = min(f[0], f[1]) // the middle of what may be a jump
}
