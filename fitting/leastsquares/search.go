package leastsquares

import (
	"context"
	"fmt"
	"math"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"
)

// Minimise goes downhill from start. It panics where the problem makes no sense:
// fewer residuals than parameters, bounds of another length, a start outside them.
// Of a search interrupted by ctx the best point is returned.
func Minimise(ctx context.Context, p Problem, start []float64, set Settings) Result {
	s := newSearch(p, start, set)
	status := s.run(ctx)
	return s.result(status)
}

// search is a problem at work.
type search struct {
	p               Problem
	set             Settings
	x, r            []float64
	sum             float64
	trial, rTrial   []float64
	high, low       []float64
	j               *mat.Dense
	scale, typical  []float64
	held            []bool // by a bound
	lambda          float64
	evaluations     int
	tried, nonsense int
}

func newSearch(p Problem, start []float64, set Settings) *search {
	n := len(start)
	if p.Count < n || n == 0 {
		panic(fmt.Sprintf("leastsquares: %d residuals for %d parameters", p.Count, n))
	}
	for _, bound := range [][]float64{p.Low, p.High} {
		if bound != nil && len(bound) != n {
			panic("leastsquares: bounds of another length than the start")
		}
	}
	for i, v := range start {
		if p.Low != nil && v < p.Low[i] || p.High != nil && v > p.High[i] {
			panic(fmt.Sprintf("leastsquares: parameter %d starts outside its bounds", i))
		}
	}
	if set.Evaluations <= 0 {
		set.Evaluations = 200000
	}
	if set.Tolerance <= 0 {
		set.Tolerance = 1e-9
	}
	s := &search{p: p, set: set, x: append([]float64(nil), start...), held: make([]bool, n), scale: make([]float64, n)}
	s.typical = make([]float64, n)
	for i, v := range start {
		if s.typical[i] = 0.1 * math.Abs(v); v == 0 {
			s.typical[i] = 1e-3
		}
	}
	s.trial = make([]float64, n)
	s.r, s.rTrial = make([]float64, p.Count), make([]float64, p.Count)
	s.high, s.low = make([]float64, p.Count), make([]float64, p.Count)
	s.j = mat.NewDense(p.Count, n, nil)
	return s
}

// residuals evaluates and returns the sum of squares; NaN where it is no number.
func (s *search) residuals(dst, x []float64) float64 {
	s.evaluations++
	s.p.Residuals(dst, x)
	sum := floats.Dot(dst, dst)
	if math.IsNaN(sum) || math.IsInf(sum, 0) {
		s.nonsense++
		return math.NaN()
	}
	return sum
}

// forgotten is what a step leaves of an earlier scale: so much memory keeps
// parameters from running off, and lets them come back from where they were huge.
const forgotten = 0.8

// largest lambda: beyond it a step is too small to change anything.
const mostDamping = 1e24

func (s *search) run(ctx context.Context) Status {
	if s.sum = s.residuals(s.r, s.x); math.IsNaN(s.sum) {
		return NotANumber
	}
	s.lambda = 1e-3
	for {
		s.linearise()
		offset, small := s.offset()
		if offset <= s.set.Tolerance || small {
			return s.determined()
		}
		switch status := s.improve(ctx); {
		case status == Stalled && offset <= math.Sqrt(s.set.Tolerance):
			return s.determined() // rounding ends it here
		case status != "":
			return status
		}
	}
}

// linearise computes J, its scales, and which parameters are held.
func (s *search) linearise() {
	if s.p.Jacobian != nil {
		s.p.Jacobian(s.j, s.x)
	} else {
		s.differences()
	}
	for k := range s.x {
		column := mat.Col(nil, k, s.j)
		if norm := floats.Norm(column, 2); !math.IsInf(norm, 0) {
			s.scale[k] = math.Max(norm, forgotten*s.scale[k])
		}
		slope := floats.Dot(column, s.r)
		s.held[k] = s.p.Low != nil && s.x[k] <= s.p.Low[k] && slope >= 0 || s.p.High != nil && s.x[k] >= s.p.High[k] && slope <= 0
	}
}

