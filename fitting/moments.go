package fitting

import "math"

// moments is one beat as the normal equations see it: for each Fourier bin
//
//	q = weight |Q|²,  re + i im = weight conj(Q) D,  D the spectrum of P - Pv
//
// At the Nyquist bin of an even N only real parts count (Q and D are real there,
// and of a column the real part is taken).
type moments struct {
	Model
	omega     []float64 // rad/s
	q, re, im []float64
	total     float64 // sum of weight |D|²
	flowSum   float64 // sum of q
	crossSum  float64 // sum of re
	bendSum   float64 // sum of w² q below the Nyquist bin
	riseSum   float64 // sum of w im below it
	nyquist   bool    // the last bin is the Nyquist bin
	scratch   [2 * maxLinear]complex128
}

func newMoments(of Model, n int, rate float64) *moments {
	bins := n/2 + 1
	m := &moments{
		Model: of, nyquist: n%2 == 0,
		omega: make([]float64, bins), q: make([]float64, bins), re: make([]float64, bins), im: make([]float64, bins),
	}
	for k := range m.omega {
		m.omega[k] = omega(k, n, rate)
	}
	return m
}

// omega is the angular frequency of bin k of n samples at rate, rad/s.
func omega(k, n int, rate float64) float64 {
	return 2 * math.Pi * float64(k) * rate / float64(n)
}

// set takes in the spectra of flow and pressure under a calibration.
func (m *moments) set(flow, pressure []complex128, c Calibration) {
	m.total, m.flowSum, m.crossSum, m.bendSum, m.riseSum = 0, 0, 0, 0, 0
	last := len(flow) - 1
	shift := complex(c.PressureScale, 0) // times exp(i w Delay)
	sin, cos := math.Sincos(m.omega[1] * c.Delay)
	for k, f := range flow {
		p, weight := pressure[k]*shift, 2.0
		shift *= complex(cos, sin)
		if k == 0 {
			p, weight = p+complex(c.PressureOffset-c.OutflowPressure, 0), 1
		} else if m.nyquist && k == last {
			f, p, weight = complex(real(f), 0), complex(real(p), 0), 1
		}
		fr, fi, pr, pi := c.FlowScale*real(f), c.FlowScale*imag(f), real(p), imag(p)
		m.q[k] = weight * (fr*fr + fi*fi)
		m.re[k] = weight * (fr*pr + fi*pi)
		m.im[k] = weight * (fr*pi - fi*pr)
		m.total += weight * (pr*pr + pi*pi)
		m.flowSum += m.q[k]
		m.crossSum += m.re[k]
		if w := m.omega[k]; !m.nyquist || k < last {
			m.bendSum += w * w * m.q[k]
			m.riseSum += w * m.im[k]
		}
	}
}

// fastCircuit is a circuit that fills the normal equations in less time than
// its columns would take.
type fastCircuit interface {
	fast(m *moments, shape []float64, to *normal)
}

// normal makes moments a problem.
func (m *moments) normal(shape []float64, to *normal) {
	to.n, to.total = m.Linear(), m.total
	if f, ok := m.Circuit.(fastCircuit); ok {
		f.fast(m, shape, to)
		return
	}
	m.byColumns(shape, to)
}

// byColumns fills the normal equations of any circuit.
func (m *moments) byColumns(shape []float64, to *normal) {
	n, shapes := m.Linear(), m.Shapes()
	*to = normal{n: n, total: m.total}
	c, dc := m.scratch[:n], m.scratch[maxLinear:maxLinear+n]
	for k, w := range m.omega {
		m.columns(w, shape, c)
		m.onlyReal(k, c)
		for i := range n {
			for j := range n {
				to.g[i][j] += m.q[k] * dot(c[i], c[j])
			}
			to.b[i] += real(c[i])*m.re[k] + imag(c[i])*m.im[k]
		}
		for s := range shapes {
			m.slopes(w, shape, s, dc)
			m.onlyReal(k, dc)
			for i := range n {
				for j := range n {
					to.dg[s][i][j] += m.q[k] * (dot(c[i], dc[j]) + dot(dc[i], c[j]))
				}
				to.db[s][i] += real(dc[i])*m.re[k] + imag(dc[i])*m.im[k]
			}
		}
	}
}

// onlyReal drops the imaginary parts of the columns at the Nyquist bin.
func (m *moments) onlyReal(k int, columns []complex128) {
	if !m.nyquist || k != len(m.omega)-1 {
		return
	}
	for i, c := range columns {
		columns[i] = complex(real(c), 0)
	}
}

// dot is Re(conj(a) b).
func dot(a, b complex128) float64 { return real(a)*real(b) + imag(a)*imag(b) }

// pulsatile tells whether the flow has a pulse above rounding.
func (m *moments) pulsatile() bool {
	pulse := 0.0
	for _, q := range m.q[1:] {
		pulse += q
	}
	return pulse > unfelt*m.q[0]
}
