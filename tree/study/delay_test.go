package study

import (
	"math"
	"strings"
	"testing"

	"afterbeat/data"
)

// late is a signal that arrives later, by s.
func late(f func(float64) float64, by float64) func(float64) float64 {
	return func(at float64) float64 { return f(at - by) }
}

// A pressure that is 20 ms late by construction is found to be, warned of with
// what it does, and with --delay auto put right.
func TestDelayFromTheBeats(t *testing.T) {
	f := invented(column{"ao_mmHg", noisy(late(halfPressure, 0.02), 0.3)}, outflowTo("ao_flow_mL_s"))
	s := fitted(t, inventedCase(), f)
	d := s.FitReport().Beat.Delay
	if !d.Identified || math.Abs(float64(d.Value)-0.02) > 0.002 || d.Used != 0 || d.UsedFrom != "assumed" || len(d.Beside) != 3 {
		t.Errorf("reported %+v", d)
	}
	w, ok := warned(s, data.CodeDelay)
	if !ok || !strings.Contains(w.Text, "not aligned") || !strings.Contains(w.Cure, "--delay auto") || !strings.Contains(w.Text, "-10 ms would change C by") {
		t.Errorf("%+v", w)
	}
	c := inventedCase()
	c.Delay = "auto"
	s = fitted(t, c, f)
	if _, ok := warned(s, data.CodeDelay); ok {
		t.Error("an estimated delay is warned of")
	}
	d = s.FitReport().Beat.Delay
	if d.UsedFrom != "estimated" || math.Abs(float64(d.Used)-0.02) > 0.002 {
		t.Errorf("with auto: %+v", d)
	}
	for _, r := range s.Fit.Results {
		if r.Model.Name == "wk3" && (!near(r.Values.Zc, halfZc, 0.08) || !near(r.Values.C, halfC, 0.03)) {
			t.Errorf("with auto: %+v", r.Values)
		}
	}
	if text := s.FitNote().Render(defaults); !strings.Contains(text, "Delay of pressure behind flow") {
		t.Error("the note has no section of the delay")
	}
}

// Far from aligned, Zc is refused: 55 ms put it off by 94 % (computed).
func TestZcIsRefusedFarFromAligned(t *testing.T) {
	c := inventedCase()
	c.Delay = "-0.03"
	s := fitted(t, c, invented(aortic("ao_mmHg"), outflowTo("ao_flow_mL_s")))
	refused := 0
	for _, r := range s.Fit.Results {
		if p, ok := r.Parameter("Zc"); ok && !p.Identified && strings.Contains(p.Why, "not corrected") {
			refused++
		}
	}
	if refused == 0 && s.Fit.Delay.Delay.Identified {
		t.Errorf("Zc stands with a delay of %v s used and %+v found", s.Fit.Beats.Delay.Value, s.Fit.Delay.Delay)
	}
	if w, ok := warned(s, data.CodeDelay); !ok || !strings.Contains(w.Text, "not aligned") {
		t.Errorf("%+v", w)
	}
}

// Where the profile is flat the delay is not identified, and 0 stays in use.
func TestDelayThatCannotBeEstimated(t *testing.T) {
	c := inventedCase()
	c.Delay = "auto"
	s := fitted(t, c, invented(column{"ao_mmHg", noisy(func(at float64) float64 {
		return 90 + 10*math.Sin(2*math.Pi*at/halfT)
	}, 1)}, column{"ao_flow_mL_s", noisy(func(at float64) float64 {
		return 90 + 60*math.Sin(2*math.Pi*at/halfT)
	}, 3)}))
	d := s.FitReport().Beat.Delay
	if d.Identified || d.Reason == nil || d.Used != 0 {
		t.Errorf("one harmonic alone: %+v", d)
	}
	if w, ok := warned(s, data.CodeDelay); !ok || !strings.Contains(w.Text, "not identified") {
		t.Errorf("%+v", w)
	}
}

// The impedance of the half-sine's load, Zc + R/(1 + i w R C): 0.1018 mmHg s/mL at
// -55.9 degrees for the first harmonic (computed independently), and the waves.
func TestImpedanceInTheReport(t *testing.T) {
	s := fitted(t, inventedCase(), invented(aortic("ao_mmHg"), outflowTo("ao_flow_mL_s")))
	r := s.FitReport()
	if len(r.Impedance) == 0 || !near(float64(r.Impedance[0].Modulus), 0.10182766, 0.02) || math.Abs(float64(r.Impedance[0].Phase)+55.86) > 1 {
		t.Errorf("%+v", r.Impedance)
	}
	hidden := 0
	for _, h := range r.Impedance {
		if h.Reason != nil {
			hidden++
			if !math.IsNaN(float64(h.Modulus)) {
				t.Errorf("harmonic %d has no flow, and an impedance", h.K)
			}
		}
	}
	if hidden == 0 {
		t.Error("all harmonics stand out of the noise")
	}
	if w := r.Waves; w == nil || w.Reason != nil || !(float64(w.Magnitude.Value) > 0) || !w.Magnitude.Identified || w.ZcFrom == nil {
		t.Errorf("%+v", w)
	}
	if fitted(t, inventedCase(), invented(aortic("ao_mmHg"))).FitReport().Waves != nil {
		t.Error("waves without a flow")
	}
}
