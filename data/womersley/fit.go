package womersley

import (
	"math"
	"math/cmplx"
	"sync"
)

// Fit is a fast form of sqrt(1 - F10), the root in the first half quadrant, as
// the line constants need it:
//
//	gamma = i w/(c sqrt(1 - F10)),  1/Z0 = (A/(rho c)) sqrt(1 - F10)
//
// Below alpha = [fitEnd] it is alpha times a polynomial in each cell of alpha, which
// interpolates at Chebyshev nodes; the nearest singularities, the zeros of J0,
// are 1.7 away. Above it is a polynomial in 1/alpha.
type Fit struct {
	cells [cellCount][2 * cellTerms]float64 // real and imaginary parts in turn
	tail  [tailTerms][2]float64             // of 1/alpha
}

const (
	cellWidth = 0.125
	cellCount = 192
	cellTerms = 8
	fitEnd    = cellWidth * cellCount
	tailTerms = 13
)

// Fitted is the fit. It is made when first asked for, in about a millisecond.
var Fitted = sync.OnceValue(newFit)

// Root is sqrt(1 - F10) to 1e-12 relative, for any alpha of 0 or more.
func (f *Fit) Root(alpha float64) complex128 {
	if alpha < fitEnd {
		cell := int(alpha * (1 / cellWidth))
		c := &f.cells[cell]
		t := alpha - cellWidth*(float64(cell)+0.5)
		t2 := t * t
		t4 := t2 * t2
		re := (c[0] + c[2]*t + (c[4]+c[6]*t)*t2) + (c[8]+c[10]*t+(c[12]+c[14]*t)*t2)*t4
		im := (c[1] + c[3]*t + (c[5]+c[7]*t)*t2) + (c[9]+c[11]*t+(c[13]+c[15]*t)*t2)*t4
		return complex(alpha*re, alpha*im)
	}
	x := 1 / alpha
	re, im := f.tail[tailTerms-1][0], f.tail[tailTerms-1][1]
	for k := tailTerms - 2; k >= 0; k-- {
		re, im = re*x+f.tail[k][0], im*x+f.tail[k][1]
	}
	return complex(re, im)
}

func newFit() *Fit {
	f := new(Fit)
	for cell := range f.cells {
		f.interpolate(cell)
	}
	// sqrt(1 - 2 x rho(x)) as a series d_k x^k in x = 1/lambda: with
	// e = 1 - 2 x rho, 2 d_0 d_n = e_n - sum_{0<j<n} d_j d_{n-j}.
	var d [tailTerms]float64
	d[0] = 1
	for n := 1; n < tailTerms; n++ {
		d[n] = -riccati[n-1]
		for j := 1; j < n; j++ {
			d[n] -= d[j] * d[n-j] / 2
		}
	}
	for k := range d { // lambda = sqrt(i) alpha
		turn := cmplx.Rect(d[k], -math.Pi/4*float64(k))
		f.tail[k] = [2]float64{real(turn), imag(turn)}
	}
	return f
}

// interpolate fills one cell: sqrt(1 - F10)/alpha at the Chebyshev nodes of the
// cell, as Newton's divided differences, expanded in powers.
func (f *Fit) interpolate(cell int) {
	middle := cellWidth * (float64(cell) + 0.5)
	var at [cellTerms]float64
	var value [cellTerms]complex128
	for j := range at {
		at[j] = cellWidth / 2 * math.Cos(math.Pi*(float64(j)+0.5)/cellTerms)
		alpha := middle + at[j]
		value[j] = cmplx.Sqrt(OneMinusF10(alpha)) / complex(alpha, 0)
	}
	for order := 1; order < cellTerms; order++ {
		for j := cellTerms - 1; j >= order; j-- {
			value[j] = (value[j] - value[j-1]) / complex(at[j]-at[j-order], 0)
		}
	}
	var power [cellTerms]complex128
	for j := cellTerms - 1; j >= 0; j-- { // power = power (t - at_j) + value_j
		for k := cellTerms - 1; k > 0; k-- {
			power[k] = power[k-1] - power[k]*complex(at[j], 0)
		}
		power[0] = value[j] - power[0]*complex(at[j], 0)
	}
	for k, v := range power {
		f.cells[cell][2*k], f.cells[cell][2*k+1] = real(v), imag(v)
	}
}
