package study

import (
	"encoding/json"
	"math"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casenote"
)

const pairOfBeds = "id,parent,name,length_cm,radius_cm,wave_speed_m_s,r1,c,r2\n" +
	"a,,Aorta,40,1.2,5.5,,,\nb,a,Upper,20,0.5,7,,0.3,3\nc,a,Lower,50,0.6,8,,0.5,1.5\n"

func supportOnTree(t *testing.T, spec, table string) (SolvedSupport, error) {
	t.Helper()
	s, err := ReadSupportSpec("spec.toml", []byte("tree = \"tree.csv\"\noutflow_pressure_mmHg = 5\n"+spec+failingHeart+axialPump))
	if err != nil {
		t.Fatal(err)
	}
	return SolveSupport("spec.toml", s, func(string) ([]byte, error) { return []byte(table), nil })
}

// A state on a tree says so in rounds, segments and energies; what flows through
// the segments is what heart and pump give, and the filling line holds.
func TestSolveSupportOnATree(t *testing.T) {
	s, err := supportOnTree(t, "speeds = [0, 9]\nstep = {from = 9, to = 9, beats = 2}\n", pairOfBeds)
	if err != nil {
		t.Fatal(err)
	}
	r := s.Report()
	native := r.Speeds[0]
	flow := float64(native.PumpFlow.Mean + native.ValveFlow.Mean)
	for i, speed := range r.Speeds {
		q := float64(speed.PumpFlow.Mean + speed.ValveFlow.Mean)
		if speed.Rounds < 2 || !speed.Settled || math.Abs(float64(speed.Energy.Balance)) > 1e-6 {
			t.Errorf("speed %v: %d rounds, settled %v, balance %v", speed.Speed, speed.Rounds, speed.Settled, speed.Energy.Balance)
		}
		if len(speed.Segments) != 3 || !near(float64(speed.Segments[0].Inlet.Flow.Mean), q, 1e-6) {
			t.Errorf("speed %v: %d segments, %v mL/s of %v", speed.Speed, len(speed.Segments), speed.Segments[0].Inlet.Flow.Mean, q)
		}
		if d := float64(speed.Segments[0].Inlet.Pressure.Max - speed.Arterial.Max); math.Abs(d) > 0.05 {
			t.Errorf("speed %v: the tree's pressure rises %v mmHg above the root's", speed.Speed, d)
		}
		// Pfill on the line through the native state: 20 - 0.46 (Q - Q0).
		if want := 20 - 0.46*(q-flow); math.Abs(float64(speed.Filling)-want) > 1e-3 {
			t.Errorf("state %d: filling pressure %v, on the line %v", i, speed.Filling, want)
		}
	}
	if d := float64(r.Step.Arterial[1] - r.Speeds[1].Arterial.Mean); math.Abs(d) > 0.01 {
		t.Errorf("a step of nothing ends %v mmHg away", d)
	}
	text, err := json.Marshal(r)
	if err != nil {
		t.Fatal(err)
	}
	for _, want := range []string{`"segments":`, `"terminal_r1":`, `"terminal_r2":`, `"rounds":`} {
		if !strings.Contains(string(text), want) {
			t.Errorf("the report has no %s", want)
		}
	}
	if strings.Contains(string(text), `"Zc":`) {
		t.Error("the report has Zc of a tree")
	}
	note := Text(s.Note(), casenote.Options{ASCII: true})
	for _, want := range []string{"tree.csv", "segments,", "rho c/A of its root"} {
		if !strings.Contains(note, want) {
			t.Errorf("the note does not say %q", want)
		}
	}
}

func TestSolveSupportNamesTheTree(t *testing.T) {
	for table, want := range map[string]string{
		strings.Replace(pairOfBeds, "b,a,", "b,x,", 1):                    `tree.csv:3: segment "b": its parent "x" is not in the table`,
		strings.ReplaceAll(pairOfBeds, "1.5\n", "inf\n"):                  "",
		"id,parent,length_cm,radius_cm,wave_speed_m_s,r2\na,,1,1,5,inf\n": "spec.toml: a tree whose resistance is +Inf",
	} {
		_, err := supportOnTree(t, "speeds = [9]\n", table)
		if want == "" {
			if err != nil {
				t.Errorf("one closed way is refused: %v", err)
			}
			continue
		}
		if err == nil || !strings.HasPrefix(err.Error(), want) {
			t.Errorf("error %v, want %s", err, want)
		}
		if _, ok := err.(*data.FileError); !ok {
			t.Errorf("%T is no FileError", err)
		}
	}
}
