package support

import (
	"math"
	"math/cmplx"
)

// rest is a periodic pressure, mmHg: Re sum amplitude_k exp(i k w t).
type rest struct {
	w         float64
	amplitude []complex128 // of harmonic k; that of 0 is none
}

func newRest(period float64, harmonics int) *rest {
	return &rest{w: 2 * math.Pi / period, amplitude: make([]complex128, harmonics+1)}
}

// at is the pressure at a time, by Horner's rule.
func (r *rest) at(t float64) float64 {
	turn := cmplx.Rect(1, r.w*t)
	c, s := real(turn), imag(turn)
	x, y := 0.0, 0.0
	for k := len(r.amplitude) - 1; k > 0; k-- {
		x += real(r.amplitude[k])
		y += imag(r.amplitude[k])
		x, y = x*c-y*s, x*s+y*c
	}
	return x
}
