package fit_test

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"sync"
	"testing"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
	"afterbeat/fitting"
	"afterbeat/fitting/harmonic"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/fit"
	"afterbeat/tui/screentest"
)

var (
	once sync.Once
	demo study.Study
)

// computed is the demo, computed once for all tests.
func computed(t testing.TB) study.Study {
	t.Helper()
	once.Do(func() { demo = screentest.Demo(t, nil) })
	return demo
}

var small = tui.Area{Width: 80, Height: 20}

func open(s study.Study, keys ...string) *screentest.Bench {
	return screentest.New(fit.New(), s, small, tui.Theme{}).Press(keys...)
}

func TestGolden(t *testing.T) {
	s := computed(t)
	views := func(s study.Study, keys ...string) func(tui.Area, tui.Theme) string {
		return func(a tui.Area, theme tui.Theme) string {
			return screentest.New(fit.New(), s, a, theme).Press(keys...).View()
		}
	}
	screentest.Golden(t, "fit", views(s))
	screentest.Golden(t, "what-if", views(s, "]"))
	screentest.Golden(t, "opened", views(s, "down", "enter"))
	screentest.Golden(t, "estimator", views(s, "right", "right", "right"))
	screentest.Golden(t, "recommendation", views(s, "r"), small)
	screentest.Golden(t, "impedance", views(s, "z"))
	screentest.Golden(t, "waves", views(s, "w"))
	screentest.Golden(t, "table", views(s, "t"), small)
	screentest.Golden(t, "flow", views(s, "f"), small)
	screentest.Golden(t, "pressure-only", views(screentest.Pressure(t, "aortic_pressure", true)), small)
	screentest.Golden(t, "no-pulse", views(screentest.Pressure(t, "aortic_pressure", false)), small)
}

func says(t *testing.T, view string, words ...string) {
	t.Helper()
	flat := strings.Join(strings.Fields(view), " ")
	for _, w := range words {
		if !strings.Contains(flat, w) {
			t.Errorf("%q is missing in\n%s", w, view)
		}
	}
}

func silent(t *testing.T, view, words string) {
	t.Helper()
	if strings.Contains(view, words) {
		t.Errorf("%q stands in\n%s", words, view)
	}
}

// The numbers on the screen are those of the study, as the note prints them.
func TestNumbersAreThoseOfTheStudy(t *testing.T) {
	s := computed(t)
	b := open(s)
	for range s.Fit.Chosen {
		b.Press("left") // to the first
	}
	for i, r := range s.Fit.Results {
		says(t, b.View(), fmt.Sprintf("%s %s (%d of %d), systemic load", r.Model.Name, r.Basis, i+1, len(s.Fit.Results)+len(s.Fit.Estimators)))
		for _, p := range r.Parameters {
			if !p.Identified {
				says(t, b.View(), p.Name+" not identified")
				continue
			}
			says(t, b.View(), p.Name+" "+casenote.Format(p.Value, p.Total)+" "+p.Unit+" "+casenote.FormatRange(p.Value, p.Total))
		}
		says(t, b.View(), "Rtotal "+casenote.Format(r.TotalResistance.Value, r.TotalResistance.Total))
		b.Press("right")
	}
	for _, e := range s.Fit.Estimators {
		says(t, b.View(), "by "+e.Name)
		if e.Reason != "" {
			says(t, b.View(), "does not apply")
		} else if !math.IsNaN(e.C) {
			says(t, b.View(), "C "+casenote.Format(e.C, data.NoInterval())+" mL/mmHg no interval")
		}
		b.Press("right")
	}
	says(t, b.View(), "(1 of ") // round to the first
	if len(s.Fit.Results) < 2 {
		t.Fatal("there is nothing to step through")
	}
}

