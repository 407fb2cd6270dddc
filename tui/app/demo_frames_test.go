package app

import (
	"os"
	"path/filepath"
	"strings"
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

// TestReadmeOpensWithAScreen holds the screen of the README against its file.
func TestReadmeOpensWithAScreen(t *testing.T) {
	file := filepath.Join("..", "..", "README.md")
	content, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	const begin, end = "<!-- screen: tui/app/testdata/demo-support-80x24.golden, held by a test -->\n```\n", "```\n<!-- end of screen -->"
	before, after, found := strings.Cut(string(content), begin)
	_, after, closed := strings.Cut(after, end)
	if !found || !closed {
		t.Fatal("the README shows no screen")
	}
	screen, err := os.ReadFile(filepath.Join("testdata", "demo-support-80x24.golden"))
	if err != nil {
		t.Fatal(err)
	}
	screentest.Text(t, file, before+begin+strings.TrimRight(string(screen), "\n")+"\n"+end+after)
}
