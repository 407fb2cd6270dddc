package estimate

import (
	"testing"

	"afterbeat/data"
)

// Every method has a formula and a source, for all that it gives.
func TestEveryMethodHasAnAccount(t *testing.T) {
	p := make([]float64, 100)
	for i := range p {
		p[i] = 90 - 0.2*float64(i)
	}
	for _, e := range All(Beat{Pressure: data.Period{Samples: p, Rate: 100}}) {
		for _, name := range []string{"R", "C", "tau"} {
			if a := e.Account(name); a.Meaning == "" || len(a.Equation) == 0 || a.Source == "" {
				t.Errorf("%s of %s: %+v", name, e.Name, a)
			}
		}
	}
}
