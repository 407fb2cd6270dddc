package support

import (
	"strings"
	"testing"

	"afterbeat/data/casenote"
	"afterbeat/fitting"
)

func sections(a Answer) []casenote.Section { return append(a.Sections(), a.HeldSection()) }

func text(s casenote.Section) string { return s.Render(casenote.Options{ASCII: true}) }

// words is the text with its line breaks taken out, and the headers of its
// tables, which the layout may have broken up.
func words(s casenote.Section) string {
	all := strings.Join(strings.Fields(text(s)), " ")
	for _, t := range s.Tables {
		all += " " + strings.Join(t.Header, " ")
	}
	return all
}

// No posing here has a ventricle, so no section may call its numbers a forecast.
func TestYardsticksAreNoForecasts(t *testing.T) {
	for _, posing := range Posings() {
		a := answer(t, example(t), halfSine(160), 0, posing, 0, 0.5, 1)
		said := 0
		for _, s := range sections(a) {
			plain := strings.NewReplacer("never a forecast", "", "no forecast of a ventricle", "").Replace(words(s))
			if strings.Contains(plain, "forecast") {
				t.Errorf("%s: a forecast in\n%s", posing, text(s))
			}
			said += len(words(s)) - len(plain)
		}
		if said == 0 {
			t.Errorf("%s: nowhere said that it is no forecast", posing)
		}
	}
}

func TestSectionsSayWhatTheyShow(t *testing.T) {
	r, q := fitted(t, 12, 0.05, 1, fitting.Systematic{Flow: 0.1})
	late := withIntervals(t, r, q, LateValvePosing, 0, 0.5, 1)
	scaled := withIntervals(t, r, q, ScaledPosing, 0, 0.5, 1)
	for _, c := range []struct {
		section casenote.Section
		says    []string
	}{
		{late.HeldSection(), []string{"total resistance", "compliance", "heart period", "0.8000 s", "mean flow", "outflow pressure", "reflexes", "2021;23:1955"}},
		{late.StateSection(), []string{"late-valve", "No ventricle", "pulse pressure, mmHg", "erg/cm3", "Gosling PI, flow", "native", "95 % interval", "0.5"}},
		{late.ComparisonSection(), []string{"retained pulse of pressure", "In brackets: 95 % interval", "Supported over native", "0.5"}},
		{scaled.ComparisonSection(), []string{"identity", "0.5000", "by construction"}},
		{late.PowerSection(), []string{"arterial side", "mW", "pulsatile part", "90 % of it goes into the characteristic impedance", "no loss in blood"}},
	} {
		got := words(c.section)
		for _, want := range c.says {
			if !strings.Contains(got, want) {
				t.Errorf("%q is not in\n%s", want, text(c.section))
			}
		}
	}
	if strings.Contains(words(scaled.ComparisonSection()), "In brackets") {
		t.Errorf("an identity with an interval:\n%s", text(scaled.ComparisonSection()))
	}
}

// By hand: 9600 mmHg mL/s are 1279.9 mW; the worked example has 1.201093 W.
func TestPowerIsPrintedInMilliwatts(t *testing.T) {
	a := answer(t, example(t), halfSine(1600), 0, LateValvePosing, 0.5)
	if got := words(a.PowerSection()); !strings.Contains(got, "native 1201 1072 129.3") {
		t.Errorf("powers of the worked example (1201.1, 1071.8 and 129.3 mW) are not in\n%s", text(a.PowerSection()))
	}
}

func TestUnitsPerArea(t *testing.T) {
	a := answer(t, example(t), halfSine(160), 0, LateValvePosing, 0.5)
	a.PerArea = true
	all := ""
	for _, s := range sections(a) {
		all += words(s)
	}
	for _, want := range []string{"mmHg s/cm", "cm/mmHg", "cm/s", "mW/cm2"} {
		if !strings.Contains(all, want) {
			t.Errorf("%q is nowhere", want)
		}
	}
	if strings.Contains(all, "mL") {
		t.Error("mL of a load per unit area")
	}
}

func TestWk2HasNoWaveImpedanceToSpeakOf(t *testing.T) {
	a := answer(t, lumped(t, "wk2", 1, 1.5, 0), halfSine(160), 0, LateValvePosing, 0.5)
	if got := words(a.PowerSection()); strings.Contains(got, "characteristic") {
		t.Errorf("%s", got)
	}
}
