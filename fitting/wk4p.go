package fitting

import "fmt"

// wk4p is the four-element windkessel with the inertance parallel to Zc
// (Stergiopulos, Westerhof and Westerhof 1999, Am J Physiol 276:H81):
//
//	             +--L--+
//	 Q ->  o-----+     +-----+-------+
//	             +-Zc--+     |       |
//	P - Pv                   R       C     P = Pv + Pd + Zc (Q - QL),  L dQL/dt = Zc (Q - QL)
//	                         |       |     C dPd/dt = Q - Pd/R
//	       o-----------------+-------+     Z(w) = i w L Zc/(Zc + i w L) + R/(1 + i w R C)
//
// Columns: 1/(1 + i w tau) with the factor R, and 1 - 1/(1 + i w theta) with Zc;
// shapes: tau = R C and theta = L/Zc. The total resistance is R.
//
// Where both shapes are equal it is a wk3, exactly (values of wk3 on the left):
//
//	WK3(R, C, Zc) = WK4p(R + Zc, R C/(R + Zc), Zc, Zc R C)
//
// so that a fit with L near Zc R C, ten times what an aorta has, tells nothing
// about an inertance.
type wk4p struct{}

func (wk4p) Source() string { return "Stergiopulos 1999" }
func (wk4p) Parameters() []Symbol {
	return []Symbol{resistance, compliance, character, parallelInertance}
}
func (wk4p) Shapes() int         { return 2 }
func (wk4p) Elements() []Element { return wk4pElements }

var wk4pElements = []Element{{Relaxed: 1}, {Direct: 1, Relaxed: -1, Shape: 1}}

func (wk4p) Equation() []string {
	return []string{
		"P = Pv + Pd + Zc (Q - QL),  L dQL/dt = Zc (Q - QL),  C dPd/dt = Q - Pd/R",
		"Z(w) = i w L Zc/(Zc + i w L) + R/(1 + i w R C),  Z(0) = R",
	}
}

// parallelInertance goes to its bound with the second shape.
var parallelInertance = Symbol{Name: "L", Meaning: "inertance", Unit: "mmHg s²/mL", PerArea: "mmHg s²/cm", shape: true, index: 1}

func (wk4p) Unpack(x, shape []float64) Values {
	return Values{R: x[0], C: complianceOf(shape[0], x[0]), Zc: x[1], L: shape[1] * x[1]}
}

func (wk4p) Pack(v Values) (x, shape []float64) {
	theta := 0.0 // a shorted Zc has no effect
	if v.Zc > 0 {
		theta = v.L / v.Zc
	}
	return []float64{v.R, v.Zc}, []float64{v.R * v.C, theta}
}

func (wk4p) Series(v Values, w float64) complex128 {
	if v.Zc == 0 || v.L == 0 {
		return 0
	}
	return complex(0, w*v.L*v.Zc) / complex(v.Zc, w*v.L)
}

func (wk4p) Resistance(v Values) float64 { return v.R }

// disguised is the L/(Zc R C) from which on a wk4p is taken for a wk3.
const disguised = 0.5

// degenerate tells why L cannot be told: the fit is a wk3 in disguise.
func (wk4p) degenerate(v Values) (parameter, why string) {
	if limit := disguised * v.Zc * v.R * v.C; v.L == 0 || v.L < limit {
		return "", ""
	}
	return "L", fmt.Sprintf("it is %.2g Zc R C: this is wk3 in disguise", v.L/(v.Zc*v.R*v.C))
}

// fast: with u = 1/(1 + w² tau²) and v = 1/(1 + w² theta²) for the two columns c
// and d,
//
//	|c|² = u,  |d|² = 1 - v,  Re(conj(c) d) = u - u v (1 + w² tau theta)
//
// At the Nyquist bin the real parts u and 1 - v are multiplied.
func (wk4p) fast(m *moments, shape []float64, to *normal) {
	*to = normal{n: to.n, total: m.total}
	cross, slope := m.relaxed(shape[0], to)
	tau, theta := shape[0], shape[1]
	var both, byTau, byTheta, second, secondSlope, b, db float64
	n := len(m.omega)
	if m.nyquist {
		n--
	}
	omega, q, re, im := m.omega[:n], m.q[:n], m.re[:n], m.im[:n]
	for k, w := range omega {
		y, z := w*tau, w*theta
		yz := y * z
		yy, zz := y*y, z*z
		d := 1 / ((1 + yy) * (1 + zz))
		u, v := (1+zz)*d, (1+yy)*d
		quv := q[k] * d
		all := 1 + yz
		both += quv * all
		byTau += quv * (yz - 2*all*yy*u)
		byTheta += quv * (yz - 2*all*zz*v)
		qv := q[k] * v
		second += qv
		secondSlope += qv * zz * v
		t := z * im[k]
		b += v * (zz*re[k] + t)
		db += v * (2*zz*v*re[k] + t*(1-2*zz*v))
	}
	second, secondSlope = m.flowSum-second, 2*secondSlope
	if m.nyquist {
		w, q, d := m.omega[n], m.q[n], m.re[n]
		c, dc := real(relaxation(w, tau)), real(relaxationSlope(w, tau))
		e, de := 1-real(relaxation(w, theta)), -real(relaxationSlope(w, theta))
		both += q * c * (1 - e)
		byTau += q * dc * (1 - e)
		byTheta -= q * c * de
		second += q * (e*e - 1)
		secondSlope += 2 * q * e * de
		b += d * e
		db += d * de
	}
	to.g[0][1], to.g[1][0], to.g[1][1] = cross-both, cross-both, second
	to.dg[0][0][1], to.dg[0][1][0] = slope-byTau, slope-byTau
	to.dg[1][0][1], to.dg[1][1][0], to.dg[1][1][1] = -byTheta, -byTheta, secondSlope
	to.b[1], to.db[1][1] = b, db
}
