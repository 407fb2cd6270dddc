package tree_test

import (
	"io/fs"
	"strings"
	"sync"
	"testing"

	"afterbeat/data"
	records "afterbeat/data/demo"
	"afterbeat/data/unit"
	"afterbeat/tree/anatomy"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/screentest"
	"afterbeat/tui/tree"
)

var (
	once sync.Once
	demo study.Study
)

// grown is the demo as far as its tree, computed once for all tests.
func grown(t testing.TB) study.Study {
	t.Helper()
	once.Do(func() {
		in, err := study.Read(screentest.DemoCase(t), func(name string) ([]byte, error) { return fs.ReadFile(records.Files(), name) })
		if err != nil {
			t.Fatal(err)
		}
		if demo, err = study.Run(t.Context(), in, study.StageTree); err != nil {
			t.Fatal(err)
		}
	})
	return demo
}

// traced is the demo with a radial trace, which is the tree's own with a larger
// pulse.
func traced(t testing.TB) study.Study {
	t.Helper()
	s := grown(t)
	own := *s.Tree
	i, _ := anatomy.Find(own.Network, data.SiteRadial)
	var p data.Period
	for _, one := range own.Segments {
		if one.Index == i.Segment {
			p = one.Waves.Outlet.Pressure
		}
	}
	measured := data.Period{Rate: p.Rate}
	for _, v := range p.Samples {
		measured.Samples = append(measured.Samples, p.Mean()+1.2*(v-p.Mean()))
	}
	own.Distal = []anatomy.Compared{{
		Trace:   anatomy.Trace{Name: data.Clean("radial_art"), Site: data.SiteRadial, Quantity: unit.Pressure, Beat: measured, HeldOut: true},
		Segment: "8", Place: "end of R. radial", Predicted: p, RMSE: 3.2,
	}}
	s.Tree = &own
	return s
}

var (
	small  = tui.Area{Width: 80, Height: 20}
	large  = tui.Area{Width: 160, Height: 46}
	little = tui.Area{Width: 60, Height: 11}
)

func open(s study.Study, keys ...string) *screentest.Bench {
	return screentest.New(tree.New(), s, small, tui.Theme{}).Press(keys...)
}

