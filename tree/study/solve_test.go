package study

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"afterbeat/data"
)

// solved evaluates a spec on a period of flow in n samples.
func solved(t *testing.T, spec string, period float64, n int, flow func(float64) float64) LoadReport {
	t.Helper()
	s, err := trySolve(spec, folder{"flow.csv": table(float64(n)/period, n, column{"flow_mL_s", flow})})
	if err != nil {
		t.Fatal(err)
	}
	return s.Report()
}

func trySolve(text string, f folder) (SolvedLoad, error) {
	spec, err := ReadLoadSpec("spec.toml", []byte(text))
	if err != nil {
		return SolvedLoad{}, err
	}
	return SolveLoad("spec.toml", spec, f.read)
}

const halfSpec = "R = 1.0\nC = 1.5\ninflow = \"flow.csv\"\n"

// The worked example in closed form (the reference values, 1.4 example 2 and
// 5.1). Means are exact; extremes and energies of a half-sine in 8000 samples
// come near the closed form as 1/N², those of pressure also by where the samples
// lie.
func TestSolveLoadOfTheHalfSine(t *testing.T) {
	wk3 := solved(t, "model = \"wk3\"\nZc = 0.05\n"+halfSpec, halfT, 8000, halfFlow)
	wk2 := solved(t, "model = \"wk2\"\n"+halfSpec, halfT, 8000, halfFlow)
	for name, c := range map[string]struct {
		got          Number
		want, within float64
	}{
		"wk3 mean":           {wk3.Mean, 91.875, 1e-6},
		"wk3 max":            {wk3.Max, 113.636082132, 1e-6},
		"wk3 min":            {wk3.Min, 73.265898894, 1e-6},
		"wk3 pulse pressure": {wk3.PulsePressure, 40.3701832, 1e-6},
		"wk3 EEP":            {wk3.EEP, 102.9592, 1e-6},
		"wk3 SHE":            {wk3.SHE, 14777.78, 1e-6},
		"wk3 power in":       {wk3.Energy.Input, 102.9592 * 87.5, 1e-6},
		"wk3 steady power":   {wk3.Energy.Steady, 91.875 * 87.5, 1e-6},
		"wk3 pulsatile":      {wk3.Energy.Pulsatile, (102.9592 - 91.875) * 87.5, 1e-5},
		"wk3 power balance":  {wk3.Energy.Input - wk3.Energy.Steady, float64(wk3.Energy.Pulsatile), 1e-9},
		"wk2 mean":           {wk2.Mean, 87.5, 1e-6},
		"wk2 max":            {wk2.Max, 103.175974691, 1e-6},
		"wk2 min":            {wk2.Min, 72.802104891, 1e-6},
		"wk2 pulse pressure": {wk2.PulsePressure, 30.3738698, 1e-6},
	} {
		if !near(float64(c.got), c.want, c.within) {
			t.Errorf("%s: %v, want %v", name, c.got, c.want)
		}
	}
	if len(wk3.Pressure) != 8000 || !near(float64(wk3.Pressure[0]), 73.265898894, 1e-5) || wk3.Posing != nil || wk3.States != nil {
		t.Errorf("%d samples from %v, posing %v", len(wk3.Pressure), wk3.Pressure[0], wk3.Posing)
	}
}

