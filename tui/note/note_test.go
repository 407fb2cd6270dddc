package note_test

import (
	"slices"
	"strings"
	"sync"
	"testing"

	"github.com/charmbracelet/bubbles/key"

	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/note"
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
	return screentest.New(note.New(), s, small, tui.Theme{}).Press(keys...)
}

// body is the view without its last line.
func body(b *screentest.Bench) []string {
	lines := strings.Split(b.View(), "\n")
	return lines[:len(lines)-1]
}

func foot(b *screentest.Bench) string {
	lines := strings.Split(b.View(), "\n")
	return lines[len(lines)-1]
}

func TestGolden(t *testing.T) {
	views := func(s study.Study, keys ...string) func(tui.Area, tui.Theme) string {
		return func(a tui.Area, theme tui.Theme) string {
			return screentest.New(note.New(), s, a, theme).Press(keys...).View()
		}
	}
	screentest.Golden(t, "note", views(computed(t)))
	screentest.Golden(t, "found", views(computed(t), "/", "Z", "c", "enter"), small)
	screentest.Golden(t, "remark", views(computed(t), "r", "h", "i"), small)
}

// The lines are those of the note that is saved, all of them, in both themes.
func TestItIsTheNoteThatIsSaved(t *testing.T) {
	s := computed(t)
	for _, theme := range []tui.Theme{{}, {ASCII: true}} {
		want := strings.Split(strings.TrimSuffix(study.Text(s.Note(), casenote.Options{ASCII: theme.ASCII}), "\n"), "\n")
		b := screentest.New(note.New(), s, tui.Area{Width: 200, Height: len(want) + 1}, theme)
		if got := body(b); !slices.Equal(got, want) {
			t.Errorf("%d lines, want %d", len(got), len(want))
		}
		var got []string
		b.Resize(tui.Area{Width: 80, Height: 20}, theme)
		for len(got) < len(want) {
			before := len(got)
			for i, line := range body(b) {
				if at := at(t, foot(b)) + i; at == len(got) {
					got = append(got, line)
				}
			}
			if len(got) == before {
				t.Fatalf("after %d lines nothing new comes", before)
			}
			b.Press(" ")
		}
		if !slices.Equal(got, want) {
			t.Error("read page by page, the note is another")
		}
	}
}

// at is the index of the first line shown.
func at(t *testing.T, foot string) int {
	t.Helper()
	words := strings.Fields(foot)
	if len(words) < 2 {
		t.Fatal(foot)
	}
	first, _, _ := strings.Cut(words[1], "-")
	n := 0
	for _, r := range first {
		n = 10*n + int(r-'0')
	}
	return n - 1
}

func TestMoving(t *testing.T) {
	b := open(computed(t))
	for _, step := range []struct {
		key  string
		want int
	}{{"j", 1}, {"down", 2}, {"k", 1}, {"up", 0}, {"up", 0}, {"pgdown", 18}, {" ", 36}, {"pgup", 18}, {"g", 0}, {"end", -1}, {"home", 0}} {
		b.Press(step.key)
		got := at(t, foot(b))
		if step.want >= 0 && got != step.want {
			t.Errorf("after %s at line %d, want %d", step.key, got, step.want)
		}
	}
	b.Press("G")
	if last := body(b); last[len(last)-1] != casenote.Caution {
		t.Errorf("the end is %q", last[len(last)-1])
	}
	if !strings.Contains(foot(b), "s saves it") {
		t.Errorf("nothing says how it is saved: %q", foot(b))
	}
}

func TestNarrowShiftsToTheRight(t *testing.T) {
	b := open(computed(t))
	b.Resize(tui.Area{Width: 60, Height: 11}, tui.Theme{})
	if first := body(b)[0]; !strings.HasSuffix(first, "~") || len(first) != 60 {
		t.Errorf("%q", first)
	}
	b.Press("right", "right", "right")
	if first := body(b)[0]; !strings.HasSuffix(first, "treatment.") {
		t.Errorf("%q", first)
	}
	b.Press("h", "h", "h")
	if first := body(b)[0]; !strings.HasPrefix(first, "Research") {
		t.Errorf("%q", first)
	}
}

