package study

import (
	"testing"

	"afterbeat/data/casefile"
)

// The whole stage of the demo: build, refine, waves, response.
func BenchmarkGrowTree(b *testing.B) {
	s := demoFitted(b, func(c *casefile.Case) { c.Replicates = ptr(few) })
	b.ReportAllocs()
	for b.Loop() {
		if _, err := GrowTree(b.Context(), *s.Fit); err != nil {
			b.Fatal(err)
		}
	}
}
