package app

import (
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data/casenote"
	"afterbeat/tui"
	"afterbeat/tui/screentest"
)

// at is the frame after keys, over stubs, on a terminal of a size.
func at(t *testing.T, keys string) func(tui.Area, tui.Theme) string {
	return func(a tui.Area, theme tui.Theme) string {
		d := started(t, func(o *Options) { o.Theme, o.Case.Label = theme, "pilot-07" })
		d.send(tea.WindowSizeMsg{Width: a.Width, Height: a.Height})
		d.keys(keys)
		return d.m.View()
	}
}

func TestFrames(t *testing.T) {
	sizes := []tui.Area{{Width: 80, Height: 24}, {Width: 100, Height: 30}, {Width: 160, Height: 50}, {Width: 60, Height: 15}}
	for name, keys := range map[string]string{
		"frame": "2", "help": "?", "error": "e", "naming": "s", "leaving": "i q",
	} {
		t.Run(name, func(t *testing.T) { screentest.Golden(t, name, at(t, keys), sizes...) })
	}
	screentest.Golden(t, "small", at(t, ""), tui.Area{Width: 59, Height: 24}, tui.Area{Width: 40, Height: 10})
}

// TestTinySizes says the most important first, as far as the rows go.
func TestTinySizes(t *testing.T) {
	const caution = "Research use only.\nNot a medical\ndevice. Not for\ndecisions about\ntreatment."
	for _, c := range []struct {
		keys          string
		width, height int
		want          string
	}{
		{"", 20, 4, strings.TrimSuffix(caution, "\ntreatment.")},
		{"", 20, 5, caution + " min 60x15"},
		{"", 20, 6, caution + "\n20x6, min 60x15"},
		{"", 20, 8, caution + "\n20x8, min 60x15\nafterbeat study\ndemo.csv"},
		{"", 20, 9, caution + "\n20x9, min 60x15\nafterbeat study\ndemo.csv\nq quit"},
		{"i q", 40, 5, "Research use only. Not a medical device.\nNot for decisions about treatment.\n" +
			"s save the note first y discard and quit\nesc stay\n40x5, min 60x15"},
		{"", 80, 3, casenote.Caution + "\n80x3, min 60x15\nafterbeat study demo.csv"},
		{"", 80, 4, casenote.Caution + "\nThis terminal is 80x4; the screens need 60x15.\nWithout a screen: afterbeat study demo.csv\nq quit"},
	} {
		d := started(t, nil)
		d.keys(c.keys)
		d.send(tea.WindowSizeMsg{Width: c.width, Height: c.height})
		if got := d.m.View(); got != c.want {
			t.Errorf("%q at %dx%d:\n%s\nwant\n%s", c.keys, c.width, c.height, got, c.want)
		}
	}
}

// TestSmallLeaving asks the question in a terminal too small for the screens.
func TestSmallLeaving(t *testing.T) {
	d := started(t, nil)
	d.keys("i")
	d.send(tea.WindowSizeMsg{Width: 40, Height: 14})
	d.keys("q")
	d.wantView("discard and quit")
	d.keys("y")
	if !d.quits {
		t.Error("y does not quit")
	}
}
