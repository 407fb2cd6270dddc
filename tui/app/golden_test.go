package app

import (
	"testing"

	tea "github.com/charmbracelet/bubbletea"

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
