package study

import (
	"strings"
	"testing"

	"afterbeat/data/casefile"
)

// indexRowsOf are the rows of the table of indices, the cells of each joined.
func indexRowsOf(s Study) map[string][]string {
	rows := map[string][]string{}
	for _, row := range s.Beats.indexTable().Rows {
		label := row[0].Words.String()
		for _, cell := range row[1:] {
			rows[label] = append(rows[label], cell.Number.String())
		}
	}
	return rows
}

// The indices of the half-sine beat by hand: pressure 73.2659 to 113.6361 about
// 91.875, flow 0 to 366.519 about 87.5 (the worked example of the reference
// values; flow PI 4.18879), the peak of flow at 0.15 s.
func TestIndicesOfTheHalfSine(t *testing.T) {
	s := whole(t, casefile.Case{Recording: "one.csv", OneBeat: true, Model: "wk3"}, oneBeat(1600, 0))
	rows := indexRowsOf(s)
	for label, want := range map[string][2]string{
		"mean":                              {"91.87", "87.50"},
		"maximum":                           {"113.6", "366.5"},
		"minimum":                           {"73.27", "0"},
		"Gosling PI, (max-min)/mean":        {"0.4394", "4.189"},
		"Pourcelot RI, (max-min)/max":       {"0.3553", "1"},
		"S/D, max/min":                      {"1.551", "undefined"},
		"form factor, (mean-min)/(max-min)": {"0.4610", "0.2387"},
		"time to peak, s":                   {"0.2160", "0.1500"},
	} {
		for i, got := range rows[label] {
			if !strings.HasPrefix(got, want[i]) {
				t.Errorf("%s, column %d: %q, want %s", label, i, got, want[i])
			}
		}
		if len(rows[label]) != 2 {
			t.Errorf("%s: %v", label, rows[label])
		}
	}
}

// The table names the unit that its columns are in: the internal one, that of a
// velocity per unit area, or an uncalibrated channel's own.
func TestIndicesHaveUnits(t *testing.T) {
	for want, f := range map[string]folder{
		"pressure, mmHg|flow, mL/s": invented(column{"ao_kPa", scaled(noisy(halfPressure, 0.3), 0.1333, 0)}, outflowTo("ao_flow_mL_s")),
		"pressure, mmHg|flow, cm/s": invented(aortic("ao_mmHg"), column{"lvot_velocity_m_s", noisy(scaled(halfFlow, 0.0025, 0), 0.002)}),
		"pressure, V|flow, mL/s":    invented(column{"ao_pressure_V", noisy(scaled(halfPressure, 0.01, 0), 0.003)}, outflowTo("ao_flow_mL_s")),
		"pressure, mmHg|flow, V":    invented(aortic("ao_mmHg"), column{"ao_flow_V", noisy(scaled(halfFlow, 0.01, 0), 0.01)}),
		"flow, mL/s":                invented(outflowTo("ao_flow_mL_s")),
	} {
		s, err := try(inventedCase(), f, StageBeats)
		if err != nil {
			t.Fatal(err)
		}
		if got := strings.Join(s.Beats.indexTable().Header[1:], "|"); got != want {
			t.Errorf("%q, want %q", got, want)
		}
	}
}
