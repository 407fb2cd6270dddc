package main

import (
	"maps"
	"os"
	"slices"
	"testing"

	"github.com/google/go-cmp/cmp"
)

// golden compares a text with a file, or rewrites the file with -update.
func golden(t *testing.T, file, got string) {
	t.Helper()
	if *update {
		if err := os.WriteFile(file, []byte(got), 0o600); err != nil {
			t.Fatal(err)
		}
	}
	want, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	if d := cmp.Diff(string(want), got); d != "" {
		t.Errorf("%s (-want +got):\n%s", file, d)
	}
}

// paths collects the paths of all keys below a JSON value; [] stands for any
// element of a list.
func paths(v any, at string, into map[string]bool) {
	switch v := v.(type) {
	case map[string]any:
		for key, value := range v {
			into[at+key] = true
			paths(value, at+key+".", into)
		}
	case []any:
		for _, value := range v {
			paths(value, at+"[].", into)
		}
	}
}

func sortedKeys(m map[string]bool) []string { return slices.Sorted(maps.Keys(m)) }
