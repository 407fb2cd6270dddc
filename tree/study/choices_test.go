package study

import (
	"errors"
	"strings"
	"testing"

	"afterbeat/data/casefile"
)

// A choice that makes no sense names its key, from which the flag follows, and
// says what would make sense.
func TestChoicesThatMakeNoSense(t *testing.T) {
	const p, v = "aortic_pressure_mmHg", "lvot_velocity_cm_s"
	for _, c := range []struct {
		key, flag string
		hint      string
		change    func(*casefile.Case)
	}{
		{"site." + p, "--site", "root, lvot", func(c *casefile.Case) { c.Site = map[string]string{p: "knee"} }},
		{"site.nobody", "--site", p, func(c *casefile.Case) { c.Site = map[string]string{"nobody": "root"} }},
		{"unit." + p, "--unit", "kPa", func(c *casefile.Case) { c.Unit = map[string]string{p: "furlong"} }},
		{"scale.nobody", "--scale", p, func(c *casefile.Case) { c.Scale = map[string]float64{"nobody": 2} }},
		{"scale." + p, "--scale", "--invert", func(c *casefile.Case) { c.Scale = map[string]float64{p: 0} }},
		{"offset.nobody", "--offset", p, func(c *casefile.Case) { c.Offset = map[string]float64{"nobody": 2} }},
		{"invert", "--invert", p, func(c *casefile.Case) { c.Invert = []string{"nobody"} }},
		{"rate", "--rate", "--rate 200", func(c *casefile.Case) { c.Rate = ptr(0.0) }},
		{"from", "--from", "0 to 22.14 s", func(c *casefile.Case) { c.From = ptr(23.0) }},
		{"to", "--to", "0 to 22.14 s", func(c *casefile.Case) { c.To = ptr(0.0) }},
		{"to", "--to", "0 to 22.14 s", func(c *casefile.Case) { c.From, c.To = ptr(3.0), ptr(3.0) }},
		{"drop", "--drop", "0 to 22.14 s", func(c *casefile.Case) { c.Drop = []float64{1, 23} }},
		{"keep", "--keep", "0 to 22.14 s", func(c *casefile.Case) { c.Drop, c.Keep = []float64{1}, []float64{-1} }},
		{"diameter_cm", "--diameter-cm", "cm", func(c *casefile.Case) { c.DiameterCM = ptr(0.0) }},
		{"diameter_cm", "--diameter-cm", "cm", func(c *casefile.Case) { c.DiameterCM, c.AngleDeg = nil, ptr(10.0) }},
		{"diameter_cm", "--diameter-cm", "cm", func(c *casefile.Case) { c.DiameterCM, c.Profile = nil, "0.5" }},
		{"angle_deg", "--angle-deg", "90 degrees", func(c *casefile.Case) { c.AngleDeg = ptr(90.0) }},
		{"profile", "--profile", "factor", func(c *casefile.Case) { c.Profile = "1.5" }},
		{"profile", "--profile", "factor", func(c *casefile.Case) { c.Profile = "womersley" }},
		{"beats", "--beats", "support", func(c *casefile.Case) { c.Beats = "weak" }},
		{"delay", "--delay", "seconds", func(c *casefile.Case) { c.Delay = "25" }},
		{"delay", "--delay", "seconds", func(c *casefile.Case) { c.Delay = "nan" }},
		{"delay", "--delay", "seconds", func(c *casefile.Case) { c.Delay = "late" }},
		{"error.flow", "--error", "--error flow=10%", func(c *casefile.Case) { c.Error = map[string]string{"flow": "-1%"} }},
		{"error.delay", "--error", "--error delay=0.01 (s)", func(c *casefile.Case) { c.Error = map[string]string{"delay": "5%"} }},
		{"error.flow", "--error", "--error flow=10%", func(c *casefile.Case) { c.Error = map[string]string{"flow": "10"} }},
		{"outflow_pressure", "--outflow-pressure", "venous", func(c *casefile.Case) { c.OutflowPressure = ptr(77.0) }},
		{"error.filling-slope", "--error", "--error filling-slope=60%", func(c *casefile.Case) { c.Error = map[string]string{"filling-slope": "5"} }},
		{"error.cardiac-output", "--error", "--error cardiac-output=25%", func(c *casefile.Case) { c.Error = map[string]string{"cardiac-output": "5"} }},
		{"error.pulse", "--error", "flow, pressure-scale", func(c *casefile.Case) { c.Error = map[string]string{"pulse": "5%"} }},
		{"model", "--model", "wk2, wk3", func(c *casefile.Case) { c.Model = "wk9" }},
		{"replicates", "--replicates", "1000", func(c *casefile.Case) { c.Replicates = ptr(0) }},
		{"seed", "--seed", "leave it out", func(c *casefile.Case) { c.Seed = ptr(0) }},
		{"share", "--share", "--share 0.5", func(c *casefile.Case) { c.Share = []float64{0.5, 1.5} }},
		{"pump", "--pump", "generic A, generic B", func(c *casefile.Case) { c.Pump = setCalled("generic C") }},
		{"speed", "--speed", "--speed 9", func(c *casefile.Case) { c.Speed = []float64{9, 9000} }},
		{"speed", "--speed", "--speed 3", func(c *casefile.Case) { c.Pump, c.Speed = setCalled("Generic-b"), []float64{0} }},
		{"ef", "--ef", "--ef 0.25", func(c *casefile.Case) { c.EF = ptr(25.0) }},
		{"edv_ml", "--edv-ml", "--edv-ml 220", func(c *casefile.Case) { c.EDVML = ptr(40.0) }},
	} {
		choices := demoCase(t)
		c.change(&choices)
		_, err := try(choices, demoFolder(t), StageDone)
		var e *ChoiceError
		switch {
		case !errors.As(err, &e):
			t.Errorf("%s: error %v", c.key, err)
		case e.Key != c.key || e.Flag() != c.flag || !strings.Contains(e.Hint, c.hint) || !strings.HasPrefix(e.Error(), c.flag):
			t.Errorf("%s: %q, key %q, flag %q, hint %q", c.key, e, e.Key, e.Flag(), e.Hint)
		}
	}
}