// remarks are those of the cases that were asked for.
func remarks(t *testing.T, b *screentest.Bench) (all []string) {
	t.Helper()
	for _, msg := range b.Told {
		c, ok := msg.(tui.ChangeMsg)
		if !ok || c.Said.String() == "" {
			t.Fatalf("%#v", msg)
		}
		all = append(all, c.Case.Remark)
	}
	return all
}

func TestRemark(t *testing.T) {
	b := open(computed(t), "r")
	if !b.Screen.Typing() {
		t.Fatal("no field opened")
	}
	b.Type("damped? q1")
	b.Paste(" see\x1b[2J\nlog")
	if got := foot(b); !strings.HasPrefix(got, "Remark: damped? q1 see") || strings.ContainsRune(got, 0x1b) {
		t.Errorf("%q", got)
	}
	b.Press("enter")
	got := remarks(t, b)
	if len(got) != 1 || !strings.HasPrefix(got[0], "damped? q1 see") || !strings.HasSuffix(got[0], " log") || b.Screen.Typing() {
		t.Fatalf("%q", got)
	}
	b.Show(screentest.Demo(t, func(c *casefile.Case) { c.Remark = got[0] }))
	b.Press("G")
	if !strings.Contains(b.View(), "damped? q1 see") {
		b.Press("k", "k", "k", "k", "k", "k", "k", "k")
	}
	if !strings.Contains(b.View(), "damped? q1 see") {
		t.Errorf("the remark is not in the note:\n%s", b.View())
	}
	b.Press("r", "enter") // unchanged
	b.Press("r", "ctrl+u", "x", "esc")
	if n := len(remarks(t, b)); n != 1 {
		t.Errorf("%d changes", n)
	}
	b.Press("r", "ctrl+u", "enter")
	if got := remarks(t, b); len(got) != 2 || got[1] != "" {
		t.Errorf("%q", got)
	}
}

func TestSearch(t *testing.T) {
	s := computed(t)
	var want []int
	for i, line := range strings.Split(study.Text(s.Note(), casenote.Options{}), "\n") {
		if strings.Contains(strings.ToLower(line), "compliance") {
			want = append(want, i)
		}
	}
	if len(want) < 2 {
		t.Fatalf("lines %v", want)
	}
	b := open(s, "/")
	b.Type("ComPliance")
	b.Press("enter")
	for i := range len(want) + 1 {
		line := want[i%len(want)]
		lines := body(b)
		if k := line - at(t, foot(b)); k < 0 || k >= len(lines) || !strings.HasPrefix(lines[k], "> ") {
			t.Fatalf("match %d on line %d is not marked:\n%s", i+1, line, b.View())
		}
		b.Press("n")
	}
	b.Press("N")
	if !strings.Contains(foot(b), "match 1 of") {
		t.Errorf("%q", foot(b))
	}
	b.Press("/")
	b.Type("no such words")
	b.Press("enter")
	said, ok := b.Told[0].(tui.SayMsg)
	if !ok || !strings.Contains(said.Text.String(), "no such words") || strings.Contains(foot(b), "match") {
		t.Errorf("%#v, %q", b.Told, foot(b))
	}
	b.Press("n", "N", "/", "enter") // nothing sought, nothing found
}

func TestStillComputing(t *testing.T) {
	b := open(study.Study{}, "r", "/", "j", "right")
	if b.Screen.Typing() || !strings.Contains(b.View(), tui.Note.Missing(study.Study{})[1:]) {
		t.Errorf("%s", b.View())
	}
}

// A note that was asked for before a change is not shown after it.
func TestALateNoteIsDropped(t *testing.T) {
	screen, _ := note.New().Resize(small, tui.Theme{})
	screen, late := screen.Show(computed(t))
	screen, _ = screen.Show(screentest.Pressure(t, "aortic_pressure", true))
	screen, _ = screen.Update(late())
	if strings.Contains(screen.View(), "demo.csv") {
		t.Errorf("%s", screen.View())
	}
}

