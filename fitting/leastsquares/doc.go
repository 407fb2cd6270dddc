// Package leastsquares minimises a sum of squares
//
//	S(x) = sum_i r_i(x)²
//
// of functions without any special form, by the method of Levenberg (1944) and
// Marquardt (1963): at x, with the Jacobian J of r and scales D,
//
//	(J'J + lambda D²) step = -J'r
//
// is solved as a linear least-squares problem (Householder's reflections on J set
// over sqrt(lambda) D, so that the condition of J is not squared). D holds the
// norms of the columns of J, with a memory of larger ones before (Moré 1978,
// Lecture Notes in Mathematics 630:105, keeps the largest for ever), and lambda
// follows the ratio of the actual to the promised gain (Nielsen 1999,
// IMM-REP-1999-05). Each step is corrected for the curvature of r along it, and
// refused where that is too large (Transtrum and Sethna 2012). Parameters may have bounds: a step ends at
// them, and a parameter on one stays there while the slope points outward.
//
// What counts as found is not a small step, which a large lambda gives anywhere,
// but that the residual is orthogonal to all that the free parameters can do
// (Bates and Watts 1981, Technometrics 23:179): the share of |r| in the space of
// J's columns is below a tolerance, or the undamped step is below rounding.
// Everything else says how it ended: [Status].
//
// The lumped models do not need this: they are nearly linear, and package fitting
// searches them in a way that cannot miss a valley. This is for what is not, such
// as the refinement of a tree of arteries. Positive parameters are best given as
// logarithms.
package leastsquares
