package screentest

import (
	"bytes"
	"fmt"
	"math"
	"testing"

	"afterbeat/data/casefile"
	"afterbeat/tree/study"
)

// Pressure computes a study of one pressure of 20 s, whose column has the name
// given and mmHg for its unit. With a pulse it is an exponential fall of time
// constant 1.2 s to 0 that starts anew every 0.8 s, on a rise of 0.1 s; else it
// is flat.
func Pressure(t testing.TB, name string, pulse bool) study.Study {
	t.Helper()
	const rate, period, rise, tau = 200, 0.8, 0.1, 1.2
	var b bytes.Buffer
	fmt.Fprintf(&b, "time_s,%s_mmHg\n", name)
	for i := range 20 * rate {
		at := math.Mod(float64(i)/rate, period)
		p := 120 * math.Exp(-(at-rise)/tau)
		if at < rise {
			low := 120 * math.Exp(-(period-rise)/tau)
			p = low + (120-low)*at/rise
		}
		if !pulse {
			p = 90
		}
		fmt.Fprintf(&b, "%.3f,%.4f\n", float64(i)/rate, p)
	}
	c := casefile.Case{Recording: "pressure.csv"}
	return Study(t, c, func(string) ([]byte, error) { return b.Bytes(), nil })
}
