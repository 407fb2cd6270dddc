// Package support asks of an arterial load what is left of the pulse when a
// steady pump takes over a share s of the output, at equal mean flow and equal
// heart period.
//
// # The posings
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
// # Units and signs
//
// Pressure in mmHg, flow in mL/s, positive into the arteries, power in
// mmHg mL/s, time in s, shares and ratios pure numbers from 0 to 1 (ratios may
// leave that range). Where the flow is a velocity, for a load per unit area,
// read cm/s for mL/s and mmHg cm/s for mmHg mL/s. A number that does not exist
// is NaN, and its estimate says why.
package support