func TestGolden(t *testing.T) {
	views := func(s study.Study, keys ...string) func(tui.Area, tui.Theme) string {
		return func(a tui.Area, theme tui.Theme) string {
			return screentest.New(tree.New(), s, a, theme).Press(keys...).View()
		}
	}
	s := grown(t)
	screentest.Golden(t, "tree", views(s, "j", "j", "j"))
	screentest.Golden(t, "beds", views(s, "b", "j"))
	screentest.Golden(t, "impedance", views(s, "i"), small, large)
	screentest.Golden(t, "measured", views(traced(t), "d", "j"), small, little)
	screentest.Golden(t, "made", views(s, "m"), small)
	screentest.Golden(t, "waves", views(s, "w"), small, little)
	screentest.Golden(t, "no-tree", views(screentest.Pressure(t, "aortic_pressure", true)), small)
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

// The cursor moves through the outline, and what is drawn is the segment under it.
func TestCursorMoves(t *testing.T) {
	s := grown(t)
	b := open(s)
	says(t, b.View(), "> - Ascending aorta", "At the end of Ascending aorta")
	for i := 1; i < len(s.Tree.Segments); i++ {
		b.Press("j")
		says(t, b.View(), "At the end of "+s.Tree.Segments[i].Called())
	}
	b.Press("j")
	says(t, b.View(), "At the end of "+s.Tree.Segments[54].Called())
	b.Press("g")
	says(t, b.View(), "At the end of Ascending aorta")
	b.Press("G", "k")
	says(t, b.View(), "At the end of "+s.Tree.Segments[53].Called())
}

func TestPictureFollowsTheCursor(t *testing.T) {
	b := open(grown(t), "w")
	before := b.View()
	if b.Press("j", "j", "j", "j", "j"); before == b.View() {
		t.Error("the waves of another segment look the same")
	}
}

// A folded segment hides what hangs on it, and says so.
func TestFold(t *testing.T) {
	s := grown(t)
	b := open(s, "j")
	first := s.Tree.Segments[1].Called()
	second := s.Tree.Segments[2].Called()
	says(t, b.View(), "> - "+first)
	b.Press("h")
	says(t, b.View(), "> + "+first)
	silent(t, b.View(), second)
	b.Press("l", "j")
	says(t, b.View(), "At the end of "+second)
	// From a terminal h goes to its parent.
	b.Press("G", "h")
	last := s.Tree.Segments[54]
	says(t, b.View(), "At the end of "+s.Tree.Segments[last.Parent].Called())
	// z folds all but the root, and unfolds all.
	b.Press("z")
	silent(t, b.View(), "femoral")
	b.Press("z", "G")
	says(t, b.View(), "At the end of "+last.Called())
	// A screen is a value: what a key folds is not folded in the screen before.
	one := open(s, "j").Screen
	two, _ := one.Update(screentest.Key("h"))
	silent(t, one.View(), "+ "+first)
	says(t, two.View(), "+ "+first)
}

func TestFilter(t *testing.T) {
	s := grown(t)
	b := open(s, "/")
	if !b.Screen.Typing() {
		t.Fatal("the filter does not take text")
	}
	b.Type("kidneys")
	says(t, b.View(), "filter: kidneys|", "L. renal", "R. renal")
	silent(t, b.View(), "Ascending")
	b.Press("enter")
	says(t, b.View(), `filter "kidneys": 2 of 55 segments`)
	b.Press("esc")
	says(t, b.View(), "Ascending aorta")
	b.Press("/")
	b.Type("nothing like it")
	says(t, b.View(), "no segment has these letters")
	b.Press("enter", "j", "h", "l", "i", "i", "w", "esc")
	says(t, b.View(), "Ascending aorta")
	b.Press("/")
	b.Paste("fem\x1boral")
	silent(t, b.View(), "\x1b[") // no escape comes through
}

func TestBedsHaveTheirNumbers(t *testing.T) {
	s := grown(t)
	b := open(s, "b")
	for _, bed := range s.Tree.Beds {
		says(t, b.View(), "Bed "+bed.Name)
		b.Press("j")
	}
	b.Press("b")
	says(t, b.View(), "At the end of")
}

func TestImpedanceAndReflection(t *testing.T) {
	b := open(grown(t), "i")
	says(t, b.View(), "modulus", "phase", "measured", "reflects", "ms from the root")
	before := b.View()
	b.Press("j")
	if strings.Split(before, "\n")[2] != strings.Split(b.View(), "\n")[2] {
		t.Error("the picture of the root moves with the cursor")
	}
}

func TestMeasuredTraces(t *testing.T) {
	says(t, open(grown(t), "d").View(), "Trace 1 of 1", "none is distal")
	b := open(traced(t), "d")
	says(t, b.View(), "Trace 1 of 2")
	says(t, b.Press("j").View(), "Trace 2 of 2", "held out: a test", "radial_art (radial), end of R. radial", "misses it by 3.2")
}

// The segment under the cursor stays when the study is computed again.
func TestCursorStays(t *testing.T) {
	s := grown(t)
	b := open(s, "j", "j", "j", "j")
	name := s.Tree.Segments[4].Called()
	b.Show(study.Study{Inputs: s.Inputs, Intake: s.Intake, Beats: s.Beats, Fit: s.Fit})
	says(t, b.View(), "The tree has not been computed yet")
	b.Show(s)
	says(t, b.View(), "At the end of "+name)
}

// Most of a frame stays as it is when the cursor moves: bounds and labels do not.
func TestAStepChangesFewLines(t *testing.T) {
	b := open(grown(t), "j")
	for range 20 {
		before := strings.Split(b.View(), "\n")
		after := strings.Split(b.Press("j").View(), "\n")
		for _, i := range []int{0, 1, 8, 17, 18} { // head, heads, titles, axes
			if before[i] != after[i] {
				t.Fatalf("line %d went from\n%s\nto\n%s", i, before[i], after[i])
			}
		}
	}
}

func TestKeysAreNamed(t *testing.T) {
	s := grown(t)
	for _, keys := range [][]string{nil, {"b"}, {"i"}, {"d"}, {"m"}, {"w"}, {"/"}, {"/", "a", "enter"}, {"v"}, {"z"}} {
		screentest.NamesAll(t, open(s, keys...).Screen)
	}
}

func TestSurvives(t *testing.T) {
	s := grown(t)
	screentest.Survives(t, func() tui.Screen { return tree.New() },
		[]study.Study{{}, {Inputs: s.Inputs}, s, traced(t), screentest.Pressure(t, "aortic_pressure", true)},
		"/", "a", "r", "backspace", "enter", "esc", "left", "right", "up", "down", "v")
}

// A move of the cursor draws both pictures.
func BenchmarkMove(b *testing.B) {
	bench := open(grown(b))
	b.ReportAllocs()
	for i := 0; b.Loop(); i++ {
		key := "j"
		if i/54%2 == 1 {
			key = "k"
		}
		bench.Press(key)
		_ = bench.View()
	}
}

func BenchmarkView(b *testing.B) {
	bench := open(grown(b))
	b.ReportAllocs()
	for b.Loop() {
		_ = bench.View()
	}
}
