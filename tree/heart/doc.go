// Package heart is the left ventricle as a time-varying elastance between two
// valves: what it ejects follows from what it meets. It knows nothing of the
// arteries or of a pump.
//
// # The chamber
//
//	Plv = E(t) (V - V0),   E(t) = Emin + (Emax - Emin) e(t)
//
// (Suga and Sagawa 1974; from memory). V0 is the volume at which the chamber
// bears no pressure, and e(t) the activation, from 0 to 1, periodic, t = 0 where
// contraction begins. There are two:
//
// [Cosine], of the end-systolic time Tes and the relaxation time Tr,
//
//	e = (1 - cos(pi t/Tes))/2              0   <= t < Tes
//	e = (1 + cos(pi (t - Tes)/Tr))/2       Tes <= t < Tes + Tr
//	e = 0                                  after
//
// [Hill], the double Hill function of the period T (Stergiopulos, Meister and
// Westerhof 1996, Am J Physiol 270:H2050; from memory),
//
//	e = a x1^1.32/(1 + x1^1.32) / (1 + x2^21.9),   x1 = t/(0.303 T), x2 = t/(0.508 T)
//
// with a such that the maximum is 1: it is 1.672, and reached at 0.428 T.
//
// A fixed curve of activation is an assumption, and has been questioned under
// support (Vandenberghe 2006, ASAIO J 52:4).
//
// # The valves
//
// Each is an ideal diode and a resistance:
//
//	Qmv = max(0, (Pfill - Plv)/Rmv)     into the ventricle
//	Qav = max(0, (Plv - Pao)/Rav)       out of it, into the arteries
//
// An aortic valve that leaks has a resistance Rar to flow back: where Plv < Pao,
// Qav = (Plv - Pao)/Rar.
//
// # The filling line
//
// A heart that is relieved is filled under less pressure. [Filling] says how:
//
//	Pfill = max(0, P0 - slope (Qm - Q0)),   Qm the mean flow over the beat
//
// through one known state (P0, Q0). A slope of 0 is a constant filling pressure.
// In a ramp study (35 patients, JACC Heart Fail 2016;4:208) filling pressure
// fell 1.23 mmHg while output rose 0.16 L/min a step: [RampSlope].
//
// # Units
//
// Pressure in mmHg, volume in mL, flow in mL/s, time in s, elastance in mmHg/mL,
// resistance in mmHg s/mL.
package heart
