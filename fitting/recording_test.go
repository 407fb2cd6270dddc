package fitting

import (
	"encoding/csv"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"testing"

	"afterbeat/data"
)

// A bench rig beats like a clock, so its recordings fall into beats of a fixed
// length. Means and fits stated with the recordings came from an independent
// program, over another window and with a free initial pressure: mean pressure
// over mean flow is held to 2 %, R and C to 15 %.
func TestBenchRecordings(t *testing.T) {
	for _, c := range []struct {
		file         string
		period       int // samples at 1000 Hz
		meanRatio    float64
		two, three   Values
		rmse2, rmse3 float64
	}{
		{"bench_pq_normovolemic_1000hz_58s.csv", 800, 1.0567, Values{R: 1.0417, C: 1.3364}, Values{R: 1.028, C: 1.3726}, 3.16, 2.18},
		{"bench_pq_lowoutput_1000hz_58s.csv", 667, 1.1807, Values{R: 1.1815, C: 1.376}, Values{R: 1.1749, C: 1.3921}, 1.71, 1.52},
	} {
		t.Run(c.file, func(t *testing.T) {
			b := cut(t, filepath.Join("..", "..", "shared", "reference-data", c.file), c.period)
			pressure, flow := b.Average()
			if got := pressure.Mean() / flow.Mean(); math.Abs(got/c.meanRatio-1) > 0.02 {
				t.Errorf("mean P/mean Q = %v, stated %v", got, c.meanRatio)
			}
			for name, want := range map[string]Values{"wk2": c.two, "wk3": c.three} {
				r := fit(t, model(t, name), b, Settings{})
				t.Logf("%s: %+v, rmse %.2f (stated %v, %v), %d evaluations", name, r.Values, r.RMSE, c.rmse2, c.rmse3, r.Evaluations)
				for _, p := range []string{"R", "C"} {
					if got := r.Values.Of(p); math.Abs(got/want.Of(p)-1) > 0.15 {
						t.Errorf("%s: %s = %v, stated %v", name, p, got, want.Of(p))
					}
				}
				if got := r.TotalResistance.Value; math.Abs(got/c.meanRatio-1) > 0.02 {
					t.Errorf("%s: Z(0) = %v, stated mean ratio %v", name, got, c.meanRatio)
				}
			}
		})
	}
}

// cut reads flow and pressure and takes beats of a fixed length.
func cut(t *testing.T, path string, period int) Beats {
	t.Helper()
	file, err := os.Open(path)
	if os.IsNotExist(err) {
		t.Skip("the full recordings are not here")
	} else if err != nil {
		t.Fatal(err)
	}
	defer file.Close()
	rows, err := csv.NewReader(file).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var flow, pressure []float64
	for _, row := range rows[1:] {
		q, err1 := strconv.ParseFloat(row[1], 64)
		p, err2 := strconv.ParseFloat(row[2], 64)
		if err1 != nil || err2 != nil {
			t.Fatal(err1, err2)
		}
		flow, pressure = append(flow, q), append(pressure, p)
	}
	b := Beats{Rate: 1000, Site: data.SiteRoot}
	for at := 0; at+period <= len(flow); at += period {
		b.Flow, b.Pressure = append(b.Flow, flow[at:at+period]), append(b.Pressure, pressure[at:at+period])
	}
	return b
}
