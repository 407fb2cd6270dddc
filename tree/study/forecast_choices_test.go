package study

import (
	"errors"
	"math"
	"strconv"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree/heart"
	"afterbeat/tree/support"
)

// demoForecast is the forecast of the demo with few replicates, as change makes
// its case.
func demoForecast(t testing.TB, change func(*casefile.Case)) (Study, *Forecast) {
	t.Helper()
	s := demoWith(t, func(c *casefile.Case) {
		c.Replicates, c.Speed = ptr(6), []float64{8, 9}
		change(c)
	})
	if s.Forecast.Reason != "" {
		t.Fatal(s.Forecast.Reason)
	}
	return s, s.Forecast
}

// What is matched is equal natively and at every speed; what is changed to make
// it so is what the case says, and the rest stays. At equal resistance equal flow
// is equal pressure, Pv + Z(0) Q, so that flow and held pressure are one answer.
func TestMatching(t *testing.T) {
	none, _ := demoForecast(t, func(*casefile.Case) {})
	for name, c := range map[string]struct {
		change             func(*casefile.Case)
		flow, pressure     bool // equal to the native ones
		resistance         bool // changed
		onLine             bool // filling pressure stays on its line
		factor             float64
		said, held, absent string
	}{
		"none":             {func(*casefile.Case) {}, false, false, false, true, 1, "are not matched", "R", "mean flow, L/min"},
		"resistance":       {func(c *casefile.Case) { c.HoldResistance = ptr(0.8) }, false, false, true, true, 0.8, "0.8 times the native one", "R", ""},
		"flow":             {func(c *casefile.Case) { c.Match = "flow" }, true, true, false, false, 1, "Mean flow is matched", "mean flow", ""},
		"flow, resistance": {func(c *casefile.Case) { c.Match, c.HoldResistance = "flow", ptr(0.9) }, true, false, true, false, 0.9, "0.9 times", "mean flow", ""},
		"pressure":         {func(c *casefile.Case) { c.Match = "pressure" }, false, true, true, true, 0, "the resistance R is changed", "mean pressure", ""},
		"pressure, held":   {func(c *casefile.Case) { c.Match, c.HoldResistance = "pressure", ptr(1.0) }, true, true, false, false, 1, "the filling pressure is changed", "mean pressure", ""},
	} {
		s, f := demoForecast(t, c.change)
		native := &f.Native
		if !near(native.PulsePressure.Value, none.Forecast.Native.PulsePressure.Value, 1e-6) {
			t.Errorf("%s: the native state is another one", name)
		}
		for i := range f.Speeds {
			got := &f.Speeds[i]
			if equal := near(got.Output.Value, native.Output.Value, 1e-4); equal != c.flow {
				t.Errorf("%s, speed %v: flow %v, natively %v", name, got.Speed, got.Output.Value, native.Output.Value)
			}
			if equal := near(got.MeanPressure.Value, native.MeanPressure.Value, 1e-4); equal != c.pressure {
				t.Errorf("%s, speed %v: pressure %v, natively %v", name, got.Speed, got.MeanPressure.Value, native.MeanPressure.Value)
			}
			if changed := !near(got.Resistance.Value, 1, 1e-9); changed != c.resistance || c.factor > 0 && !near(got.Resistance.Value, c.factor, 1e-9) {
				t.Errorf("%s, speed %v: resistance is %v of the native one", name, got.Speed, got.Resistance.Value)
			}
			line := heart.Filling{Pressure: native.Filling, Flow: native.Flow(), Slope: heart.RampSlope}
			if on := math.Abs(line.At(got.Flow())-got.Filling) < 1e-3; on != c.onLine {
				t.Errorf("%s, speed %v: filling pressure %v, on the line %v", name, got.Speed, got.Filling, line.At(got.Flow()))
			}
			if !got.PulsePressure.Total.Contains(got.PulsePressure.Value) {
				t.Errorf("%s, speed %v: %+v", name, got.Speed, got.PulsePressure)
			}
		}
		text := strings.Join(strings.Fields(s.Note().Render(defaults)), " ")
		if !strings.Contains(text, c.said) {
			t.Errorf("%s: the note lacks %q", name, c.said)
		}
		quantities := map[string]bool{}
		for _, h := range s.Report(defaults).Comparison[len(s.Report(defaults).Comparison)-1].Held {
			quantities[h.Quantity] = true
		}
		if !quantities[c.held] || quantities["R"] == (name == "pressure") {
			t.Errorf("%s: held are %v", name, quantities)
		}
	}
}

