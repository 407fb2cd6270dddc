package harmonic

import (
	"fmt"
	"math"
	"math/cmplx"
)

const (
	// mostHarmonics is how many harmonics are looked at.
	mostHarmonics = 20
	// clearance is the flow of a harmonic over its scatter from which it is shown.
	clearance = 3
	// leastPart is the flow of a harmonic over that of the largest one from which
	// it is shown where a single beat tells no scatter (an assumption).
	leastPart = 0.01
	// rounding is the part of the largest flow that rounding may leave in a harmonic.
	rounding = 1e-12
)

// Harmonic is pressure, flow and impedance at one frequency.
type Harmonic struct {
	K         int
	Frequency float64    // Hz
	Pressure  complex128 // P_k of the average beat, mmHg; its amplitude is 2 |P_k|
	Flow      complex128 // Q_k, mL/s
	Z         complex128 // mmHg s/mL; only where Shown
	// FlowScatter is the standard deviation of the flow over the beats, as a
	// distance in the complex plane, mL/s; NaN for a single beat.
	FlowScatter float64
	// ModulusSD and PhaseSD are the standard deviations of the impedance over the
	// beats, mmHg s/mL and rad; NaN for a single beat and where not Shown.
	ModulusSD, PhaseSD float64
	Shown              bool
	Reason             string // why it is not shown; empty where it is
}

// Modulus is |Z|, mmHg s/mL.
func (h Harmonic) Modulus() float64 { return cmplx.Abs(h.Z) }

// Phase is arg Z, rad, in (-pi, pi].
func (h Harmonic) Phase() float64 { return cmplx.Phase(h.Z) }

// Impedance is the input impedance of beats of pressure, mmHg, and flow, mL/s,
// of one length, at a rate in Hz: its harmonics 1, 2, ... up to the twentieth,
// those at or above the Nyquist frequency left out. Beats that differ in number
// or length panic.
func Impedance(pressure, flow [][]float64, rate float64) []Harmonic {
	if len(pressure) == 0 || len(pressure) != len(flow) || len(pressure[0]) == 0 {
		panic("harmonic: Impedance: beats of pressure and of flow differ in number, or there is none")
	}
	n := len(pressure[0])
	count := min(mostHarmonics, (n-1)/2)
	p, q := coefficients(pressure, n, count), coefficients(flow, n, count)
	all := make([]Harmonic, count)
	largest := 0.0
	for k := range all {
		all[k] = newHarmonic(p[k], q[k])
		all[k].K, all[k].Frequency = k+1, float64(k+1)*rate/float64(n)
		largest = max(largest, cmplx.Abs(all[k].Flow))
	}
	floor := rounding * greatest(flow)
	for k := range all {
		all[k].show(p[k], q[k], largest, floor)
	}
	return all
}

// greatest is the largest size of a sample.
func greatest(beats [][]float64) float64 {
	top := 0.0
	for _, beat := range beats {
		for _, v := range beat {
			top = max(top, math.Abs(v))
		}
	}
	return top
}

// Shown are the harmonics that are shown.
func Shown(all []Harmonic) (some []Harmonic) {
	for _, h := range all {
		if h.Shown {
			some = append(some, h)
		}
	}
	return some
}

// coefficients are X_k = (1/n) sum_j x_j exp(-2 pi i j k/n) of each beat, k = 1
// .. count: [k-1][beat].
func coefficients(beats [][]float64, n, count int) [][]complex128 {
	turn := make([]complex128, n)
	for j := range turn {
		sin, cos := math.Sincos(2 * math.Pi * float64(j) / float64(n))
		turn[j] = complex(cos/float64(n), -sin/float64(n))
	}
	all := make([][]complex128, count)
	for k := range all {
		all[k] = make([]complex128, len(beats))
	}
	for i, beat := range beats {
		if len(beat) != n {
			panic("harmonic: Impedance: beats differ in length")
		}
		for k := range all {
			re, im, at := 0.0, 0.0, 0
			for _, x := range beat {
				re += x * real(turn[at])
				im += x * imag(turn[at])
				if at += k + 1; at >= n {
					at -= n
				}
			}
			all[k][i] = complex(re, im)
		}
	}
	return all
}

func mean(x []complex128) complex128 {
	sum := complex(0, 0)
	for _, v := range x {
		sum += v
	}
	return sum / complex(float64(len(x)), 0)
}

func newHarmonic(p, q []complex128) Harmonic {
	h := Harmonic{Pressure: mean(p), Flow: mean(q), FlowScatter: math.NaN(), ModulusSD: math.NaN(), PhaseSD: math.NaN(), Z: cmplx.NaN()}
	if len(q) < 2 {
		return h
	}
	sum := 0.0
	for _, v := range q {
		d := v - h.Flow
		sum += real(d)*real(d) + imag(d)*imag(d)
	}
	h.FlowScatter = math.Sqrt(sum / float64(len(q)-1))
	return h
}

// show decides whether the harmonic is shown, and fills in its impedance.
func (h *Harmonic) show(p, q []complex128, largest, floor float64) {
	a := cmplx.Abs(h.Flow)
	switch {
	case !(a > floor):
		h.Reason = "it carries no flow"
	case len(q) < 2 && a < leastPart*largest:
		h.Reason = fmt.Sprintf("its flow is below %g %% of the largest harmonic's, and a single beat tells no scatter", 100*leastPart)
	case a <= clearance*h.FlowScatter:
		h.Reason = fmt.Sprintf("its flow is %.2g times its scatter over the beats, and %d times are asked for", a/h.FlowScatter, clearance)
	default:
		h.Shown = true
		h.Z = h.Pressure / h.Flow
		h.scatter(p, q)
	}
}

// scatter fills in the standard deviations of the impedance over the beats.
func (h *Harmonic) scatter(p, q []complex128) {
	if len(q) < 2 {
		return
	}
	along, across := 0.0, 0.0
	direction := h.Z / complex(cmplx.Abs(h.Z), 0)
	for i := range q {
		e := (p[i] - h.Z*q[i]) / h.Flow / direction
		along += real(e) * real(e)
		across += imag(e) * imag(e)
	}
	n := float64(len(q) - 1)
	h.ModulusSD, h.PhaseSD = math.Sqrt(along/n), math.Sqrt(across/n)/cmplx.Abs(h.Z)
}
