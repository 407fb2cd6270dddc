package tree

import (
	"math"
	"os"
	"strconv"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// table reads a published table of testdata as rows by column name.
func table(t testing.TB, name string) []map[string]string {
	t.Helper()
	f, err := os.Open("testdata/" + name)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	text, err := data.ReadTextTable(name, f)
	if err != nil {
		t.Fatal(err)
	}
	var rows []map[string]string
	for _, r := range text.Rows {
		row := map[string]string{}
		for i, column := range text.Header {
			row[column] = r.Fields[i]
		}
		rows = append(rows, row)
	}
	return rows
}

func number(t testing.TB, text string) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(text, 64)
	if err != nil {
		t.Fatal(err)
	}
	return v
}

// published is a segment of either table: radii in cm, modulus in MPa.
func published(t testing.TB, row map[string]string, inlet, outlet, wall float64) Segment {
	s := Segment{
		ID: row["id"], Parent: row["parent"], Name: row["name"], Length: number(t, row["length_cm"]),
		Radius: inlet, RadiusDistal: outlet, Poisson: 0.5, Eh: number(t, row["youngs_modulus_MPa"]) * 1e7 * wall,
	}
	if s.Parent == "0" {
		s.Parent = ""
	}
	return s
}

// tree55 is the 55-segment table with the terminals of the reference values:
// R1 = min(rho c/A, 0.9 R), R2 = R - R1, 0.56 mL/mmHg shared by 1/R. Uniform
// segments have the mean of both radii; tapering ones both.
func tree55(t testing.TB, tapering bool) Network {
	t.Helper()
	n := Network{Blood: Blood{Density: 1.05, Viscosity: 0.04}}
	conductance := 0.0
	rows := table(t, "tree55.csv")
	for _, row := range rows {
		inlet, outlet := number(t, row["radius_prox_cm"]), number(t, row["radius_dist_cm"])
		if !tapering {
			inlet, outlet = (inlet+outlet)/2, 0
		}
		n.Segments = append(n.Segments, published(t, row, inlet, outlet, number(t, row["wall_thickness_cm"])))
		if r := row["terminal_resistance_mmHg_s_per_mL"]; r != "" {
			conductance += 1 / number(t, r)
		}
	}
	for i, row := range rows {
		if row["terminal_resistance_mmHg_s_per_mL"] == "" {
			continue
		}
		s := &n.Segments[i]
		r := number(t, row["terminal_resistance_mmHg_s_per_mL"])
		out := s.Outlet()
		r1 := min(1.05*s.Speed(out, 1.05)/(math.Pi*out*out)/unit.DynPerMmHg, 0.9*r)
		s.Terminal = &Terminal{R1: r1, R2: r - r1, C: 0.56 / (r * conductance)}
	}
	return n
}

// tree37 is the in-vitro network: tapering tubes, resistances as terminals.
func tree37(t testing.TB) Network {
	t.Helper()
	n := Network{Blood: Blood{Density: 1.05, Viscosity: 0.025}}
	for _, row := range table(t, "tree37.csv") {
		s := published(t, row, number(t, row["radius_in_mm"])/10, number(t, row["radius_out_mm"])/10, number(t, row["wall_thickness_mm"])/10)
		if r := row["terminal_resistance_GPa_s_per_m3"]; r != "" {
			s.Terminal = &Terminal{R2: number(t, r) * 1e9 / 1.33322387415e8}
		}
		n.Segments = append(n.Segments, s)
	}
	return n
}

// invented flow: a smooth ejection of 70 mL in a period of 0.8 s, samples at rate.
func beat(samples int) data.Period {
	p := data.Period{Samples: make([]float64, samples), Rate: float64(samples) / 0.8}
	for j := range p.Samples {
		if at := float64(j) / float64(samples); at < 0.375 {
			p.Samples[j] = 70 / 0.3 * (1 - math.Cos(2*math.Pi*at/0.375))
		}
	}
	return p
}