// The pressure keeps its labels and every curve its place; the residual has the
// range of its own size about a labelled 0.
func TestSteppingKeepsThePressure(t *testing.T) {
	b := open(computed(t))
	axis := func(view string, from, to int) (labels []string) {
		for _, line := range strings.Split(view, "\n")[from:to] {
			labels = append(labels, strings.TrimRight(line[:6], " "))
		}
		return labels
	}
	first := b.View()
	b.Press("left")
	if !slices.Equal(axis(b.View(), 0, 5), axis(first, 0, 5)) {
		t.Errorf("labels moved:\n%s\n%s", first, b.View())
	}
	if b.View() == first {
		t.Error("another model looks the same")
	}
	for view, want := range map[string][]string{first: {"  0.6", "    0", " -0.6"}, b.View(): {"   20", "    0", "  -20"}} {
		if got := axis(view, 6, 9); !slices.Equal(got, want) {
			t.Errorf("the residual has %q, want %q:\n%s", got, want, view)
		}
	}
	b.Press("right")
	if b.View() != first {
		t.Error("back at the first model, it looks different")
	}
	says(t, first, "rms 0.07788, maximum 0.3084 mmHg")
}

// changes are the cases that were asked for.
func changes(t *testing.T, b *screentest.Bench) []casefile.Case {
	t.Helper()
	var all []casefile.Case
	for _, msg := range b.Told {
		c, ok := msg.(tui.ChangeMsg)
		if !ok || c.Said.String() == "" {
			t.Fatalf("%#v", msg)
		}
		all = append(all, c.Case)
	}
	return all
}

func TestChoosingIsExplicitAndTakenBack(t *testing.T) {
	s := computed(t)
	b := open(s, "left") // wk2 stands before the recommended wk3
	if len(b.Told) > 0 {
		t.Fatal("stepping chooses")
	}
	b.Press("c")
	got := changes(t, b)
	if len(got) != 1 || got[0].Model != "wk2" || got[0].Basis != s.Fit.Results[s.Fit.Chosen].Basis || s.Inputs.Case.Model != "" {
		t.Fatalf("asked for %v", got)
	}
	chosen := screentest.Demo(t, func(c *casefile.Case) { c.Model = "wk2" })
	b.Show(chosen)
	says(t, b.View(), "wk2 span (5 of", "Recommended: wk3", "in use wk2 span, chosen")
	b.Press("c")
	if got = changes(t, b); len(got) != 2 || got[1].Model != "" || got[1].Basis != "" {
		t.Fatalf("asked for %v", got)
	}
	b.Show(s)
	says(t, b.View(), "wk2 span (5 of", "in use wk3 span")
}

// A what-if is marked as one, stands beside the numbers, and is left with esc;
// nothing of it is asked for.
func TestWhatIfStandsBesideTheNumbers(t *testing.T) {
	s := computed(t)
	all, err := s.Fit.WhatIfs(t.Context(), s.Fit.Chosen)
	if err != nil {
		t.Fatal(err)
	}
	b := open(s)
	plain := b.View()
	r := s.Fit.Results[s.Fit.Chosen]
	for i, w := range all {
		b.Press("]")
		p, _ := r.Parameter("R")
		name := strings.ReplaceAll(w.Assumption, "-", " ") + " " + w.Change
		says(t, b.View(), "WHAT IF "+name, fmt.Sprintf("What if %s (%d of %d): not kept", name, i+1, len(all)))
		says(t, b.View(), casenote.Format(w.Values.R, p.Total)+" (", "was "+casenote.Format(r.RMSE, data.NoInterval()))
		if i == 0 {
			silent(t, b.View(), "random")
		}
	}
	b.Press("]")
	if b.View() != plain {
		t.Errorf("after the last there is still one:\n%s", b.View())
	}
	b.Press("[")
	says(t, b.View(), all[len(all)-1].Change)
	b.Press("left") // the same of another model
	says(t, b.View(), "WHAT IF diameter", "wk2 span")
	b.Press("right", "esc")
	if b.View() != plain {
		t.Errorf("esc leaves something:\n%s", b.View())
	}
	if len(b.Told) > 0 {
		t.Errorf("asked for %v", b.Told)
	}
}