// What cannot be matched has no numbers, and says so; the note quotes a speed that
// has some.
func TestWhatCannotBeMatchedAtASpeed(t *testing.T) {
	s, f := demoForecast(t, func(c *casefile.Case) { c.Match, c.Speed = "flow", []float64{9, 12, 13} })
	if f.Middle != 0 || math.IsNaN(f.Speeds[0].PulsePressure.Value) {
		t.Fatalf("the middle is %d", f.Middle)
	}
	last := f.Speeds[2]
	if e := last.PulsePressure; !math.IsNaN(e.Value) || e.Identified || e.Why == "" {
		t.Errorf("at 13: %+v", e)
	}
	if _, ok := warned(s, data.CodeNotMatched); !ok {
		t.Error("no warning")
	}
	if text := s.Note().Render(defaults); strings.Contains(text, "NaN") {
		t.Error("NaN in the note")
	}
	_ = parsed(t, s.Report(defaults))
	s = demoWith(t, func(c *casefile.Case) { c.Match, c.Speed, c.Replicates = "flow", []float64{14, 15}, ptr(fewest) })
	if !strings.Contains(s.Forecast.Reason, "--match none") {
		t.Errorf("reason %q", s.Forecast.Reason)
	}
}

// A modulation changes the pulse about that of its mean speed, in the note and in
// the report; one that does not change the speed changes nothing.
func TestModulationOfTheCase(t *testing.T) {
	s, f := demoForecast(t, func(c *casefile.Case) {
		c.Modulation = map[string]string{"shape": "square", "low": "8", "high": "10", "duty": "0.4", "rise_s": "0.04"}
	})
	m := f.Modulated
	if m == nil || m.Locked != 1 || !m.State.Settled || !near(m.State.Speed, 8.8, 0.02) {
		t.Fatalf("%+v", m)
	}
	if !(m.State.PulsePressure.Value > m.Steady.PulsePressure.Value) || !m.State.PulsePressure.Total.Defined() || !near(m.BeatPulse.Value, m.State.PulsePressure.Value, 1e-6) {
		t.Errorf("modulated %+v, constant %+v, beats %+v", m.State.PulsePressure, m.Steady.PulsePressure, m.BeatPulse)
	}
	r := s.Report(defaults)
	if last := r.Supported[len(r.Supported)-1]; last.Posing != support.ModulatedPosing || last.Coupled != nil || r.Comparison[len(r.Comparison)-1].Posing != support.ModulatedPosing || r.Forecast.Modulated == nil {
		t.Errorf("%+v", last)
	}
	if text := s.Note().Render(defaults); !strings.Contains(text, "Posing modulated: square, 8 to 10") || !strings.Contains(text, "SHE, erg/cm3") {
		t.Error("the note has no modulated state")
	}
	_, still := demoForecast(t, func(c *casefile.Case) { c.Modulation = map[string]string{"shape": "sine", "low": "9", "high": "9"} })
	if got, want := still.Modulated.State.PulsePressure, still.Speeds[1].PulsePressure; !near(got.Value, want.Value, 1e-4) || !near(got.Total.High, want.Total.High, 1e-3) {
		t.Errorf("a modulation of nothing: %+v, constant %+v", got, want)
	}
}

// A file is locked where its period comes to whole beats, else free: free it has
// no intervals, and says why.
func TestModulationOfAFile(t *testing.T) {
	for content, locked := range map[string]int{
		"time_s,speed_1000_per_min\n0,8\n0.36,9\n0.72,10\n1.08,9\n": 2,
		"time_s,speed_1000_per_min\n0,8\n0.25,9\n0.5,10\n0.75,9\n":  0,
	} {
		f := demoFolder(t)
		f["speed.csv"] = content
		c := demoCase(t)
		c.Replicates, c.Modulation = ptr(fewest), map[string]string{"file": "speed.csv"}
		s := whole(t, c, f)
		m := s.Forecast.Modulated
		if m.Locked != locked || math.IsNaN(m.State.PulsePressure.Value) || m.State.PulsePressure.Total.Defined() != (locked > 0) {
			t.Errorf("locked to %d beats, want %d: %+v", m.Locked, locked, m.State.PulsePressure)
		}
		if locked == 2 && !(m.State.PulsePressure.Value > m.BeatPulse.Value) {
			t.Errorf("pulse %v over two beats, %v in each", m.State.PulsePressure.Value, m.BeatPulse.Value)
		}
		want := s.Note()
		if got := again(t, want, f); got.Render(defaults) != want.Render(defaults) {
			t.Error("the note cannot be had again")
		}
		_ = parsed(t, s.Report(defaults))
	}
}

