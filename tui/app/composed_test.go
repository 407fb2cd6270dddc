package app

import (
	"context"
	"io/fs"
	"slices"
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"
	"pgregory.net/rapid"

	"afterbeat/data/casefile"
	"afterbeat/data/demo"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/beats"
	"afterbeat/tui/fit"
	"afterbeat/tui/intake"
	"afterbeat/tui/note"
	"afterbeat/tui/support"
	"afterbeat/tui/tree"
)

// composed is a driver over the screens of the program and the demo case,
// whose computing is real where compute is set.
func composed(t testing.TB, compute bool, more ...func(*Options)) *driver {
	t.Helper()
	d := newDriver(t, func(o *Options) {
		o.Screens = map[tui.Stage]tui.Screen{
			tui.Intake: intake.New(), tui.Beats: beats.New(), tui.Fit: fit.New(), tui.Tree: tree.New(), tui.Support: support.New(), tui.Note: note.New(),
		}
		if !compute {
			return
		}
		o.Load = func(_ context.Context, c casefile.Case) (study.Inputs, error) {
			return study.Read(c, func(name string) ([]byte, error) { return fs.ReadFile(demo.Files(), name) })
		}
		for _, change := range more {
			change(o)
		}
	})
	if compute {
		d.m.next = func(ctx context.Context, s study.Study) (study.Study, error) { return s.Next(ctx) }
	}
	d.send(tea.WindowSizeMsg{Width: 80, Height: 24})
	d.do(d.m.Init())
	return d
}

// keysOfScreens are keys that the screens answer, beside those of nobody.
var keysOfScreens = strings.Fields(
	"left right up down h j k l g G H L 0 + - = t n p N P d c o O e i w f z b [ ] x m r / v enter esc pgup pgdown home end " +
		"1 2 3 4 5 6 tab ? A u ctrl+r backspace 7 .")

// TestNoKeyHasTwoMeanings holds the keys of every screen against those of the
// root, as they change with what is pressed.
func TestNoKeyHasTwoMeanings(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		d := composed(t, false)
		for range rapid.IntRange(0, 12).Draw(rt, "presses") {
			d.send(keyOf(rapid.SampledFrom(keysOfScreens).Draw(rt, "key")))
			if d.m.typing() || d.m.helping {
				continue
			}
			of := map[string]string{}
			most, others := d.m.everywhere()
			for _, b := range slices.Concat(d.m.screens[d.m.open].Keys(), most, others) {
				if !b.Enabled() {
					continue
				}
				if b.Help().Key == "" || b.Help().Desc == "" {
					rt.Fatalf("%s: %q has no help", d.m.open, b.Keys())
				}
				for _, k := range b.Keys() {
					if was, twice := of[k]; twice && k != "esc" && k != "enter" {
						rt.Fatalf("%s: %q is %q and %q", d.m.open, k, was, b.Help().Desc)
					}
					of[k] = b.Help().Desc
				}
			}
		}
	})
}

// TestComposedProperties presses anything on the real screens.
func TestComposedProperties(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		d := composed(t, false)
		for range rapid.IntRange(1, 20).Draw(rt, "steps") {
			switch rapid.IntRange(0, 7).Draw(rt, "what") {
			case 0:
				d.send(tea.WindowSizeMsg{Width: rapid.IntRange(1, 250).Draw(rt, "width"), Height: rapid.IntRange(1, 80).Draw(rt, "height")})
			case 1:
				d.burst(rapid.StringOfN(rapid.SampledFrom([]rune("123456?uhjklgGHLtnpNPdcoOeiwf[]xmrv/+-=0 .")), 2, 10, -1).Draw(rt, "burst"))
			case 2:
				d.send(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune(rapid.String().Draw(rt, "pasted")), Paste: true})
			default:
				d.send(keyOf(rapid.SampledFrom(keysOfScreens).Draw(rt, "key")))
			}
			check(rt, d)
			if strings.Contains(d.m.View(), "has a fault at") {
				rt.Fatal(d.m.View())
			}
		}
	})
}

// TestEachStageOfTheDemo looks at every stage of the demo, computed in earnest.
func TestEachStageOfTheDemo(t *testing.T) {
	d := composed(t, true)
	for _, s := range tui.Stages() {
		d.send(letter(rune('0' + int(s))))
		t.Logf("\n%s", d.m.View())
		if n := len(d.rows()); n != 24 {
			t.Errorf("%s: %d rows", s, n)
		}
	}
	d.keys("6 s enter")
	if !strings.Contains(d.files["demo.note.txt"], "Reproduce") && !strings.Contains(d.files["demo.note.txt"], "afterbeat study") {
		t.Errorf("saved %q", d.files)
	}
}

func BenchmarkView(b *testing.B) {
	d := composed(b, false)
	d.send(tea.WindowSizeMsg{Width: 200, Height: 56})
	for _, s := range tui.Stages() {
		d.keys(string(rune('0' + int(s))))
		b.Run(s.String(), func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if d.m.View() == "" {
					b.Fatal("no view")
				}
			}
		})
	}
}
