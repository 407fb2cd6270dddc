// Package fitting estimates lumped models of the arterial load from measured
// pressure and flow, with intervals that say how far to trust them.
//
// # The load
//
// Q(t) is flow into an arterial system and P(t) pressure at the same place. A
// lumped model is an impedance Z(w) between them, time dependence exp(i w t),
// above a constant outflow pressure Pv:
//
//	P_k = Z(w_k) Q_k,  w_k = 2 pi k/T,  and Pv is added to P_0
//
// [Model] is one such circuit, each in its own file with a sketch, its equation
// and its source; [Values] are its parameters. R is always the resistor in
// parallel with C, and the total resistance Z(0) is reported beside it. [Load]
// is what models and arterial trees have in common, [Respond] the pressure that
// a load makes of a flow.
//
// # The fit to one beat
//
// One beat is N samples, its period exactly N/rate, and flow between samples is
// the trigonometric interpolation. The sum of squares over samples
//
//	S = sum_j (P_model - P)_j² = N sum_k weight_k |Z(w_k) Q_k - D_k|²,  D = spectrum of P - Pv
//
// is a sum over Fourier bins (Parseval; the Nyquist bin of an even N counts once
// and only with its real part). Every impedance here is a sum x_1 c_1(w) + x_2
// c_2(w) + ... with x >= 0, linear in x, whose columns c depend on one or two
// shape parameters (tau = RC). For a given shape the best x is a non-negative
// linear least-squares problem of at most three unknowns, solved exactly; what
// remains is a function of the shape alone (variable projection: Golub and
// Pereyra 1973, SIAM J Numer Anal 10:413). Its slope is known too, so the search
// goes for the zero of the slope, which is sharp, and not for the bottom of the
// function, which is flat: scan of the whole range of ln tau, then a bracketed
// root in each valley. See [FitBeat].
//
// # Doubt
//
// Random error comes from the scatter of the beats: blocks of successive beats
// are drawn anew, averaged, cleared of what C carries from beat to beat, and
// fitted again ([IntervalBlocks]); with fewer than eight beats it comes from the
// residual and from leaving out one beat after the other ([IntervalCovariance]); a
// single beat has none ([IntervalNone]). Systematic error (calibration, delay, outflow
// pressure) is drawn on top of it from the half-widths in [Systematic]. Both sets
// of replicates stand in the [Result], so that what is computed downstream carries
// the same doubt. A parameter on its bound, wider than 100 %, or without effect
// is not identified, and says why.
//
// # Units
//
// mmHg, mL, s: R and Zc in mmHg s/mL, C in mL/mmHg, L in mmHg s²/mL. A fit to
// velocity instead of flow is per unit area: cm in place of mL.
package fitting
