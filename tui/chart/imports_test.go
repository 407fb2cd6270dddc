package chart

import (
	"go/parser"
	"go/token"
	"io/fs"
	"path/filepath"
	"strings"
	"testing"
)

// Of all packages this one alone imports the plotting library, and it imports
// nothing of the screens.
func TestImports(t *testing.T) {
	plotting, here := 0, 0
	root := filepath.Join("..", "..")
	err := filepath.WalkDir(root, func(path string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() || filepath.Ext(path) != ".go" {
			return err
		}
		f, err := parser.ParseFile(token.NewFileSet(), path, nil, parser.ImportsOnly)
		if err != nil {
			return err
		}
		inside := filepath.Dir(path) == filepath.Join(root, "tui", "chart")
		if inside {
			here++
		}
		for _, spec := range f.Imports {
			switch target := strings.Trim(spec.Path.Value, `"`); {
			case strings.HasPrefix(target, "github.com/guptarohit/asciigraph") && inside:
				plotting++
			case strings.HasPrefix(target, "github.com/guptarohit/asciigraph"):
				t.Errorf("%s imports the plotting library", path)
			case inside && strings.HasPrefix(target, "github.com/charmbracelet/"):
				t.Errorf("%s imports %s", path, target)
			}
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	if plotting == 0 || here == 0 {
		t.Errorf("%d imports of the plotting library in %d files: nothing was checked", plotting, here)
	}
}
