package study

import (
	"math/cmplx"
	"slices"

	"afterbeat/data"
)

// later is one period moved later by a number of samples, which need not be
// whole: its trigonometric interpolation, read at j - shift.
func later(samples []float64, shift float64) []float64 {
	if shift == 0 {
		return slices.Clone(samples)
	}
	p := data.Period{Samples: samples, Rate: 1}
	x := p.Spectrum()
	for k := range x {
		x[k] *= cmplx.Exp(complex(0, -p.Omega(k)*shift))
	}
	return data.FromSpectrum(x, len(samples), 1).Samples
}
