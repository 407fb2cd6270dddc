package fitting

// wk4s is the four-element windkessel with the inertance in series with Zc, a
// form of the one of Westerhof 1969 with the inertia of the blood added (compared
// on 2404 people in Segers et al. 2008, Proc IMechE H 222:417):
//
//	 Q ->  o---L---Zc---+-------+
//	                    |       |
//	P - Pv              R       C     C dPd/dt = Q - Pd/R,  P = Pv + Pd + Zc Q + L dQ/dt
//	                    |       |
//	       o------------+-------+     Z(w) = Zc + i w L + R/(1 + i w R C)
//
// Columns: 1/(1 + i w tau) with the factor R, 1 with Zc, and i w with L; shape:
// tau = R C. The total resistance is R + Zc. A delay d of pressure multiplies Z by
// exp(-i w d), about 1 - i w d, and so looks like an L of -d Zc: the two are
// never free together.
type wk4s struct{}

func (wk4s) Source() string { return "Westerhof 1969 with L in series; Segers 2008" }
func (wk4s) Parameters() []Symbol {
	return []Symbol{resistance, compliance, character, seriesInertance}
}
func (wk4s) Shapes() int         { return 1 }
func (wk4s) Elements() []Element { return wk4sElements }

var wk4sElements = []Element{{Relaxed: 1}, {Direct: 1}, {Rise: 1}}

func (wk4s) Equation() []string {
	return []string{"P = Pv + Pd + Zc Q + L dQ/dt,  C dPd/dt = Q - Pd/R", "Z(w) = Zc + i w L + R/(1 + i w R C),  Z(0) = R + Zc"}
}

// seriesInertance goes to its bound with the third column.
var seriesInertance = Symbol{Name: "L", Meaning: "inertance", Unit: "mmHg s²/mL", PerArea: "mmHg s²/cm", index: 2}

func (wk4s) Unpack(x, shape []float64) Values {
	return Values{R: x[0], C: complianceOf(shape[0], x[0]), Zc: x[1], L: x[2]}
}

func (wk4s) Pack(v Values) (x, shape []float64) {
	return []float64{v.R, v.Zc, v.L}, []float64{v.R * v.C}
}

func (wk4s) Series(v Values, w float64) complex128 { return complex(v.Zc, w*v.L) }

func (wk4s) Resistance(v Values) float64 { return v.R + v.Zc }

// fast adds to wk3's equations the column i w, of which
//
//	Re(conj(c_0) i w) = -w² tau u = -(1 - u)/tau,  Re(conj(1) i w) = 0,  |i w|² = w²
//
// with u = 1/(1 + w² tau²): no sum of its own depends on tau.
func (wk4s) fast(m *moments, shape []float64, to *normal) {
	wk3{}.fast(m, shape, to)
	tau := shape[0]
	inner := m.flowSum // of q below the Nyquist bin, where the column has no real part
	relaxed, slope := to.g[0][1], to.dg[0][0][1]
	if last := len(m.omega) - 1; m.nyquist {
		w, q := m.omega[last], m.q[last]
		inner -= q
		relaxed -= q * real(relaxation(w, tau))
		slope -= q * real(relaxationSlope(w, tau))
	}
	cross := (relaxed - inner) / tau
	dcross := slope/tau - cross
	to.g[0][2], to.g[2][0], to.g[1][2], to.g[2][1], to.g[2][2] = cross, cross, 0, 0, m.bendSum
	to.dg[0][0][2], to.dg[0][2][0], to.dg[0][1][2], to.dg[0][2][1], to.dg[0][2][2] = dcross, dcross, 0, 0, 0
	to.b[2], to.db[0][2] = m.riseSum, 0
}
