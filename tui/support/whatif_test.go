package support_test

import (
	"strings"
	"testing"

	"afterbeat/data/casefile"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/screentest"
)

// coupledDemo is the demo with a forecast at few speeds.
func coupledDemo(t testing.TB) study.Study {
	t.Helper()
	s := screentest.Demo(t, func(c *casefile.Case) {
		c.Speed = []float64{7, 9, 10}
		n := 4
		c.Replicates = &n
	})
	s, err := s.Next(t.Context())
	if err != nil || s.Forecast.Reason != "" {
		t.Fatal(err, s.Forecast.Reason)
	}
	return s
}

// A what-if is marked, has the change of each headline beside it, goes on with the
// speed, ends with esc, and never reaches the note or asks the root for anything.
func TestWhatIfOfTheForecast(t *testing.T) {
	s := coupledDemo(t)
	note := len(s.Note().Sections)
	b := open(s)
	before := b.View()
	silent(t, before, "WHAT IF")
	seen := map[string]bool{}
	for range s.Forecast.WhatIfs() {
		b.Press("]")
		view := b.View()
		says(t, view, "WHAT IF ", "never in the note", "retained pulse", "supported")
		silent(t, view, "computing")
		for _, name := range []string{"resistance R -20 %", "resistance R +20 %", "outflow-pressure -10 mmHg", "outflow-pressure +10 mmHg", "output -20 %", "output +20 %", "contractility, Emax -20 %", "contractility, Emax +20 %"} {
			if strings.Contains(view, name) {
				seen[name] = true
			}
		}
	}
	if len(seen) != 8 || s.Forecast.WhatIfs() != 8 {
		t.Errorf("moved were %v", seen)
	}
	b.Press("]")
	if got := b.View(); got != before {
		t.Errorf("after the last one comes none; got\n%s", got)
	}
	b.Press("]", "up")
	says(t, b.View(), "WHAT IF resistance R -20 %", "speed 10")
	b.Press("down", "esc")
	if got := b.View(); got != before {
		t.Errorf("after esc\n%s", got)
	}
	if len(b.Told) != 0 || len(s.Note().Sections) != note {
		t.Errorf("told the root %v", b.Told)
	}
}

// At R -20 % on support the screen shows what the forecast's own sensitivity has:
// two ways to the same number.
func TestWhatIfIsThatOfTheSensitivity(t *testing.T) {
	f := coupledDemo(t).Forecast
	for i := range f.WhatIfs() {
		w, err := f.WhatIf(i, 50)
		if err != nil {
			t.Fatal(err)
		}
		found := false
		for _, one := range f.Sensitivity {
			if one.Assumption == w.Assumption && one.Change == w.Change {
				found = true
				if d := w.Speeds[f.Middle].RetainedPulse.Value - one.RetainedPulse; d > 1e-4 || d < -1e-4 {
					t.Errorf("%s %s: %v, by the sensitivity %v", w.Assumption, w.Change, w.Speeds[f.Middle].RetainedPulse.Value, one.RetainedPulse)
				}
			}
		}
		if !found || len(w.Speeds) != len(f.Speeds) || len(w.Native.Waves.Pressure.Samples) != 50 {
			t.Errorf("%s %s: found %v, %d speeds", w.Assumption, w.Change, found, len(w.Speeds))
		}
	}
}

// A speed reaches the note by a change of the case, which can be undone.
func TestSpeedOfTheNote(t *testing.T) {
	s := coupledDemo(t)
	b := open(s, "up", "n")
	if len(b.Told) != 1 {
		t.Fatalf("told the root %v", b.Told)
	}
	change, ok := b.Told[0].(tui.ChangeMsg)
	if !ok || change.Case.Quote == nil || *change.Case.Quote != 10 || !strings.Contains(change.Said.String(), "10") {
		t.Fatalf("%+v", b.Told[0])
	}
	after := s.With(change.Case)
	if after.Pending() != study.StageForecast {
		t.Errorf("pending %q", after.Pending())
	}
	after, err := after.Next(t.Context())
	if err != nil || after.Forecast.Speeds[after.Forecast.Middle].Speed != 10 {
		t.Errorf("the note quotes %v, %v", after.Forecast.Speeds[after.Forecast.Middle].Speed, err)
	}
	b.Show(after)
	for _, k := range b.Screen.Keys() {
		if k.Help().Desc == "quote in the note" {
			t.Error("the key works at the speed that the note quotes")
		}
	}
}

func TestWhatIfGolden(t *testing.T) {
	s := coupledDemo(t)
	screentest.Golden(t, "forecast-what-if", func(a tui.Area, th tui.Theme) string {
		b := open(s, "]")
		b.Resize(a, th)
		return b.View()
	})
}

func BenchmarkWhatIf(b *testing.B) {
	f := coupledDemo(b).Forecast
	b.ReportAllocs()
	for b.Loop() {
		if _, err := f.WhatIf(0, 144); err != nil {
			b.Fatal(err)
		}
	}
}
