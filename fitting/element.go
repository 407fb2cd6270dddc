package fitting

// Element is a column of a model: what its factor makes of the flow,
//
//	c(w) = Direct + Relaxed/(1 + i w tau) + Rise i w,  tau = shape[Shape], s
//
// that is, over time, a part of Q itself, of Q relaxed with a time constant,
// tau dy/dt = Q - y, and of dQ/dt.
type Element struct {
	Direct, Relaxed, Rise float64
	Shape                 int
}

// Linear is the number of columns of the model.
func (m Model) Linear() int { return len(m.Elements()) }

// columns writes c_j(w) to out, w in rad/s.
func (m Model) columns(w float64, shape []float64, out []complex128) {
	for j, e := range m.Elements() {
		out[j] = complex(e.Direct, e.Rise*w)
		if e.Relaxed != 0 {
			out[j] += complex(e.Relaxed, 0) * relaxation(w, shape[e.Shape])
		}
	}
}

// slopes writes the derivatives of the columns with respect to ln shape[s].
func (m Model) slopes(w float64, shape []float64, s int, out []complex128) {
	for j, e := range m.Elements() {
		out[j] = 0
		if e.Relaxed != 0 && e.Shape == s {
			out[j] = complex(e.Relaxed, 0) * relaxationSlope(w, shape[s])
		}
	}
}
