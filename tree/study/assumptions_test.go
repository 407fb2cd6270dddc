package study

import (
	"strings"
	"testing"

	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
)

// labelled are the rows of a section by their label, as they are printed.
func labelled(s casenote.Section) map[string]string {
	rows := map[string]string{}
	for _, row := range s.Rows {
		if row.Number != nil {
			rows[row.Label] = row.Number.String()
		} else {
			rows[row.Label] = row.Words.String()
		}
	}
	return rows
}

// Every assumption stands in the note, as what it is: given, or a default.
func TestAssumptionsAreListed(t *testing.T) {
	const p, q = "ao_mmHg", "ao_flow_mL_s"
	velocity := column{"lvot_velocity_cm_s", noisy(scaled(halfFlow, 0.25, 0), 0.2)}
	for name, c := range map[string]struct {
		columns []column
		change  func(*casefile.Case)
		want    string // label: start of the row; those with - must not be there
	}{
		"pressure and flow": {[]column{aortic(p), outflowTo(q)}, func(*casefile.Case) {}, `
delay of pressure: 0.000 s, 95 % -0.010 to 0.010, assumed
outflow pressure: 0 mmHg, 95 % -10 to 10, assumed
95 % error, flow: +-10 % (assumed)
95 % error, delay: +-0.01 s (assumed)
95 % error, pressure-scale: +-3 % (assumed)
95 % error, pressure-offset: +-2 mmHg (assumed)
replicates: 40, seed 1
-95 % error, diameter:`},
		"given": {[]column{aortic(p), outflowTo(q)}, func(c *casefile.Case) {
			c.Delay, c.OutflowPressure, c.Seed = "0.02", ptr(8.0), ptr(3)
			c.Error = map[string]string{"flow": "25%", "delay": "0.002", "outflow-pressure": "4"}
		}, `
delay of pressure: 0.0200 s, 95 % 0.0180 to 0.0220, measured
outflow pressure: 8.0 mmHg, 95 % 4.0 to 12.0, measured
95 % error, flow: +-25 % (given)
95 % error, delay: +-0.002 s (given)
replicates: 40, seed 3`},
		"velocity": {[]column{aortic(p), velocity}, func(c *casefile.Case) { c.DiameterCM = ptr(2.2) }, `
95 % error, flow: +-10 % (assumed)
95 % error, diameter: +-5 % (assumed)
95 % error, angle: +-5 degrees (assumed)`},
		"velocity, with the error of flow given": {[]column{aortic(p), velocity}, func(c *casefile.Case) {
			c.DiameterCM, c.Error = ptr(2.2), map[string]string{"flow": "20%"}
		}, `
95 % error, flow: +-20 % (given)
-95 % error, diameter:
-95 % error, angle:`},
		"pressure alone": {[]column{aortic(p)}, func(*casefile.Case) {}, `
outflow pressure: 0 mmHg, 95 % -10 to 10, assumed
-delay of pressure:
-95 % error, flow:`},
	} {
		choices := inventedCase()
		c.change(&choices)
		b := fitted(t, choices, invented(c.columns...)).Beats
		settings, err := fitSettings(choices)
		if err != nil {
			t.Fatal(err)
		}
		settings = settings.WithDefaults()
		rows := labelled(b.assumptionSection(int(settings.Seed), settings.Replicates))
		for _, line := range strings.Split(strings.TrimSpace(c.want), "\n") {
			label, want, _ := strings.Cut(line, ":")
			got, ok := rows[strings.TrimPrefix(label, "-")]
			if absent := strings.HasPrefix(label, "-"); ok == absent || !strings.HasPrefix(got, strings.TrimSpace(want)) {
				t.Errorf("%s: %s is %q (there: %v), want %q", name, label, got, ok, want)
			}
		}
	}
}
