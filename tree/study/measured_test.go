package study

import (
	"errors"
	"math"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/fitting"
)

// A pressure with an output: total resistance (91.875 mmHg)/(87.5 mL/s) = 1.05, tau
// 1.5 s, so C = 1.5/(0.95 1.05), with 5 % of the total taken for Zc. The half-sine's
// truth is R 1, C 1.5, Zc 0.05.
func TestPressureAndAnOutput(t *testing.T) {
	c := inventedCase()
	c.CardiacOutput, c.OutputBy = ptr(5.25), "thermodilution"
	s := whole(t, c, invented(aortic("ao_mmHg")))
	r := s.FitReport()
	if len(r.Fits) != 1 || r.Fits[0].Basis != fitting.BasisMeans || r.Fits[0].Model != "wk3" || r.Reason != nil || r.Given == nil {
		t.Fatalf("%+v, reason %v", r.Fits, r.Reason)
	}
	f := r.Fits[0]
	for name, want := range map[string]float64{"R": 0.9975, "C": 1.5038} {
		e := f.Parameters[name]
		if !near(float64(e.Value), want, 0.02) || !e.Identified {
			t.Errorf("%s: %+v, want %v", name, e, want)
		}
		// Thermodilution is good to 20 % (95 %), more than all other errors here.
		if w := float64(e.High-e.Low) / want; w < 0.35 || w > 0.8 || float64(e.RandomHigh-e.RandomLow) > 0.2*float64(e.High-e.Low) {
			t.Errorf("%s: interval %+v", name, e)
		}
	}
	if !near(float64(f.TotalResistance.Value), 1.05, 0.01) || f.Parameters["Zc"].Identified || f.IntervalMethod != "blocks-of-beats" || f.Site != data.SiteRoot {
		t.Errorf("%+v", f)
	}
	if s.Comparison.Reason == "" || !strings.Contains(s.Comparison.Reason, "no wave") || s.Forecast.Reason != s.Comparison.Reason {
		t.Errorf("comparison %q, forecast %q", s.Comparison.Reason, s.Forecast.Reason)
	}
	if w, ok := warned(s, data.CodeOutflow); !ok || !strings.Contains(w.Text, "26.5 mmHg R changes by") {
		t.Errorf("%+v", w)
	}
	if text := s.Note().Render(defaults); !strings.Contains(text, "thermodilution") || !strings.Contains(text, "--cardiac-output 5.25") {
		t.Error("the note does not say what was given")
	}
	// An output of 20 % less: R up by a quarter, C down by a fifth, exactly.
	for _, m := range s.Fit.Sensitivity {
		if m.Change == "-20 %" && (!near(m.Percent.R, 25, 1e-6) || !near(m.Percent.C, -20, 1e-6)) {
			t.Errorf("%+v", m)
		}
	}
}

// The error of an output follows how it was measured; one that is itself an estimate,
// or of which nothing is said, is warned of.
func TestErrorsOfAnOutput(t *testing.T) {
	for how, want := range map[string]float64{"fick": 0.1, "thermodilution": 0.2, "assumed-fick": 0.25, "outflow-doppler": 0.25, "contour": 0.4, "pump": 0.2, "": 0.25} {
		c := inventedCase()
		c.CardiacOutput, c.OutputBy = ptr(5.25), how
		widths, err := halfWidths(c)
		if err != nil || widths["cardiac-output"] != want {
			t.Errorf("%q: %v %v", how, widths["cardiac-output"], err)
		}
		_, said := warned(fitted(t, c, invented(aortic("ao_mmHg"))), data.CodeOutputEstimate)
		if said != (how == "" || how == "contour" || how == "pump") {
			t.Errorf("%q: warned %v", how, said)
		}
	}
	c := inventedCase()
	c.CardiacOutput, c.OutputBy, c.Error = ptr(5.25), "contour", map[string]string{"cardiac-output": "3%"}
	if widths, _ := halfWidths(c); widths["cardiac-output"] != 0.03 {
		t.Errorf("given: %v", widths["cardiac-output"])
	}
}

// A limb's pressure beside an output is warned of with what it does to this beat.
func TestLimbBesideAnOutput(t *testing.T) {
	c := inventedCase()
	c.CardiacOutput = ptr(5.25)
	w, ok := warned(fitted(t, c, invented(aortic("radial_mmHg"))), data.CodeStandIn)
	if !ok || !strings.Contains(w.Text, "at the radial") || !strings.Contains(w.Text, "C would be 2") {
		t.Errorf("%+v", w)
	}
}

// A flow recorded rules over an output given; 15 % apart are warned of.
func TestRecordedFlowRules(t *testing.T) {
	f := invented(aortic("ao_mmHg"), outflowTo("ao_flow_mL_s")) // 5.25 L/min
	for output, want := range map[float64]bool{5.25: false, 5.9: false, 6.5: true, 4.2: true} {
		c := inventedCase()
		c.CardiacOutput = ptr(output)
		s := fitted(t, c, f)
		if _, got := warned(s, data.CodeOutputDiffers); got != want {
			t.Errorf("%v L/min: warned %v", output, got)
		}
		if s.Fit.Row != RowAll || !near(s.Fit.Results[s.Fit.Chosen].TotalResistance.Value, 1.05, 0.01) {
			t.Errorf("%v L/min: %s, %v", output, s.Fit.Row, s.Fit.Results[s.Fit.Chosen].TotalResistance)
		}
	}
	c := inventedCase()
	c.CardiacOutput, c.Cuff = ptr(5.25), "120/80"
	s := fitted(t, c, invented(aortic("carotid_mmHg"), column{"carotid_flow_mL_s", noisy(scaled(halfFlow, 0.05, 0), 0.1)}))
	unused := 0
	for _, w := range s.Warnings() {
		if w.Code == data.CodeUnused {
			unused++
		}
	}
	if unused != 2 {
		t.Errorf("output and cuff beside a carotid's flow and pressure: %d said to be unused", unused)
	}
}

