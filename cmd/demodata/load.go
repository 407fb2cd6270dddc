package main

import (
	"math"
	"sort"

	"afterbeat/data/demo"
)

// load is flow into a windkessel and the pressure that it makes, in closed form.
// Over a piece of time in which the flow is a polynomial Q(x) of
// x = (t - from)/duration,
//
//	C dPd/dt = Q - Pd/R
//
// is solved by a polynomial p(x) with tau p'/duration + p = R Q, tau = R C, and
// what else there is decays:
//
//	Pd(t) = p(x) + rest exp(-(t - from)/tau)
//
// where rest makes Pd continuous.
type load struct {
	patient demo.Patient
	pieces  []piece // in the order of time
}

type piece struct {
	stroke
	flow, driven polynomial
	rest         float64 // mmHg
}

// newLoad begins at the first stroke, with Pd at its mean.
func newLoad(p demo.Patient, strokes []stroke) load {
	l := load{patient: p}
	pd := p.R * p.StrokeVolume / p.Period
	for i, s := range strokes {
		if i > 0 {
			pd = l.store(l.pieces[i-1], s.from)
		}
		flow := s.coefficients()
		driven := l.drive(flow, s.duration)
		l.pieces = append(l.pieces, piece{s, flow, driven, pd - driven.at(0)})
	}
	return l
}

func (l load) tau() float64 { return l.patient.R * l.patient.C }

// drive is p(x): p_i = R Q_i - tau (i + 1) p_(i+1)/duration.
func (l load) drive(flow polynomial, duration float64) polynomial {
	var p polynomial
	higher := 0.0
	for i := len(flow) - 1; i >= 0; i-- {
		p[i] = l.patient.R*flow[i] - l.tau()/duration*float64(i+1)*higher
		higher = p[i]
	}
	return p
}

// store is Pd at time t, which lies in pc or at its end, mmHg.
func (l load) store(pc piece, t float64) float64 {
	since := t - pc.from
	return pc.driven.at(since/pc.duration) + pc.rest*math.Exp(-since/l.tau())
}

// flow is Q at time t, mL/s.
func (l load) flow(t float64) float64 {
	pc := l.pieceAt(t)
	return pc.flow.at((t - pc.from) / pc.duration)
}

// pressure is P = Pv + Pd + Zc Q at time t, mmHg.
func (l load) pressure(t float64) float64 {
	return l.patient.OutflowPressure + l.store(l.pieceAt(t), t) + l.patient.Zc*l.flow(t)
}

// pieceAt is the last piece that begins at or before t.
func (l load) pieceAt(t float64) piece {
	next := sort.Search(len(l.pieces), func(i int) bool { return l.pieces[i].from > t })
	return l.pieces[max(next-1, 0)]
}
