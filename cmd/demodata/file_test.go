package main

import (
	"bytes"
	"io/fs"
	"os"
	"path/filepath"
	"testing"

	"afterbeat/data/demo"
)

// What is embedded is what the generator writes.
func TestDemoIsCurrent(t *testing.T) {
	dir := t.TempDir()
	if err := write(dir, demo.Truth()); err != nil {
		t.Fatal(err)
	}
	embedded, err := fs.Glob(demo.Files(), "*")
	if err != nil || len(embedded) != 2 {
		t.Fatalf("embedded files %v, %v", embedded, err)
	}
	for _, name := range embedded {
		want, err := os.ReadFile(filepath.Join(dir, name))
		if err != nil {
			t.Fatal(err)
		}
		got, err := fs.ReadFile(demo.Files(), name)
		if err != nil {
			t.Fatal(err)
		}
		if !bytes.Equal(got, want) {
			t.Errorf("%s is not what the generator writes; run: go generate ./data/demo", name)
		}
	}
}

func TestSeedDecidesTheNoise(t *testing.T) {
	p := demo.Truth()
	first := recordingFile(p)
	if !bytes.Equal(first, recordingFile(p)) {
		t.Error("the same seed gives another recording")
	}
	p.Seed++
	if bytes.Equal(first, recordingFile(p)) {
		t.Error("another seed gives the same recording")
	}
}

func TestWriteSaysWhereItFailed(t *testing.T) {
	if err := write(filepath.Join(t.TempDir(), "missing"), demo.Truth()); err == nil {
		t.Error("no error for a missing folder")
	}
}

func TestTenthHasNoNegativeZero(t *testing.T) {
	for in, want := range map[float64]string{-0.04: "0.0", 0.04: "0.0", -0.06: "-0.1", 71.25001: "71.3"} {
		if got := tenth(in); got != want {
			t.Errorf("%v is printed %s, want %s", in, got, want)
		}
	}
}
