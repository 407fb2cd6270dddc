package beat

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"afterbeat/data"
)

// wave with the given maximum, minimum and mean: three levels, the third such
// that the mean comes out.
func wave(high, low, mean float64) data.Period {
	const n = 100
	p := data.Period{Samples: make([]float64, n), Rate: n}
	rest := (n*mean - 10*high - 10*low) / 80
	for i := range p.Samples {
		switch {
		case i >= 10 && i < 20:
			p.Samples[i] = high
		case i < 10:
			p.Samples[i] = low
		default:
			p.Samples[i] = rest
		}
	}
	return p
}

// Hand checks: (S, D, mean) = (100, 20, 45) and (30, 25, 27).
func TestIndicesByHand(t *testing.T) {
	for _, c := range []struct{ s, d, m, pi, ri, sd, form float64 }{
		{100, 20, 45, 1.7778, 0.8, 5, 0.3125},
		{30, 25, 27, 0.18519, 0.16667, 1.2, 0.4},
	} {
		m := Measure(wave(c.s, c.d, c.m))
		for _, v := range []struct {
			what      string
			got, want float64
		}{
			{"mean", m.Mean, c.m},
			{"max", m.Max, c.s},
			{"min", m.Min, c.d},
			{"amplitude", m.Amplitude, c.s - c.d},
			{"Gosling PI", m.GoslingPI, c.pi},
			{"Pourcelot RI", m.PourcelotRI, c.ri},
			{"S/D", m.SystolicRatio, c.sd},
			{"form factor", m.FormFactor, c.form},
			{"RI = 1 - 1/(S/D)", m.PourcelotRI, 1 - 1/m.SystolicRatio},
			{"time to peak", m.TimeToPeak, 0.1},
		} {
			if math.Abs(v.got-v.want) > 5e-5 {
				t.Errorf("%s %v, want %v", v.what, v.got, v.want)
			}
		}
	}
}

// Closed form: 93 + 20 cos(wt) + 5 cos(3wt) has A = 20, 0, 5 and the pulsatile
// power index (400 + 25)/93²; its steepest slope is that of the sum, over 20 ms.
func TestHarmonicsOfKnownWave(t *testing.T) {
	const n, rate = 200, 250.0
	p := data.Period{Samples: make([]float64, n), Rate: rate}
	for j := range p.Samples {
		a := 2 * math.Pi * float64(j) / n
		p.Samples[j] = 93 + 20*math.Cos(a) + 5*math.Cos(3*a)
	}
	m := Measure(p)
	for k, want := range []float64{20, 0, 5, 0} {
		if math.Abs(m.Harmonics[k]-want) > 1e-12 {
			t.Errorf("A_%d = %v, want %v", k+1, m.Harmonics[k], want)
		}
	}
	if len(m.Harmonics) != 10 {
		t.Errorf("%d harmonics", len(m.Harmonics))
	}
	if want := 425 / (93.0 * 93); math.Abs(m.PulsatilePower-want) > 1e-14 {
		t.Errorf("pulsatile power index %v, want %v", m.PulsatilePower, want)
	}
	most := 0.0
	for j := range 100000 {
		a := 2 * math.Pi * float64(j) / 100000
		most = max(most, -(20*math.Sin(a)+15*math.Sin(3*a))*2*math.Pi*rate/n)
	}
	if math.Abs(m.MaxSlope-most) > 0.02*most {
		t.Errorf("maximum slope %v, want %v within 2 %%", m.MaxSlope, most)
	}
}

// The pulsatile power index is the variance over the squared mean (Parseval).
func TestPulsatilePowerIsVariance(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := data.Period{Samples: rapid.SliceOfN(rapid.Float64Range(50, 150), 2, 65).Draw(t, "samples"), Rate: 100}
		m := Measure(p)
		sum := 0.0
		for _, x := range p.Samples {
			sum += (x - m.Mean) * (x - m.Mean) / float64(len(p.Samples))
		}
		// Amplitudes are peak values: A²/2 is the mean square, A² at Nyquist.
		n := len(p.Samples)
		nyquist := 0.0
		if n%2 == 0 {
			x := p.Spectrum()[n/2]
			nyquist = real(x) * real(x)
		}
		if want := (2*sum - nyquist) / (m.Mean * m.Mean); math.Abs(m.PulsatilePower-want) > 1e-9*(1+want) {
			t.Fatalf("%v, want %v", m.PulsatilePower, want)
		}
	})
}

