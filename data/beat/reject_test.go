package beat

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"afterbeat/data/unit"
)

// steady is a minute of a regular pulse at 75/min, 125 Hz, with breathing.
func steady(seed uint64) (x []float64, onsets []float64, rate float64) {
	v := invented{rate: 125, seconds: 60, heartRate: 75, scatter: 0.02, amplitude: 40, noise: 0.5, breathing: 4, offset: 80}
	x, onsets = v.make(seed)
	return x, onsets, v.rate
}

// at is the reason of the beat that holds the time t, s.
func (p Pulse) at(t float64) Reason {
	i := int(t * p.Rate)
	for _, b := range p.Beats {
		if b.From <= i && i < b.To {
			return b.Rejected
		}
	}
	return "no beat"
}

func TestSteadyPulseIsUsed(t *testing.T) {
	for seed := range uint64(20) {
		x, _, rate := steady(seed)
		p := Find(x, rate, unit.Pressure)
		if p.Rejected() > 1 || len(p.Beats) < 72 {
			t.Errorf("seed %d: %d of %d used: %s", seed, p.Used(), len(p.Beats), Tally(p.Beats))
		}
	}
}

// Planted faults are rejected, each for its own reason, and spare the others.
func TestPlantedFaults(t *testing.T) {
	for _, c := range []struct {
		name   string
		plant  func(x []float64, at int, rate float64) // at is the onset of the beat
		offset float64                                 // s from that onset: where the reason is looked for
		want   []Reason
		most   int // beats lost
	}{
		{"missing sample", func(x []float64, at int, _ float64) { x[at+20] = math.NaN() }, 0.2, []Reason{Gap}, 1},
		{"infinite sample", func(x []float64, at int, _ float64) { x[at+20] = math.Inf(1) }, 0.2, []Reason{Gap}, 1},
		{"flush", func(x []float64, at int, rate float64) {
			for i := at + int(0.2*rate); i < at+int(0.5*rate); i++ {
				x[i] = 300
			}
		}, 0.1, []Reason{Amplitude, Shape, TooShort, Early}, 4},
		{"spike", func(x []float64, at int, _ float64) { x[at+40], x[at+41] = x[at+40]+50, x[at+41]+50 }, 0.2, []Reason{Amplitude, Shape, TooShort}, 3},
		{"damped", func(x []float64, at int, rate float64) {
			for i := at; i < at+int(0.8*rate); i++ {
				x[i] = 80 + 0.5*(x[i]-80)
			}
		}, 0.2, []Reason{Amplitude}, 2},
		{"lost pulse", func(x []float64, at int, rate float64) {
			for i := at - int(0.05*rate); i < at+int(0.7*rate); i++ {
				x[i] = 85
			}
		}, -0.3, []Reason{TooLong}, 3},
		{"level", func(x []float64, at int, rate float64) {
			for i := at; i < at+int(0.78*rate); i++ {
				x[i] += 60
			}
		}, 0.2, []Reason{Level, Shape, Amplitude}, 3},
	} {
		for seed := range uint64(4) {
			x, onsets, rate := steady(seed)
			before := Find(x, rate, unit.Pressure)
			on := onsets[30+seed]
			c.plant(x, int(on*rate), rate)
			after := Find(x, rate, unit.Pressure)
			if got := after.at(on + c.offset); !slices.Contains(c.want, got) {
				t.Errorf("%s, seed %d: %q, want one of %q", c.name, seed, got, c.want)
			}
			if lost := before.Used() - after.Used(); lost > c.most {
				t.Errorf("%s, seed %d: %d beats lost: %s", c.name, seed, lost, Tally(after.Beats))
			}
			if math.Abs(after.Systolic-before.Systolic) > 0.6 || math.Abs(after.HeartRate()-before.HeartRate()) > 0.3 {
				t.Errorf("%s, seed %d: %.2f mmHg, %.2f/min; were %.2f, %.2f", c.name, seed,
					after.Systolic, after.HeartRate(), before.Systolic, before.HeartRate())
			}
		}
	}
}