// The speeds of a square by hand: 1 s at 1/64 s, high for 0.5, rising in 0.125 s.
func TestSquareByHand(t *testing.T) {
	m := modulation{name: "square", low: 8, high: 10, rise: 0.125, duty: 0.5, locked: 1}
	got, locked, err := m.at(1)
	if err != nil || locked != 1 || len(got.Speeds) != 64 {
		t.Fatal(got, locked, err)
	}
	for i, want := range map[int]float64{0: 8, 4: 9, 8: 10, 32: 10, 36: 9, 40: 8, 63: 8} {
		if math.Abs(got.Speeds[i]-want) > 1e-9 {
			t.Errorf("row %d: %v, want %v", i, got.Speeds[i], want)
		}
	}
	m.phase = 0.25
	if late, _, _ := m.at(1); math.Abs(late.Speeds[20]-9) > 1e-9 || late.Speeds[10] != 8 {
		t.Errorf("late by a quarter: %v", late.Speeds)
	}
}

// One's own pump with the coefficients of a set is that set; its note can be had
// again from its own line, without the case file.
func TestOwnPump(t *testing.T) {
	_, set := demoForecast(t, func(c *casefile.Case) {})
	f := demoFolder(t)
	f["own.afterbeat.toml"] = strings.Replace(f["demo.afterbeat.toml"], "[site]", "speed = [8, 9]\nreplicates = 6\nshare = [0.5]\n\n[pump]\nname = \"bench 7\"\na = 1.05\nb = 0.013\nc = 0.0006\nRc = 0.12\nLc = 0.035\nlowest = 6\nhighest = 12\n\n[site]", 1)
	c, err := casefile.Read("own.afterbeat.toml", []byte(f["own.afterbeat.toml"]))
	if err != nil {
		t.Fatal(err)
	}
	own := whole(t, c, f)
	for i := range set.Speeds {
		if got, want := own.Forecast.Speeds[i].PulsePressure, set.Speeds[i].PulsePressure; got != want {
			t.Errorf("%+v, of the set %+v", got, want)
		}
	}
	note := own.Note()
	if text := note.Render(defaults); !strings.Contains(text, "bench 7 (given in the case)") || !strings.Contains(text, "All numbers are measured") {
		t.Error("the pump is not said to be given")
	}
	if got := again(t, note, f); got.Render(defaults) != note.Render(defaults) {
		t.Error("the note cannot be had again")
	}
	if r := own.Report(defaults).Pump; r.Name != "bench 7" || r.Origin != data.Measured {
		t.Errorf("%+v", r)
	}
	// Over a set, one coefficient; a range of speeds that is not given.
	p, err := pumpOf(casefile.Case{Pump: map[string]string{"set": "generic B", "a": "14"}})
	if err != nil || p.A != 14 || p.C != 0.0042 || !p.Centrifugal || p.origin("a") != data.Measured || p.origin("c") != data.Assumed {
		t.Errorf("%+v, %v", p, err)
	}
	p, err = pumpOf(casefile.Case{Pump: map[string]string{"a": "1.05", "Lc": "0.035", "inlet": "atrium"}})
	if err != nil || p.Low != 6 || p.High != 12 || p.Inlet != support.InletAtrium {
		t.Errorf("%+v, %v", p, err)
	}
}