func TestAnyNumberOpens(t *testing.T) {
	b := open(computed(t), "enter")
	says(t, b.View(), "> R", "R of wk3, basis span: peripheral resistance", "doubt from", "outflow pressure +10 mmHg", "span-blocks")
	b.Press(" ")
	says(t, b.View(), "Westerhof 1969", "0.853 +- 0.029", "(seen)", "support")
	b.Press("down")
	says(t, b.View(), "C of wk3, basis span: compliance")
	b.Press("left")
	says(t, b.View(), "C of wk2")
	b.Press("esc")
	silent(t, b.View(), "doubt from")
	b.Press("right", "right", "right", "right", "enter")
	says(t, b.View(), "of decay", "ln(P - Pv) = a - t/tau", "none: this method gives no interval")
}

// The impedance has a point a harmonic that is shown, and the model over them;
// the waves open into what is read off them.
func TestImpedanceAndWaves(t *testing.T) {
	s := computed(t)
	shown := harmonic.Shown(s.Fit.Impedance)
	b := screentest.New(fit.New(), s, tui.Area{Width: 160, Height: 46}, tui.Theme{ASCII: true}).Press("z")
	says(t, b.View(), fmt.Sprintf("|Z| at %d of %d harmonics", len(shown), len(s.Fit.Impedance)), "phase, degrees")
	points := 0
	for _, line := range strings.Split(b.View(), "\n")[1:24] {
		if _, curves, ok := strings.Cut(line, "|"); ok {
			points += strings.Count(curves, "o")
		} else if _, curves, ok = strings.Cut(line, "+"); ok && !strings.Contains(line, "Hz") {
			points += strings.Count(curves, "o")
		}
	}
	if points != 2*len(shown) {
		t.Errorf("%d points of %d harmonics, twice:\n%s", points, len(shown), b.View())
	}
	first := b.View()
	if b.Press("left").View() == first || !strings.Contains(b.View(), "> wk2") {
		t.Error("another model has the same impedance")
	}
	b.Press("w")
	says(t, b.View(), "Reflection "+casenote.Format(s.Fit.Waves.Magnitude.Value, s.Fit.Waves.Magnitude.Random)+" (", "P+", "P-")
	b.Press("enter", "k")
	for range 9 {
		b.Press("j")
	}
	says(t, b.View(), "> return time", "foot of the forward wave", "no systematic error is in it")
}

// Every model of package fitting has its equation here.
func TestEveryModelHasItsEquation(t *testing.T) {
	s := computed(t)
	for _, m := range fitting.Models() {
		b := open(s, "enter")
		for range len(s.Fit.Results) + len(s.Fit.Estimators) {
			if strings.Contains(b.View(), "of "+m.Name+", basis") {
				break
			}
			b.Press("right")
		}
		says(t, b.View(), "of "+m.Name+", basis")
		says(t, b.View()+b.Press(" ").View(), "Z(w) = ")
	}
}

func TestNotIdentifiedIsNeverBare(t *testing.T) {
	s := computed(t)
	f := *s.Fit
	f.Results = slices.Clone(f.Results)
	r := &f.Results[f.Chosen]
	r.Parameters = slices.Clone(r.Parameters)
	r.Parameters[2].Identified, r.Parameters[2].Why = false, "it is 0, the end\x1b[2J"
	s.Fit = &f
	b := open(s)
	says(t, b.View(), `Zc not identified (it is 0, the end\x1b[2J)`)
	silent(t, b.View(), "Zc     0.0")
	screentest.Fits(t, b.View(), small, tui.Theme{})
	b.Press("down", "down", "enter")
	says(t, b.View(), "range 0.0599")
}

// undecided is a study of which no model is recommended, and none was chosen.
func undecided(t *testing.T) study.Study {
	t.Helper()
	s := computed(t)
	f := *s.Fit
	f.Chosen, f.Recommended, f.Sensitivity = -1, fitting.Recommendation{Why: "C of wk2 is not identified (it has no effect)"}, nil
	s.Fit = &f
	return s
}