// offset is the share of |r| in the space of the free columns; small tells that
// the undamped step is below rounding.
func (s *search) offset() (share float64, small bool) {
	step, inside, full := s.step(0, s.r)
	if s.sum == 0 {
		return 0, true
	}
	moved, size := 0.0, 0.0
	for k, v := range step {
		moved, size = math.Hypot(moved, s.scale[k]*v), math.Hypot(size, s.scale[k]*s.x[k])
	}
	return inside / math.Sqrt(s.sum), full && moved <= 1e-14*size
}

// improve raises the damping until a step lowers the sum of squares.
func (s *search) improve(ctx context.Context) Status {
	for grow := 2.0; s.lambda < mostDamping; grow *= 2 {
		if ctx.Err() != nil {
			return Interrupted
		}
		if s.evaluations >= s.set.Evaluations {
			return TooMany
		}
		s.tried++
		step, _, _ := s.step(s.lambda, s.r)
		if !s.bend(step) {
			s.lambda *= grow
			continue
		}
		for k, v := range step {
			s.trial[k] = s.x[k] + v
			if s.p.Low != nil {
				s.trial[k] = math.Max(s.p.Low[k], s.trial[k])
			}
			if s.p.High != nil {
				s.trial[k] = math.Min(s.p.High[k], s.trial[k])
			}
			step[k] = s.trial[k] - s.x[k]
		}
		sum := s.residuals(s.rTrial, s.trial)
		if promised := s.promised(step); sum < s.sum && promised > 0 {
			gain := (s.sum - sum) / promised
			s.lambda *= math.Max(1.0/3, 1-math.Pow(2*gain-1, 3))
			s.lambda = math.Max(s.lambda, 1e-20)
			copy(s.x, s.trial)
			copy(s.r, s.rTrial)
			s.sum = sum
			return ""
		}
		s.lambda *= grow
	}
	s.lambda = mostDamping / 2
	return Stalled
}

const (
	// probe is the part of a step at which the curvature of r along it is looked at.
	probe = 0.1
	// mostBend is the size of the correction over that of the step, both doubled,
	// above which the linear model is not to be trusted so far.
	mostBend = 0.75
)

// bend corrects a step for the curvature of r along it (geodesic acceleration:
// Transtrum and Sethna 2012, arXiv:1201.5885):
//
//	r_vv = 2/h ((r(x + h v) - r(x))/h - J v),  (J'J + lambda D²) a = -J'r_vv,  step = v + a/2
//
// and reports false where the correction is too large for the step. It keeps the
// search in the bed of a bent valley, and parameters from running off to where
// nothing depends on them.
func (s *search) bend(step []float64) bool {
	for k, v := range step {
		s.trial[k] = s.x[k] + probe*v
		if s.p.Low != nil && s.trial[k] < s.p.Low[k] || s.p.High != nil && s.trial[k] > s.p.High[k] {
			return true // at a bound the step is cut anyway
		}
	}
	if math.IsNaN(s.residuals(s.rTrial, s.trial)) {
		return false
	}
	for i, r := range s.r {
		v := 0.0
		for k, d := range step {
			v += s.j.At(i, k) * d
		}
		s.rTrial[i] = 2 / probe * ((s.rTrial[i]-r)/probe - v)
	}
	a, _, _ := s.step(s.lambda, s.rTrial)
	long, bent := 0.0, 0.0
	for k, v := range step {
		long, bent = math.Hypot(long, s.scale[k]*v), math.Hypot(bent, s.scale[k]*a[k])
	}
	if 2*bent > mostBend*long {
		return false
	}
	for k := range step {
		step[k] += a[k] / 2
	}
	return true
}

// promised is by how much the linear model says that a step lowers the sum.
func (s *search) promised(step []float64) float64 {
	sum := 0.0
	for i, r := range s.r {
		v := r
		for k, d := range step {
			v += s.j.At(i, k) * d
		}
		sum += (r - v) * (r + v)
	}
	return sum
}

// determined tells a minimum from a valley's floor.
func (s *search) determined() Status {
	if _, _, full := s.step(0, s.r); !full {
		return Undetermined
	}
	return Found
}
