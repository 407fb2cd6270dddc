package study

import (
	"encoding/json"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casefile"
	"afterbeat/data/demo"
)

// oneBeat is exactly one period of the half-sine beat in n samples, the
// pressure late by a delay, s.
func oneBeat(n int, late float64) folder {
	rate := float64(n) / halfT
	return folder{"one.csv": table(rate, n,
		column{"ao_mmHg", func(at float64) float64 { return halfPressure(at - late) }}, column{"ao_flow_mL_s", halfFlow})}
}

// The closed form of the worked example, sampled 1000 times and read as one
// period, gives back what it was made from to 2e-5 (the trigonometric
// interpolation of the half-sine is what is left; the reference values put it at
// 1.5e-4 for 200 samples, falling as 1/N²). A single beat has no interval.
func TestOneBeat(t *testing.T) {
	s := fitted(t, casefile.Case{Recording: "one.csv", OneBeat: true}, oneBeat(1000, 0))
	r, c, zc := chosen(t, s)
	if !near(r, halfR, 2e-5) || !near(c, halfC, 2e-5) || !near(zc, halfZc, 2e-5) {
		t.Errorf("R %.7f, C %.7f, Zc %.7f", r, c, zc)
	}
	if b := s.Beats; b.Pressure.Count != 1 || !near(b.Pressure.Period.Duration(), halfT, 1e-9) || !math.IsNaN(b.Pulses[0].PeriodCV) {
		t.Errorf("%d beats of %v s, CV %v", b.Pressure.Count, b.Pressure.Period.Duration(), b.Pulses[0].PeriodCV)
	}
	report := s.FitReport()
	for _, fit := range report.Fits {
		if fit.IntervalMethod != "none" {
			t.Errorf("%s: interval method %q", fit.Model, fit.IntervalMethod)
		}
		for name, p := range fit.Parameters {
			text, err := json.Marshal(p)
			if err != nil || !strings.Contains(string(text), `"low":null,"high":null,"random_low":null,"random_high":null`) || p.Reason == nil {
				t.Errorf("%s of %s: %s, %v", name, fit.Model, text, err)
			}
		}
	}
}

// At 200 samples the error is 1.5e-4 at most, and at 1600 64 times less.
func TestOneBeatConverges(t *testing.T) {
	for n, within := range map[int]float64{200: 1.6e-4, 1600: 3e-6} {
		s := fitted(t, casefile.Case{Recording: "one.csv", OneBeat: true, Model: "wk3"}, oneBeat(n, 0))
		if r, _, _ := chosen(t, s); !near(r, halfR, within) {
			t.Errorf("%d samples: R off by %.3g", n, r-halfR)
		}
	}
}

// A delay turns the period of the flow: 20 ms are 25 samples of 1000.
func TestOneBeatWithADelay(t *testing.T) {
	prompt := fitted(t, casefile.Case{Recording: "one.csv", OneBeat: true}, oneBeat(1000, 0))
	late := fitted(t, casefile.Case{Recording: "one.csv", OneBeat: true, Delay: "0.02"}, oneBeat(1000, 0.02))
	r0, c0, zc0 := chosen(t, prompt)
	r, c, zc := chosen(t, late)
	if !near(r, r0, 1e-8) || !near(c, c0, 1e-8) || !near(zc, zc0, 1e-7) {
		t.Errorf("R %v, C %v, Zc %v; without a delay %v, %v, %v", r, c, zc, r0, c0, zc0)
	}
}

// One period needs every sample.
func TestOneBeatWithAHole(t *testing.T) {
	f := oneBeat(1000, 0)
	f["one.csv"] = emptied(f["one.csv"], 500, 530) // 24 ms
	s := fitted(t, casefile.Case{Recording: "one.csv", OneBeat: true}, f)
	if reason := s.Reason(); reason == nil || !strings.Contains(*reason, "every sample") {
		t.Errorf("%v", reason)
	}
}

