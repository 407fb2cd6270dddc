package support

import "testing"

func TestEveryFigureHasAnAccount(t *testing.T) {
	published := 0
	for _, f := range AllFigures() {
		a := f.Account()
		if a.Meaning == "" || len(a.Equation) == 0 || a.Source == "" {
			t.Errorf("%s: %+v", f, a)
		}
		for _, p := range a.Published {
			published++
			if p.Group == "" || p.Words == "" || p.Source == "" {
				t.Errorf("%s: %+v", f, p)
			}
		}
	}
	if published == 0 {
		t.Error("nothing is published of any figure")
	}
}