func TestNoneRecommendedAndNoneInUse(t *testing.T) {
	b := open(undecided(t))
	says(t, b.View(), "in use none", "None is recommended, and none in use before c chooses one: C of wk2")
	b.Press("v", "v", "]", "enter", "down", "right", "esc", "c")
	if got := changes(t, b); len(got) != 1 || got[0].Model != "wk3" {
		t.Errorf("asked for %v", got)
	}
	for _, a := range screentest.Areas() {
		b.Resize(a, tui.Theme{})
		screentest.Fits(t, b.View(), a, tui.Theme{})
	}
}

// A reason that is longer than its two lines is cut where one can see it.
func TestALongReasonIsCutVisibly(t *testing.T) {
	s := undecided(t)
	f := *s.Fit
	f.Recommended.Why = strings.Repeat("it has no effect on the pressure; ", 9)
	s.Fit = &f
	lines := strings.Split(open(s).View(), "\n")
	if got := lines[len(lines)-2]; !strings.HasSuffix(got, "~ (r: in full)") {
		t.Errorf("%q", got)
	}
	b := open(s, "r")
	if n := strings.Count(strings.Join(strings.Fields(b.View()), " "), "it has no effect on the pressure"); n < 9 {
		t.Errorf("%d of 9 reasons:\n%s", n, b.View())
	}
	if b.Press("esc"); strings.Contains(b.View(), "~ (r: in full)") == false {
		t.Errorf("esc does not close it:\n%s", b.View())
	}
}

// What is not identified is cut in its column, and in full with the
// recommendation and where it is opened; there it can be read on, where it is
// longer than the screen.
func TestALongReasonOfANumberIsReadInFull(t *testing.T) {
	s := computed(t)
	f := *s.Fit
	f.Results = slices.Clone(f.Results)
	r := &f.Results[f.Chosen]
	r.Parameters = slices.Clone(r.Parameters)
	r.Parameters[0].Identified, r.Parameters[0].Why = false, strings.Repeat("it has no effect; ", 90)+"these are the last words"
	s.Fit = &f
	for _, open_ := range []string{"enter", "r"} {
		b := open(s)
		silent(t, b.View(), "these are the last words")
		b.Press(open_)
		silent(t, b.View(), "these are the last words")
		screentest.NamesAll(t, b.Screen)
		for range 3 {
			b.Press(" ")
		}
		says(t, b.View(), "these are the last words", "lines ")
		screentest.Fits(t, b.View(), small, tui.Theme{})
		b.Press("esc")
		says(t, b.View(), "measured less that")
	}
}

func TestEscClosesANumber(t *testing.T) {
	b := open(computed(t), "enter")
	says(t, b.View(), "equation")
	if !slices.ContainsFunc(b.Screen.Keys(), func(k key.Binding) bool { return slices.Contains(k.Keys(), "esc") && k.Help().Desc == "close" }) {
		t.Error("esc is not listed as close")
	}
	if b.Press("esc"); !strings.Contains(b.View(), "measured less") {
		t.Errorf("still open:\n%s", b.View())
	}
}

func TestEveryKeyIsListedWithAllItsNames(t *testing.T) {
	for _, keys := range [][]string{nil, {"enter"}, {"r"}, {"t"}, {"f"}, {"z"}, {"w"}, {"v"}, {"]"}, {"left", "left"}} {
		screentest.NamesAll(t, open(computed(t), keys...).Screen)
	}
}

func TestWarningsNameTheKeysOfTheIntake(t *testing.T) {
	b := open(screentest.Demo(t, func(c *casefile.Case) { c.OutflowPressure = nil }), "v")
	says(t, b.View(), "here: 1 opens the intake, where m states the outflow pressure")
}

