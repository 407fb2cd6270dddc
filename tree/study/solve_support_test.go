package study

import (
	"encoding/json"
	"errors"
	"maps"
	"math"
	"slices"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"afterbeat/data"
	"afterbeat/data/casenote"
)

const failingHeart = `
[ventricle]
period_s = 0.8
activation = "hill"
Emax = 0.62
Emin = 0.1
V0 = 10
Pfill = 20
Rmv = 0.01
Rav = 0.005
filling_slope = 0.46
`

const givenLoad = `
[load]
model = "wk3"
R = 1.2
C = 1.3
Zc = 0.05
Pv = 5
`

const axialPump = `
[pump]
a = 1.05
b = 0.013
c = 0.0006
Rc = 0.12
Lc = 0.035
`

const threeSpeeds = "time_s,speed_1000_per_min\n0,8\n0.2,9\n0.4,10\n0.6,9\n"

func solveSupport(t *testing.T, spec string) (SolvedSupport, error) {
	t.Helper()
	s, err := ReadSupportSpec("spec.toml", []byte(spec))
	if err != nil {
		return SolvedSupport{}, err
	}
	return SolveSupport("spec.toml", s, func(name string) ([]byte, error) {
		if name != "speed.csv" {
			return nil, &data.FileError{File: name, What: "cannot be read"}
		}
		return []byte(threeSpeeds), nil
	})
}

// keys lists the keys of a JSON value, those within it after a point.
func keys(v any) []string {
	var all []string
	switch v := v.(type) {
	case map[string]any:
		for _, k := range slices.Sorted(maps.Keys(v)) {
			all = append(all, k)
			for _, in := range keys(v[k]) {
				all = append(all, k+"."+in)
			}
		}
	case []any:
		if len(v) > 0 {
			all = keys(v[0])
		}
	}
	return all
}

// The report has the keys that other programs read, and no others.
func TestKeysOfTheSupportReport(t *testing.T) {
	s, err := solveSupport(t, "speeds = [0, 9]\nstep = {from = 8, to = 9.5, beats = 3}\nmodulation = \"speed.csv\"\nlocked = 1\n"+failingHeart+givenLoad+axialPump)
	if err != nil {
		t.Fatal(err)
	}
	text, err := json.Marshal(s.Report())
	if err != nil {
		t.Fatal(err)
	}
	var got map[string]any
	if err := json.Unmarshal(text, &got); err != nil {
		t.Fatal(err)
	}
	want := strings.Fields(`caution
		modulated modulated.arterial modulated.arterial.max modulated.arterial.mean modulated.arterial.min
		modulated.eep modulated.filling_pressure modulated.pulse_pressure modulated.pulse_pressure_beat_mean
		modulated.pump_flow modulated.pump_flow.max modulated.pump_flow.mean modulated.pump_flow.min
		modulated.settled modulated.she modulated.window_s
		program program.name program.version
		speeds speeds.arterial speeds.arterial.max speeds.arterial.mean speeds.arterial.min
		speeds.back_flow speeds.beats speeds.eep
		speeds.energy speeds.energy.R speeds.energy.Zc speeds.energy.aortic speeds.energy.balance speeds.energy.cannula
		speeds.energy.filling speeds.energy.mitral speeds.energy.outflow speeds.energy.pump speeds.energy.ventricle
		speeds.filling_pressure speeds.pump_flow speeds.pump_flow.max speeds.pump_flow.mean speeds.pump_flow.min
		speeds.rounds speeds.settled speeds.she speeds.speed speeds.stroke_work speeds.suction
		speeds.valve_flow speeds.valve_flow.max speeds.valve_flow.mean speeds.valve_flow.open_s speeds.valve_flow.opened
		speeds.volume speeds.volume.max speeds.volume.min
		step step.arterial_mean step.beat_end_s step.filling_pressure step.total_flow_mean
		warnings warnings.channel warnings.code warnings.cure warnings.text`)
	if d := cmp.Diff(want, keys(got)); d != "" {
		t.Error(d)
	}
	if n := len(got["step"].(map[string]any)["beat_end_s"].([]any)); n != 3 {
		t.Errorf("%d beats after the step", n)
	}
}

