package main

// stroke is a pulse of flow through the aortic valve,
//
//	Q = b x (1 - x) (1 - skew x),   x = (t - from)/duration in 0 .. 1
//
// with b such that its volume is the one given; a negative volume flows back.
type stroke struct{ from, duration, volume float64 } // s, s, mL

// skew puts the peak at 0.40 of the duration and makes it 1/0.64 of the mean.
const skew = 0.6

// coefficients are those of Q in powers of x, mL/s. The integral of
// x (1 - x)(1 - skew x) over 0 .. 1 is 1/6 - skew/12.
func (s stroke) coefficients() polynomial {
	b := s.volume / s.duration / (1.0/6 - skew/12)
	return polynomial{0, b, -b * (1 + skew), b * skew}
}

// polynomial has a coefficient for each power from 0 to 3.
type polynomial [4]float64

func (p polynomial) at(x float64) float64 {
	return p[0] + x*(p[1]+x*(p[2]+x*p[3]))
}
