package study

import (
	"encoding/json"
	"math"
	"strings"
	"testing"

	"afterbeat/data/casenote"
)

// solvedTree evaluates a spec on the worked example's flow.
func solvedTree(t *testing.T, spec, table string, flow func(float64) float64) SolvedTree {
	t.Helper()
	f := folder{"tree.csv": table, "flow.csv": halfTable(flow)}
	s, err := ReadTreeSpec("spec.toml", []byte("table = \"tree.csv\"\ninflow = \"flow.csv\"\n"+spec))
	if err != nil {
		t.Fatal(err)
	}
	out, err := SolveTree("spec.toml", s, f.read)
	if err != nil {
		t.Fatal(err)
	}
	return out
}

func halfTable(flow func(float64) float64) string {
	return table(200, 160, column{"flow_mL_s", flow})
}

// A tube of no length before R1 = Zc, R2 = R and C is the lumped load of the worked
// example: closed form of its pressure, energies and indices (the reference
// values, 1.4 example 2 and 9), with 160 samples good to 3e-4.
func TestSolveTreeOfALumpedLoad(t *testing.T) {
	s := solvedTree(t, "viscosity_poise = 0\nsteady = true\n", "id,parent,length_cm,radius_cm,wave_speed_m_s,r1,c,r2\na,,1e-6,1,1000,0.05,1.5,1\n", halfFlow)
	r := s.Report()
	inlet := r.Segments[0].Inlet
	for name, c := range map[string]struct {
		got          Number
		want, within float64
	}{
		"resistance":  {r.DCResistance, 1.05, 1e-9},
		"mean":        {inlet.Pressure.Mean, 91.875, 3e-4},
		"max":         {inlet.Pressure.Max, 113.636082132, 3e-4},
		"min":         {inlet.Pressure.Min, 73.265898894, 1e-3},
		"input":       {r.Energy.Input, 1.201093 / 1.33322387415e-4, 1e-3},
		"steady":      {r.Energy.Steady.Input, 1.071787 / 1.33322387415e-4, 1e-3},
		"pulsatile":   {r.Energy.Pulsatile.Input, 0.129306 / 1.33322387415e-4, 1e-3},
		"steady flow": {r.Steady.Energy.Input, 91.875 * 87.5, 1e-3},
		"R2, steady":  {r.Steady.Energy.R2, 87.5 * 87.5, 1e-3},
	} {
		if !near(float64(c.got), c.want, c.within) {
			t.Errorf("%s: %v, want %v", name, c.got, c.want)
		}
	}
	if math.Abs(float64(r.Energy.Balance)) > 1e-9 || len(r.Warnings) > 0 {
		t.Errorf("balance %v, warnings %v", r.Energy.Balance, r.Warnings)
	}
	sum := r.Energy.Pulsatile.Segments + r.Energy.Pulsatile.R1 + r.Energy.Pulsatile.R2 + r.Energy.Pulsatile.Outflow
	if !near(float64(sum), float64(r.Energy.Pulsatile.Input), 1e-9) {
		t.Errorf("pulsatile parts add to %v of %v", sum, r.Energy.Pulsatile.Input)
	}
}

// The agreed keys, in the order of the table.
func TestSolveTreeKeys(t *testing.T) {
	s := solvedTree(t, "harmonics = 7\nsteady = true\nresponse = true\n",
		"id,parent,name,length_cm,radius_cm,wave_speed_m_s,r1,c,r2\nleg,a,Leg,40,0.4,8,,0.05,4\na,,Aorta,30,1.2,5,,,\nshut,a,Shut,5,0.3,7,inf,,1\n", halfFlow)
	text, err := json.Marshal(s.Report())
	if err != nil {
		t.Fatal(err)
	}
	var r struct {
		Frequencies []float64    `json:"frequencies_hz"`
		Impedance   [][2]float64 `json:"root_input_impedance"`
		Segments    []struct {
			ID, Name      string
			Inlet, Outlet struct {
				Pressure, Flow struct{ Mean, Min, Max float64 }
			}
			Loss float64
		}
		Energy map[string]any
		Steady struct {
			Segments []any
			Energy   map[string]any
		}
		Response map[string][]struct {
			ID                        string
			Outflow, Pressure, Inflow map[string]any
		}
	}
	if err := json.Unmarshal(text, &r); err != nil {
		t.Fatal(err)
	}
	if len(r.Frequencies) != 7 || !near(r.Frequencies[0], 1.25, 1e-9) || len(r.Impedance) != 7 {
		t.Errorf("frequencies %v, %d impedances", r.Frequencies, len(r.Impedance))
	}
	if len(r.Segments) != 3 || r.Segments[0].ID != "leg" || r.Segments[1].Name != "Aorta" || !(r.Segments[0].Loss > 0) {
		t.Errorf("segments %+v", r.Segments)
	}
	for _, key := range []string{"input", "segment_loss", "terminal_r1", "terminal_r2", "outflow", "balance"} {
		if _, ok := r.Energy[key].(float64); !ok {
			t.Errorf("energy has no %s", key)
		}
		if _, ok := r.Steady.Energy[key]; !ok {
			t.Errorf("steady energy has no %s", key)
		}
	}
	for _, step := range []string{"flow_step", "pressure_step"} {
		beds := r.Response[step]
		if len(beds) != 2 || beds[0].ID != "leg" || beds[1].ID != "shut" {
			t.Fatalf("%s: %+v", step, beds)
		}
		for _, key := range []string{"final", "t10_s", "t50_s", "t90_s"} {
			if v, ok := beds[0].Outflow[key].(float64); !ok || !(v > 0) {
				t.Errorf("%s of the leg: %s is %v", step, key, beds[0].Outflow[key])
			}
			if v, there := beds[1].Pressure[key]; !there || v != nil {
				t.Errorf("%s of a closed bed: %s is %v", step, key, v)
			}
		}
	}
	note := Text(s.Note(), casenote.Options{ASCII: true})
	for _, want := range []string{"Aorta", "terminal R1", "undefined", "steady"} {
		if !strings.Contains(note, want) {
			t.Errorf("the note does not say %q", want)
		}
	}
	if strings.Contains(note, "NaN") {
		t.Error("the note says NaN")
	}
}

func FuzzReadTreeSpec(f *testing.F) {
	f.Add([]byte("table = \"t.csv\"\nharmonics = 3\n"), []byte("id,parent,length_cm,radius_cm,wave_speed_m_s,r2\n1,,1,1,5,1\n"))
	f.Add([]byte("table = \"t.csv\"\ninflow=\"f\"\nline=\"poiseuille\"\nviscosity_poise = 0\nsteady = true"), []byte(""))
	f.Fuzz(func(t *testing.T, spec, table []byte) {
		s, err := ReadTreeSpec("spec.toml", spec)
		if err != nil {
			return
		}
		s.Response = false // takes its time
		out, err := SolveTree("spec.toml", s, func(name string) ([]byte, error) {
			if name == s.Table {
				return table, nil
			}
			return []byte("time_s,flow_mL_s\n0,1\n0.2,3\n0.4,2\n0.6,0\n"), nil
		})
		if err != nil {
			return
		}
		if _, err := json.Marshal(out.Report()); err != nil {
			t.Fatal(err)
		}
		Text(out.Note(), casenote.Options{})
	})
}