// Energies and flows of the report are those of the beat: sources less sinks is
// the balance, and the mean pressure is Pv + (R + Zc) mean Q.
func TestNumbersOfTheSupportReport(t *testing.T) {
	s, err := solveSupport(t, "speeds = [0, 7, 9]\n"+failingHeart+givenLoad+axialPump)
	if err != nil {
		t.Fatal(err)
	}
	for _, r := range s.Report().Speeds {
		e := r.Energy
		sources := e.Filling + e.Ventricle + e.Pump
		sinks := e.Mitral + e.Aortic + e.Cannula + e.Zc + e.R + e.Outflow
		if balance := float64((sources - sinks) / sinks); math.Abs(balance) > 1e-7 || math.Abs(balance-float64(e.Balance)) > 1e-12 {
			t.Errorf("speed %v: balance %v, in the report %v", r.Speed, balance, e.Balance)
		}
		flow := r.PumpFlow.Mean + r.ValveFlow.Mean
		if d := float64(r.Arterial.Mean - 5 - 1.25*flow); math.Abs(d) > 1e-4 {
			t.Errorf("speed %v: mean pressure is off by %v", r.Speed, d)
		}
		if d := float64(e.Ventricle - r.StrokeWork); d != 0 {
			t.Errorf("speed %v: stroke work %v, ventricle %v", r.Speed, r.StrokeWork, e.Ventricle)
		}
		if d := float64(e.Outflow - 5*flow*0.8); math.Abs(d) > 1e-3 {
			t.Errorf("speed %v: outflow %v", r.Speed, e.Outflow)
		}
		if !r.Settled || r.Rounds != 0 || r.Beats < 1 {
			t.Errorf("speed %v: settled %v, rounds %v, beats %v", r.Speed, r.Settled, r.Rounds, r.Beats)
		}
	}
}

// A valve that leaks and an inlet in the atrium are given in their tables; what
// the pump moves is then told apart from what reaches the body.
func TestLeakAndInletOfTheSpec(t *testing.T) {
	s, err := solveSupport(t, "speeds = [0, 9]\n"+failingHeart+"Rar = 1.5\n"+givenLoad+axialPump+"inlet = \"atrium\"\n")
	if err != nil {
		t.Fatal(err)
	}
	for _, r := range s.Report().Speeds {
		if r.Systemic == nil || r.Loop == nil || !(*r.Loop > 1) {
			t.Fatalf("speed %v: systemic flow %v, loop flow %v", r.Speed, r.Systemic, r.Loop)
		}
		if d := float64(r.Arterial.Mean - 5 - 1.25**r.Systemic); math.Abs(d) > 1e-4 {
			t.Errorf("speed %v: mean pressure is off by %v", r.Speed, d)
		}
		if math.Abs(float64(r.Energy.Balance)) > 1e-7 {
			t.Errorf("speed %v: balance %v", r.Speed, r.Energy.Balance)
		}
	}
	text := s.Note().Render(casenote.Options{})
	for _, want := range []string{"Rar, backwards", "pump draws from", "atrium", "does not reach the body"} {
		if !strings.Contains(strings.Join(strings.Fields(text), " "), want) {
			t.Errorf("no %q in the note", want)
		}
	}
	for spec, want := range map[string]string{
		failingHeart + "Rar = -1\n" + givenLoad + axialPump:          "Rar = -1",
		failingHeart + givenLoad + axialPump + "inlet = \"aorta\"\n": "none of ventricle, atrium",
	} {
		if _, err := solveSupport(t, "speeds = [9]\n"+spec); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("error %v, want %q", err, want)
		}
	}
}

// The filling line passes through the native state unless its flow is given.
func TestFillingOfTheSpec(t *testing.T) {
	native, err := solveSupport(t, "speeds = [0]\n"+failingHeart+givenLoad)
	if err != nil {
		t.Fatal(err)
	}
	if got := float64(native.Report().Speeds[0].Filling); math.Abs(got-20) > 1e-6 {
		t.Errorf("native filling pressure %v", got)
	}
	given, err := solveSupport(t, "speeds = [0]\n"+failingHeart+"filling_flow = 40\n"+givenLoad)
	if err != nil {
		t.Fatal(err)
	}
	r := given.Report().Speeds[0]
	if got, want := float64(r.Filling), 20-0.46*(float64(r.ValveFlow.Mean)-40); math.Abs(got-want) > 1e-6 || got > 19 {
		t.Errorf("filling pressure %v, the line says %v", got, want)
	}
}

