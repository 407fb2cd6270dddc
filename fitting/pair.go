package fitting

// Impedances writes Z of a load at the harmonics k = 0 .. n/2 of the planned
// period to dst, for [Responder.Pair].
func (r *Responder) Impedances(dst []complex128, l Load) {
	for k := range dst {
		dst[k] = l.Impedance(omega(k, r.plan.n, r.rate))
	}
}

// Pair writes the pressures above Pv that a load, whose impedances z are those
// of [Responder.Impedances], makes of two flows. The two travel through one
// transform, so that it takes half the time of two calls of Respond. The
// destinations may be the flows. It allocates nothing.
func (r *Responder) Pair(toA, toB []float64, z []complex128, a, b []float64) {
	r.plan.pair(r.spectrum, r.unused, a, b)
	for k, v := range z {
		r.spectrum[k] *= v
		r.unused[k] *= v
	}
	r.plan.inversePair(toA, toB, r.spectrum, r.unused)
}

// inversePair is inverse for two spectra at once.
func (t *transform) inversePair(toA, toB []float64, a, b []complex128) {
	// x holds the conjugate of A_k + i B_k, whose transform is that of the inverse.
	for k, u := range a {
		v := b[k]
		if mirror := t.n - k; k > 0 && mirror > k {
			t.x[k] = complex(real(u)-imag(v), -imag(u)-real(v))
			t.x[mirror] = complex(real(u)+imag(v), imag(u)-real(v))
		} else {
			t.x[k] = complex(real(u), -real(v))
		}
	}
	t.forward()
	for j, v := range t.x {
		toA[j], toB[j] = real(v), -imag(v)
	}
}
