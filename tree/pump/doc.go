// Package pump is a rotary blood pump with its cannulas: the head it gives at a
// speed and a flow, and what its cannulas take. It knows nothing of the heart or
// of the arteries.
//
// # The head-flow law
//
//	H = a n² - b n Q - c Q |Q|            [Curve.Head]
//
// n is the speed in 1000/min and Q the flow through the pump, forward positive.
// a n² is the head at no flow, b n Q what the exchange of momentum takes, c Q|Q|
// the losses at the inlet and in the channels, which oppose the flow whichever
// way it goes (the usual quadratic law of a turbomachine; from memory). With
// b, c >= 0 the head falls with flow at every speed. Between the ventricle and
// the aorta
//
//	Lc dQ/dt = Plv - Pao + H - Rc Q
//
// where [Pump.Resistance] Rc and [Pump.Inertance] Lc are those of pump and
// cannulas together.
//
// # The sets of coefficients
//
// [Sets] has one from the open literature, remembered and not looked up again,
// and two that are invented: for the demo, and for checks. None is the pump of a
// maker, and none replaces the measured curve of the pump at hand.
//
// # Units
//
// Head in mmHg, flow in mL/s, speed in 1000/min, a in mmHg per (1000/min)², b in
// mmHg s/mL per 1000/min, c in mmHg s²/mL², Rc in mmHg s/mL, Lc in mmHg s²/mL.
package pump