// A person drops a beat that the rules use, and keeps one that they do not.
func TestDropAndKeepByHand(t *testing.T) {
	plain := demoFitted(t, func(*casefile.Case) {})
	early := plain.Beats.Beats[demo.Truth().Ectopic]
	within := func(b beat.Beat) float64 { return plain.Intake.Grid.At((b.From + b.To) / 2) }
	s := demoFitted(t, func(c *casefile.Case) {
		c.Drop = []float64{within(plain.Beats.Beats[3])}
		c.Keep = []float64{within(early), within(plain.Beats.Beats[4])}
	})
	if got := s.Beats.Beats[3].Rejected; got != beat.ByHand {
		t.Errorf("the beat dropped is rejected for %q", got)
	}
	if got := s.Beats.Beats[demo.Truth().Ectopic].Rejected; early.Rejected == "" || got != "" {
		t.Errorf("the beat kept was rejected for %q and is for %q", early.Rejected, got)
	}
	if got, want := s.Beats.Pressure.Count, plain.Beats.Pressure.Count; got != want {
		t.Errorf("%d beats used, %d without the choices", got, want)
	}
	if plain.Beats.Beats[3].Rejected != "" {
		t.Error("the beats of another study changed")
	}
	if note := s.Note().Render(defaults); !strings.Contains(note, "by hand") {
		t.Error("the note does not speak of a beat dropped by hand")
	}
}

// A gap is no beat, even where a person would keep it.
func TestAGapCannotBeKept(t *testing.T) {
	f := invented(aortic("ao_mmHg"), outflowTo("ao_flow_mL_s"))
	f["a.csv"] = emptied(f["a.csv"], 2000, 2010) // 10 s to 10.05 s
	c := inventedCase()
	c.Keep = []float64{10}
	for _, b := range fitted(t, c, f).Beats.Ensemble.Used {
		if b.From <= 2010 && b.To >= 2000 {
			t.Errorf("the beat from sample %d to %d was used", b.From, b.To)
		}
	}
}

// Q = k v (pi d²/4)/cos(angle); on a linear load R and Zc go with 1/Q, C with Q.
func TestVelocityBecomesFlow(t *testing.T) {
	plain := demoFitted(t, func(*casefile.Case) {})
	d := *plain.Inputs.Case.DiameterCM
	flow := plain.Beats.Flow.Period.Mean()
	perArea := demoFitted(t, func(c *casefile.Case) { c.DiameterCM = nil })
	if velocity := perArea.Beats.Flow.Period.Mean(); !near(flow, velocity*math.Pi*d*d/4, 1e-12) {
		t.Errorf("%v cm/s through %v cm gave %v mL/s", velocity, d, flow)
	}
	r0, c0, zc0 := chosen(t, plain)
	for _, one := range []struct {
		gain   float64
		change func(*casefile.Case)
	}{
		{4, func(c *casefile.Case) { c.DiameterCM = ptr(2 * d) }},
		{2, func(c *casefile.Case) { c.AngleDeg = ptr(60.0) }},
		{0.5, func(c *casefile.Case) { c.Profile = "0.5" }},
		{1 / (math.Pi * d * d / 4), func(c *casefile.Case) { c.DiameterCM = nil }},
	} {
		r, c, zc := chosen(t, demoFitted(t, one.change))
		if !near(r*one.gain, r0, 1e-7) || !near(c/one.gain, c0, 1e-7) || !near(zc*one.gain, zc0, 1e-6) {
			t.Errorf("flow times %v: R %v, C %v, Zc %v; before %v, %v, %v", one.gain, r, c, zc, r0, c0, zc0)
		}
	}
	// 2 x 5 % of the diameter, and tan 60 x 5 degrees, in quadrature.
	s := demoFitted(t, func(c *casefile.Case) { c.AngleDeg = ptr(60.0) })
	if want := math.Hypot(0.1, math.Sqrt(3)*5*math.Pi/180); !near(s.Beats.FlowInfo.Error, want, 1e-9) {
		t.Errorf("error of flow %v, want %v", s.Beats.FlowInfo.Error, want)
	}
}

// A recording without a beat that can be used says so.
func TestNoUsableBeat(t *testing.T) {
	c := inventedCase()
	f := invented(aortic("ao_mmHg"), outflowTo("ao_flow_mL_s"))
	s := fitted(t, c, f)
	for _, b := range s.Beats.Beats {
		c.Drop = append(c.Drop, s.Intake.Grid.At((b.From+b.To)/2))
	}
	s = fitted(t, c, f)
	if reason := s.Reason(); reason == nil || !strings.HasPrefix(*reason, fmt.Sprintf("no usable beat: %d by hand", len(c.Drop))) {
		t.Errorf("%v", *reason)
	}
	if slices.ContainsFunc(s.Warnings(), func(w data.Warning) bool { return strings.Contains(w.Text, "NaN") }) {
		t.Errorf("%v", s.Warnings())
	}
}