func TestPressureAlone(t *testing.T) {
	b := open(screentest.Pressure(t, "aortic_pressure", true))
	says(t, b.View(), "tau", "no interval", "cardiac output even within 20 %", "R and C are not known from pressure alone")
	b.Press("enter")
	says(t, b.View(), "ln(P - Pv) = a - t/tau", "Frank 1899")
	b.Press("c", "]", "right")
	if len(b.Told) > 0 {
		t.Errorf("there is no model to choose: %v", b.Told)
	}
}

func TestWithoutAFitTheReasonAndTheCure(t *testing.T) {
	b := open(screentest.Pressure(t, "P\x1b[31mress\u202e", false))
	says(t, b.View(), "Nothing could be fitted: no pulse in", `\x1b[31m`, "What cures it", "Intake (1)")
	screentest.Fits(t, b.View(), small, tui.Theme{})
	for _, theme := range []tui.Theme{{}, {ASCII: true}} {
		b := screentest.New(fit.New(), screentest.Pressure(t, "Füllung_pressure", false), small, theme)
		screentest.Fits(t, b.View(), small, theme)
	}
}

func TestStillComputing(t *testing.T) {
	b := open(study.Study{})
	says(t, b.View(), tui.Fit.Missing(study.Study{})[1:])
	if len(b.Screen.Keys()) > 2 {
		t.Errorf("keys that do nothing: %v", b.Screen.Keys())
	}
	b.Show(computed(t))
	b.Show(study.Study{})
	says(t, b.View(), tui.Fit.Missing(study.Study{})[1:])
}

// A picture that was asked for before a change is not shown after it.
func TestLatePicturesAreDropped(t *testing.T) {
	screen, late := fit.New().Show(computed(t))
	screen, _ = screen.Resize(small, tui.Theme{})
	for _, one := range late().(tea.BatchMsg) {
		screen, _ = screen.Update(one())
	}
	silent(t, screen.View(), "measured")
}

func TestWarningsOpenWithTheirCures(t *testing.T) {
	s := screentest.Demo(t, func(c *casefile.Case) { c.OutflowPressure = nil })
	b := open(s)
	says(t, b.View(), "warning")
	b.Press("v")
	says(t, b.View(), string(data.CodeOutflow), "cure: ")
	b.Press("v")
	says(t, b.View(), "measured")
}

func TestKeysAreListedOnceAndNoneOfTheRoots(t *testing.T) {
	roots := []string{"1", "2", "3", "4", "5", "6", "tab", "shift+tab", "?", "u", "ctrl+r", "s", "q", "ctrl+c", "ctrl+l", "ctrl+z", "esc", "A"}
	for _, s := range []study.Study{computed(t), screentest.Pressure(t, "aortic_pressure", true), {}} {
		seen := map[string]key.Binding{}
		for _, b := range open(s).Screen.Keys() {
			for _, k := range b.Keys() {
				if _, twice := seen[k]; twice || slices.Contains(roots, k) {
					t.Errorf("key %q", k)
				}
				seen[k] = b
			}
		}
	}
}

func TestSurvives(t *testing.T) {
	fresh := func() tui.Screen { return fit.New() }
	studies := []study.Study{
		computed(t),
		{},
		screentest.Pressure(t, "aortic_pressure", true), screentest.Pressure(t, "P\x1b[31m", false),
		screentest.Demo(t, func(c *casefile.Case) { c.DiameterCM = nil }),
		screentest.Demo(t, func(c *casefile.Case) { c.Model = "wk2"; c.OutflowPressure = nil }),
	}
	screentest.Survives(t, fresh, studies, "left", "right", "up", "down", "enter", "c", "[", "]", "f", "z", "w", "b", "t", "v", "r", "esc", "pgup")
}

func BenchmarkView(b *testing.B) {
	s := computed(b)
	for _, c := range []struct {
		name string
		area tui.Area
	}{{"80x20", small}, {"200x56", tui.Area{Width: 200, Height: 56}}} {
		b.Run(c.name, func(b *testing.B) {
			screen := screentest.New(fit.New(), s, c.area, tui.Theme{Colours: 256}).Screen
			b.ReportAllocs()
			for b.Loop() {
				screen.View()
			}
		})
	}
}
