package study

import (
	"context"
	"errors"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/demo"
)

// What the demo was made from comes back: within the intervals of random error,
// and within 2 %.
func TestDemoRecoversWhatItWasMadeFrom(t *testing.T) {
	s := demoFitted(t, func(c *casefile.Case) { c.Replicates = nil })
	truth := demo.Truth()
	r := s.Fit.Results[s.Fit.Chosen]
	if r.Model.Name != "wk3" {
		t.Fatalf("chosen: %s", r.Model.Name)
	}
	for name, want := range map[string]float64{"R": truth.R, "C": truth.C, "Zc": truth.Zc} {
		p, _ := r.Parameter(name)
		if !p.Identified || !p.Random.Contains(want) || !p.Total.Contains(want) || !near(p.Value, want, 0.02) {
			t.Errorf("%s: %+v, made from %v", name, p.Estimate, want)
		}
		if p.Total.Width() < p.Random.Width() {
			t.Errorf("%s: the total interval %v is narrower than the random one %v", name, p.Total, p.Random)
		}
	}
	// Output is 48 mL in 0.72 s, breathing out of it.
	if flow := s.Beats.Flow.Period.Mean(); !near(flow, truth.StrokeVolume/truth.Period, 0.02) {
		t.Errorf("mean flow %v mL/s, made from %v", flow, truth.StrokeVolume/truth.Period)
	}
	// The premature beat, the one cut short by it, and the one after its pause.
	if b := s.Beats; b.Pressure.Count != truth.Beats-3 || b.Beats[truth.Ectopic].Rejected == "" {
		t.Errorf("%d beats used; of the premature one: %q", b.Pressure.Count, b.Beats[truth.Ectopic].Rejected)
	}
}

// Delay is positive where pressure is late: 25 ms in the demo. None and twice as
// much both fit worse, and move Zc and C as pressure too late or too early does.
func TestDelayHasItsSign(t *testing.T) {
	rmse := func(delay string) (float64, float64) {
		s := demoFitted(t, func(c *casefile.Case) { c.Delay, c.Model = delay, "wk3" })
		r := s.Fit.Results[s.Fit.Chosen]
		return r.RMSE, r.Values.Zc
	}
	right, zc := rmse("0.025")
	for _, delay := range []string{"", "0", "0.05", "-0.025"} {
		wrong, off := rmse(delay)
		if wrong < 10*right || near(off, zc, 0.1) {
			t.Errorf("delay %q: residual %.3g mmHg, Zc %.3g; with 0.025: %.3g mmHg, Zc %.3g", delay, wrong, off, right, zc)
		}
	}
}

// A stage that gives an error is not there, and the study stays as it was.
func TestAStageWithAnErrorIsNotComputed(t *testing.T) {
	c := demoCase(t)
	c.Share = []float64{2}
	s, err := try(c, demoFolder(t), StageDone)
	var choice *ChoiceError
	if !errors.As(err, &choice) || s.Pending() != StageSupport || s.Fit == nil {
		t.Errorf("pending %q, error %v", s.Pending(), err)
	}
	ctx, stop := context.WithCancel(context.Background())
	stop()
	s = s.With(demoCase(t))
	if after, err := s.Next(ctx); !errors.Is(err, context.Canceled) || after.Comparison != nil {
		t.Errorf("interrupted: %v, comparison %v", err, after.Comparison)
	}
	if _, err := Run(ctx, s.Inputs, StageDone); !errors.Is(err, context.Canceled) {
		t.Errorf("Run, interrupted: %v", err)
	}
}

func TestRunStopsAtAStage(t *testing.T) {
	c, f := demoCase(t), demoFolder(t)
	c.Replicates = ptr(fewest)
	next := map[Stage]Stage{StageIntake: StageBeats, StageBeats: StageFit, StageFit: StageTree, StageTree: StageSupport, StageSupport: StageForecast, StageForecast: StageDone}
	for last, want := range next {
		s, err := try(c, f, last)
		if err != nil || s.Pending() != want {
			t.Errorf("run up to %q: pending %q, error %v", last, s.Pending(), err)
		}
	}
	if s := (Study{}); s.Pending() != StageIntake || s.Warnings() != nil || s.Reason() != nil {
		t.Errorf("a study of nothing: pending %q, warnings %v, reason %v", s.Pending(), s.Warnings(), s.Reason())
	}
}

// Every warning comes once, has a code of the table, and says what cures it.
func TestWarningsAreComplete(t *testing.T) {
	known := map[data.Code]bool{}
	for _, w := range data.WarningCodes() {
		known[w.Code] = true
	}
	s := demoFitted(t, func(c *casefile.Case) {
		c.DiameterCM, c.AngleDeg, c.Delay, c.OutflowPressure, c.Invert = ptr(9.0), ptr(70.0), "", nil, []string{"lvot_velocity_cm_s"}
		c.From, c.To = ptr(13.0), ptr(18.0)
	})
	seen := map[data.Warning]bool{}
	for _, w := range s.Warnings() {
		if !known[w.Code] || w.Text == "" || w.Cure == "" || seen[w] {
			t.Errorf("%+v: code known %v, seen before %v", w, known[w.Code], seen[w])
		}
		seen[w] = true
	}
	for _, code := range []data.Code{data.CodeUnlikely, data.CodeSteepAngle, data.CodeNegativeFlow, data.CodeFewBeats} {
		if _, ok := warned(s, code); !ok {
			t.Errorf("no warning %s among %v", code, s.Warnings())
		}
	}
}

func BenchmarkStudyDemo(b *testing.B) {
	c, f := demoCase(b), demoFolder(b)
	c.Replicates, c.Share, c.Speed = nil, nil, nil
	b.ReportAllocs()
	for b.Loop() {
		s := whole(b, c, f)
		if len(s.Note().Sections) == 0 {
			b.Fatal("no note")
		}
	}
}
