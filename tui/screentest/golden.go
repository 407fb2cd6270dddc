package screentest

import (
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"testing"

	"afterbeat/tui"
)

var update = flag.Bool("update", false, "rewrite the golden files")

// Areas are the sizes at which screens are compared with files: what the root
// leaves of terminals of 80x24, 100x30, 160x50 and 60x15.
func Areas() []tui.Area {
	return []tui.Area{{Width: 80, Height: 20}, {Width: 100, Height: 26}, {Width: 160, Height: 46}, {Width: 60, Height: 11}}
}

// Golden compares views with testdata/NAME-SIZE.golden, in Unicode and in ASCII,
// at the areas given, or else at all [Areas]. at shows the screen at a size.
func Golden(t *testing.T, name string, at func(tui.Area, tui.Theme) string, areas ...tui.Area) {
	t.Helper()
	if len(areas) == 0 {
		areas = Areas()
	}
	for _, a := range areas {
		for _, theme := range []tui.Theme{{}, {ASCII: true}} {
			view := at(a, theme)
			Fits(t, view, a, theme)
			suffix := ""
			if theme.ASCII {
				suffix = "-ascii"
			}
			compare(t, filepath.Join("testdata", fmt.Sprintf("%s-%dx%d%s.golden", name, a.Width, a.Height, suffix)), view+"\n")
		}
	}
}

func compare(t *testing.T, path, got string) {
	t.Helper()
	if *update {
		if err := os.WriteFile(path, []byte(got), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	want, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	if got != string(want) {
		t.Errorf("%s is\n%s\nand was\n%s", path, got, want)
	}
}