// A velocity with a cuff and a diameter: C by the pulse, 1.1257 for wk2 and about
// 1.5 for wk3; and there is a load and a wave, so that everything goes on from it.
func TestVelocityAndACuff(t *testing.T) {
	c := inventedCase()
	area := math.Pi * 2.2 * 2.2 / 4
	c.DiameterCM, c.Cuff = ptr(2.2), "113.6/73.3/91.875"
	f := invented(column{"lvot_velocity_cm_s", noisy(scaled(halfFlow, 1/area, 0), 0.2)})
	s := whole(t, c, f)
	r := s.FitReport()
	if len(r.Fits) != 2 || r.Recommended == nil || r.Recommended.Basis != fitting.BasisMeans {
		t.Fatalf("%+v, reason %v", r.Fits, r.Reason)
	}
	for i, want := range []float64{1.1257, 1.55} {
		if e := r.Fits[i].Parameters["C"]; !near(float64(e.Value), want, 0.05) || !(e.Low < e.Value && e.Value < e.High) {
			t.Errorf("%s: C %+v, want %v", r.Fits[i].Model, e, want)
		}
		if !near(float64(r.Fits[i].TotalResistance.Value), 1.05, 0.02) {
			t.Errorf("%s: %+v", r.Fits[i].Model, r.Fits[i].TotalResistance)
		}
	}
	if s.Comparison.Reason != "" || s.Forecast.Reason != "" {
		t.Errorf("comparison: %q, forecast: %q", s.Comparison.Reason, s.Forecast.Reason)
	}
	for _, m := range s.Forecast.Mismatch {
		if math.IsNaN(m.Measured) || math.IsInf(m.Measured, 0) || math.Abs(m.Percent()) > 30 {
			t.Errorf("native state: %+v", m)
		}
	}
	if _, ok := warned(s, data.CodeStandIn); !ok {
		t.Error("the arm's pressure is not warned of")
	}
	if len(r.Estimators) != 7 || !near(float64(r.Estimators[4].C), 1.1257, 0.05) {
		t.Errorf("%+v", r.Estimators)
	}
}

// What the data cannot carry is refused with the smallest thing that would cure it.
func TestRefusedWithACure(t *testing.T) {
	velocity := column{"lvot_velocity_cm_s", noisy(scaled(halfFlow, 0.25, 0), 0.2)}
	for name, c := range map[string]struct {
		columns []column
		cuff    string
		cure    string
	}{
		"a velocity alone":               {[]column{velocity}, "", "--cuff SYS/DIA"},
		"a velocity and a cuff":          {[]column{velocity}, "120/80", "--diameter-cm"},
		"a flow and an impossible cuff":  {[]column{{"ao_flow_mL_s", noisy(scaled(halfFlow, 0.1, 80), 0.5)}}, "390/20", "pulse"},
		"a flow upside down with a cuff": {[]column{{"ao_flow_mL_s", noisy(scaled(halfFlow, -1, 0), 1)}}, "120/80", "--invert"},
	} {
		choices := inventedCase()
		choices.Cuff = c.cuff
		s := fitted(t, choices, invented(c.columns...))
		if r := s.Reason(); r == nil || !strings.Contains(*r, c.cure) || len(s.Fit.Results) != 0 {
			t.Errorf("%s: reason %v", name, r)
		}
	}
}

// Readings and outputs that make no sense name their flag.
func TestMeasuredBesideMakesSense(t *testing.T) {
	for _, c := range []struct {
		key    string
		change func(*casefile.Case)
	}{
		{"cuff", func(c *casefile.Case) { c.Cuff = "120" }},
		{"cuff", func(c *casefile.Case) { c.Cuff = "80/120" }},
		{"cuff", func(c *casefile.Case) { c.Cuff = "120/80/130" }},
		{"cuff", func(c *casefile.Case) { c.Cuff = "120/high" }},
		{"cuff", func(c *casefile.Case) { c.Cuff = "120/80/90/1" }},
		{"cardiac_output", func(c *casefile.Case) { c.CardiacOutput = ptr(0.0) }},
		{"cardiac_output", func(c *casefile.Case) { c.CardiacOutput = ptr(5250.0) }},
		{"output_by", func(c *casefile.Case) { c.CardiacOutput, c.OutputBy = ptr(5.0), "guess" }},
	} {
		choices := inventedCase()
		c.change(&choices)
		_, err := try(choices, invented(aortic("ao_mmHg"), outflowTo("ao_flow_mL_s")), StageFit)
		var e *ChoiceError
		if !errors.As(err, &e) || e.Key != c.key || e.Hint == "" {
			t.Errorf("%s: %v", c.key, err)
		}
	}
}

// The time constant of a pressure alone has both intervals.
func TestTimeConstantHasIntervals(t *testing.T) {
	s := fitted(t, inventedCase(), invented(aortic("ao_mmHg")))
	e := s.FitReport().TimeConstant
	if e == nil || !near(float64(e.Value), halfR*halfC, 0.02) || !(e.Low < e.RandomLow && e.RandomLow < e.Value && e.Value < e.RandomHigh && e.RandomHigh < e.High) {
		t.Errorf("%+v", e)
	}
}
