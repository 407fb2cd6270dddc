package womersley

import "math/cmplx"

// F10 is 2 J1(z)/(z J0(z)), z = i^{3/2} alpha; 1 at alpha = 0. It falls as
// 2/(alpha sqrt(i)). alpha must not be negative.
func F10(alpha float64) complex128 { return F(imaginarySquare(alpha)) }

// OneMinusF10 is 1 - F10, i alpha²/8 at small alpha, without loss of digits.
func OneMinusF10(alpha float64) complex128 { return OneMinusF(imaginarySquare(alpha)) }

// imaginarySquare is i alpha², held back where a square would overflow; there
// 1 - F10 is 1 to the last digit.
func imaginarySquare(alpha float64) complex128 {
	alpha = min(alpha, 1e100)
	return complex(0, alpha*alpha)
}

// F is 2 I1(lambda)/(lambda I0(lambda)) of q = lambda², Re lambda > 0.
func F(q complex128) complex128 {
	if beyond(q) {
		lambda := cmplx.Sqrt(q)
		return 2 * hankel(1/lambda) / lambda
	}
	return 1 / (1 + fraction(q))
}

// OneMinusF is 1 - F of q = lambda².
func OneMinusF(q complex128) complex128 {
	if beyond(q) {
		lambda := cmplx.Sqrt(q)
		return 1 - 2*hankel(1/lambda)/lambda
	}
	x := fraction(q)
	return x / (1 + x)
}

// switchAt is the |lambda| above which Hankel's expansion is used. There its
// smallest term and exp(-2 Re lambda), which it lacks, are below 2e-15 for
// arguments of lambda up to 45 degrees.
const switchAt = 24.0

// beyond tells whether |lambda| is above switchAt.
func beyond(q complex128) bool {
	return max(real(q), -real(q))+max(imag(q), -imag(q)) > switchAt*switchAt && cmplx.Abs(q) > switchAt*switchAt
}

// fraction is X of the package documentation, from its tail.
func fraction(q complex128) complex128 {
	re, im := real(q)/4, imag(q)/4
	x, y := 0.0, 0.0
	for n := tail(cmplx.Abs(q)); n >= 1; n-- { // x + iy = u/(n (n + 1))/(1 + x + iy)
		x++
		scale := steps[n] / (x*x + y*y)
		x, y = scale*(re*x+im*y), scale*(im*x-re*y)
	}
	return complex(x, y)
}

// steps are 1/(n (n + 1)).
var steps = func() (s [longest + 4]float64) {
	for n := 1; n < len(s); n++ {
		s[n] = 1 / float64(n*(n+1))
	}
	return s
}()

// longest is the number of terms from which on tail takes no more.
const longest = 60

// tail is the number of terms of the fraction that suffice for |q|: its n-th
// term must be small beside 1, and each further one gains a factor.
func tail(q float64) int {
	n := 10
	for limit := q; limit > 1 && n < longest; limit /= 1.6 {
		n += 3
	}
	return n
}

// hankel is I1(lambda)/I0(lambda) = sum c_k x^k, x = 1/lambda.
func hankel(x complex128) complex128 {
	sum := complex(0, 0)
	for k := len(riccati) - 1; k >= 0; k-- {
		sum = sum*x + complex(riccati[k], 0)
	}
	return sum
}

// riccati are the c_k, which follow from rho' = 1 - rho/lambda - rho²:
// c_0 = 1, 2 c_n = (n - 2) c_{n-1} - sum_{0<j<n} c_j c_{n-j}.
var riccati = func() (c [18]float64) {
	c[0] = 1
	for n := 1; n < len(c); n++ {
		c[n] = float64(n-2) * c[n-1] / 2
		for j := 1; j < n; j++ {
			c[n] -= c[j] * c[n-j] / 2
		}
	}
	return c
}()