func TestForeignTextIsShownCleaned(t *testing.T) {
	s := screentest.Pressure(t, "Fü\x1b[31m\u202epress", true)
	for _, theme := range []tui.Theme{{}, {ASCII: true}} {
		b := screentest.New(note.New(), s, tui.Area{Width: 80, Height: 500}, theme)
		screentest.Fits(t, b.View(), tui.Area{Width: 80, Height: 500}, theme)
		if !strings.Contains(b.View(), `\x1b[31m`) {
			t.Errorf("the name is not there:\n%s", b.View())
		}
	}
}

func TestKeysAreListedOnceAndNoneOfTheRoots(t *testing.T) {
	roots := []string{"1", "2", "3", "4", "5", "6", "tab", "shift+tab", "?", "u", "ctrl+r", "s", "q", "ctrl+c", "ctrl+l", "ctrl+z", "esc", "A"}
	for _, s := range []study.Study{computed(t), {}} {
		b := open(s, "/", "R", "enter")
		b.Resize(tui.Area{Width: 60, Height: 11}, tui.Theme{})
		seen := map[string]key.Binding{}
		for _, one := range b.Screen.Keys() {
			for _, k := range one.Keys() {
				if _, twice := seen[k]; twice || slices.Contains(roots, k) && one.Help().Desc != "end search" {
					t.Errorf("key %q", k)
				}
				seen[k] = one
			}
		}
	}
}

func TestEscEndsASearch(t *testing.T) {
	b := open(computed(t), "/", "R", "enter")
	if !strings.Contains(b.View(), "match 1 of") {
		t.Fatalf("nothing found:\n%s", b.View())
	}
	if !slices.ContainsFunc(b.Screen.Keys(), func(k key.Binding) bool { return k.Help().Desc == "end search" }) {
		t.Error("esc is not listed")
	}
	b.Press("esc")
	if strings.Contains(b.View(), "match 1 of") {
		t.Errorf("still searching:\n%s", b.View())
	}
	for _, k := range b.Screen.Keys() {
		if k.Enabled() && slices.Contains(k.Keys(), "esc") {
			t.Errorf("esc is listed as %q without a search", k.Help().Desc)
		}
	}
}

// TestEveryKeyIsListedWithAllItsNames: what the help names is what is bound.
func TestEveryKeyIsListedWithAllItsNames(t *testing.T) {
	b := open(computed(t), "/", "R", "enter")
	b.Resize(tui.Area{Width: 60, Height: 11}, tui.Theme{})
	screentest.NamesAll(t, b.Screen)
}

func TestSurvives(t *testing.T) {
	fresh := func() tui.Screen { return note.New() }
	studies := []study.Study{computed(t), {}, screentest.Pressure(t, "P\x1b[31mü", true)}
	screentest.Survives(t, fresh, studies, "r", "/", "n", "N", "j", "k", "g", "G", "left", "right", " ", "R", "c", "\x1b")
}

func BenchmarkView(b *testing.B) {
	s := computed(b)
	for _, c := range []struct {
		name string
		area tui.Area
	}{{"80x20", small}, {"200x56", tui.Area{Width: 200, Height: 56}}} {
		b.Run(c.name, func(b *testing.B) {
			screen := screentest.New(note.New(), s, c.area, tui.Theme{}).Screen
			b.ReportAllocs()
			for b.Loop() {
				screen.View()
			}
		})
	}
}

func TestBrief(t *testing.T) {
	b := open(computed(t), "b")
	var asked []bool
	for _, m := range b.Told {
		if c, ok := m.(tui.ChangeMsg); ok {
			asked = append(asked, c.Case.Brief)
		}
	}
	if len(asked) != 1 || !asked[0] {
		t.Fatalf("asked for %v", asked)
	}
	b.Show(screentest.Demo(t, func(c *casefile.Case) { c.Brief = true }))
	if v := b.View(); !strings.Contains(v, "lines 1-") {
		t.Errorf("view:\n%s", v)
	}
	for _, k := range b.Screen.Keys() {
		if k.Help().Desc == "all sections" {
			return
		}
	}
	t.Error("no key brings the sections back")
}
