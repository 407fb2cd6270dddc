package fitting

// Fourier is a plan for the transform of [data.Period.Spectrum] and its inverse
// over one length, two signals at a time, without allocating. It is not safe for
// concurrent use.
type Fourier struct{ plan *transform }

// NewFourier plans for n samples. It panics if n < 1.
func NewFourier(n int) *Fourier {
	if n < 1 {
		panic("fitting: a transform needs at least one sample")
	}
	return &Fourier{newTransform(n)}
}

// Pair writes the spectra of a and b, n/2+1 coefficients each.
func (f *Fourier) Pair(toA, toB []complex128, a, b []float64) { f.plan.pair(toA, toB, a, b) }

// InversePair writes the samples whose spectra are a and b. Of coefficient 0 and of the
// Nyquist bin of an even n only the real part counts.
func (f *Fourier) InversePair(toA, toB []float64, a, b []complex128) {
	t := f.plan
	for k, v := range a {
		w := b[k]
		mirror := t.n - k
		if k == 0 || mirror == k {
			t.x[k] = complex(real(v), real(w))
			continue
		}
		t.x[mirror] = complex(real(v)-imag(w), imag(v)+real(w)) // a + i b
		t.x[k] = complex(real(v)+imag(w), real(w)-imag(v))      // conj a + i conj b
	}
	t.forward()
	for j, v := range t.x {
		toA[j], toB[j] = real(v), imag(v)
	}
}
