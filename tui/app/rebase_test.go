package app

import (
	"testing"

	"pgregory.net/rapid"

	"afterbeat/data/casefile"
)

// aCase draws a case with few values, so that changes meet.
var aCase = rapid.Custom(func(t *rapid.T) casefile.Case {
	word := rapid.SampledFrom([]string{"", "a", "b"})
	name := rapid.SampledFrom([]string{"p", "q"})
	number := rapid.SampledFrom([]float64{1, 2, 3})
	return casefile.Case{
		Label: word.Draw(t, "label"), Model: word.Draw(t, "model"),
		Site:   rapid.MapOfN(name, name, 0, 2).Draw(t, "site"),
		Scale:  rapid.MapOfN(name, number, 0, 2).Draw(t, "scale"),
		Invert: rapid.SliceOfNDistinct(name, 0, 2, rapid.ID[string]).Draw(t, "invert"),
		Drop:   rapid.SliceOfNDistinct(number, 0, 3, rapid.ID[float64]).Draw(t, "drop"),
		From:   rapid.Ptr(number, true).Draw(t, "from"),
	}
})

func TestRebaseProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		base, next, now := aCase.Draw(t, "base"), aCase.Draw(t, "next"), aCase.Draw(t, "now")
		if got := rebase(base, next, base); !same(got, next) {
			t.Fatalf("on its own base: %+v, want %+v", got, next)
		}
		if got := rebase(base, base, now); !same(got, now) {
			t.Fatalf("no change: %+v, want %+v", got, now)
		}
		before := now
		got := rebase(base, next, now)
		if !same(before, now) {
			t.Fatalf("the case given was changed: %+v, was %+v", now, before)
		}
		if next.Model != base.Model && got.Model != next.Model || next.Model == base.Model && got.Model != now.Model {
			t.Fatalf("model %q of base %q, next %q, now %q", got.Model, base.Model, next.Model, now.Model)
		}
		for _, name := range []string{"p", "q"} {
			want, ok := now.Site[name]
			if is, there := next.Site[name]; is != base.Site[name] || there != (base.Site[name] != "") {
				want, ok = is, there
			}
			if is, there := got.Site[name]; is != want || there != ok {
				t.Fatalf("site of %s: %q, want %q", name, is, want)
			}
		}
	})
}

func TestTwoChangesOfOneCaseBothStand(t *testing.T) {
	base := casefile.Case{Drop: []float64{1, 2}, Site: map[string]string{"p": "root"}}
	one, two := base, base
	one.Drop, one.Label = []float64{2, 5}, "p-1" // 1 restored, 5 dropped
	two.Drop, two.Site = []float64{1, 2, 7}, map[string]string{"p": "root", "q": "lvot"}
	want := casefile.Case{Label: "p-1", Drop: []float64{2, 5, 7}, Site: two.Site}
	if got := rebase(base, two, one); !same(got, want) {
		t.Errorf("%+v, want %+v", got, want)
	}
}