// Of several wrong entries it is always the same one that is named.
func TestTheSameWrongChoiceIsNamedEachTime(t *testing.T) {
	for range 20 {
		c := demoCase(t)
		c.Error = map[string]string{"flow": "x", "angle": "x", "delay": "x", "diameter": "x"}
		c.Site = map[string]string{"b": "root", "a": "root", "lvot_velocity": "lvot"}
		_, err := try(c, demoFolder(t), StageDone)
		if want := "--site a:"; err == nil || !strings.HasPrefix(err.Error(), want) {
			t.Fatalf("%v, want %s", err, want)
		}
		c.Site = nil
		if _, err = try(c, demoFolder(t), StageDone); !strings.HasPrefix(err.Error(), "--error angle:") {
			t.Fatal(err)
		}
	}
}

// A name with escapes in it is shown cleaned.
func TestAChoiceIsShownCleaned(t *testing.T) {
	c := demoCase(t)
	c.Site = map[string]string{"a\x1b[2J": "root"}
	_, err := try(c, demoFolder(t), StageIntake)
	if err == nil || strings.Contains(err.Error(), "\x1b") {
		t.Errorf("%q", err)
	}
}

func TestHalfWidths(t *testing.T) {
	widths, err := halfWidths(casefile.Case{Error: map[string]string{"flow": "25%", "pressure-scale": "0.04", "delay": "0.005", "outflow-pressure": " 5 "}})
	if err != nil {
		t.Fatal(err)
	}
	// The rest are the defaults of the design: 2 mmHg, 5 %, 5 degrees (common
	// practice, and assumptions).
	for name, want := range map[string]float64{
		"flow": 0.25, "pressure-scale": 0.04, "delay": 0.005, "outflow-pressure": 5,
		"pressure-offset": 2, "diameter": 0.05, "angle": 5,
	} {
		if widths[name] != want {
			t.Errorf("%s: %v, want %v", name, widths[name], want)
		}
	}
}

func TestShares(t *testing.T) {
	got, err := shares(casefile.Case{Share: []float64{1, 0.5, 0, 0.5}})
	if err != nil || len(got) != 3 || got[0] != 0 || got[1] != 0.5 || got[2] != 1 {
		t.Errorf("%v, %v: want them rising, each once", got, err)
	}
	if got, _ = shares(casefile.Case{}); len(got) != 11 || got[0] != 0 || got[10] != 1 {
		t.Errorf("without a choice: %v", got)
	}
}
