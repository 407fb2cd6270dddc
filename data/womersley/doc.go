// Package womersley has the functions of oscillating flow in a round tube:
//
//	F10 = 2 J1(z)/(z J0(z)),  z = i^{3/2} alpha,  alpha = r sqrt(w rho/mu)
//	1 - F10 = M'10 exp(i eps'10)
//	Z' = i w (rho/A)/(1 - F10)
//
// (Womersley 1955, J Physiol 127:553, and 1957, WADC TR 56-614; from memory), for
// time dependence exp(+i w t). alpha compares inertia to viscosity: below 1 the
// flow is Poiseuille's at every instant, above 10 it moves as a plug with a
// boundary layer.
//
// # How they are computed
//
// With lambda² = q = i alpha² the quotient is one of modified Bessel functions,
// F10 = 2 I1(lambda)/(lambda I0(lambda)), and has Gauss's continued fraction
//
//	F = 1/(1 + X),  1 - F = X/(1 + X)
//	X = (u/2)/(1 + (u/6)/(1 + (u/12)/(1 + ... (u/(n (n + 1)))/...))),  u = q/4
//
// (Abramowitz and Stegun 1964, 9.1.73, in I; from memory), which neither
// overflows nor loses digits at small alpha: F and 1 - F are both products.
// Above |lambda| = [switchAt] Hankel's expansion of I1/I0 takes over, whose terms follow
// from the Riccati equation rho' = 1 - rho/lambda - rho². Any q with Re lambda > 0
// may be given, so that a Laplace transform is served too: q = r² s rho/mu.
//
// [F10] and [OneMinusF10] are good to 1e-12 relative for alpha from 0.01 to 1e6, and
// run on beyond both ends. [Fit] is a fast form of sqrt(1 - F10) for inner loops,
// good to 1e-12. [CentreRatio] and [Profile] are the relations of velocities.
package womersley