// The lag of the filling pressure may stand at the top or with the ventricle.
func TestFillingLagOfTheSpec(t *testing.T) {
	const step = "step = {from = 8, to = 9, beats = 2}\n"
	var answers []Number
	for _, spec := range []string{
		step + failingHeart + givenLoad + axialPump,
		step + "filling_lag_s = 5\n" + failingHeart + givenLoad + axialPump,
		step + failingHeart + "filling_lag_s = 5\n" + givenLoad + axialPump,
		step + "filling_lag_s = 50\n" + failingHeart + givenLoad + axialPump,
	} {
		s, err := solveSupport(t, spec)
		if err != nil {
			t.Fatal(err)
		}
		answers = append(answers, s.Report().Step.Filling[1])
	}
	if answers[0] != answers[1] || answers[0] != answers[2] || answers[0] == answers[3] {
		t.Errorf("filling pressures %v", answers)
	}
}

func TestSupportNote(t *testing.T) {
	s, err := solveSupport(t, "speeds = [0, 9]\nstep = {from = 8, to = 9.5, beats = 12}\nmodulation = \"speed.csv\"\nlocked = 0\n"+failingHeart+givenLoad+axialPump)
	if err != nil {
		t.Fatal(err)
	}
	text := s.Note().Render(casenote.Options{})
	for _, want := range []string{
		casenote.Caution, "filling flow", "Periodic state at each speed", "Step of speed from 8 to 9.5", "free, over a long window",
		"Not modelled", "afterbeat solve support spec.toml", "valve-shut",
	} {
		if !strings.Contains(text, want) {
			t.Errorf("no %q in the note", want)
		}
	}
	for _, line := range strings.Split(text, "\n") {
		if len([]rune(line)) > 80 {
			t.Errorf("a line of %d: %s", len([]rune(line)), line)
		}
	}
}

func TestWhatIsNoSupportSpec(t *testing.T) {
	for _, c := range []struct {
		spec, says string
		line       int
	}{
		{"speeds = [0]\n" + givenLoad, "[ventricle] is missing", 0},
		{"speeds = [0]\n" + failingHeart, "[load] is missing", 0},
		{"speeds = [0]\n[ventricle]\nperiod_s = 0.8\n", "Emax is missing", 2},
		{"speeds = [0]\n" + strings.Replace(failingHeart, "activation = \"hill\"\n", "", 1) + givenLoad, "activation is missing", 3},
		{"speeds = [0]\n" + strings.Replace(failingHeart, "hill", "sine", 1) + givenLoad, "none of", 5},
		{"speeds = [0]\n" + failingHeart + "Tes = 0.3\n" + givenLoad, "do not go with it", 5},
		{"speeds = [0]\n" + strings.Replace(failingHeart, "Emin = 0.1", "Emin = nan", 1) + givenLoad, "Emin = NaN", 7},
		{"speeds = [0]\n" + strings.Replace(failingHeart, "Pfill = 20", "Pfill = -1", 1) + givenLoad, "Pfill = -1", 9},
		{"speeds = [0]\n" + failingHeart + strings.Replace(givenLoad, "wk3", "wk9", 1), "is none of", 15},
		{"speeds = [0]\n" + failingHeart + strings.Replace(givenLoad, "wk3", "wk4s", 1), "L is missing", 14},
		{"speeds = [0]\n" + failingHeart + strings.Replace(givenLoad, "wk3", "wk2", 1), "Zc was given", 18},
		{"speeds = [0]\n" + failingHeart + strings.Replace(givenLoad, "R = 1.2", "R = 0", 1), "R = 0", 16},
		{"speeds = [9]\n" + failingHeart + givenLoad + "[pump]\na = 1\n", "Lc is missing", 20},
		{"speeds = [9]\n" + failingHeart + givenLoad + "[pump]\na = -1\nLc = 0.1\n", "a = -1", 21},
		{"speeds = [-9]\n" + failingHeart + givenLoad + axialPump, "speed -9", 1},
		{"step = {from = 8, to = 9, beats = 2}\n" + failingHeart + givenLoad, "[pump] is missing", 0},
		{"step = {from = 8, to = 9}\n" + failingHeart + givenLoad + axialPump, "needs from, to and beats", 1},
		{"step = {from = 8, to = 9, beats = 0}\n" + failingHeart + givenLoad + axialPump, "none to follow", 1},
		{"speeds = [0]\nlocked = 1\n" + failingHeart + givenLoad, "there is none", 2},
		{"modulation = \"speed.csv\"\n" + failingHeart + givenLoad + axialPump, "needs locked", 1},
		{"modulation = \"gone.csv\"\nlocked = 1\n" + failingHeart + givenLoad + axialPump, "cannot be read", 0},
		{"speeds = [0]\nfilling_lag_s = 0\n" + failingHeart + givenLoad, "filling_lag_s = 0", 2},
		{"speeds = [0]\nfilling_lag_s = 3\n" + failingHeart + "filling_lag_s = 4\n" + givenLoad, "given twice", 2},
		{"speeds = [0]\nviscosity_poise = 0.03\n" + failingHeart + givenLoad, "goes with a tree", 2},
		{"speeds = [0]\ntree = \"gone.csv\"\n" + failingHeart, "cannot be read", 0},
		{"speeds = [0]\ntree = \"gone.csv\"\n" + failingHeart + givenLoad, "one of them", 15},
		{"speeds = [0]\ntree = \"gone.csv\"\ndensity_g_mL = -1\n" + failingHeart, "density_g_mL = -1", 3},
		{"tree = \"gone.csv\"\nmodulation = \"m.csv\"\n" + failingHeart, "modulation on a tree", 2},
		{"tree = \"gone.csv\"\n" + failingHeart, "nothing is asked for", 0},
		{"speeds = 0\n", "wrong kind", 1},
		{"speeds = [0\n", "", 0},
	} {
		_, err := solveSupport(t, c.spec)
		var file *data.FileError
		if !errors.As(err, &file) || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%q: error %v, want one that says %q", c.spec, err, c.says)
			continue
		}
		if c.line > 0 && file.Line != c.line {
			t.Errorf("%v: line %d, want %d", err, file.Line, c.line)
		}
	}
}

