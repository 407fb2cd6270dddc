package support_test

import (
	"fmt"
	"io/fs"
	"slices"
	"strings"
	"sync"
	"testing"

	"github.com/charmbracelet/bubbles/key"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
	records "afterbeat/data/demo"
	"afterbeat/data/unit"
	"afterbeat/tree/study"
	posing "afterbeat/tree/support"
	"afterbeat/tui"
	"afterbeat/tui/screentest"
	"afterbeat/tui/support"
)

const identity = "by construction: an identity, never a forecast"

var (
	once sync.Once
	demo study.Study
)

// computed is the demo as far as the yardsticks, computed once for all tests.
func computed(t testing.TB) study.Study {
	t.Helper()
	once.Do(func() { demo = yardsticks(t, nil) })
	return demo
}

var (
	small = tui.Area{Width: 80, Height: 20}
	large = tui.Area{Width: 160, Height: 46}
)

// yardsticks is the demo as change makes its case, without a forecast.
func yardsticks(t testing.TB, change func(*casefile.Case)) study.Study {
	t.Helper()
	c := screentest.DemoCase(t)
	if change != nil {
		change(&c)
	}
	in, err := study.Read(c, func(name string) ([]byte, error) { return fs.ReadFile(records.Files(), name) })
	if err != nil {
		t.Fatal(err)
	}
	s, err := study.Run(t.Context(), in, study.StageSupport)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

func open(s study.Study, keys ...string) *screentest.Bench {
	return screentest.New(support.New(), s, small, tui.Theme{}).Press(keys...)
}

// answer is that of a posing.
func answer(t testing.TB, s study.Study, p posing.Posing) posing.Answer {
	t.Helper()
	for _, a := range s.Comparison.Answers {
		if a.Posing == p {
			return a
		}
	}
	t.Fatalf("no answer for %s", p)
	return posing.Answer{}
}

func TestGolden(t *testing.T) {
	s := computed(t)
	views := func(s study.Study, keys ...string) func(tui.Area, tui.Theme) string {
		return func(a tui.Area, theme tui.Theme) string {
			return screentest.New(support.New(), s, a, theme).Press(keys...).View()
		}
	}
	screentest.Golden(t, "support", views(s))
	screentest.Golden(t, "scaled", views(s, "left"), small)
	screentest.Golden(t, "sweep", views(s, "w"), small, tui.Area{Width: 60, Height: 11})
	screentest.Golden(t, "energy", views(s, "e"), small, large)
	screentest.Golden(t, "indices", views(s, "m"), small)
	screentest.Golden(t, "held", views(s, "h"), small, tui.Area{Width: 60, Height: 11})
	screentest.Golden(t, "table", views(s, "t"), small)
	screentest.Golden(t, "no-comparison", views(screentest.Pressure(t, "aortic_pressure", true)), small)
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

// The screen begins with the posing that is no identity, at half the flow, and
// moves through what the study computed.
func TestShareMoves(t *testing.T) {
	s := computed(t)
	a := answer(t, s, posing.LateValvePosing)
	b := open(s)
	shares := a.Shares()
	i := slices.Index(shares, 0.5)
	for _, step := range []struct {
		key string
		by  int
	}{{"up", 0}, {"up", 1}, {"k", 1}, {"+", 1}, {"down", -1}, {"j", -1}, {"-", -1}, {"down", -1}} {
		if step.by != 0 {
			i += step.by
			b.Press(step.key)
		}
		e := a.Comparisons[i].RetainedPressure
		says(t, b.View(), fmt.Sprintf("late-valve share %.4g", shares[i]),
			"retained pulse "+casenote.Format(e.Value, e.Total)+" ("+casenote.FormatRange(e.Value, e.Total)+")")
	}
	for range 2 * len(shares) {
		b.Press("up")
	}
	says(t, b.View(), "share 1 ", "valve shut")
	for range 2 * len(shares) {
		b.Press("down")
	}
	says(t, b.View(), "share 0 ", "retained pulse 1 ")
}

func TestScaledIsAlwaysLabelled(t *testing.T) {
	b := open(computed(t))
	says(t, b.View(), "a yardstick, no forecast")
	silent(t, b.View(), identity)
	b.Press("left")
	for _, view := range []string{"w", "w", "e", "e", "m", "m", "t", "t", "f"} {
		says(t, b.View(), "scaled share 0.5", identity)
		b.Press(view)
	}
	b.Press("right", "w") // late-valve, but the sweep shows both
	says(t, b.View(), "late-valve share 0.5", identity)
	for _, a := range screentest.Areas() {
		b.Resize(a, tui.Theme{})
		says(t, b.View(), identity)
	}
}

// A step of the share leaves axes and labels where they are.
func TestSteppingKeepsTheFrame(t *testing.T) {
	b := open(computed(t))
	frame := func() (out []string) {
		lines := strings.Split(b.View(), "\n")
		for _, line := range lines[2:15] {
			out = append(out, strings.TrimRight(string([]rune(line + strings.Repeat(" ", 5))[:5]), " "))
		}
		return append(out, lines[13], lines[14])
	}
	before := frame()
	for _, k := range []string{"up", "up", "down", "left", "up", "right"} {
		b.Press(k)
		if got := frame(); !slices.Equal(got, before) {
			t.Fatalf("after %s the frame is\n%s\nand was\n%s", k, strings.Join(got, "\n"), strings.Join(before, "\n"))
		}
	}
}

func TestShareAndPosingStay(t *testing.T) {
	s := computed(t)
	b := open(s, "left", "up", "up")
	b.Show(study.Study{})
	b.Show(s)
	says(t, b.View(), "scaled share 0.7")
	b.Show(yardsticks(t, func(c *casefile.Case) { c.Share = []float64{0.25, 0.625} }))
	says(t, b.View(), "scaled share 0.625")
	b.Press("w")
	says(t, b.View(), "0.25 0.7500")
	b.Press("down")
	says(t, b.View(), "share 0.25")
}

func TestFigures(t *testing.T) {
	s := computed(t)
	a := answer(t, s, posing.LateValvePosing)
	i := slices.Index(a.Shares(), 0.5)
	state := a.Supported[i]
	b := open(s)
	p := state.PulsePressure
	says(t, b.View(), "mean "+casenote.Format(state.MeanPressure.Value, state.MeanPressure.Total)+" mmHg",
		casenote.Format(p.Value, p.Total)+" ("+casenote.FormatRange(p.Value, p.Total)+")")
	b.Press("e")
	mw := data.Interval{
		Low:  state.PulsatilePower.Total.Low * unit.MilliwattPerMmHgMLPerS,
		High: state.PulsatilePower.Total.High * unit.MilliwattPerMmHgMLPerS,
	}
	says(t, b.View(), "pulsatile part, mW", casenote.FormatRange(state.PulsatilePower.Value*unit.MilliwattPerMmHgMLPerS, mw), "Power of the arterial side")
	b.Press("m")
	says(t, b.View(), "Gosling PI", casenote.Format(state.PressureMeasures.GoslingPI, data.NoInterval()))
	b.Press("m", "f")
	says(t, b.View(), "mL/s flow of wk3 native", "retained swing "+casenote.Format(a.Comparisons[i].RetainedFlow.Value, a.Comparisons[i].RetainedFlow.Total))
}

func TestSweepShowsEveryShare(t *testing.T) {
	s := computed(t)
	b := open(s, "w")
	for _, p := range posing.Posings() {
		a := answer(t, s, p)
		for i, share := range a.Shares() {
			says(t, b.View(), fmt.Sprintf("%.4g ", share))
			if e := a.Comparisons[i].RetainedPressure; e.Total.Defined() && share > 0 {
				says(t, b.View(), casenote.Format(e.Value, e.Total))
			}
		}
	}
	b.Resize(tui.Area{Width: 60, Height: 11}, tui.Theme{})
	silent(t, b.View(), "share  scaled")
	b.Press("t")
	says(t, b.View(), "> 0.5 0.5000")
}

func TestHeldScrolls(t *testing.T) {
	b := open(computed(t))
	b.Resize(tui.Area{Width: 60, Height: 11}, tui.Theme{})
	b.Press("h")
	says(t, b.View(), "total resistance Z(0)", "lines 1-10 of")
	b.Press("j", "G")
	says(t, b.View(), "Eur J Heart Fail 2021;23:1955")
	b.Press("h")
	says(t, b.View(), "late-valve 0.5 ") // scrolling did not move the share
}

func TestWithoutAComparisonTheReasonAndTheCure(t *testing.T) {
	b := open(yardsticks(t, func(c *casefile.Case) { c.DiameterCM = nil }))
	says(t, b.View(), "There is no comparison: the fit is per unit area", "Intake (1)", "a diameter for a velocity")
	b.Press("up", "left", "w", "e", "m", "h", "t", "f")
	says(t, b.View(), "There is no comparison")
	for _, theme := range []tui.Theme{{}, {ASCII: true}} {
		b := screentest.New(support.New(), screentest.Pressure(t, "Fü\x1b[31m\u202epress", false), small, theme)
		screentest.Fits(t, b.Press("v").View(), small, theme)
	}
}

func TestStillComputing(t *testing.T) {
	b := open(study.Study{}, "up", "w", "h")
	says(t, b.View(), tui.Support.Missing(study.Study{})[1:])
}

// A picture that was asked for before a change is not shown after it.
func TestLateCurvesAreDropped(t *testing.T) {
	screen, _ := support.New().Resize(small, tui.Theme{})
	screen, late := screen.Show(computed(t))
	screen, _ = screen.Resize(small, tui.Theme{})
	screen, _ = screen.Update(late())
	silent(t, screen.View(), "native ─")
}

func TestWarningsOpenWithTheirCures(t *testing.T) {
	b := open(yardsticks(t, func(c *casefile.Case) { c.OutflowPressure = nil }), "v")
	says(t, b.View(), "outflow-pressure-assumed", "cure: ")
	b.Press("v")
	says(t, b.View(), "native (95 %)")
}

func TestKeysAreListedOnceAndNoneOfTheRoots(t *testing.T) {
	roots := []string{"1", "2", "3", "4", "5", "6", "tab", "shift+tab", "?", "u", "ctrl+r", "s", "q", "ctrl+c", "ctrl+l", "ctrl+z", "esc", "A"}
	for _, s := range []study.Study{computed(t), {}} {
		for _, view := range []string{"", "w", "e", "m", "h"} {
			seen := map[string]key.Binding{}
			for _, b := range open(s, view).Screen.Keys() {
				for _, k := range b.Keys() {
					if _, twice := seen[k]; twice || slices.Contains(roots, k) {
						t.Errorf("key %q in %q", k, view)
					}
					seen[k] = b
				}
			}
		}
	}
}

func TestSurvives(t *testing.T) {
	fresh := func() tui.Screen { return support.New() }
	studies := []study.Study{
		computed(t),
		{},
		screentest.Pressure(t, "P\x1b[31m", false),
		yardsticks(t, func(c *casefile.Case) { c.DiameterCM = nil }),
		yardsticks(t, func(c *casefile.Case) { c.Share = []float64{1}; c.OutflowPressure = nil }),
		yardsticks(t, func(c *casefile.Case) { c.Share = []float64{0.123456, 0.98765} }),
	}
	screentest.Survives(t, fresh, studies, "left", "right", "up", "down", "+", "-", "w", "e", "m", "h", "f", "t", "v")
}

func BenchmarkView(b *testing.B) {
	s := computed(b)
	for _, c := range []struct {
		name string
		area tui.Area
	}{{"80x20", small}, {"200x56", tui.Area{Width: 200, Height: 56}}} {
		for _, view := range []string{"", "w", "e", "m", "h"} {
			b.Run(c.name+view, func(b *testing.B) {
				bench := screentest.New(support.New(), s, c.area, tui.Theme{Colours: 256})
				if view != "" {
					bench.Press(view)
				}
				b.ReportAllocs()
				for b.Loop() {
					bench.Screen.View()
				}
			})
		}
	}
}
