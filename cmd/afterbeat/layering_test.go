package main

import (
	"go/parser"
	"go/token"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// layers, from left to right: a folder may import those to its left, never one
// to its right.
var layers = []string{"data", "fitting", "tree", "tui", "cmd"}

// terminal packages, which nothing left of tui may import.
var terminal = []string{"github.com/charmbracelet/", "github.com/guptarohit/asciigraph", "golang.org/x/term"}

// breach says what is wrong with folder layer importing path, or nothing.
func breach(layer, path string) string {
	from := slices.Index(layers, layer)
	inside, ok := strings.CutPrefix(path, "afterbeat/")
	if ok {
		to := slices.Index(layers, strings.SplitN(inside, "/", 2)[0])
		if to > from {
			return "lies to the right"
		}
		return ""
	}
	if from < slices.Index(layers, "tui") {
		for _, prefix := range terminal {
			if strings.HasPrefix(path, prefix) {
				return "is a terminal package"
			}
		}
	}
	return ""
}

func TestBreachIsSeen(t *testing.T) {
	for _, c := range []struct {
		layer, path string
		wrong       bool
	}{
		{"data", "afterbeat/fitting", true},
		{"fitting", "afterbeat/data/beat", false},
		{"tree", "afterbeat/tui", true},
		{"tree", "github.com/charmbracelet/lipgloss", true},
		{"tui", "github.com/charmbracelet/lipgloss", false},
		{"cmd", "afterbeat/tree/study", false},
		{"data", "afterbeat/data/unit", false},
	} {
		if got := breach(c.layer, c.path); (got != "") != c.wrong {
			t.Errorf("%s importing %s: %q", c.layer, c.path, got)
		}
	}
}

// The arrows of DEVELOPERS.md hold in every file, tests included.
func TestLayering(t *testing.T) {
	root := filepath.Join("..", "..")
	files, imports := map[string]int{}, 0
	for _, layer := range layers {
		err := filepath.WalkDir(filepath.Join(root, layer), func(path string, d fs.DirEntry, err error) error {
			if err != nil || d.IsDir() || filepath.Ext(path) != ".go" {
				return err
			}
			files[layer]++
			f, err := parser.ParseFile(token.NewFileSet(), path, nil, parser.ImportsOnly)
			if err != nil {
				return err
			}
			for _, spec := range f.Imports {
				target, err := strconv.Unquote(spec.Path.Value)
				if err != nil {
					return err
				}
				imports++
				if why := breach(layer, target); why != "" {
					t.Errorf("%s imports %s, which %s", path, target, why)
				}
			}
			return nil
		})
		if err != nil {
			t.Fatal(err)
		}
	}
	for _, layer := range layers {
		if files[layer] == 0 {
			t.Errorf("no Go file found in %s: nothing was checked there", layer)
		}
	}
	if imports == 0 {
		t.Error("no import found: nothing was checked")
	}
}

// The top level holds what the design fixes and nothing else.
func TestTopLevel(t *testing.T) {
	want := append(slices.Clone(layers), "testdata", "go.mod", "go.sum", "README.md", "DEVELOPERS.md", ".ci", ".gitignore", ".git")
	entries, err := os.ReadDir(filepath.Join("..", ".."))
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, e := range entries {
		got = append(got, e.Name())
	}
	for _, name := range want[:len(want)-1] { // .git is absent from an archive
		if !slices.Contains(got, name) {
			t.Errorf("top level lacks %s", name)
		}
	}
}