func TestReadModulation(t *testing.T) {
	m, err := ReadModulation("speed.csv", []byte(threeSpeeds))
	if err != nil {
		t.Fatal(err)
	}
	if d := cmp.Diff([]float64{8, 9, 10, 9}, m.Speeds); d != "" || math.Abs(m.Period()-0.8) > 1e-12 {
		t.Errorf("period %v, speeds %v", m.Period(), m.Speeds)
	}
	for _, c := range []struct {
		content, says string
	}{
		{"", "speed.csv:1: no header"},
		{"time_s,speed\n0,1\n1,2\n", "speed.csv:1: the columns are not"},
		{"time_s,speed_1000_per_min\n0,8\n", "speed.csv:2: one period"},
		{"time_s,speed_1000_per_min\n0,8\n1,fast\n", "speed.csv:3: speed_1000_per_min is not a number"},
		{"time_s,speed_1000_per_min\n0,8\n1,NaN\n", "speed.csv:3: speed_1000_per_min is not a number"},
		{"time_s,speed_1000_per_min\n0,8\n0,9\n", "speed.csv:2: the steps of time_s are not even"},
		{"time_s,speed_1000_per_min\n0,8\n1,9,4\n", "speed.csv:3: "},
	} {
		if _, err := ReadModulation("speed.csv", []byte(c.content)); err == nil || !strings.HasPrefix(err.Error(), c.says) {
			t.Errorf("%q: error %v, want %q", c.content, err, c.says)
		}
	}
}

func FuzzReadModulation(f *testing.F) {
	f.Add([]byte(threeSpeeds))
	f.Add([]byte("\ufefftime_s, speed_1000_per_min\n\"0\",8\n1,9\n"))
	f.Fuzz(func(t *testing.T, content []byte) {
		m, err := ReadModulation("speed.csv", content)
		var file *data.FileError
		if err != nil && !errors.As(err, &file) {
			t.Errorf("error %v is none of a file", err)
		}
		if err == nil && (len(m.Speeds) < 2 || !(m.Step > 0)) {
			t.Errorf("%v passed", m)
		}
	})
}

func FuzzReadSupportSpec(f *testing.F) {
	f.Add([]byte("speeds = [0, 9]\n" + failingHeart + givenLoad + axialPump))
	f.Add([]byte("tree = \"a.csv\"\n[ventricle]\n"))
	f.Fuzz(func(t *testing.T, content []byte) {
		s, err := ReadSupportSpec("spec.toml", content)
		if err == nil {
			_, err = s.Coupling()
		}
		var file *data.FileError
		if err != nil && !errors.As(err, &file) {
			t.Errorf("error %v is none of a file", err)
		}
	})
}
