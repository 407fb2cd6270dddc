package app

import (
	"os"
	"slices"
	"strings"
	"testing"
	"unicode/utf8"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/charmbracelet/x/ansi"
	"pgregory.net/rapid"

	"afterbeat/data/casenote"
	"afterbeat/tui"
	"afterbeat/tui/state"
)

// anyKey are keys, those of the root and the stubs, and some of nobody.
var anyKey = rapid.SampledFrom(strings.Fields(
	"1 2 3 4 5 6 tab shift+tab ? u ctrl+r s q y r esc enter A ctrl+l ctrl+z k j g G pgup pgdown home end up down left right " +
		"i d l / o w e n p P v V x backspace ctrl+u ctrl+v ctrl+a f1 insert delete"))

// TestRootProperties presses anything at any size while commands come back in
// any order.
func TestRootProperties(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		d := newDriver(t, func(o *Options) { o.Theme.ASCII = rapid.Bool().Draw(rt, "ascii") })
		d.hold = true
		d.do(d.m.Init())
		check(rt, d)
		for range rapid.IntRange(1, 40).Draw(rt, "steps") {
			anyStep(rt, d)
			check(rt, d)
			if d.quits {
				break
			}
		}
		d.run()
		work := d.m.present
		unsaved := d.m.unsaved()
		if d.quits {
			o, err := d.m.finish(nil)
			if err != nil || unsaved && !o.Unsaved {
				rt.Fatalf("unsaved choices are lost: %+v, %v", o, err)
			}
			return
		}
		for range 20 { // esc leads back: typing, questions, help, errors, computing
			d.send(keyOf("esc"))
			d.run()
		}
		if d.m.naming || d.m.helping || d.m.leaving != stays || d.m.typing() || len(d.m.errors) > 0 || d.m.job.running {
			if !d.m.small() {
				rt.Fatalf("esc does not lead back: %q", d.status())
			}
		}
		if !same(work, d.m.present) {
			rt.Fatalf("choices are lost: %+v, were %+v", d.m.present, work)
		}
	})
}

// anyStep is one thing that can happen.
func anyStep(rt *rapid.T, d *driver) {
	switch rapid.IntRange(0, 9).Draw(rt, "what") {
	case 0:
		d.send(tea.WindowSizeMsg{Width: rapid.IntRange(1, 250).Draw(rt, "width"), Height: rapid.IntRange(1, 80).Draw(rt, "height")})
	case 1:
		letters := rapid.StringOfN(rapid.SampledFrom([]rune("123456?usqyridlownepPvA/x \u202eü")), 2, 12, -1)
		d.send(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune(letters.Draw(rt, "burst"))})
	case 2:
		d.send(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune(rapid.String().Draw(rt, "pasted")), Paste: true})
	case 3, 4, 5:
		if n := len(d.waiting); n > 0 {
			d.step(rapid.IntRange(0, n-1).Draw(rt, "which"))
		}
	case 6:
		d.tick()
	default:
		d.send(keyOf(anyKey.Draw(rt, "key")))
	}
}

// check checks a frame.
func check(rt *rapid.T, d *driver) {
	rt.Helper()
	size := d.m.size
	if size == (tui.Area{}) {
		size = tui.Area{Width: 80, Height: 24}
	}
	frame := d.m.View()
	rows := strings.Split(frame, "\n")
	if len(rows) > size.Height {
		rt.Fatalf("%d rows of %d", len(rows), size.Height)
	}
	for _, row := range rows {
		if w := ansi.StringWidth(row); w > size.Width {
			rt.Fatalf("%d cells of %d: %q", w, size.Width, row)
		}
		checkBytes(rt, row, d.m.theme.ASCII)
	}
	words := strings.Join(strings.Fields(strings.ReplaceAll(frame, "\n", " ")), "")
	caution := strings.ReplaceAll(casenote.Caution, " ", "")
	if n := min(len(words), len(caution)); n == 0 || words[:n] != caution[:n] {
		rt.Fatalf("the caution does not come first:\n%s", frame)
	}
	if size.Width >= 20 && size.Height >= 6 && len(words) < len(caution) {
		rt.Fatalf("the caution is cut:\n%s", frame)
	}
}

// checkBytes finds control bytes that are not those of a colour.
func checkBytes(rt *rapid.T, row string, ascii bool) {
	rt.Helper()
	if !utf8.ValidString(row) {
		rt.Fatalf("not UTF-8: %q", row)
	}
	for i, r := range row {
		switch {
		case r == 0x1b:
			if colourLength(row[i:]) == 0 {
				rt.Fatalf("an escape sequence that is no colour: %q", row[i:])
			}
		case r < ' ', r >= 0x7f && r < 0xa0, ascii && r >= 0x80, slices.Contains([]rune("\u202e\u2066"), r):
			rt.Fatalf("%U in %q", r, row)
		}
	}
}

// TestUnsavedWorkIsNeverLost makes choices, ends in any way, and starts again.
func TestUnsavedWorkIsNeverLost(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		folder, err := os.MkdirTemp(t.TempDir(), "")
		if err != nil {
			rt.Fatal(err)
		}
		st := state.New(folder, "demo")
		d := started(t, func(o *Options) { o.State = st })
		for range rapid.IntRange(0, 12).Draw(rt, "keys") {
			d.send(keyOf(rapid.SampledFrom(strings.Fields("1 2 i d l u ctrl+r s enter esc ? /")).Draw(rt, "key")))
			if rapid.Bool().Draw(rt, "time passes") {
				d.tick()
			}
		}
		work, unsaved := d.m.present, d.m.unsaved()
		switch rapid.IntRange(0, 2).Draw(rt, "end") {
		case 0:
			d.send(keyOf("ctrl+c"))
		case 1:
			d.send(SignalMsg{})
		case 2: // the terminal is gone at once
			if _, err := d.m.finish(tea.ErrProgramKilled); err != nil {
				rt.Fatal(err)
			}
		}
		if d.quits {
			d.outcome()
		}
		d = started(t, func(o *Options) { o.State = state.New(folder, "demo") })
		if (d.m.offer != nil) != (unsaved && !same(work, d.m.options.Case)) {
			rt.Fatalf("unsaved %v, offered %v", unsaved, d.m.offer)
		}
		if d.m.offer != nil {
			d.keys("r")
			if !same(d.m.present, work) {
				rt.Fatalf("resumed %+v, was %+v", d.m.present, work)
			}
		}
	})
}

func TestClampShowsWhatItCuts(t *testing.T) {
	got := clamp([]string{"a\tb\x1b[2J", "\x1b[1;31mred\x1b[m\u009b ü", strings.Repeat("x", 30)}, tui.Area{Width: 24, Height: 9}, tui.Theme{})
	want := `a b\x1b[2J` + "\n\x1b[1;31mred\x1b[m" + `\x9b ü` + "\n" + strings.Repeat("x", 24)
	if got != want {
		t.Errorf("%q, want %q", got, want)
	}
	if got := clamp([]string{"a\x1b[", "ü┼"}, tui.Area{Width: 30, Height: 9}, tui.Theme{ASCII: true}); got != `a\x1b[`+"\n"+`\u{fc}\u{253c}` {
		t.Errorf("%q", got)
	}
}
