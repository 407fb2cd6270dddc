package womersley

import (
	"math"
	"math/cmplx"
)

// CentreRatio is the mean velocity of the cross-section over that on the axis,
// of one harmonic:
//
//	(1 - F10)/(1 - 1/J0(i^{3/2} alpha))
//
// 1/2 at alpha = 0 (Poiseuille), towards 1 as the profile flattens (Evans and
// McDicken, Doppler Ultrasound; from memory).
func CentreRatio(alpha float64) complex128 {
	if alpha < flat {
		return 0.5
	}
	return 1 / Profile(alpha, 0)
}

// flat is the alpha below which the profile is Poiseuille's to the last digit.
const flat = 1e-8

// Profile is the velocity at the radius y r, y from 0 to 1, over the mean of the
// cross-section, of one harmonic:
//
//	(1 - J0(i^{3/2} alpha y)/J0(i^{3/2} alpha))/(1 - F10)
//
// 2 (1 - y²) at alpha = 0.
func Profile(alpha, y float64) complex128 {
	if alpha < flat {
		return complex(2*(1-y*y), 0)
	}
	return lag(alpha, y) / OneMinusF10(alpha)
}

// seriesEnd is the alpha up to which the power series of I0 is used: there it
// loses three digits, and Hankel's expansion is good to 1e-13.
const seriesEnd = 22

// lag is 1 - I0(lambda y)/I0(lambda).
func lag(alpha, y float64) complex128 {
	if alpha > seriesEnd {
		alpha = min(alpha, 1e100)
		lambda := cmplx.Rect(alpha, math.Pi/4)
		return 1 - scaledI0(y*alpha)/scaledI0(alpha)*cmplx.Exp(lambda*complex(y-1, 0))
	}
	// I0(lambda) - I0(lambda y) = sum u^k (1 - y^{2k})/k!², u = i alpha²/4
	u := complex(0, alpha*alpha/4)
	term, whole, difference, power := complex(1, 0), complex(1, 0), complex(0, 0), 1.0
	for k := 1; k < 60; k++ {
		term *= u / complex(float64(k*k), 0)
		power *= y * y
		whole += term
		difference += term * complex(1-power, 0)
	}
	return difference / whole
}

// scaledI0 is exp(-lambda) I0(lambda), lambda = sqrt(i) alpha.
func scaledI0(alpha float64) complex128 {
	lambda := cmplx.Rect(alpha, math.Pi/4)
	if alpha <= seriesEnd {
		u := complex(0, alpha*alpha/4)
		term, sum := complex(1, 0), complex(1, 0)
		for k := 1; k < 60; k++ {
			term *= u / complex(float64(k*k), 0)
			sum += term
		}
		return sum * cmplx.Exp(-lambda)
	}
	// Hankel: sum (1² 3² ... (2k-1)²)/(k! (8 lambda)^k)/sqrt(2 pi lambda)
	term, sum := complex(1, 0), complex(1, 0)
	for k := 1; k <= 20; k++ {
		odd := float64(2*k - 1)
		term *= complex(odd*odd/(8*float64(k)), 0) / lambda
		sum += term
	}
	return sum / cmplx.Sqrt(2*math.Pi*lambda)
}