// Pure waves on a pure resistor, P = 93 + 20 sin and Q = 90 + 80 sin in phase, and
// the ripple of a pump on the example's load: the reference values, 5.1.
func TestSolveLoadOfWaves(t *testing.T) {
	wave := func(mean, amplitude, frequency float64) func(float64) float64 {
		return func(at float64) float64 { return mean + amplitude*math.Sin(2*math.Pi*frequency*at) }
	}
	r := solved(t, "model = \"wk2\"\nR = 0.25\nC = 0\nPv = 70.5\ninflow = \"flow.csv\"", 1, 1000, wave(90, 80, 1))
	if !near(float64(r.EEP), 101.8889, 1e-6) || !near(float64(r.SHE), 11850.879, 1e-6) || !near(float64(r.Mean), 93, 1e-9) || !near(float64(r.PulsePressure), 40, 1e-9) {
		t.Errorf("in phase: EEP %v, SHE %v, mean %v, pulse %v", r.EEP, r.SHE, r.Mean, r.PulsePressure)
	}
	for _, c := range []struct{ frequency, pulse, she float64 }{{1.25, 4.07311, 174.168}, {0.5, 8.93535, 283.683}, {1. / 3, 12.88098, 432.726}} {
		r := solved(t, "model = \"wk3\"\nZc = 0.05\n"+halfSpec, 1/c.frequency, 3000, wave(87.5, 20, c.frequency))
		if !near(float64(r.PulsePressure), c.pulse, 2e-6) || !near(float64(r.SHE), c.she, 2e-6) {
			t.Errorf("ripple at %v Hz: pulse %v, SHE %v; want %v, %v", c.frequency, r.PulsePressure, r.SHE, c.pulse, c.she)
		}
	}
	// A steady flow has a steady pressure, and no surplus energy.
	r = solved(t, "model = \"wk3\"\nZc = 0.05\nPv = 8\n"+halfSpec, 1, 100, steady(80))
	if !near(float64(r.Mean), 92, 1e-12) || math.Abs(float64(r.PulsePressure)) > 1e-9 || math.Abs(float64(r.SHE)) > 1e-6 {
		t.Errorf("steady: %+v", r.LoadState)
	}
}

// Late-valve on the worked example leaves 0.586, 0.338 and 0.164 of pulse
// pressure (an independent computation; the design asks for these), scaled 1-s
// by construction. Each share that is asked for has its state, 0 too.
func TestSolveLoadPosings(t *testing.T) {
	text := "model = \"wk3\"\nZc = 0.05\n" + halfSpec + "shares = [0, 0.5, 0.75, 0.9, 1]\nposing = "
	for posing, want := range map[string][5]float64{
		"late-valve": {1, 0.586, 0.338, 0.164, 0},
		"scaled":     {1, 0.5, 0.25, 0.1, 0},
	} {
		r := solved(t, text+fmt.Sprintf("%q", posing), halfT, 4000, halfFlow)
		if r.Posing == nil || string(*r.Posing) != posing || len(r.States) != 5 {
			t.Fatalf("%s: %v, %d states", posing, r.Posing, len(r.States))
		}
		for i, state := range r.States {
			share := float64(state.Share)
			if math.Abs(float64(state.RetainedPulse.Pressure)-want[i]) > 6e-4 {
				t.Errorf("%s, share %v: retained pulse %v, want %v", posing, share, state.RetainedPulse.Pressure, want[i])
			}
			if posing == "scaled" && (!state.ByConstruction || math.Abs(float64(state.RetainedPulse.Flow)-(1-share)) > 1e-9) {
				t.Errorf("%s, share %v: by construction %v, flow %v", posing, share, state.ByConstruction, state.RetainedPulse.Flow)
			}
			if posing == "late-valve" && state.ByConstruction {
				t.Error("late-valve is called an identity")
			}
			if !near(float64(state.Mean), 91.875, 1e-6) {
				t.Errorf("%s, share %v: mean pressure %v", posing, share, state.Mean)
			}
		}
		if first := r.States[0]; first.PulsePressure != r.PulsePressure || !near(float64(first.SHE), float64(r.SHE), 1e-9) {
			t.Errorf("%s: the state of share 0 is not the native one: %v, %v", posing, first.PulsePressure, r.PulsePressure)
		}
	}
	if r := solved(t, "model = \"wk2\"\nposing = \"scaled\"\n"+halfSpec, halfT, 400, halfFlow); len(r.States) != 11 {
		t.Errorf("%d states where no share is asked for", len(r.States))
	}
}

