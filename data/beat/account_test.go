package beat

import (
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/unit"
)

// Every measure of the tables has a formula and a source.
func TestEveryMeasureHasAnAccount(t *testing.T) {
	all := []Index{
		HeartRateOf, MeanOf, MaximumOf, MinimumOf, SwingOf, GoslingPI, PourcelotRI, SystolicRatio,
		FormFactor, PulsatilePower, TimeToPeak, MaxSlope, Augmentation,
	}
	for _, i := range all {
		a := Account(i, unit.Pressure, data.SiteRoot)
		if a.Meaning == "" || len(a.Equation) == 0 || a.Source == "" {
			t.Errorf("%s: %+v", i, a)
		}
	}
	if len(formulas()) != len(all) {
		t.Errorf("%d formulas for %d measures", len(formulas()), len(all))
	}
	for _, p := range publications() {
		if _, ok := formulas()[p.of]; !ok {
			t.Errorf("published of %q, which is no measure", p.of)
		}
	}
}

// What is published of one site is not shown at another, nor of another quantity.
func TestPublishedIsOfTheSite(t *testing.T) {
	groups := func(a data.Account) string {
		var out []string
		for _, p := range a.Published {
			out = append(out, p.Group)
		}
		return strings.Join(out, " ")
	}
	for _, c := range []struct {
		q    unit.Quantity
		at   data.Site
		want string
	}{
		{unit.Velocity, data.SiteMCA, "healthy ill support"},
		{unit.Velocity, data.SiteBrachial, "healthy support"},
		{unit.Velocity, data.SiteRoot, ""},
		{unit.Pressure, data.SiteMCA, ""},
	} {
		if got := groups(Account(GoslingPI, c.q, c.at)); got != c.want {
			t.Errorf("%s at %s: %q, want %q", c.q, c.at, got, c.want)
		}
	}
}
