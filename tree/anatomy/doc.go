// Package anatomy makes the tree of one patient's arteries: a published table of
// segments scaled to the patient's body, its terminals shared among the organs,
// and then refined until flow measured at the root makes the pressure measured.
//
// # The table
//
// [Systemic] is the 55-segment table of Stergiopulos, Young and Rogge (1992, J
// Biomech 25:1477) after Westerhof and others (1969, J Biomech 2:121), embedded
// with its marks: values from memory, parents of segments 1 to 33 confirmed. Wave
// speed is c² = Eh/(2 rho r (1 - sigma²)), sigma 0.5. A tree may come from the
// user's own table instead ([Given]).
//
// # Scaling
//
// Lengths go with height; radii with the root of body surface area (Du Bois:
// 0.007184 W^0.425 H^0.725, kg and cm, from memory), those of the trunk with a
// diameter measured at the root; wave speed with the carotid-femoral pulse-wave velocity, measured
// or the median of the patient's age. The table's own body is taken as 175 cm and
// 70 kg (assumed).
//
// # Flow among the organs
//
// The adult's organ table (values.md 8: US National Academies 1999, table A-1,
// after Williams and Leggett 1989) adds up to 102.55 % of the output. The heart's
// 4 % are left out, since the tree has no coronary arteries, and the rest is
// normalised to 1. Each terminal gets its share q_i, and with the Poiseuille
// resistances R_s of the segments on its way, through which the flow of all
// terminals beyond goes, its own resistance follows:
//
//	R_i = (R - sum_s R_s Q_s)/q_i,   Q_s = sum of q over the terminals beyond s
//
// so that the resistance of the whole is R, the fitted one. The brain's flow may
// be given as such instead of by share, since it is defended when output is low.
//
// # Compliance
//
// The table's ratio of walls to terminals is kept: 0.640 to 0.56 mL/mmHg. Wave
// speeds are scaled until the walls, sum of A l/(rho c²), have their part of the
// fitted C; the terminals share the rest by 1/R_i. Where a wave speed is known it
// rules over that ratio, but the walls have at most nine tenths of C, so that no
// terminal's compliance is ever negative. R1 = min(rho c/A, 0.9 R_i).
//
// # Refinement
//
// [Refine] moves factors on wall stiffness (c² of all segments), resistance and
// compliance of the terminals, and the calibre of the root (the wide trunk that
// begins there), and where a distal trace is there a regional one. It minimises
//
//	sum over traces of (2H+1) MSE/s²  +  sum over factors of (ln m/d)²
//
// MSE is the mean of the squared differences of traces, by Parseval over the
// harmonics to 25 Hz; H the number of harmonics that carry the trace, at most 10;
// s what is left of the pressure, and no less than 1 mmHg, since no such tree is
// truer than that; d the doubt about a factor before the recording is looked at.
// Factors are bound by d where the recording says nothing of them, and their
// interval shows it.
package anatomy
