package fitting

// wk3 is the three-element windkessel (Westerhof, Bosman, De Vries and
// Noordergraaf 1969, J Biomech 2:121):
//
//	 Q ->  o---Zc---+-------+
//	                |       |
//	P - Pv          R       C        C dPd/dt = Q - Pd/R,  P = Pv + Pd + Zc Q
//	                |       |
//	       o--------+-------+        Z(w) = Zc + R/(1 + i w R C)
//
// Columns: 1/(1 + i w tau) with the factor R, and 1 with Zc; shape: tau = R C.
// The total resistance is R + Zc.
type wk3 struct{}

func (wk3) Source() string       { return "Westerhof 1969" }
func (wk3) Parameters() []Symbol { return []Symbol{resistance, compliance, character} }
func (wk3) Shapes() int          { return 1 }
func (wk3) Elements() []Element  { return wk3Elements }

var wk3Elements = []Element{{Relaxed: 1}, {Direct: 1}}

func (wk3) Equation() []string {
	return []string{"P = Pv + Pd + Zc Q,  C dPd/dt = Q - Pd/R", "Z(w) = Zc + R/(1 + i w R C),  Z(0) = R + Zc"}
}

func (wk3) Unpack(x, shape []float64) Values {
	return Values{R: x[0], C: complianceOf(shape[0], x[0]), Zc: x[1]}
}

func (wk3) Pack(v Values) (x, shape []float64) {
	return []float64{v.R, v.Zc}, []float64{v.R * v.C}
}

func (wk3) Series(v Values, _ float64) complex128 { return complex(v.Zc, 0) }

func (wk3) Resistance(v Values) float64 { return v.R + v.Zc }

func (wk3) fast(m *moments, shape []float64, to *normal) {
	cross, slope := m.relaxed(shape[0], to)
	to.g[0][1], to.g[1][0], to.g[1][1] = cross, cross, m.flowSum
	to.dg[0][0][1], to.dg[0][1][0], to.dg[0][1][1] = slope, slope, 0
	to.b[1], to.db[0][1] = m.crossSum, 0
}
