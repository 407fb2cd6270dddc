package tree

import (
	"sync"

	"afterbeat/fitting"
)

// Load is a network as a load at its root. It is safe for concurrent use.
type Load struct {
	tree *compiled
	free sync.Pool // of *[]node
}

var _ fitting.Load = (*Load)(nil)

// NewLoad checks a network and copies what it needs of it.
func NewLoad(n Network) (*Load, error) {
	c, err := compile(n)
	if err != nil {
		return nil, err
	}
	l := &Load{tree: c}
	l.free.New = func() any {
		nodes := make([]node, len(c.pieces))
		return &nodes
	}
	return l, nil
}

// Impedance is that at the root, mmHg s/mL, w in rad/s; Resistance at w = 0.
func (l *Load) Impedance(w float64) complex128 {
	switch {
	case w == 0:
		return complex(l.Resistance(), 0)
	case w < 0: // of a real load
		z := l.Impedance(-w)
		return complex(real(z), -imag(z))
	}
	nodes := l.free.Get().(*[]node)
	defer l.free.Put(nodes)
	return invert(l.tree.up(l.tree.harmonic(w), *nodes))
}

// Resistance is that to mean flow, mmHg s/mL: Poiseuille's in the segments, and
// the terminals; +Inf where all of them are closed.
func (l *Load) Resistance() float64 { return l.tree.resistance }

// CharacteristicImpedance is rho c/A at the inlet of the root, mmHg s/mL.
func (l *Load) CharacteristicImpedance() float64 { return l.tree.rootZc }

// Compliance is that of all walls and all terminals, mL/mmHg.
func (l *Load) Compliance() float64 { return l.tree.compliance }
