package main

import (
	"bytes"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"
)

// A flag that a message, a warning or the README tells people to use exists.
func TestFlagsSpokenOfExist(t *testing.T) {
	known := map[string]bool{"help": true}
	root := newRoot(stream{in: strings.NewReader(""), out: io.Discard, err: new(bytes.Buffer)})
	for _, c := range append([]*cobra.Command{root}, root.Commands()...) {
		c.Flags().VisitAll(func(f *pflag.Flag) { known[f.Name] = true })
	}
	known["version"] = true
	spoken := regexp.MustCompile(`(?:^|[^-\w])--([a-z][a-z-]+)`)
	found := 0
	for _, layer := range append(layers, "README.md") {
		err := filepath.WalkDir(filepath.Join("..", "..", layer), func(path string, d fs.DirEntry, err error) error {
			if err != nil || d.IsDir() || strings.HasSuffix(path, "_test.go") || (filepath.Ext(path) != ".go" && filepath.Ext(path) != ".md") {
				return err
			}
			content, err := os.ReadFile(path)
			if err != nil {
				return err
			}
			for _, m := range spoken.FindAllStringSubmatch(string(content), -1) {
				found++
				if !known[m[1]] {
					t.Errorf("%s speaks of --%s, which no command has", path, m[1])
				}
			}
			return nil
		})
		if err != nil {
			t.Fatal(err)
		}
	}
	if found < 20 {
		t.Errorf("only %d flags found: the check is blind", found)
	}
}
