package fitting

// wk2 is the two-element windkessel (Frank 1899, Z Biol 37:483):
//
//	 Q ->  o----+-------+
//	            |       |
//	P - Pv      R       C        C dPd/dt = Q - Pd/R,  P = Pv + Pd
//	            |       |
//	       o----+-------+        Z(w) = R/(1 + i w R C)
//
// Column: 1/(1 + i w tau) with the factor R; shape: tau = R C.
type wk2 struct{}

func (wk2) Source() string       { return "Frank 1899" }
func (wk2) Parameters() []Symbol { return []Symbol{resistance, compliance} }
func (wk2) Shapes() int          { return 1 }
func (wk2) Elements() []Element  { return wk2Elements }

var wk2Elements = []Element{{Relaxed: 1}}

func (wk2) Equation() []string {
	return []string{"P = Pv + Pd,  C dPd/dt = Q - Pd/R", "Z(w) = R/(1 + i w R C),  Z(0) = R"}
}

func (wk2) Unpack(x, shape []float64) Values {
	return Values{R: x[0], C: complianceOf(shape[0], x[0])}
}

func (wk2) Pack(v Values) (x, shape []float64) {
	return []float64{v.R}, []float64{v.R * v.C}
}

func (wk2) Series(Values, float64) complex128 { return 0 }

func (wk2) Resistance(v Values) float64 { return v.R }

func (wk2) fast(m *moments, shape []float64, to *normal) {
	m.relaxed(shape[0], to)
}
