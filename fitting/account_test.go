package fitting

import (
	"math"
	"strings"
	"testing"

	"afterbeat/data"
)

func TestEveryParameterHasAnAccount(t *testing.T) {
	for _, m := range Models() {
		r := Result{Model: m, Site: data.SiteRoot}
		names := []string{TotalResistanceName}
		for _, s := range m.Parameters() {
			names = append(names, s.Name)
		}
		for _, name := range names {
			a := r.Account(name)
			if a.Meaning == "" || len(a.Equation) < 2 || a.Source == "" || len(a.Published) == 0 {
				t.Errorf("%s of %s: %+v", name, m.Name, a)
			}
		}
	}
}

// What is published of the whole body is not set beside a bed, nor beside a
// load per unit area; and an inertance in parallel not beside one in series.
func TestPublishedIsOfTheSameLoad(t *testing.T) {
	wk3, _ := ByName("wk3")
	for _, r := range []Result{{Model: wk3, Site: data.SiteMCA}, {Model: wk3, Site: data.SiteRoot, PerArea: true}} {
		if got := r.Account("R").Published; len(got) > 0 {
			t.Errorf("site %s, per area %v: %v", r.Site, r.PerArea, got)
		}
	}
	wk4s, _ := ByName("wk4s")
	for _, p := range (Result{Model: wk4s, Site: data.SiteRoot}).Account("L").Published {
		if strings.Contains(p.Source, "Stergiopulos") {
			t.Errorf("of wk4s: %s", p)
		}
	}
}

// The numbers in units of this package are those of the publications: 1137 and
// 47 dyn s/cm^5 (Murgo 1980), 1.59e-3 cm^5/dyn (Laskey 1990), 53 and 202 dyn
// s/cm^5 (Nichols 1977).
func TestPublishedNumbersAreConverted(t *testing.T) {
	const dyn = 1333.22387415 // dyn/cm² of 1 mmHg
	for _, c := range []struct{ printed, computed float64 }{
		{0.853, 1137 / dyn},
		{0.0353, 47 / dyn},
		{2.12, 1.59e-3 * dyn},
		{0.67, 0.50e-3 * dyn},
		{0.040, 53 / dyn},
		{0.152, 202 / dyn},
		{1.84, 1.38e-3 * dyn},
		{1.53, 1.15e-3 * dyn},
	} {
		if math.Abs(c.printed/c.computed-1) > 0.01 {
			t.Errorf("%g is printed for %g", c.printed, c.computed)
		}
	}
}
