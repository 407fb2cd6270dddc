package delay

import (
	"context"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/fitting"
)

// beats makes beats of a half-sine (stroke volume 70 mL in 0.3 s of 0.8 s, varied
// by 4 % from beat to beat, smooth at the corners) and the pressure of a load,
// recorded late, with white noise.
func beats(t *testing.T, model string, v fitting.Values, late, noise float64) fitting.Beats {
	t.Helper()
	m, ok := fitting.ByName(model)
	if !ok {
		t.Fatalf("no model %s", model)
	}
	const n, rate = 160, 200.0
	rng := rand.New(rand.NewPCG(3, 5))
	b := fitting.Beats{Rate: rate, Site: data.SiteRoot, OutflowMeasured: true}
	for range 24 {
		scale := 1 + 0.04*rng.NormFloat64()
		flow := data.Period{Samples: make([]float64, n), Rate: rate}
		for j := range n {
			if s := float64(j) / rate; s < 0.3 {
				flow.Samples[j] = scale * 366.5 * math.Pow(math.Sin(math.Pi*s/0.3), 2) * 1.27
			}
		}
		p := fitting.Respond(fitting.Lumped{Model: m, Values: v}, flow, 0)
		x := p.Spectrum()
		for k := range x {
			sin, cos := math.Sincos(-p.Omega(k) * late)
			x[k] *= complex(cos, sin)
		}
		p = data.FromSpectrum(x, n, rate)
		for j := range p.Samples {
			p.Samples[j] += noise * rng.NormFloat64()
		}
		b.Pressure, b.Flow = append(b.Pressure, p.Samples), append(b.Flow, flow.Samples)
	}
	return b
}

var load = fitting.Values{R: 1, C: 1.5, Zc: 0.08}

func profile(t *testing.T, b fitting.Beats, used float64) Profile {
	t.Helper()
	p, err := Of(context.Background(), b, used)
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// A delay that was put in comes back, and its interval holds it and not the
// others; so it does for a recording cut with part of the delay in use.
func TestKnownDelays(t *testing.T) {
	for _, late := range []float64{-0.012, 0, 0.0125, 0.055} {
		for _, noise := range []float64{0, 1} {
			p := profile(t, beats(t, "wk3", load, late, noise), 0)
			if d := p.Delay; !d.Identified || math.Abs(d.Value-late) > 0.001*noise+2e-5 || !(d.Total.Low <= late+2e-5 && late-2e-5 <= d.Total.High) || d.Total.Width() > 0.01*noise+2e-4 {
				t.Errorf("late by %v s, noise %v: %+v", late, noise, d)
			}
			if len(p.Points) != 51 || p.Points[0].Delay != Lowest || math.Abs(p.Points[50].Delay-Highest) > 1e-12 {
				t.Errorf("%d points", len(p.Points))
			}
		}
	}
	p := profile(t, beats(t, "wk3", load, 0.01, 0), 0.015) // cut with 15 ms, 25 in all
	if math.Abs(p.Delay.Value-0.025) > 2e-5 || math.Abs(p.InUse.Delay-0.015) > 1e-12 {
		t.Errorf("%+v, in use %+v", p.Delay, p.InUse)
	}
}

// The load at 10 ms less and more: a pressure taken for late when it is not puts
// Zc off by tens of percent (computed: 12.5 ms move Zc by 20 % and C by 7 %).
func TestLoadBesideTheDelay(t *testing.T) {
	p := profile(t, beats(t, "wk3", load, 0, 0), 0)
	if math.Abs(p.InUse.Values.Zc/load.Zc-1) > 1e-4 || math.Abs(p.InUse.Values.C/load.C-1) > 1e-4 {
		t.Errorf("in use: %+v", p.InUse)
	}
	for _, at := range []Point{p.Early, p.Late} {
		zc, c := math.Abs(at.Values.Zc/load.Zc-1), math.Abs(at.Values.C/load.C-1)
		if zc < 0.05 || zc > 0.5 || c < 0.01 || c > 0.15 {
			t.Errorf("at %v s: Zc off by %v, C by %v", at.Delay, zc, c)
		}
	}
}

// Without a characteristic impedance and with noise the profile is flat, or Zc
// vanishes: the delay is not identified, and says why.
func TestFlatProfile(t *testing.T) {
	p := profile(t, beats(t, "wk2", fitting.Values{R: 1, C: 1.5}, 0.02, 3), 0)
	if !p.Delay.Total.Contains(0.02) {
		t.Errorf("noise of 3 mmHg: %+v", p.Delay)
	}
	p = profile(t, beats(t, "wk2", fitting.Values{R: 1, C: 1.5}, 0.02, 30), 0)
	if p.Delay.Identified || !strings.Contains(p.Delay.Why, "flat") || !p.Delay.Total.Contains(0.02) {
		t.Errorf("noise of 30 mmHg: %+v", p.Delay)
	}
	steady := beats(t, "wk3", load, 0, 0)
	for i := range steady.Flow {
		for j := range steady.Flow[i] {
			steady.Flow[i][j] = 80 + float64(i%2)
		}
	}
	p = profile(t, steady, 0)
	if p.Delay.Identified || !strings.Contains(p.Delay.Why, "harmonics") {
		t.Errorf("a steady flow: %+v", p.Delay)
	}
}

func TestNoBeats(t *testing.T) {
	if _, err := Of(context.Background(), fitting.Beats{}, 0); err == nil {
		t.Error("no error")
	}
}
