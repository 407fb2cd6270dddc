package energy

import (
	"fmt"
	"math"

	"afterbeat/data"
)

// Tolerance is the largest balance, relative to the input, that passes without
// a warning.
const Tolerance = 1e-9

// Term is power that is lost in a part of the load, or passed on by it, mean
// over the period in mmHg mL/s.
type Term struct {
	Name      string // "Zc", "R", "outflow"; "segments", "terminal R1", "terminal R2" of a tree
	Steady    float64
	Pulsatile float64
}

// Total is Steady + Pulsatile.
func (t Term) Total() float64 { return t.Steady + t.Pulsatile }

// Ledger sets the power that enters against all that is lost and passed on.
// Power stored in compliance and inertance is given back within the period and
// has no term. The zero Ledger is one that nobody filled: it has no balance.
type Ledger struct {
	Input float64 // mean PQ at the inlet, mmHg mL/s
	Terms []Term
}

// Balance is (input - sum of terms)/input; NaN without terms or without input.
func (l Ledger) Balance() float64 {
	if len(l.Terms) == 0 || l.Input == 0 {
		return math.NaN()
	}
	left := l.Input
	for _, t := range l.Terms {
		left -= t.Total()
	}
	return left / l.Input
}

// Term returns the term of that name.
func (l Ledger) Term(name string) (Term, bool) {
	for _, t := range l.Terms {
		if t.Name == name {
			return t, true
		}
	}
	return Term{}, false
}

// Warnings has one warning where a filled ledger does not close to [Tolerance].
func (l Ledger) Warnings() []data.Warning {
	b := l.Balance()
	if len(l.Terms) == 0 || math.Abs(b) <= Tolerance {
		return nil
	}
	return []data.Warning{{
		Code: data.CodeBalance,
		Text: fmt.Sprintf("power in and power accounted for differ by %.2g of the input of %.4g mmHg mL/s", b, l.Input),
		Cure: "do not use the losses; check the parameters of the load and the flow for extreme values",
	}}
}
