package energy

import (
	"math"
	"testing"

	"afterbeat/data"
)

func TestBalance(t *testing.T) {
	l := Ledger{Input: 8000, Terms: []Term{{"Zc", 300, 500}, {"R", 6000, 200}, {"outflow", 900, 100}}}
	near(t, "balance", l.Balance(), 0, 0)
	if w := l.Warnings(); w != nil {
		t.Errorf("a closed ledger warns: %v", w)
	}
	l.Input *= 1 + 1e-8
	near(t, "balance", l.Balance(), 1e-8, 1e-14)
	if w := l.Warnings(); len(w) != 1 || w[0].Code != data.CodeBalance || w[0].Cure == "" {
		t.Errorf("an open ledger says %v", w)
	}
	if r, ok := l.Term("R"); !ok || r.Total() != 6200 {
		t.Errorf("term R: %v, %v", r, ok)
	}
	if _, ok := l.Term("r"); ok {
		t.Error("found a term that is not there")
	}
}

// A ledger that misses a term is told from one that nobody filled.
func TestBalanceOfNothing(t *testing.T) {
	if b := (Ledger{Input: 8000}).Balance(); !math.IsNaN(b) {
		t.Errorf("balance without terms = %v", b)
	}
	empty := Ledger{Terms: []Term{{"R", 1, 0}}}
	if b := empty.Balance(); !math.IsNaN(b) || len(empty.Warnings()) != 1 {
		t.Errorf("losses without input: balance %v, warnings %v", b, empty.Warnings())
	}
}