func TestUndefinedIndicesSayWhy(t *testing.T) {
	flat := data.Period{Samples: []float64{90, 90, 90, 90}, Rate: 4}
	for _, c := range []struct {
		name   string
		p      data.Period
		index  Index
		value  func(Measures) float64
		remark string
	}{
		{"negative mean", wave(10, -30, -5), GoslingPI, func(m Measures) float64 { return m.GoslingPI }, "the mean is not positive"},
		{"mean near nil", wave(100, -20, 0.1), GoslingPI, func(m Measures) float64 { return m.GoslingPI }, "nearly nil"},
		{"mean near nil", wave(100, -20, 0.1), PulsatilePower, func(m Measures) float64 { return m.PulsatilePower }, "nearly nil"},
		{"all negative", wave(-10, -30, -20), PourcelotRI, func(m Measures) float64 { return m.PourcelotRI }, "the maximum is not positive"},
		{"reversal", wave(100, -20, 20), SystolicRatio, func(m Measures) float64 { return m.SystolicRatio }, "the minimum is not positive"},
		{"flat", flat, FormFactor, func(m Measures) float64 { return m.FormFactor }, "flat"},
		{"flat", flat, TimeToPeak, func(m Measures) float64 { return m.TimeToPeak }, "flat"},
		{"flat", flat, Augmentation, func(m Measures) float64 { return m.Augmentation }, "flat"},
	} {
		m := Measure(c.p)
		if v := c.value(m); !math.IsNaN(v) || !strings.Contains(m.Remark(c.index), c.remark) {
			t.Errorf("%s: %s is %v, %q", c.name, c.index, v, m.Remark(c.index))
		}
	}
	if m := Measure(flat); m.GoslingPI != 0 || m.PourcelotRI != 0 || m.MaxSlope != 0 {
		t.Errorf("a flat trace has %+v", m)
	}
	m := Measure(wave(100, -20, 20))
	if math.Abs(m.PourcelotRI-1.2) > 1e-12 || !strings.Contains(m.Remark(PourcelotRI), "above 1") {
		t.Errorf("Pourcelot RI with reversal %v, %q", m.PourcelotRI, m.Remark(PourcelotRI))
	}
	if m := Measure(wave(100, 20, 45)); m.Remark(PourcelotRI) != "" || m.Remark(GoslingPI) != "" {
		t.Error("a remark where there is nothing to say")
	}
}

// A shoulder planted before the peak (type A) or after it (type C), as the sum
// of two humps: the index has the sign of the type and about the size.
func TestAugmentation(t *testing.T) {
	humps := func(h1, t1, h2, t2 float64) data.Period {
		p := data.Period{Samples: make([]float64, 400), Rate: 500}
		for j := range p.Samples {
			u := float64(j) / 500
			hump := func(h, at float64) float64 { return h * math.Exp(-(u-at)*(u-at)/(2*0.05*0.05)) }
			p.Samples[j] = 70 + hump(h1, t1) + hump(h2, t2)
		}
		return p
	}
	for _, c := range []struct {
		name      string
		p         data.Period
		low, high float64
	}{
		{"type A", humps(25, 0.15, 40, 0.27), 0.2, 0.6},
		{"two peaks, the later higher", humps(30, 0.12, 40, 0.30), 0.15, 0.35},
		{"type C", humps(40, 0.15, 25, 0.27), -0.6, -0.2},
	} {
		m := Measure(c.p)
		if !(c.low < m.Augmentation && m.Augmentation < c.high) {
			t.Errorf("%s: %v, %q", c.name, m.Augmentation, m.Remark(Augmentation))
		}
	}
	if m := Measure(humps(40, 0.15, 0, 0.3)); !math.IsNaN(m.Augmentation) || m.Remark(Augmentation) == "" {
		t.Errorf("a single hump has %v", m.Augmentation)
	}
}