// Premature beats: the one cut short, the early one and the one after it are
// out, whatever of the rest stays, and the heart rate is that of the rhythm.
func TestPrematureBeats(t *testing.T) {
	for seed := range uint64(10) {
		rng := rand.New(rand.NewPCG(seed, 5))
		v := invented{rate: 125, seconds: 60, amplitude: 40, noise: 0.5}
		x := make([]float64, 60*125)
		var early []float64
		at := 0.1
		for k := 0; at < 59; k++ {
			interval := 0.8 * (1 + 0.01*rng.NormFloat64())
			w := v
			switch {
			case k%8 == 6:
				interval *= 0.6
			case k%8 == 7:
				early = append(early, at)
				w.amplitude, interval = 25, interval*1.4
			}
			w.add(x, at, interval)
			at += interval
		}
		p := Find(x, 125, unit.Pressure)
		if math.Abs(p.HeartRate()-75) > 1 {
			t.Errorf("seed %d: %.1f/min, want 75", seed, p.HeartRate())
		}
		for _, on := range early[:len(early)-1] {
			got := []Reason{p.at(on - 0.2), p.at(on + 0.2), p.at(on + 1.3)}
			if !slices.Equal(got, []Reason{TooShort, Early, AfterEarly}) {
				t.Errorf("seed %d: around an early beat %q", seed, got)
			}
		}
		if p.Used() < 4*len(early) {
			t.Errorf("seed %d: %d used of %d: %s", seed, p.Used(), len(p.Beats), Tally(p.Beats))
		}
	}
}

// Strong breathing modulates amplitude and level; it throws away nothing much.
func TestBreathingIsNoFault(t *testing.T) {
	for _, heartRate := range []float64{40, 50, 75, 110, 140} {
		v := invented{rate: 125, seconds: 60, heartRate: heartRate, scatter: 0.01, amplitude: 30, noise: 0.3, breathing: 10, offset: 40}
		x, _ := v.make(4)
		if p := Find(x, v.rate, unit.Pressure); p.Rejected() > len(p.Beats)/10 {
			t.Errorf("%g/min: %d of %d used: %s", heartRate, p.Used(), len(p.Beats), Tally(p.Beats))
		}
	}
}

// Secondary waves are no onsets: a dicrotic wave of half the pulse, and the end
// of the reversal in a leg's flow.
func TestSecondaryWaves(t *testing.T) {
	hump := func(u, at, width float64) float64 { return math.Exp(-(u - at) * (u - at) / (width * width)) }
	for name, of := range map[string]func(u float64) float64{
		"dicrotic": func(u float64) float64 { return 70 + 40*hump(u, 0.16, 0.07) + 20*hump(u, 0.48, 0.07) },
		"triphasic": func(u float64) float64 {
			return 5 + 100*hump(u, 0.15, 0.06) - 40*hump(u, 0.35, 0.06) + 20*hump(u, 0.52, 0.06)
		},
	} {
		rng := rand.New(rand.NewPCG(2, 2))
		x := make([]float64, 125*60)
		for i := range x {
			x[i] = of(math.Mod(float64(i)/125, 0.8)) + 0.5*rng.NormFloat64()
		}
		p := Find(x, 125, unit.Flow)
		if math.Abs(p.HeartRate()-75) > 0.5 || p.Used() < 70 || len(p.Beats) > 76 {
			t.Errorf("%s: %.1f/min, %d of %d used: %s", name, p.HeartRate(), p.Used(), len(p.Beats), Tally(p.Beats))
		}
	}
}

// A transducer that hangs free for part of the recording, with whatever noise,
// gives no used beats there.
func TestNoiseInPartOfARecording(t *testing.T) {
	v := invented{rate: 125, seconds: 120, heartRate: 75, scatter: 0.03, amplitude: 40, noise: 1, offset: 60}
	const noisy = 60 * 125
	for name, noise := range map[string][]float64{
		"white":       autoregressive(1, 125, 60, 0),
		"random walk": autoregressive(1, 125, 60, 1),
		"rounding":    flicker(1, 125, 60),
	} {
		x, _ := v.make(7)
		copy(x, noise)
		p := Find(x, v.rate, unit.Pressure)
		inNoise := 0
		for _, b := range used(p.Beats) {
			if b.To < noisy {
				inNoise++
			}
		}
		if inNoise > 2 || p.Used() < 70 || math.Abs(p.HeartRate()-75) > 1 {
			t.Errorf("%s: %d beats used in noise, %d in all, %.1f/min", name, inNoise, p.Used(), p.HeartRate())
		}
	}
}

// The heart rate may change within a recording, and the shape with it.
func TestRisingHeartRate(t *testing.T) {
	v := invented{rate: 125, amplitude: 40}
	x := make([]float64, 300*125)
	n := 0
	for at := 0.0; at < 300; n++ {
		interval := 60 / (60 + 90*at/300)
		v.add(x, at, interval)
		at += interval
	}
	rng := rand.New(rand.NewPCG(1, 1))
	for i := range x {
		x[i] += rng.NormFloat64()
	}
	p := Find(x, v.rate, unit.Pressure)
	if len(p.Beats) < n-3 || len(p.Beats) > n || p.Used() < n-10 {
		t.Errorf("%d of %d used, of %d: %s", p.Used(), len(p.Beats), n, Tally(p.Beats))
	}
}
