package support

import (
	"context"
	"math"
	"runtime"
	"slices"
	"sync"
	"sync/atomic"

	"afterbeat/data"
	"afterbeat/fitting"
)

// draw is the patient drawn again: a load with its own parameters, the native
// flow it was fitted to, and the outflow pressure.
type draw struct {
	load fitting.Load
	flow data.Period // mL/s
	pv   float64     // mmHg
}

// push runs count draws through the native state and the states of a sweep. Row
// i belongs to draw i: its native figures, then those at each share. The draws
// are taken from several goroutines at once; the rows do not depend on how many.
func push(ctx context.Context, count int, take func(i int) draw, posing Posing, shares []float64) ([][]numbers, error) {
	rows := make([][]numbers, count)
	all := make([]numbers, count*(1+len(shares)))
	for i := range rows {
		rows[i], all = all[:1+len(shares)], all[1+len(shares):]
	}
	var next atomic.Int64
	var workers sync.WaitGroup
	for range min(runtime.GOMAXPROCS(0), count) {
		workers.Go(func() {
			var w worker
			for ctx.Err() == nil {
				i := int(next.Add(1)) - 1
				if i >= count {
					return
				}
				w.push(take(i), posing, shares, rows[i])
			}
		})
	}
	workers.Wait()
	return rows, ctx.Err()
}

// worker pushes one draw after the other. It allocates for the first, and where
// a draw has another length than the one before.
type worker struct {
	ejection   ejection
	responder  *fitting.Responder
	rate       float64
	impedances []complex128
	// Two states travel together.
	root     [2][]float64 // flow, about its first sample
	first    [2]float64   // that sample
	pressure [2][]float64 // the pressure it meets, about the steady one of the first sample
}

// push fills row with the figures of the native state and of each share. They
// are NaN where mean flow is not positive.
func (w *worker) push(d draw, posing Posing, shares []float64, row []numbers) {
	w.ejection.of(d.flow.Samples)
	if !(w.ejection.mean > 0) {
		for i := range row {
			row[i] = undefined()
		}
		return
	}
	w.fit(d.flow)
	w.responder.Impedances(w.impedances, d.load)
	if posing == ScaledPosing {
		native, _ := w.pair(d, posing, 0, 0)
		row[0] = native.numbers()
		for i, share := range shares {
			row[1+i] = native.scaled(1 - share).numbers()
		}
		return
	}
	share := func(state int) float64 {
		if state == 0 || state > len(shares) {
			return 0 // native, or the idle half of the last two
		}
		return shares[state-1]
	}
	for i := 0; i < len(row); i += 2 {
		a, b := w.pair(d, posing, share(i), share(i+1))
		row[i] = a.numbers()
		if i+1 < len(row) {
			row[i+1] = b.numbers()
		}
	}
}

// fit makes the worker fit for flows like q.
func (w *worker) fit(q data.Period) {
	n := len(q.Samples)
	if len(w.root[0]) == n && w.rate == q.Rate {
		return
	}
	w.responder, w.rate = fitting.NewResponder(n, q.Rate), q.Rate
	w.impedances = make([]complex128, n/2+1)
	for half := range w.root {
		w.root[half], w.pressure[half] = make([]float64, n), make([]float64, n)
	}
}

// pair solves for two shares at once.
func (w *worker) pair(d draw, posing Posing, shareA, shareB float64) (a, b signal) {
	w.pose(0, posing, shareA)
	w.pose(1, posing, shareB)
	w.responder.Pair(w.pressure[0], w.pressure[1], w.impedances, w.root[0], w.root[1])
	return w.measure(0, d), w.measure(1, d)
}

// pose fills one half with the flow of a share.
func (w *worker) pose(half int, posing Posing, share float64) {
	q := w.root[half]
	w.ejection.pose(q, posing, share)
	w.first[half] = q[0]
	for j := range q {
		q[j] -= w.first[half]
	}
}

// measure takes the signal of one half. A steady flow meets a steady pressure:
// what the transform leaves there is rounding of the other half.
func (w *worker) measure(half int, d draw) signal {
	if !slices.ContainsFunc(w.root[half], func(q float64) bool { return q != 0 }) {
		clear(w.pressure[half])
	}
	first := w.first[half]
	return measure(w.pressure[half], w.root[half], d.pv+d.load.Resistance()*first, first)
}

// measure takes the signal of a pressure and a flow that are both above their
// base values.
func measure(p, q []float64, baseP, baseQ float64) signal {
	n := float64(len(p))
	meanP, meanQ := 0.0, 0.0
	s := signal{lowP: p[0], highP: p[0], lowQ: q[0], highQ: q[0]}
	for j := range p {
		meanP += p[j] / n
		meanQ += q[j] / n
		s.lowP, s.highP = min(s.lowP, p[j]), max(s.highP, p[j])
		s.lowQ, s.highQ = min(s.lowQ, q[j]), max(s.highQ, q[j])
	}
	for j := range p {
		s.product += (p[j] - meanP) * (q[j] - meanQ) / n
	}
	s.meanP, s.lowP, s.highP = meanP+baseP, s.lowP+baseP, s.highP+baseP
	s.meanQ, s.lowQ, s.highQ = meanQ+baseQ, s.lowQ+baseQ, s.highQ+baseQ
	return s
}

func undefined() numbers {
	var n numbers
	for i := range n {
		n[i] = math.NaN()
	}
	return n
}