// A ventricle that is given whole is taken as it is: with what was solved for the
// demo it makes the same native state, and only the load and the filling are
// drawn.
func TestOwnVentricle(t *testing.T) {
	_, solved := demoForecast(t, func(*casefile.Case) {})
	v := map[string]string{}
	for _, p := range solved.Ventricle {
		switch p.Symbol {
		case "Emax", "Emin", "Tes", "Tr", "V0", "Pfill", "Rmv", "Rav":
			v[p.Symbol] = strconv.FormatFloat(p.Value, 'g', -1, 64)
		}
	}
	s, own := demoForecast(t, func(c *casefile.Case) { c.Ventricle = v })
	for i := range own.Speeds {
		got, want := own.Speeds[i].PulsePressure, solved.Speeds[i].PulsePressure
		if !near(got.Value, want.Value, 1e-3) || got.Total.Width() > 1.5*want.Total.Width() {
			t.Errorf("%+v, solved %+v", got, want)
		}
	}
	for _, p := range own.Ventricle {
		if v[p.Symbol] != "" && (p.Origin != data.Measured || !p.Identified) {
			t.Errorf("%s: %+v", p.Symbol, p)
		}
	}
	if text := s.Note().Render(defaults); !strings.Contains(strings.Join(strings.Fields(text), " "), "as given in the case") {
		t.Error("the note does not say that it is given")
	}
	note := s.Note()
	if got := again(t, note, demoFolder(t)); got.Render(defaults) != note.Render(defaults) {
		t.Error("the note cannot be had again")
	}
	// Part of it narrows what is drawn; a leak raises what the pump moves.
	_, leaks := demoForecast(t, func(c *casefile.Case) { c.Ventricle = map[string]string{"Rar": "2", "Pfill": "20"} })
	at := leaks.Speeds[1]
	if !(at.Loop > 1) || !near(leaks.Native.Filling, 20, 1e-6) || !near(leaks.Native.Output.Value, solved.Native.Output.Value, 1e-4) {
		t.Errorf("loop %v, filling %v, output %v", at.Loop, leaks.Native.Filling, leaks.Native.Output.Value)
	}
}

// Choices of the forecast that make no sense name their flag.
func TestForecastChoicesThatMakeNoSense(t *testing.T) {
	table := func(pairs ...string) map[string]string {
		m := map[string]string{}
		for i := 0; i < len(pairs); i += 2 {
			m[pairs[i]] = pairs[i+1]
		}
		return m
	}
	for _, c := range []struct {
		key    string
		change func(*casefile.Case)
	}{
		{"match", func(c *casefile.Case) { c.Match = "volume" }},
		{"hold_resistance", func(c *casefile.Case) { c.HoldResistance = ptr(0.0) }},
		{"quote", func(c *casefile.Case) { c.Quote = ptr(90.0) }},
		{"pump", func(c *casefile.Case) { c.Pump = table("a", "1") }},
		{"pump", func(c *casefile.Case) { c.Pump = table("a", "-1", "Lc", "0.03") }},
		{"pump", func(c *casefile.Case) { c.Pump = table("lowest", "12", "highest", "6") }},
		{"pump.inlet", func(c *casefile.Case) { c.Pump = table("inlet", "aorta") }},
		{"ventricle", func(c *casefile.Case) { c.Ventricle = table("Emax", "1", "Emin", "0.1") }},
		{"ventricle", func(c *casefile.Case) {
			c.Ventricle, c.EDVML = table("activation", "hill", "Emax", "1", "Emin", "0.1"), ptr(200.0)
		}},
		{"ventricle", func(c *casefile.Case) { c.Ventricle = table("Emax", "1", "Emin", "0.1", "Tes", "0.5", "Tr", "0.5") }},
		{"ventricle.Pfill", func(c *casefile.Case) { c.Ventricle = table("Pfill", "0") }},
		{"ventricle.activation", func(c *casefile.Case) { c.Ventricle = table("activation", "hill") }},
		{"modulation.shape", func(c *casefile.Case) { c.Modulation = table("low", "8", "high", "9") }},
		{"modulation", func(c *casefile.Case) { c.Modulation = table("shape", "sine", "low", "9", "high", "8") }},
		{"modulation.locked", func(c *casefile.Case) {
			c.Modulation = table("shape", "sine", "low", "8", "high", "9", "locked", "1.5")
		}},
		{"modulation.period_s", func(c *casefile.Case) { c.Modulation = table("shape", "sine", "low", "8", "high", "9", "locked", "0") }},
		{"modulation.rise_s", func(c *casefile.Case) {
			c.Modulation = table("shape", "square", "low", "8", "high", "9", "rise_s", "0.7")
		}},
		{"modulation", func(c *casefile.Case) {
			c.Modulation, c.Match = table("shape", "sine", "low", "8", "high", "9", "locked", "0", "period_s", "1"), "flow"
		}},
	} {
		choices := demoCase(t)
		choices.Replicates = ptr(fewest)
		c.change(&choices)
		_, err := try(choices, demoFolder(t), StageDone)
		var e *ChoiceError
		if !errors.As(err, &e) || e.Key != c.key || e.Hint == "" {
			t.Errorf("%s: error %v", c.key, err)
		}
	}
}
