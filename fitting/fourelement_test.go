package fitting

// The four-element models stand here as what the least-squares core must be
// able to carry: three columns (wk4s), and two shapes searched one inside the
// other (wk4p). Neither has a fast path.

// fourSeries: P = Pv + Pd + Zc Q + L dQ/dt.
type fourSeries struct{ wk3 }

func (fourSeries) Linear() int { return 3 }

func (fourSeries) Columns(w float64, shape []float64, out []complex128) {
	out[0], out[1], out[2] = relaxation(w, shape[0]), 1, complex(0, w)
}

func (fourSeries) Slopes(w float64, shape []float64, _ int, out []complex128) {
	out[0], out[1], out[2] = relaxationSlope(w, shape[0]), 0, 0
}

func (fourSeries) Unpack(x, shape []float64) Values {
	return Values{R: x[0], C: complianceOf(shape[0], x[0]), Zc: x[1], L: x[2]}
}

func (fourSeries) Pack(v Values) (x, shape []float64) {
	return []float64{v.R, v.Zc, v.L}, []float64{v.R * v.C}
}

func (fourSeries) Impedance(v Values, w float64) complex128 {
	return wk3{}.Impedance(v, w) + complex(0, w*v.L)
}

// wk3's fast path knows two columns only.
func (fourSeries) fast(m *moments, shape []float64, to *normal) { m.byColumns(shape, to) }

// fourParallel: L parallel to Zc, i w L Zc/(Zc + i w L) = Zc (1 - 1/(1 + i w L/Zc)).
type fourParallel struct{ wk3 }

func (fourParallel) Shapes() int { return 2 }

func (fourParallel) Columns(w float64, shape []float64, out []complex128) {
	out[0], out[1] = relaxation(w, shape[0]), 1-relaxation(w, shape[1])
}

func (fourParallel) Slopes(w float64, shape []float64, s int, out []complex128) {
	out[0], out[1] = 0, 0
	if s == 0 {
		out[0] = relaxationSlope(w, shape[0])
	} else {
		out[1] = -relaxationSlope(w, shape[1])
	}
}

func (fourParallel) Unpack(x, shape []float64) Values {
	return Values{R: x[0], C: complianceOf(shape[0], x[0]), Zc: x[1], L: shape[1] * x[1]}
}

func (fourParallel) Pack(v Values) (x, shape []float64) {
	return []float64{v.R, v.Zc}, []float64{v.R * v.C, v.L / v.Zc}
}

func (fourParallel) Impedance(v Values, w float64) complex128 {
	return complex(v.R, 0)/complex(1, w*v.R*v.C) + complex(0, w*v.L*v.Zc)/complex(v.Zc, w*v.L)
}

func (fourParallel) Resistance(v Values) float64 { return v.R }

func (fourParallel) fast(m *moments, shape []float64, to *normal) { m.byColumns(shape, to) }

// everyModel is Models and the two above.
func everyModel() []Model {
	return append(Models(), Model{"wk4s", fourSeries{}}, Model{"wk4p", fourParallel{}})
}
