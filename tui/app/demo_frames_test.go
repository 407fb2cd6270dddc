package app

import (
	"testing"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tui"
	"afterbeat/tui/screentest"
)

// TestDemoFrames compares whole frames of the demo, as the program shows them,
// with files: every stage at every size, in Unicode and in ASCII.
func TestDemoFrames(t *testing.T) {
	d := composed(t, true, func(o *Options) { o.Case.Replicates = nil })
	d.run()
	sizes := []tui.Area{{Width: 80, Height: 24}, {Width: 100, Height: 30}, {Width: 160, Height: 50}, {Width: 60, Height: 15}}
	for digit, name := range map[string]string{"1": "intake", "2": "beats", "3": "fit", "5": "support", "6": "note"} {
		t.Run(name, func(t *testing.T) {
			screentest.Golden(t, "demo-"+name, func(a tui.Area, theme tui.Theme) string {
				if d.m.theme.ASCII != theme.ASCII {
					d.keys("A")
				}
				d.send(tea.WindowSizeMsg{Width: a.Width, Height: a.Height})
				d.keys(digit)
				d.run()
				return d.m.View()
			}, sizes...)
		})
	}
}
