package beat

import (
	"math"
	"math/cmplx"

	"afterbeat/data"
)

// Index names a measure by its formula.
type Index string

// The indices. A bare "PI" is none of them: on the screens of pumps that is a
// scaled number of the pump's own flow.
const (
	GoslingPI      Index = "Gosling PI"            // (max - min)/mean; Gosling & King 1974 (from memory)
	PourcelotRI    Index = "Pourcelot RI"          // (max - min)/max; Pourcelot 1974 (from memory)
	SystolicRatio  Index = "S/D"                   // max/min
	TimeToPeak     Index = "time to peak"          // from sample 0, the onset
	MaxSlope       Index = "maximum slope"         // dP/dt max
	FormFactor     Index = "form factor"           // (mean - min)/(max - min)
	PulsatilePower Index = "pulsatile power index" // sum over k of (A_k/A_0)²
	Augmentation   Index = "augmentation index"    // Murgo 1980; see Measures.Augmentation
)

// harmonics listed in Measures.
const listedHarmonics = 10

// slopeHalf is the time, s, on either side of a slope.
const slopeHalf = 0.01

// nearlyNil: a mean, maximum or minimum below this part of the amplitude is
// taken as nil, since an index divided by it would be noise.
const nearlyNil = 0.01

// Measures are the numbers of one beat, in the unit of its samples. An
// undefined one is NaN, and [Measures.Remark] says why. Ratios to a mean or a
// maximum have a meaning in a calibrated channel only.
type Measures struct {
	Mean, Max, Min float64
	Amplitude      float64 // max - min: the pulse pressure of a pressure

	GoslingPI      float64 // (max - min)/mean
	PourcelotRI    float64 // (max - min)/max; above 1 where flow reverses
	SystolicRatio  float64 // S/D = max/min
	TimeToPeak     float64 // s
	MaxSlope       float64 // largest (x(t + 10 ms) - x(t - 10 ms))/20 ms, round the beat; per s
	FormFactor     float64 // (mean - min)/(max - min)
	PulsatilePower float64 // sum of (A_k/A_0)², k = 1 .. N/2
	// Augmentation is (Ps - Pi)/PP where the inflection, Pi, comes before the
	// peak (type A), and (Pi - Ps)/PP, negative, where it comes after (type C);
	// Ps is the maximum and PP the amplitude. It has a meaning in a central
	// pressure only.
	Augmentation float64
	// Harmonics are the amplitudes A_1, A_2 ..: of x(t) = A_0 + sum A_k
	// cos(k w t + phi_k), up to ten or N/2.
	Harmonics []float64

	remarks map[Index]string
}

// Remark says why an index is undefined, or what to mind about it; empty where
// there is nothing to say.
func (m Measures) Remark(i Index) string { return m.remarks[i] }

// Measure takes the measures of one period that begins at the onset. An empty
// period panics.
func Measure(p data.Period) Measures {
	if len(p.Samples) == 0 {
		panic("beat: Measure: empty period")
	}
	m := Measures{Mean: p.Mean(), remarks: map[Index]string{}}
	m.Min, m.Max = p.Extremes()
	m.Amplitude = m.Max - m.Min
	m.ratios()
	m.spectral(p)
	m.TimeToPeak, m.MaxSlope = m.undefined(TimeToPeak, "the trace is flat"), maxSlope(p)
	if m.Amplitude > 0 {
		delete(m.remarks, TimeToPeak)
		m.TimeToPeak = float64(peak(p.Samples)) / p.Rate
	}
	var why string
	if m.Augmentation, why = augmentation(p); why != "" {
		m.undefined(Augmentation, why)
	}
	return m
}

// undefined notes the reason and returns NaN.
func (m *Measures) undefined(i Index, why string) float64 {
	m.remarks[i] = why
	return math.NaN()
}

// ratio is above/below, undefined with the reason where below is not positive
// or nearly nil beside the amplitude.
func (m *Measures) ratio(i Index, above, below float64, what string) float64 {
	switch {
	case below <= 0:
		return m.undefined(i, what+" is not positive")
	case below < nearlyNil*m.Amplitude:
		return m.undefined(i, what+" is nearly nil beside the pulse")
	}
	return above / below
}

func (m *Measures) ratios() {
	m.GoslingPI = m.ratio(GoslingPI, m.Amplitude, m.Mean, "the mean")
	m.PourcelotRI = m.ratio(PourcelotRI, m.Amplitude, m.Max, "the maximum")
	if m.PourcelotRI > 1 {
		m.remarks[PourcelotRI] = "above 1: the minimum is negative, flow reverses within the beat"
	}
	m.SystolicRatio = m.ratio(SystolicRatio, m.Max, m.Min, "the minimum")
	if m.Amplitude > 0 {
		m.FormFactor = (m.Mean - m.Min) / m.Amplitude
	} else {
		m.FormFactor = m.undefined(FormFactor, "the trace is flat")
	}
}

func (m *Measures) spectral(p data.Period) {
	n := len(p.Samples)
	x := p.Spectrum()
	power := 0.0
	for k := 1; k < len(x); k++ {
		a := data.Weight(k, n) * cmplx.Abs(x[k])
		power += a * a
		if k <= listedHarmonics {
			m.Harmonics = append(m.Harmonics, a)
		}
	}
	if math.Abs(m.Mean) < nearlyNil*m.Amplitude || m.Mean == 0 {
		m.PulsatilePower = m.undefined(PulsatilePower, "the mean is nearly nil beside the pulse")
	} else {
		m.PulsatilePower = power / (m.Mean * m.Mean)
	}
}

// peak is the index of the first largest sample.
func peak(x []float64) int {
	best := 0
	for i, v := range x {
		if v > x[best] {
			best = i
		}
	}
	return best
}

// maxSlope is the largest central difference round the beat, per s, over
// slopeHalf on either side or one sample, whichever is more: over less, the
// steps of a recorder that holds its samples would be taken for slopes. A sine
// of 10 Hz comes out 6 % too low.
func maxSlope(p data.Period) float64 {
	n := len(p.Samples)
	h := min(samplesIn(slopeHalf, p.Rate), (n+1)/2)
	most := 0.0
	for j := range p.Samples {
		most = max(most, (p.Samples[(j+h)%n]-p.Samples[(j+n-h)%n])*p.Rate/(2*float64(h)))
	}
	return most
}
