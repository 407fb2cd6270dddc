package study

import (
	"math"
	"strings"
	"testing"
)

// The half-sine beat of 0.8 s, by its closed form: pressure from 73.265899 to
// 113.636082 mmHg about a mean of 91.875, flow of mean 87.5 mL/s (the worked
// example of the reference values; 60/0.8 = 75 beats a minute).
func TestCheckMeasuresTheHalfSine(t *testing.T) {
	s := fitted(t, inventedCase(), invented(column{"ao_kPa", scaled(halfPressure, 0.133322387415, 0)}, column{"ao_flow_L_min", scaled(halfFlow, 0.06, 0)}))
	report := s.Beats.Check(nil)
	p, q := report.Channels[0], report.Channels[1]
	if p.Unit != "kPa" || !p.Calibrated || p.Site != "root" || q.Unit != "L/min" {
		t.Errorf("%+v, %+v", p, q)
	}
	for name, c := range map[string]struct{ got, want, within float64 }{
		"systolic":     {float64(p.Systolic), 113.636082, 1e-4}, // the peak lies between samples
		"diastolic":    {float64(p.Diastolic), 73.265899, 1e-4},
		"mean":         {float64(p.Mean), 91.875, 1e-4},
		"amplitude":    {float64(p.Amplitude), 40.370183, 1e-4},
		"gosling":      {float64(p.GoslingPI), 40.370183 / 91.875, 1e-3},
		"pourcelot":    {float64(p.PourcelotRI), 40.370183 / 113.636082, 1e-3},
		"rate":         {float64(p.Pulse.HeartRate), 75, 1e-3},
		"period":       {float64(p.Pulse.Period), 0.8, 1e-3},
		"flow, mean":   {float64(q.Mean), 87.5, 1e-3},
		"flow, PI":     {float64(q.GoslingPI), 4.18879, 1e-3},
		"rhythm":       {float64(p.Pulse.Rhythms[0].Frequency), 1.25, 5e-3},
		"rhythm, beat": {float64(p.Pulse.Rhythms[0].Amplitude), 40.370183, 0.02},
	} {
		if !near(c.got, c.want, c.within) {
			t.Errorf("%s: %v, want %v", name, c.got, c.want)
		}
	}
	if p.Pulse.BeatsUsed < 23 || p.Pulse.BeatsUsed > 25 || p.Pulse.PeriodCV > 0.01 {
		t.Errorf("%+v", p.Pulse)
	}
	if math.IsNaN(float64(report.Recording.Rate)) || report.Recording.Rate != 200 || len(report.Recording.SHA256) != 64 {
		t.Errorf("%+v", report.Recording)
	}
	// A person reads the values in the unit they have become.
	if note := s.CheckNote().Render(defaults); !strings.Contains(note, "91.87 mmHg") || !strings.Contains(note, "87.480 mL/s") {
		t.Errorf("the note does not give means in mmHg and mL/s:\n%s", note)
	}
}

// An index over a mean that is not positive does not exist.
func TestIndicesOfAReversedFlow(t *testing.T) {
	c := inventedCase()
	c.Invert = []string{"ao_flow_mL_s"}
	q := fitted(t, c, invented(aortic("ao_mmHg"), outflowTo("ao_flow_mL_s"))).Beats.Check(nil).Channels[1]
	if !q.Pulse.Found || !math.IsNaN(float64(q.GoslingPI)) || q.Mean > 0 {
		t.Errorf("%+v", q)
	}
}
