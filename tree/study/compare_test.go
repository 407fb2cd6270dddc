package study

import (
	"math"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/fitting"
	"afterbeat/tree/support"
)

// Scaled flow leaves 1-s of the pulse and (1-s)² of surplus energy and pulsatile
// power, on any linear load, by construction.
func TestScaledIsAnIdentity(t *testing.T) {
	s := demoFitted(t, func(c *casefile.Case) { c.Share = []float64{0, 0.25, 0.5, 0.9, 1} })
	for _, a := range s.Comparison.Answers {
		if a.Posing != support.ScaledPosing {
			continue
		}
		for i, c := range a.Comparisons {
			left := 1 - c.Share
			for name, got := range map[string][2]float64{
				"pulse pressure":  {c.RetainedPressure.Value, left},
				"flow":            {c.RetainedFlow.Value, left},
				"Gosling PI":      {c.RetainedPI.Value, left},
				"SHE":             {c.RetainedSHE.Value, left * left},
				"pulsatile power": {c.RetainedPower.Value, left * left},
			} {
				if math.Abs(got[0]-got[1]) > 1e-9 {
					t.Errorf("share %v, %s: %v, want %v", c.Share, name, got[0], got[1])
				}
			}
			if !c.ByConstruction || c.RetainedPressure.Total.Defined() {
				t.Errorf("share %v: by construction %v, interval %v", c.Share, c.ByConstruction, c.RetainedPressure.Total)
			}
			if balance := a.Supported[i].Ledger.Balance(); math.Abs(balance) > 1e-9 {
				t.Errorf("share %v: balance %v", c.Share, balance)
			}
		}
	}
}

// Mean flow and mean pressure are the same in every state; root flow swings the
// less the more the pump carries; nothing swings at share 1.
func TestLateValveKeepsTheMeans(t *testing.T) {
	s := demoFitted(t, func(c *casefile.Case) { c.Share = nil })
	if len(s.Comparison.Answers) != len(support.Posings()) {
		t.Fatalf("%d answers", len(s.Comparison.Answers))
	}
	for _, a := range s.Comparison.Answers {
		if len(a.Supported) != 11 {
			t.Fatalf("%s: %d states", a.Posing, len(a.Supported))
		}
		before := math.Inf(1)
		for _, state := range a.Supported {
			swing := state.FlowMeasures.Amplitude
			if !near(state.Flow.Mean(), a.Native.Flow.Mean(), 1e-9) || !near(state.MeanPressure.Value, a.Native.MeanPressure.Value, 1e-9) || swing > before {
				t.Errorf("%s, share %v: mean flow %v, swing %v after %v", a.Posing, state.Share, state.Flow.Mean(), swing, before)
			}
			before = swing
		}
		if before > 1e-9 || !near(a.Supported[0].FlowMeasures.Amplitude, a.Native.FlowMeasures.Amplitude, 1e-12) {
			t.Errorf("%s: swing %v at share 1", a.Posing, before)
		}
	}
}

// The native state is the fitted load under the measured flow: its mean
// pressure is near the measured one, which the fit meets as well as it can.
func TestNativeStateIsTheFit(t *testing.T) {
	s := demoFitted(t, func(*casefile.Case) {})
	r := s.Fit.Results[s.Fit.Chosen]
	want := fitting.Respond(r.Load(), s.Beats.Flow.Period, r.OutflowPressure)
	for j, p := range s.Comparison.Native.Pressure.Samples {
		if math.Abs(p-want.Samples[j]) > 1e-9 {
			t.Fatalf("sample %d: %v, of the fit %v", j, p, want.Samples[j])
		}
	}
	if measured := s.Beats.Pressure.Period.Mean(); !near(s.Comparison.Native.MeanPressure.Value, measured, 1e-3) {
		t.Errorf("mean pressure %v, measured %v", s.Comparison.Native.MeanPressure.Value, measured)
	}
}

// What is held says where the outflow pressure comes from.
func TestOutflowPressureHasItsOrigin(t *testing.T) {
	for want, pv := range map[data.Origin]*float64{data.Measured: ptr(7.0), data.Assumed: nil} {
		s := demoFitted(t, func(c *casefile.Case) { c.OutflowPressure = pv })
		found := false
		for _, h := range s.Comparison.Answers[0].Held() {
			if h.Quantity == "outflow pressure" {
				found = true
				if h.Origin != want || h.Value != outflow(*s.Beats) {
					t.Errorf("%+v, want %s", h, want)
				}
			}
		}
		if !found {
			t.Error("outflow pressure is not among what is held")
		}
	}
}
