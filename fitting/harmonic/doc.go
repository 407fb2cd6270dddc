// Package harmonic looks at pressure and flow of the same beats frequency by
// frequency, without a model: the input impedance, and the forward and backward
// wave.
//
// # Impedance
//
// With the Fourier coefficients of the average beat, harmonic k = 1, 2, ...,
// time dependence exp(+i w t),
//
//	Z_k = P_k / Q_k,  modulus |Z_k|, phase arg Z_k (negative: pressure lags flow)
//
// (Murgo et al. 1980, Circulation 62:105; from memory). The beats i scatter about
// it by e_ik = (P_ik - Z_k Q_ik)/Q_k; the part of e along Z_k is scatter of the
// modulus, the part across it, over |Z_k|, scatter of the phase. A harmonic is
// shown where its flow exceeds three times the standard deviation of Q_ik over
// the beats: below that, a ratio of two noises would pass for an impedance.
//
// # Waves
//
// With the characteristic impedance Zc,
//
//	P+ = (P + Zc Q)/2,  P- = (P - Zc Q)/2
//
// (Westerhof et al. 1972, Cardiovasc Res 6:648; from memory). The reflection
// magnitude is the swing of P- over that of P+; the return time is that from the
// foot of P+ to the foot of P-.
//
// # Units
//
// mmHg, mL/s, s, Hz; Z in mmHg s/mL. Where flow is a velocity, cm stands in place
// of mL.
package harmonic
