package harmonic

import (
	"math"
	"math/cmplx"
	"math/rand/v2"
	"testing"
)

// Impedance of the three-element load R = 1, C = 1.5, Zc = 0.05 and of the others
// at the harmonics of 0.8 s: modulus and phase in degrees, computed independently
// from the equations (Westerhof 1969, Stergiopulos 1999).
var published = []struct {
	name           string
	z              func(w float64) complex128
	modulus, phase map[int]float64 // by harmonic
}{
	{
		"wk2", func(w float64) complex128 { return 1 / (1 + complex(0, 1.5*w)) },
		map[int]float64{1: 0.084578487, 2: 0.042403146, 4: 0.021215883, 8: 0.010609732},
		map[int]float64{1: -85.148213, 2: -87.56975, 4: -88.784328, 8: -89.392096},
	},
	{
		"wk3", func(w float64) complex128 { return 0.05 + 1/(1+complex(0, 1.5*w)) },
		map[int]float64{1: 0.10182766, 2: 0.066916586, 4: 0.054727736, 8: 0.051223267, 10: 0.050786317},
		map[int]float64{1: -55.855845, 2: -39.279337, 4: -22.803699, 8: -11.95337, 10: -9.6206896},
	},
	{
		"wk4p", func(w float64) complex128 {
			return complex(0, 0.005*w)*0.05/(0.05+complex(0, 0.005*w)) + 1/(1+complex(0, 1.5*w))
		},
		map[int]float64{1: 0.065471165, 4: 0.046345763, 10: 0.049324527},
		map[int]float64{1: -66.382923, 4: -8.3868834, 10: -2.5831452},
	},
	{
		"wk4s", func(w float64) complex128 { return 0.05 + complex(0, 0.005*w) + 1/(1+complex(0, 1.5*w)) },
		map[int]float64{1: 0.072746282, 2: 0.063179525, 10: 0.38746049},
		map[int]float64{1: -38.218651, 2: 34.929755, 10: 82.574822},
	},
}

// beats makes count beats of n samples over 0.8 s: flow with harmonics 0 .. most,
// their amplitude falling, and varying from beat to beat by part; pressure through
// z, with white noise.
func beats(z func(float64) complex128, count, n, most int, part, noise float64) (pressure, flow [][]float64, rate float64) {
	rng := rand.New(rand.NewPCG(7, 7))
	rate = float64(n) / 0.8
	for range count {
		scale := 1 + part*rng.NormFloat64()
		p, q := make([]float64, n), make([]float64, n)
		for k := range most + 1 {
			qk := complex(scale*80/float64(1+k*k), 0) * cmplx.Rect(1, float64(k))
			w := 2 * math.Pi * float64(k) / 0.8
			for j := range n {
				turn := cmplx.Rect(1, 2*math.Pi*float64(j*k)/float64(n))
				q[j] += real(qk * turn)
				p[j] += real(z(w) * qk * turn)
			}
		}
		for j := range n {
			p[j] += noise * rng.NormFloat64()
			q[j] += noise * rng.NormFloat64()
		}
		pressure, flow = append(pressure, p), append(flow, q)
	}
	return pressure, flow, rate
}

func TestImpedanceOfKnownLoads(t *testing.T) {
	for _, c := range published {
		p, q, rate := beats(c.z, 1, 100, 12, 0, 0)
		all := Impedance(p, q, rate)
		checked := 0
		for _, h := range all {
			want, ok := c.modulus[h.K]
			if !ok {
				continue
			}
			checked++
			if !h.Shown || math.Abs(h.Modulus()/want-1) > 1e-6 || math.Abs(h.Phase()*180/math.Pi-c.phase[h.K]) > 1e-4 {
				t.Errorf("%s, harmonic %d: %.8f at %.5f degrees, want %.8f at %.5f (%s)", c.name, h.K, h.Modulus(), h.Phase()*180/math.Pi, want, c.phase[h.K], h.Reason)
			}
			if math.Abs(h.Frequency-1.25*float64(h.K)) > 1e-9 {
				t.Errorf("harmonic %d at %v Hz", h.K, h.Frequency)
			}
		}
		if checked != len(c.modulus) {
			t.Errorf("%s: %d harmonics checked", c.name, checked)
		}
	}
}

// Harmonics 6 and more carry noise alone, and are not shown; those shown have the
// impedance of the load within what their scatter allows.
func TestHarmonicsWithoutFlow(t *testing.T) {
	const count = 40
	p, q, rate := beats(published[1].z, count, 160, 5, 0.04, 0.5)
	shown := 0
	for _, h := range Impedance(p, q, rate) {
		if h.K > 5 {
			if h.Shown || h.Reason == "" || !cmplx.IsNaN(h.Z) {
				t.Errorf("harmonic %d is shown: %+v", h.K, h)
			}
			continue
		}
		shown++
		w := 2 * math.Pi * h.Frequency
		d := (h.Z - published[1].z(w)) / h.Z * complex(h.Modulus(), 0)
		if !h.Shown || math.Abs(real(d)) > 4*h.ModulusSD/math.Sqrt(count) || math.Abs(imag(d)) > 4*h.PhaseSD*h.Modulus()/math.Sqrt(count) {
			t.Errorf("harmonic %d: %v, want %v; scatter %v and %v rad", h.K, h.Z, published[1].z(w), h.ModulusSD, h.PhaseSD)
		}
		// Noise of 0.5 puts sqrt(2 0.5²/160) on each part of each coefficient, that
		// of pressure and that of flow times Z.
		amount := 0.5 / math.Sqrt(160) / math.Sqrt2 * math.Hypot(1, h.Modulus()) / cmplx.Abs(h.Flow)
		if math.Abs(h.ModulusSD/amount-1) > 0.5 || math.Abs(h.PhaseSD*h.Modulus()/amount-1) > 0.5 {
			t.Errorf("harmonic %d: scatter %v and %v, want about %v", h.K, h.ModulusSD, h.PhaseSD*h.Modulus(), amount)
		}
	}
	if shown != 5 {
		t.Errorf("%d harmonics", shown)
	}
}

// A sign that is wrong is seen: pressure that lags flow has a negative phase.
func TestSignOfThePhase(t *testing.T) {
	p, q, rate := beats(func(w float64) complex128 { return cmplx.Rect(1, -w*0.01) }, 1, 128, 4, 0, 0)
	for _, h := range Shown(Impedance(p, q, rate)) {
		if math.Abs(h.Phase()+2*math.Pi*h.Frequency*0.01) > 1e-9 {
			t.Errorf("harmonic %d: phase %v", h.K, h.Phase())
		}
	}
}
