package fit_test

import (
	"bytes"
	"fmt"
	"math"
	"testing"

	"afterbeat/data/casefile"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/fit"
	"afterbeat/tui/screentest"
)

// ofOne is a study of one channel that beats, with what was measured beside it.
func ofOne(t *testing.T, header string, at func(float64) float64, c casefile.Case) study.Study {
	t.Helper()
	var b bytes.Buffer
	fmt.Fprintf(&b, "time_s,%s\n", header)
	for i := range 3000 {
		fmt.Fprintf(&b, "%.3f,%.4f\n", float64(i)/200, at(math.Mod(float64(i)/200, 0.8)))
	}
	c.Recording, c.Replicates = "a.csv", new(int)
	*c.Replicates = 50
	return screentest.Study(t, c, func(string) ([]byte, error) { return b.Bytes(), nil })
}

// Loads of mean values have no wave that was fitted: the screen stands, at all sizes,
// and shows their numbers.
func TestLoadsOfMeans(t *testing.T) {
	output := 5.0
	pressure := ofOne(t, "ao_mmHg", func(at float64) float64 {
		if at < 0.1 {
			return 70 + 400*at
		}
		return 110 * math.Exp(-(at-0.1)/1.55)
	}, casefile.Case{CardiacOutput: &output})
	flow := ofOne(t, "ao_flow_mL_s", func(at float64) float64 {
		if at < 0.3 {
			return 360 * math.Sin(math.Pi*at/0.3)
		}
		return 0
	}, casefile.Case{Cuff: "120/75"})
	for name, s := range map[string]study.Study{"output": pressure, "cuff": flow} {
		if s.Fit == nil || s.Fit.Chosen < 0 {
			t.Fatalf("%s: nothing was fitted: %q", name, s.Fit.Reason)
		}
		for _, size := range []tui.Area{{Width: 60, Height: 11}, {Width: 80, Height: 20}, {Width: 160, Height: 46}} {
			for _, keys := range [][]string{nil, {"right"}, {"]"}, {"down", "x"}, {"t"}, {"f"}, {"w"}} {
				view := screentest.New(fit.New(), s, size, tui.Theme{}).Press(keys...).View()
				if size.Width >= 80 && keys == nil {
					says(t, view, "Rtotal", "C ")
				}
			}
		}
	}
}
