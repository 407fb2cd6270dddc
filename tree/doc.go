// Package tree computes the pulse in a tree of arteries: pressure and flow at
// both ends of every segment, made of the flow at the root; what of it is lost
// where; and how fast each vascular bed follows a change at the root.
//
// # The tree
//
// A [Network] is a set of [Segment], each a tube that hangs on its parent; one
// has no parent, the root. A segment without daughters ends in a [Terminal], the
// load of its bed,
//
//	Z = R1 + R2/(1 + i w R2 C)
//
// above the outflow pressure Pv. At a junction pressure is continuous and flow
// conserved: the admittances of the daughters add. [Read] and [Network.Write]
// move the segments from and to a table.
//
// # The segment
//
// Time dependence exp(+i w t). Per unit length, with A = pi r² and the Womersley
// number alpha = r sqrt(w rho/mu),
//
//	Z' = i w (rho/A)/(1 - F10)      F10 = 2 J1(z)/(z J0(z)), z = i^{3/2} alpha
//	Y' = i w A/(rho c²)             c² = E h/(2 rho r (1 - sigma²))
//	gamma = sqrt(Z' Y')             Re gamma >= 0
//	Z0 = Z'/gamma
//	G = (ZL - Z0)/(ZL + Z0)         Zin = Z0 (1 + G e^{-2 gamma l})/(1 - G e^{-2 gamma l})
//
// (Womersley 1957, WADC TR 56-614; wave speed: Moens 1878, Korteweg 1878, with
// the 1 - sigma² of a tethered wall. From memory.) With the line "poiseuille"
// Z' = 8 mu/(pi r⁴) + i w rho/A. A viscoelastic wall has E (1 + i w tau) in place
// of E (Kelvin-Voigt). Mean flow has Z' = 8 mu/(pi r⁴) and Y' = 0. A segment whose
// radii differ is cut into uniform pieces of at most 2 % change each.
//
// # Units
//
// cm, cm/s, dyn/cm, g, poise within a segment; what leaves it is in mmHg, mL, s:
// impedance Z = Z0/1333.22387415 mmHg s/mL.
package tree
