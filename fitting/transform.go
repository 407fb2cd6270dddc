package fitting

import "math/bits"

// transform is a plan for the discrete Fourier transform of n real samples,
//
//	X_k = (1/n) sum_j x_j exp(-2 pi i j k/n),  k = 0 .. n/2,
//
// of two signals at once, which travel as the real and the imaginary part of
// one complex transform. A beat has whatever length the heart gave it, so a
// large prime factor must not hurt: such lengths go through Bluestein's
// convolution (Bluestein 1970, IEEE Trans Audio Electroacoust 18:451) at a
// power of two. A plan is not safe for concurrent use.
type transform struct {
	n        int
	core     *stockham
	x        []complex128 // n values
	chirp    []complex128 // exp(-i pi j²/n); nil where n goes straight through
	response []complex128 // transform of the chirp's conjugate, over the length of core
	work     []complex128 // over the length of core
}

// largestRadix bounds the prime factors that are taken directly; above it
// Bluestein is faster (measured at lengths near 860).
const largestRadix = 31

func newTransform(n int) *transform {
	t := &transform{n: n, x: make([]complex128, n)}
	if radices(n)[0] <= largestRadix {
		t.core = newStockham(n)
		return t
	}
	m := 1 << bits.Len(uint(2*n-2))
	t.core = newStockham(m)
	t.chirp = make([]complex128, n)
	t.response, t.work = make([]complex128, m), make([]complex128, m)
	for j := range n {
		t.chirp[j] = root(j*j, 2*n)
		c := complex(real(t.chirp[j]), -imag(t.chirp[j]))
		t.response[j], t.response[(m-j)%m] = c, c
	}
	t.core.forward(t.response)
	return t
}

// pair gives the spectra of a and b, n samples each, as n/2+1 coefficients.
func (t *transform) pair(toA, toB []complex128, a, b []float64) {
	for j := range t.x {
		t.x[j] = complex(a[j], b[j])
	}
	t.forward()
	scale := 0.5 / float64(t.n)
	for k := range toA {
		x, y := t.x[k], t.x[(t.n-k)%t.n]
		toA[k] = complex(scale*(real(x)+real(y)), scale*(imag(x)-imag(y)))
		toB[k] = complex(scale*(imag(x)+imag(y)), scale*(real(y)-real(x)))
	}
}

// inverse gives the n samples whose spectrum is x, n/2+1 coefficients; of X_0
// and of the Nyquist bin of an even n only the real part counts.
func (t *transform) inverse(to []float64, x []complex128) {
	for k, v := range x {
		if mirror := t.n - k; k > 0 && mirror > k {
			t.x[mirror] = v
			t.x[k] = complex(real(v), -imag(v))
		} else {
			t.x[k] = complex(real(v), 0)
		}
	}
	t.forward()
	for j, v := range t.x {
		to[j] = real(v)
	}
}

// forward transforms t.x in place, without the factor 1/n.
func (t *transform) forward() {
	if t.chirp == nil {
		t.core.forward(t.x)
		return
	}
	clear(t.work)
	for j, c := range t.chirp {
		t.work[j] = t.x[j] * c
	}
	t.core.forward(t.work)
	for k, r := range t.response {
		v := t.work[k] * r
		t.work[k] = complex(real(v), -imag(v)) // conjugates make the next transform an inverse
	}
	t.core.forward(t.work)
	scale := 1 / float64(len(t.work))
	for j, c := range t.chirp {
		t.x[j] = c * complex(scale*real(t.work[j]), -scale*imag(t.work[j]))
	}
}
