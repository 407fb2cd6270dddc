// Command demodata writes the demo recording and its case file, from which
// package data/demo takes what the program embeds:
//
//	go run ./cmd/demodata            into data/demo
//	go run ./cmd/demodata -o DIR     into DIR
//
// The data are invented; data/demo says how they are made.
package main

import (
	"flag"
	"fmt"
	"os"
	"path/filepath"

	"afterbeat/data/demo"
)

func main() {
	dir := flag.String("o", filepath.Join("data", "demo"), "the `folder` to write into")
	flag.Parse()
	if err := write(*dir, demo.Truth()); err != nil {
		fmt.Fprintln(os.Stderr, "demodata:", err)
		os.Exit(1)
	}
}

// write puts the files of p into a folder, over those that are there.
func write(dir string, p demo.Patient) error {
	for name, content := range map[string][]byte{
		demo.RecordingName: recordingFile(p),
		demo.CaseName:      caseFile(p),
	} {
		if err := os.WriteFile(filepath.Join(dir, name), content, 0o644); err != nil {
			return err
		}
	}
	return nil
}
