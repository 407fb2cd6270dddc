package main

import (
	"fmt"
	"io/fs"
	"os"
	"path/filepath"

	"github.com/spf13/cobra"

	"afterbeat/data"
	"afterbeat/data/demo"
	"afterbeat/data/save"
)

// demoCommand is `afterbeat demo DIR`.
func demoCommand(s stream) *cobra.Command {
	replace := false
	c := &cobra.Command{
		Use:   "demo DIR",
		Short: "Write the demo case and its recording, to start from",
		Long:  "Writes the demo case (" + demo.CaseName + ") and its recording into DIR, which is\nmade if it is not there. The data are invented: no patient.",
		Args:  exactly(1, "one DIR"),
		RunE: func(_ *cobra.Command, args []string) error {
			return writeDemo(s, args[0], replace)
		},
	}
	c.Flags().BoolVar(&replace, "replace", false, "replace existing files")
	return c
}

func writeDemo(s stream, folder string, replace bool) error {
	if err := os.MkdirAll(folder, 0o700); err != nil {
		return &data.FileError{File: folder, What: "the folder cannot be made", Err: err}
	}
	return fs.WalkDir(demo.Files(), ".", func(name string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() {
			return err
		}
		content, err := fs.ReadFile(demo.Files(), name)
		if err != nil {
			return err
		}
		path := filepath.Join(folder, name)
		if err := save.File(path, content, replace); err != nil {
			return err
		}
		fmt.Fprintln(s.err, "afterbeat: wrote "+data.Clean(path).String())
		return nil
	})
}
