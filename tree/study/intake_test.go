package study

import (
	"errors"
	"math"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

// The same trace in other numbers, put right by a choice, gives the same fit.
func TestCalibration(t *testing.T) {
	const kPa = 0.133322387415 // of one mmHg (ISO 80000-4)
	pressure, flow := noisy(halfPressure, 0.3), noisy(halfFlow, 1)
	plain := fitted(t, inventedCase(), invented(column{"ao_mmHg", pressure}, column{"ao_flow_mL_s", flow}))
	wantR, wantC, wantZc := chosen(t, plain)
	for name, c := range map[string]struct {
		pressure, flow column
		change         func(*casefile.Case)
	}{
		"kPa and L/min in the header": {
			column{"ao_kPa", scaled(noisy(halfPressure, 0.3), kPa, 0)},
			column{"ao_flow [L/min]", scaled(noisy(halfFlow, 1), 0.06, 0)},
			func(*casefile.Case) {},
		},
		"a unit stated over the header's": {
			column{"ao_mmHg", scaled(noisy(halfPressure, 0.3), kPa, 0)},
			column{"ao_flow", scaled(noisy(halfFlow, 1), 0.06, 0)},
			func(c *casefile.Case) { c.Unit = map[string]string{"ao_mmHg": "kPa", "ao_flow": "L/min"} },
		},
		"scale and offset": {
			column{"ao_mmHg", scaled(noisy(halfPressure, 0.3), 0.5, -5)},
			column{"ao_flow_mL_s", scaled(noisy(halfFlow, 1), 1/1.5, 0)},
			func(c *casefile.Case) {
				c.Scale, c.Offset = map[string]float64{"ao": 2, "ao_flow": 1.5}, map[string]float64{"ao": 10}
			},
		},
		"offset in the channel's unit, after scaling": {
			column{"ao_kPa", scaled(noisy(halfPressure, 0.3), kPa/2, -0.75)},
			column{"ao_flow_mL_s", noisy(halfFlow, 1)},
			func(c *casefile.Case) {
				c.Scale, c.Offset = map[string]float64{"ao_kPa": 2}, map[string]float64{"ao_kPa": 1.5}
			},
		},
		"inverted": {
			column{"ao_mmHg", scaled(noisy(halfPressure, 0.3), -1, 0)},
			column{"ao_flow_mL_s", scaled(noisy(halfFlow, 1), -1, 0)},
			func(c *casefile.Case) { c.Invert = []string{"ao", "ao_flow_mL_s"} },
		},
		"volts, with a unit and a scale stated": {
			column{"ao_pressure_V", scaled(noisy(halfPressure, 0.3), 0.01, 0.2)},
			column{"ao_flow_mL_s", noisy(halfFlow, 1)},
			func(c *casefile.Case) {
				c.Unit = map[string]string{"ao_pressure_V": "mmHg"}
				c.Scale, c.Offset = map[string]float64{"ao_pressure_V": 100}, map[string]float64{"ao_pressure_V": -20}
			},
		},
	} {
		choices := inventedCase()
		c.change(&choices)
		r, cc, zc := chosen(t, fitted(t, choices, invented(c.pressure, c.flow)))
		if !near(r, wantR, 1e-9) || !near(cc, wantC, 1e-9) || !near(zc, wantZc, 1e-8) {
			t.Errorf("%s: R %v, C %v, Zc %v; want %v, %v, %v", name, r, cc, zc, wantR, wantC, wantZc)
		}
	}
}

// The recording that is read stays as it was, whatever is done to its channels.
func TestTakingInChangesNoRecording(t *testing.T) {
	c := inventedCase()
	c.From, c.Invert, c.Scale = ptr(5.0), []string{"ao_flow_mL_s"}, map[string]float64{"ao_mmHg": 3}
	in, err := Read(c, invented(column{"ao_mmHg", halfPressure}, column{"ao_flow_mL_s", halfFlow}).read)
	if err != nil {
		t.Fatal(err)
	}
	taken, err := TakeIn(in)
	if err != nil {
		t.Fatal(err)
	}
	if got := in.Recording.Channels[0].Values[0]; !near(got, halfPressure(0), 1e-12) {
		t.Errorf("the first pressure of the recording became %v", got)
	}
	if v := taken.Channels[0].Values; !math.IsNaN(v[999]) || !near(v[1000], 3*halfPressure(5), 1e-12) {
		t.Errorf("pressure about 5 s: %v, %v", v[999], v[1000])
	}
}

// Only the span is used, and what a file says to leave out is not; the
// recording is described whole all the same.
func TestSpanAndExclusions(t *testing.T) {
	f := invented(aortic("ao_mmHg"), outflowTo("ao_flow_mL_s"))
	f["ex.csv"] = "start_s,end_s,why\n10,12,cough\n15.5,15.6,flush\n"
	c := inventedCase()
	c.From, c.To, c.Exclude = ptr(4.0), ptr(18.0), "ex.csv"
	s := fitted(t, c, f)
	used := 0
	for _, b := range s.Beats.Ensemble.Used {
		used++
		from, to := s.Intake.Grid.At(b.From), s.Intake.Grid.At(b.To)
		if from < 4 || to > 18 || from < 12 && to > 10 || from < 15.6 && to > 15.5 {
			t.Errorf("a beat from %v to %v s was used", from, to)
		}
	}
	if used < 9 || used > 14 { // 14 s less 2 s and the beats on the edges, 0.8 s each
		t.Errorf("%d beats used", used)
	}
	report := s.FitReport()
	if report.Recording.Rows != 4000 || !near(float64(report.Recording.Duration), 19.995, 1e-9) {
		t.Errorf("recording: %+v", report.Recording)
	}
	note := s.Note().Render(defaults)
	for _, want := range []string{"4 to 18 s of the file's clock", "2 stretches of 2.1 s in all, by ex.csv"} {
		if !strings.Contains(note, want) {
			t.Errorf("the note lacks %q", want)
		}
	}
	if r, cc, zc := chosen(t, s); !near(r, halfR, 0.02) || !near(cc, halfC, 0.02) || !near(zc, halfZc, 0.05) {
		t.Errorf("R %v, C %v, Zc %v", r, cc, zc)
	}
}

// A hole of 20 ms is filled by a straight line, and said to be; a longer one, and
// a stretch left out, is not.
func TestShortHolesAreFilled(t *testing.T) {
	f := invented(column{"ao_mmHg", halfPressure}, column{"ao_flow_mL_s", halfFlow})
	f["a.csv"] = emptied(emptied(f["a.csv"], 1000, 1003), 2000, 2010)
	f["ex.csv"] = "start_s,end_s\n15,15.01\n"
	c := inventedCase()
	c.Exclude = "ex.csv"
	s := fitted(t, c, f)
	v := s.Intake.Channels[0].Values
	for j := range 3 {
		if want := v[999] + float64(j+1)/4*(v[1003]-v[999]); !near(v[1000+j], want, 1e-9) {
			t.Errorf("sample %d is %v, want %v", 1000+j, v[1000+j], want)
		}
	}
	if s.Intake.Filled[0] != 3 || !math.IsNaN(v[2000]) || !math.IsNaN(v[3001]) {
		t.Errorf("%d filled; %v in a longer hole, %v in a stretch left out", s.Intake.Filled[0], v[2000], v[3001])
	}
	if note := s.Note().Render(defaults); !strings.Contains(note, "3 samples of ao_mmHg") {
		t.Error("the note does not speak of filled samples")
	}
}

// What a channel's site means for a fit is said.
func TestSitesAreStatedAndWarnedOf(t *testing.T) {
	for name, c := range map[string]struct {
		pressure, flow string
		site           map[string]string
		code           data.Code // "" for none of the three
		says           string
	}{
		"root and root":              {"ao_mmHg", "ao_flow_mL_s", nil, "", ""},
		"root and outflow tract":     {"ao_mmHg", "lvot_flow_mL_s", nil, "", ""},
		"limb and root":              {"radial_mmHg", "ao_flow_mL_s", nil, data.CodeStandIn, "at the radial stands in for the root's; a pulse 1.3 times that of the root puts C 23 % too low"},
		"a limb that is called root": {"radial_mmHg", "ao_flow_mL_s", map[string]string{"radial_mmHg": "root"}, "", ""},
		"unnamed artery and root":    {"abp_mmHg", "ao_flow_mL_s", nil, data.CodeStandIn, "at a place that its name does not tell"},
		"bed":                        {"carotid_mmHg", "carotid_flow_mL_s", nil, data.CodeRegional, "that of one bed (carotid)"},
		"flow of nowhere":            {"ao_mmHg", "flow_mL_s", nil, data.CodeSiteUnknown, "not known"},
	} {
		choices := inventedCase()
		choices.Site = c.site
		s, err := try(choices, invented(aortic(c.pressure), outflowTo(c.flow)), StageIntake)
		if err != nil {
			t.Fatal(err)
		}
		for _, code := range []data.Code{data.CodeStandIn, data.CodeRegional, data.CodeSiteUnknown} {
			w, ok := data.Warning{}, false
			for _, one := range s.Intake.Warnings {
				if one.Code == code {
					w, ok = one, true
				}
			}
			if ok != (code == c.code) || ok && !strings.Contains(w.Text, c.says) {
				t.Errorf("%s: warning %s: %v %q", name, code, ok, w.Text)
			}
		}
	}
}

// A choice between two equal columns is a person's, and is asked for at the fit
// only: until then, both can be looked at.
func TestTwoEqualChannels(t *testing.T) {
	f := invented(aortic("left_radial_mmHg"), aortic("right_radial_mmHg"), outflowTo("ao_flow_mL_s"))
	c := inventedCase()
	s, err := try(c, f, StageBeats)
	if err != nil || s.Intake.Ambiguous == nil || !s.Beats.Pulses[0].Found || !s.Beats.Pulses[1].Found {
		t.Fatalf("beats of two equal channels: %v", err)
	}
	if reason := s.Reason(); reason != nil {
		t.Errorf("check has a reason: %q", *reason)
	}
	_, err = try(c, f, StageFit)
	var e *data.AmbiguousError
	if !errors.As(err, &e) || len(e.Names) != 2 || !strings.Contains(err.Error(), "--pressure") {
		t.Errorf("fit of two equal channels: %v", err)
	}
	c.Pressure = "right_radial_mmHg"
	if s = fitted(t, c, f); s.Fit.Chosen < 0 || s.Intake.Selection.Pressure != 1 {
		t.Errorf("the pressure named: %+v", s.Intake.Selection)
	}
}
