// Package estimate has the ways of the literature, other than a fit, to the
// resistance and the compliance of an arterial load.
//
//	decay            P - Pv falls as exp(-t/tau) in late diastole; C = tau/R      Frank 1899; Simon 1979
//	decay-asymptote  P - Pinf falls so, the asymptote Pinf estimated too
//	area             C = int (P - Pv) dt / (R (P1 - P2)) over diastole            Liu, Brin and Yin 1986
//	two-area         int Q dt = C (Pb - Pa) + (1/R) int (P - Pv) dt, over systole
//	                 and over diastole: two equations for C and R                 Self et al. 1994
//	pulse-pressure   the C with which wk2, driven by Q, has the measured pulse    Stergiopulos et al. 1994
//	sv-over-pp       stroke volume over pulse pressure: an index, no compliance   Chemla et al. 1998
//	zc-modulus       Zc as the mean of |Z| over the harmonics 4 to 10             Murgo et al. 1980
//
// (the formulas from memory). R is the total resistance, (mean P - Pv)/mean Q,
// except in two-area, which has its own. All use one outflow pressure Pv. Each
// estimator says when it does not apply: those of diastole need a flow that
// stops there, the pulse-pressure method the wave of the flow, and so on.
//
// On a load with a characteristic impedance these methods are biased, in known
// directions: on wk3, tau over the total resistance is R C/(R + Zc), and the
// pulse-pressure method lies further below C, since Zc adds to the pulse.
//
// Units are mmHg, mL, s, as in package fitting; per unit area cm stands in place
// of mL.
package estimate
