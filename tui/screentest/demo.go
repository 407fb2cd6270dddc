package screentest

import (
	"context"
	"io/fs"
	"testing"

	"afterbeat/data/casefile"
	"afterbeat/data/demo"
	"afterbeat/tree/study"
)

// replicates of the demo in tests: few, for speed.
const replicates = 50

// DemoCase is the demo's case, with few replicates.
func DemoCase(t testing.TB) casefile.Case {
	t.Helper()
	content, err := fs.ReadFile(demo.Files(), demo.CaseName)
	if err != nil {
		t.Fatal(err)
	}
	c, err := casefile.Read(demo.CaseName, content)
	if err != nil {
		t.Fatal(err)
	}
	n := replicates
	c.Replicates = &n
	return c
}

// Demo computes the demo as change makes its case.
func Demo(t testing.TB, change func(*casefile.Case)) study.Study {
	t.Helper()
	c := DemoCase(t)
	if change != nil {
		change(&c)
	}
	return Study(t, c, func(name string) ([]byte, error) { return fs.ReadFile(demo.Files(), name) })
}

// Study computes a case as far as the yardsticks; read gives its files. The
// forecast, which takes the longest, comes with one more Next.
func Study(t testing.TB, c casefile.Case, read func(string) ([]byte, error)) study.Study {
	t.Helper()
	in, err := study.Read(c, read)
	if err != nil {
		t.Fatal(err)
	}
	s, err := study.Run(context.Background(), in, study.StageSupport)
	if err != nil {
		t.Fatal(err)
	}
	return s
}
