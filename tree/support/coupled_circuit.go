package support

import (
	"math"

	"afterbeat/tree/heart"
	"afterbeat/tree/pump"
)

// The places of the state in a [vector].
const (
	vol = iota // V, mL
	pc         // pressure over R and C, outflow pressure included, mmHg
	qp         // pump flow, mL/s
	qx         // wk4s: Qav; wk4p: QL, mL/s; else 0
	out        // int Q dt since the beat began, mL
)

// circuit is ventricle, load and pump in the form that is integrated. The load
// is Pc behind Zc, and
//
//	wk3 (wk2: Zc = 0)   Pao = Pc + Zc Q
//	wk4p                Pao = Pc + Zc (Q - QL),  L dQL/dt = Zc (Q - QL)
//	wk4s                Pao = Pc + Zc Q + L dQ/dt
//
// with Q = Qav + Qp. Where Zc or L is as good as 0 the load is the simpler one
// that this leaves, so that parallel and series both mean an L that counts.
type circuit struct {
	heart            heart.Ventricle
	corners          []float64 // of E(t)
	r, c, zc, l, pv  float64
	parallel, series bool
	pump             pump.Pump
	atrial           bool  // the pump draws from the atrium
	rest             *rest // of a tree, beyond the wk3 that stands for it; nil: lumped
}

// drive is what is done to the circuit over a beat.
type drive struct {
	// Pfill is fill + gap exp(-t/lag), t from the start of the beat.
	fill, gap, lag float64
	running        bool // whether there is a pump; without one Qp is 0
	speed          float64
	// modulation, where not nil, rules over speed; the beat begins at since.
	modulation *Modulation
	since      float64 // s
}

func (d *drive) filling(t float64) float64 {
	if d.gap == 0 {
		return d.fill
	}
	return d.fill + d.gap*math.Exp(-t/d.lag)
}

func (d *drive) speedAt(t float64) float64 {
	if d.modulation == nil {
		return d.speed
	}
	return d.modulation.At(d.since + t)
}

// mode says which valves are open and which way the pump's flow goes. While it
// holds, the equations are smooth.
type mode [3]bool

const (
	mitral = iota
	aortic
	reverse
)

// instant is all that follows from the state at one time.
type instant struct {
	plv, pao, pfill, head float64
	inlet                 float64 // pressure that the pump draws from
	qmv, qav              float64
	dqp, dqx              float64 // slopes of the flows that are states
	margin                [3]float64
}

// look fills an instant. The margins are positive where the mode is the right
// one, and pass through 0 where it ends.
func (c *circuit) look(t float64, y *vector, m mode, d *drive, i *instant) {
	i.plv = c.heart.Pressure(t, y[vol])
	i.pfill = d.filling(t)
	i.inlet = i.plv
	if c.atrial {
		i.inlet = i.pfill
	}
	i.qmv, i.qav, i.dqp, i.dqx, i.head = 0, 0, 0, 0, 0
	if m[mitral] {
		i.qmv = (i.pfill - i.plv) / c.heart.Rmv
	}
	i.margin[mitral] = signed(i.pfill-i.plv, m[mitral])
	i.margin[reverse] = math.Inf(1)
	if d.running {
		n, q := d.speedAt(t), y[qp]
		i.head = c.pump.A*n*n - c.pump.B*n*q - c.pump.C*q*signed(q, !m[reverse])
		if c.pump.C > 0 {
			i.margin[reverse] = signed(q, !m[reverse])
		}
	}
	if c.series {
		c.lookSeries(y, m, d, i)
	} else {
		c.lookDirect(t, y, m, d, i)
	}
}

// lookDirect solves the root for wk2, wk3 and wk4p, where Qav follows from the
// pressures: Qav = (Plv - Pc + Zc QL - Zc Qp)/(Rav + Zc).
func (c *circuit) lookDirect(t float64, y *vector, m mode, d *drive, i *instant) {
	source := y[pc]
	if c.rest != nil {
		source += c.rest.at(t)
	}
	if c.parallel {
		source -= c.zc * y[qx]
	}
	over := i.plv - source - c.zc*y[qp]
	switch {
	case m[aortic]:
		i.qav = over / (c.heart.Rav + c.zc)
	case c.heart.Rar > 0:
		i.qav = over / (c.heart.Rar + c.zc)
	}
	i.margin[aortic] = signed(over, m[aortic])
	i.pao = source + c.zc*(i.qav+y[qp])
	if d.running {
		i.dqp = (i.inlet - i.pao + i.head - c.pump.Resistance*y[qp]) / c.pump.Inertance
	}
	if c.parallel {
		i.dqx = c.zc * (i.qav + y[qp] - y[qx]) / c.l
	}
}

// lookSeries solves the root for wk4s, where Qav is a state while blood passes the
// valve, and the load's L is in line with the pump's while none does.
func (c *circuit) lookSeries(y *vector, m mode, d *drive, i *instant) {
	push := i.head - c.pump.Resistance*y[qp]
	rest := y[pc] + c.zc*(y[qx]+y[qp])
	if m[aortic] || c.heart.Rar > 0 {
		i.qav = y[qx]
		resistance := c.heart.Rav
		if !m[aortic] {
			resistance = c.heart.Rar
		}
		i.pao = i.plv - resistance*i.qav
		if d.running {
			i.dqp = (i.inlet - i.pao + push) / c.pump.Inertance
		}
		i.dqx = (i.pao-rest)/c.l - i.dqp
		i.margin[aortic] = signed(i.qav, m[aortic])
		return
	}
	if d.running {
		i.dqp = (i.inlet - rest + push) / (c.pump.Inertance + c.l)
	}
	i.pao = rest + c.l*i.dqp
	i.margin[aortic] = i.pao - i.plv
}

// signed is x where yes, else -x.
func signed(x float64, yes bool) float64 {
	if yes {
		return x
	}
	return -x
}

// modeAt is the mode of a state.
func (c *circuit) modeAt(t float64, y *vector, d *drive) mode {
	var i instant
	m := mode{true, c.series && y[qx] > 0, y[qp] < 0}
	c.look(t, y, m, d, &i)
	m[mitral] = i.margin[mitral] > 0
	if !m[aortic] && !(c.series && c.heart.Rar > 0) {
		m[aortic] = i.margin[aortic] < 0
	}
	return m
}
