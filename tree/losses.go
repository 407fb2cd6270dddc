package tree

import (
	"math"

	"afterbeat/tree/energy"
)

// Loss is power lost in a segment, mean over the period, mmHg mL/s: what enters
// less what leaves. Of an elastic wall it is lost to viscosity; of a
// viscoelastic one in the wall too.
type Loss struct{ Steady, Pulsatile float64 }

// Total is Steady + Pulsatile.
func (l Loss) Total() float64 { return l.Steady + l.Pulsatile }

// Loss is the power lost in a segment, by the net flux of power
//
//	P Q at the inlet - P Q at the outlet,  2 Re(P_k Q_k*) for each harmonic
//
// NaN where mean pressure is.
func (s *State) Loss(segment int) Loss {
	s.sumLosses()
	return s.losses[s.solver.tree.place[segment]]
}

// sumLosses fills the losses of all segments, harmonic by harmonic, since so
// they lie in memory.
func (s *State) sumLosses() {
	if s.lossesOf {
		return
	}
	s.lossesOf = true
	for at, m := range s.means {
		s.losses[at] = Loss{Steady: m.pin*m.qin - m.pout*m.qout}
	}
	for k := 1; k <= s.solver.harmonics; k++ {
		for at, e := range s.at(k) {
			s.losses[at].Pulsatile += 2 * (flux(e.pin, e.qin) - flux(e.pout, e.qout))
		}
	}
}

// flux is Re(p q*).
func flux(p, q complex128) float64 { return real(p)*real(q) + imag(p)*imag(q) }

func square(q complex128) float64 { return flux(q, q) }

// Ledger sets the power that enters at the root against what is lost in the
// segments, in R1 and in R2 of the terminals, and what leaves against the outflow
// pressure: terms "segments", "terminal R1", "terminal R2", "outflow".
func (s *State) Ledger() energy.Ledger {
	s.sumLosses()
	c := s.solver.tree
	segments := energy.Term{Name: "segments"}
	for _, l := range s.losses {
		segments.Steady += l.Steady
		segments.Pulsatile += l.Pulsatile
	}
	r1, r2 := energy.Term{Name: "terminal R1"}, energy.Term{Name: "terminal R2"}
	outflow := energy.Term{Name: "outflow"}
	for at, m := range s.means {
		t := c.at(at)
		if t == nil {
			continue
		}
		if !t.closed() {
			outflow.Steady += c.outflow * m.qout
		}
		in1, in2 := s.terminalLoss(at)
		r1.Steady, r1.Pulsatile = r1.Steady+in1.Steady, r1.Pulsatile+in1.Pulsatile
		r2.Steady, r2.Pulsatile = r2.Steady+in2.Steady, r2.Pulsatile+in2.Pulsatile
	}
	return energy.Ledger{Input: s.Power().Input, Terms: []energy.Term{segments, r1, r2, outflow}}
}

// nothing is the part of what goes to and fro below which power is rounding.
const nothing = 1e-12

// Power is that into the root, mmHg mL/s. What goes in and comes back whole is
// none, to the last digit.
func (s *State) Power() energy.Power {
	m := s.means[0]
	w := energy.Power{Steady: m.pin * m.qin}
	around := 0.0
	for k := 1; k <= s.solver.harmonics; k++ {
		e := s.at(k)[0]
		w.Pulsatile += 2 * flux(e.pin, e.qin)
		around += 2 * math.Sqrt(square(e.pin)*square(e.qin))
	}
	if math.Abs(w.Pulsatile) < nothing*around {
		w.Pulsatile = 0
	}
	w.Input = w.Steady + w.Pulsatile
	return w
}

// TerminalLoss is the power lost in R1 and in R2 of the terminal of a segment,
// mean over the period, mmHg mL/s; nothing where it has none, or it is closed.
func (s *State) TerminalLoss(segment int) (r1, r2 Loss) {
	return s.terminalLoss(int(s.solver.tree.place[segment]))
}

func (s *State) terminalLoss(at int) (r1, r2 Loss) {
	t := s.solver.tree.at(at)
	if t == nil || math.IsInf(t.R1, 1) {
		return Loss{}, Loss{}
	}
	if !t.closed() {
		mean := s.means[at].qout
		r1.Steady, r2.Steady = t.R1*mean*mean, t.R2*mean*mean
	}
	for k := 1; k <= s.solver.harmonics; k++ {
		q := square(s.at(k)[at].qout)
		r1.Pulsatile += 2 * t.R1 * q
		if !math.IsInf(t.R2, 1) {
			turn := s.omega(k) * t.R2 * t.C // of flow through R2, |1 + i w R2 C|²
			r2.Pulsatile += 2 * t.R2 * q / (1 + turn*turn)
		}
	}
	return r1, r2
}

// at is the terminal of the segment at a position, nil where it has daughters.
func (c *compiled) at(position int) *Terminal {
	i := c.lastPiece[position]
	if t := c.pieces[i].terminal; t >= 0 {
		return &c.terminals[t]
	}
	return nil
}
