package fitting

// relaxation is the column 1/(1 + i w tau), the impedance of R parallel to C
// over R.
func relaxation(w, tau float64) complex128 {
	y := w * tau
	u := 1 / (1 + y*y)
	return complex(u, -y*u)
}

// relaxationSlope is its derivative with respect to ln tau,
// -i w tau/(1 + i w tau)².
func relaxationSlope(w, tau float64) complex128 {
	y := w * tau
	u := 1 / (1 + y*y)
	return complex(-2*y*y*u*u, -y*(1-y*y)*u*u)
}

// complianceOf is C = tau/R; 0 where R is 0, for a shorted C has no effect.
func complianceOf(tau, r float64) float64 {
	if r == 0 {
		return 0
	}
	return tau / r
}

// relaxed does for the column c = 1/(1 + i w tau) what moments.byColumns does
// for any: it fills the first entries of the normal equations and returns the
// product of c with the column 1, and its slope. With u = 1/(1 + w² tau²) both
// |c|² and Re c are u, so one division a bin is all there is to pay.
func (m *moments) relaxed(tau float64, to *normal) (cross, slope float64) {
	var g, dg, b, db float64
	n := len(m.omega)
	if m.nyquist {
		n--
	}
	omega, q, re, im := m.omega[:n], m.q[:n], m.re[:n], m.im[:n]
	for k, w := range omega {
		y := w * tau
		yy := y * y
		u := 1 / (1 + yy)
		v := yy * u // 1 - u
		qu, t := q[k]*u, y*im[k]
		e := u * (re[k] - t)
		g += qu
		dg -= qu * v
		b += e
		db -= u*t + 2*v*e
	}
	cross, slope = g, 2*dg
	to.g[0][0], to.dg[0][0][0] = cross, slope
	if m.nyquist {
		w, q, d := m.omega[n], m.q[n], m.re[n]
		c, dc := real(relaxation(w, tau)), real(relaxationSlope(w, tau))
		to.g[0][0] += q * c * c
		to.dg[0][0][0] += 2 * q * c * dc
		cross += q * c
		slope += q * dc
		b += d * c
		db += d * dc
	}
	to.b[0], to.db[0][0] = b, db
	return cross, slope
}
