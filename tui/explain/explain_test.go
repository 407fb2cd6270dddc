package explain

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tui"
	"afterbeat/tui/screentest"
)

// numbers are a list as a screen has it: one with all there can be, one that is
// not identified, one with nothing but its value, one that is undefined.
func numbers() []Number {
	value := func(e data.Estimate, unit string) casenote.Number {
		return casenote.Number{Estimate: e, Unit: unit, Origin: data.Estimated}
	}
	full := data.Estimate{Value: 0.98, Total: data.Interval{Low: 0.80, High: 1.17}, Random: data.Interval{Low: 0.97, High: 0.99}, Identified: true}
	open := full
	open.Identified, open.Why = false, "it trades against the others\x1b[2J"
	return []Number{
		{
			Name: "R", Of: "wk3", Value: value(full, "mmHg s/mL"), Method: "blocks of beats",
			Leads: []string{"outflow pressure +10 mmHg: -13 %", "flow +10 %: -9 %"}, Notes: []string{"a note"},
			Account: data.Account{
				Meaning: "peripheral resistance", Equation: []string{"P = Pv + Pd", "Z(0) = R"}, Source: "Westerhof 1969",
				Published: []data.Published{{Group: data.Healthy, Words: "0.853 +- 0.029 (SEM), n 18", Source: "Murgo 1980", Seen: true}},
			},
		},
		{Name: "L", Value: value(open, "mmHg s2/mL")},
		{Name: "Gosling PI", Value: value(full, ""), RandomOnly: true},
		{Name: "S/D", Value: value(data.Estimate{Value: math.NaN(), Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: "the minimum is not positive"}, "")},
	}
}

func press(m Model, keys ...string) Model {
	for _, k := range keys {
		m = m.Update(screentest.Key(k))
	}
	return m
}

func opened(a tui.Area, t tui.Theme, keys ...string) Model {
	return press(New().Hold(numbers()).Resize(a, t), append([]string{"enter"}, keys...)...)
}

func TestGolden(t *testing.T) {
	view := func(keys ...string) func(tui.Area, tui.Theme) string {
		return func(a tui.Area, theme tui.Theme) string { return opened(a, theme, keys...).View() }
	}
	screentest.Golden(t, "full", view())
	screentest.Golden(t, "not-identified", view("down"), tui.Area{Width: 80, Height: 20})
}

func TestANumberOpensIntoAllOfIt(t *testing.T) {
	m := opened(tui.Area{Width: 80, Height: 30}, tui.Theme{})
	v := strings.Join(strings.Fields(m.View()), " ")
	for _, want := range []string{
		"> R", "R of wk3: peripheral resistance", "0.98 mmHg s/mL, estimated", "0.80 to 1.17, every kind of error",
		"0.97 to 0.99; 5 % of the total, so mostly systematic", "blocks of beats", "outflow pressure +10 mmHg: -13 %",
		"P = Pv + Pd", "Westerhof 1969", "0.853 +- 0.029 (SEM), n 18; Murgo 1980 (seen)", "a note",
	} {
		if !strings.Contains(v, want) {
			t.Errorf("%q is missing in\n%s", want, m.View())
		}
	}
}

func TestTheCursorMovesAndStaysOnItsName(t *testing.T) {
	m := opened(tui.Area{Width: 80, Height: 20}, tui.Theme{}, "down", "j", "up")
	if m.Cursor() != 1 || !strings.Contains(m.View(), "> L") {
		t.Fatalf("cursor %d:\n%s", m.Cursor(), m.View())
	}
	list := numbers()
	m = m.Hold([]Number{list[2], list[1]})
	if m.Cursor() != 1 {
		t.Errorf("cursor %d", m.Cursor())
	}
	if m = m.Hold(nil); m.Open() {
		t.Error("open without numbers")
	}
	if m = press(opened(tui.Area{Width: 80, Height: 20}, tui.Theme{}), "esc"); m.Open() {
		t.Error("esc does not close it")
	}
}

// A text that is longer than the area is read on.
func TestALongTextIsReadOn(t *testing.T) {
	m := opened(tui.Area{Width: 60, Height: 11}, tui.Theme{})
	first := m.View()
	if !strings.Contains(first, "read on") {
		t.Fatal(first)
	}
	for range 5 {
		m = press(m, " ")
	}
	if !strings.Contains(m.View(), "a note") {
		t.Errorf("the end is never reached:\n%s", m.View())
	}
	end := m.View()
	if m = press(m, "pgup"); m.View() == end {
		t.Error("no page back")
	}
}

func TestFitsAnyArea(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a := tui.Area{Width: rapid.IntRange(1, 250).Draw(t, "width"), Height: rapid.IntRange(1, 80).Draw(t, "height")}
		theme := tui.Theme{ASCII: rapid.Bool().Draw(t, "ascii")}
		m := New().Hold(numbers()).Resize(a, theme)
		for _, k := range rapid.SliceOf(rapid.SampledFrom([]string{"enter", "esc", "j", "k", " ", "pgup", "q"})).Draw(t, "keys") {
			m = m.Update(screentest.Key(k))
		}
		if m.Open() {
			screentest.Fits(t, m.View(), a, theme)
		}
	})
}

func TestKeysAreListed(t *testing.T) {
	m := opened(tui.Area{Width: 60, Height: 11}, tui.Theme{})
	listed := map[string]bool{}
	for _, b := range m.Bindings() {
		for _, k := range b.Keys() {
			listed[k] = true
		}
	}
	for _, k := range []string{"enter", "esc", "j", "k", " ", "pgup", "pgdown", "up", "down"} {
		if !listed[k] {
			t.Errorf("%q is not listed", k)
		}
	}
}
