// Package support asks of an arterial load what is left of the pulse when a
// pump takes over. There are two ways to ask. The posings with a share need no
// ventricle: a steady pump takes a share s of the output, at equal mean flow and
// equal heart period. The coupled state needs one: ventricle, pump and load
// settle among themselves what each does.
//
// # The posings with a share
//
// A posing is a rule that turns the native flow Q(t) into the flow that enters
// the arteries with the pump running. Neither of the two here has a ventricle.
//
// [ScaledPosing]: the native flow, smaller, on a steady one,
//
//	Q_s = (1-s) Q + s mean Q
//
// On a linear load the pulse of pressure and of flow, and the Gosling index of
// both, are then 1-s of the native ones, and surplus energy and pulsatile power
// (1-s)². That is an identity: true of every patient, whatever was measured. It
// is a yardstick, never a forecast, and has no interval.
//
// [LateValvePosing]: ejection is what stands above a threshold, the pump is
// steady. With Q+ = max(0, Q) and Q- = min(0, Q),
//
//	Q_s = max(0, Q+ - q0) + (1-s) Q- + s mean Q,   q0 >= 0 such that
//	mean max(0, Q+ - q0) = (1-s) mean Q+
//
// so the valve opens later and closes earlier, and the mean is kept. Only the
// swing of root flow must fall with s; single harmonics, and what they do to
// pressure, may rise. It is a yardstick too: no ventricle answers to the load.
//
// For both, s = 0 is the native state and s = 1 a steady flow.
//
// # The state and the comparison
//
// A [State] is the flow, the pressure that the load answers with
// ([fitting.Respond]), and what both carry ([energy]). A [Comparison] sets a
// supported state against the native one. [Answer] holds a native state, a
// sweep of supported ones and their comparisons; [Answer.WithIntervals] pushes
// the replicates of a fit, each with its own parameters, flow and outflow
// pressure, through all of them.
//
// # The coupled state
//
// [Coupled] solves, for a ventricle ([heart.Ventricle]) that fills at Pfill, a
// pump ([pump.Pump]) from the ventricle to the root, and a lumped load
// ([Windkessel]),
//
//	dV/dt = Qmv - Qav - Qp,  Qmv = max(0, (Pfill - Plv)/Rmv),  Qav = max(0, (Plv - Pao)/Rav)
//	Lc dQp/dt = Plv - Pao + H - Rc Qp,                     Q = Qav + Qp into the load
//	wk3:  Pao = Pc + Zc Q,  C dPc/dt = Q - (Pc - Pv)/R,    hence Qav = max(0, (Plv - Pc - Zc Qp)/(Rav + Zc))
//
// and likewise for wk2, wk4s and wk4p. Two things may be otherwise: a valve that
// leaks lets Qav = (Plv - Pao)/Rar back where Plv < Pao, so that some of the flow
// of the pump goes round and only Qav + Qp reaches the body; and a pump whose
// inlet is the left atrium draws from Pfill in place of Plv, and not from V.
//
// [Match] makes mean flow or mean pressure equal to a given value: the flow by
// another filling pressure than that of the line, the pressure by another R at
// the filling pressure of the line.
//
// While no valve moves the equations are smooth: they are integrated with an
// adaptive method of order 5 (Dormand and Prince 1980) whose steps end where a valve opens or shuts or the pump's flow
// reverses, which is located, not stepped over. What comes back after a beat is
// found by Newton's method on the few states at its start and, on a filling line,
// the filling pressure as one more unknown; never by repeated substitution of the
// latter, which oscillates. The result is good to about 1e-7; two independent
// methods, and the balance of energy over the beat
//
//	filling + ventricle + pump = valves + cannula + Zc + R + outflow,
//	ventricle = int Plv (Qav + Qp - Qmv) dt, the stroke work
//
// are held against it in the tests. Minima and maxima are those of the
// continuous beat: kinks at the valves count, and both sides of the jump of Pao
// where the valve shuts in front of the L of a wk4s.
//
// [Coupled.Step] follows a change of speed, with filling pressure drawing nearer
// to its line with a lag; [Coupled.Modulate] a speed that changes all the time.
// [SetUp] finds the ventricle that natively ejects as asked, [Coupled.ValveLimit]
// the speed from which on the aortic valve stays shut, [Coupled.Waves] the signals
// over the beat.
// Nothing of this is a forecast for a patient unless ventricle, load and pump
// are: what is not known of them has to be varied, by whoever asks.
//
// # Units and signs
//
// Pressure in mmHg, flow in mL/s, positive into the arteries, power in
// mmHg mL/s, time in s, shares and ratios pure numbers from 0 to 1 (ratios may
// leave that range). Where the flow is a velocity, for a load per unit area,
// read cm/s for mL/s and mmHg cm/s for mmHg mL/s. A number that does not exist
// is NaN, and its estimate says why.
package support