// Errors name the file and, where it is known, the line.
func TestSolveLoadErrors(t *testing.T) {
	const head = "model = \"wk3\"\n"
	even := folder{"flow.csv": table(100, 80, column{"flow_mL_s", halfFlow})}
	for _, c := range []struct {
		text, want string
		files      folder
	}{
		{"", `spec.toml: model "" is none of wk2, wk3`, nil},
		{"model = \"wk9\"", `spec.toml: model "wk9" is none of wk2, wk3`, nil},
		{head + "Q = 1", `spec.toml:2: unknown key "Q"`, nil},
		{head + "R = \"one\"", "spec.toml:2: ", nil},
		{head + "R 1", "spec.toml:2: ", nil},
		{head + "R = 1\nC = 1", "spec.toml: Zc is missing: wk3 needs it", nil},
		{head + "R = -1\nC = 1\nZc = 0", "spec.toml: R = -1 is not a number of 0 or more", nil},
		{head + "R = 1\nC = nan\nZc = 0", "spec.toml: C = NaN is not", nil},
		{head + "R = inf\nC = 1\nZc = 0", "spec.toml: R = +Inf is not", nil},
		{head + "R = 1\nC = 1\nZc = 0\nL = 1", "spec.toml: L was given, but wk3 has none", nil},
		{head + "R = 1\nC = 1\nZc = 0\nPv = nan", "spec.toml: Pv = NaN is not a number", nil},
		{head + "R = 1\nC = 1\nZc = 0", "spec.toml: inflow is missing", nil},
		{head + "R = 1\nC = 1\nZc = 0\ninflow = \"none.csv\"", "none.csv: cannot be read", even},
		{head + "R = 1\nC = 1\nZc = 0\ninflow = \"flow.csv\"\nshares = [0.5]", "spec.toml: shares without a posing", even},
		{head + "R = 1\nC = 1\nZc = 0\ninflow = \"flow.csv\"\nposing = \"odd\"", "spec.toml: ", even},
		{head + "R = 1\nC = 1\nZc = 0\ninflow = \"flow.csv\"\nposing = \"scaled\"\nshares = [2]", "spec.toml: ", even},
		{head + "R = 1\nC = 1\nZc = 0\ninflow = \"flow.csv\"", "flow.csv:1: no flow column", folder{"flow.csv": "time_s,p_mmHg\n0,1\n1,2\n"}},
		{head + "R = 1\nC = 1\nZc = 0\ninflow = \"flow.csv\"", "flow.csv: the flow has missing samples", folder{"flow.csv": "time_s,flow_mL_s\n0,1\n1,\n2,3\n"}},
		{head + "R = 1\nC = 1\nZc = 0\ninflow = \"flow.csv\"", "flow.csv: the steps of time_s are not even", folder{"flow.csv": "time_s,flow_mL_s\n0,1\n1,2\n2,1\n2.5,1\n"}},
		{head + "R = 1\nC = 1\nZc = 0\ninflow = \"flow.csv\"", "flow.csv:3: flow_mL_s is not a number", folder{"flow.csv": "time_s,flow_mL_s\n0,1\n1,x\n"}},
	} {
		_, err := trySolve(c.text, c.files)
		var e *data.FileError
		if !errors.As(err, &e) || !strings.HasPrefix(err.Error(), c.want) || len(err.Error()) == len(c.want) && strings.HasSuffix(c.want, ": ") {
			t.Errorf("%q: %v, want %s", c.text, err, c.want)
		}
	}
}

// A person reads the same numbers, with units, and what was given.
func TestSolveLoadNote(t *testing.T) {
	s, err := trySolve("model = \"wk3\"\nZc = 0.05\nPv = 5\nposing = \"late-valve\"\nshares = [0.5]\n"+halfSpec, folder{"flow.csv": table(1000, 800, column{"flow_mL_s", halfFlow})})
	if err != nil {
		t.Fatal(err)
	}
	note := s.Note().Render(defaults)
	for _, want := range []string{"model", "wk3", "96.874 mmHg", "0.05 mmHg s/mL", "0.586", "late-valve", "afterbeat solve load spec.toml"} {
		if !strings.Contains(note, want) {
			t.Errorf("the note lacks %q:\n%s", want, note)
		}
	}
}
