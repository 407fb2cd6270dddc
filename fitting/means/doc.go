// Package means finds a load where pressure and flow were not both recorded as
// waves: the resistance from mean values, the compliance from what else there is.
//
// With a pressure and a mean flow Q measured beside it (a cardiac output),
//
//	Z(0) = (mean P - Pv)/Q,  Zc = s Z(0),  R = (1 - s) Z(0),  C = tau/R
//
// tau from the decay of late diastole (package estimate). The share s is taken for
// 5 %, since nothing that was measured tells it (published: 5 to 10 %, 4.1 % in 18
// healthy people, Murgo 1980); its 95 % error is 3 % of Z(0), an assumption.
//
// With a flow and a cuff reading, Z(0) = (mean - Pv)/mean Q, and C is that with
// which the load, driven by the flow, has the pulse pressure of the cuff
// (Stergiopulos et al. 1994): for wk2, and for wk3 with Zc = s Z(0).
//
// Random error comes from the beats, drawn anew in blocks as in package fitting;
// with two to seven beats from leaving out one after the other (jackknife, Student's
// t). Systematic errors are drawn on top: those of package fitting, that of the
// output, of the cuff's two readings, and of s.
//
// Units: mmHg, mL, s.
package means
