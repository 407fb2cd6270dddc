package support

import "math"

// Range is a signal over a beat or a window: its mean, and the extremes of the
// continuous signal, both sides of a jump included. NaN where there is none.
type Range struct{ Mean, Min, Max float64 }

// Swing is Max - Min.
func (r Range) Swing() float64 { return r.Max - r.Min }

// The signals that are followed over a beat.
const (
	sigPao = iota
	sigPump
	sigValve
	sigVolume
	sigPlv
	sigFill
	sigRoot
	signals
)

// The powers that are added up over a beat.
const (
	powFilling = iota
	powVentricle
	powHead
	powMitral
	powAortic
	powCannula
	powZc
	powR
	powOutflow
	powRoot // Pao Q
	powFlow // Q, which is no power, but is added up with them
	powLoop // what runs back through the aortic valve, likewise
	powers
)

// books follows signals and powers over the steps of a run. On each step the
// continuous solution is looked at in the nodes of Lobatto's rule of 5 points,
// which integrates polynomials of degree 7 (Abramowitz and Stegun 1964, 25.4.32).
type books struct {
	time     float64
	open     float64 // time that the aortic valve is open, s
	integral [signals]float64
	low      [signals]float64
	high     [signals]float64
	power    [powers]float64 // integrals, mmHg mL
	trace    *Trace          // nil: no samples are wanted
}

const nodes = 5

var (
	lobattoAt     = [nodes]float64{0, (1 - root37) / 2, 0.5, (1 + root37) / 2, 1}
	lobattoWeight = [nodes]float64{1.0 / 20, 49.0 / 180, 16.0 / 45, 49.0 / 180, 1.0 / 20}
)

const root37 = 0.654653670707977143798292456247 // sqrt(3/7)

// begin opens new books.
func (b *books) begin() {
	*b = books{trace: b.trace}
	for k := range signals {
		b.low[k], b.high[k] = math.Inf(1), math.Inf(-1)
	}
}

// void are the books of a beat that could not be followed.
func (b *books) void() {
	for k := range b.power {
		b.power[k] = math.NaN()
	}
	b.time = math.NaN()
}

// add books the step just taken.
func (b *books) add(r *run) {
	h := r.step.h
	r.step.between(&r.dense)
	var seen [signals][nodes]float64
	for j, at := range &lobattoAt {
		r.peek(at)
		w := h * lobattoWeight[j]
		for k, x := range r.signals() {
			seen[k][j] = x
			b.integral[k] += w * x
		}
		b.powers(r, w)
	}
	b.time += h
	if r.mode[aortic] {
		b.open += h
	}
	for k := range seen {
		b.extremes(r, k, &seen[k])
	}
	if b.trace != nil {
		b.trace.add(r)
	}
}

// signals are those at the place last looked at.
func (r *run) signals() [signals]float64 {
	i, y := &r.now, &r.step.y
	return [signals]float64{sigPao: i.pao, sigPump: y[qp], sigValve: i.qav, sigVolume: y[vol], sigPlv: i.plv, sigFill: i.pfill, sigRoot: i.qav + y[qp]}
}

// powers adds the powers of the place last looked at, for a time w.
func (b *books) powers(r *run, w float64) {
	i, y := &r.now, &r.step.y
	q := i.qav + y[qp]
	drop := r.zc * q * q
	if r.parallel {
		drop = r.zc * square(q-y[qx])
	}
	fromHeart, fromAtrium := i.qav+y[qp]-i.qmv, i.qmv
	if r.atrial {
		fromHeart, fromAtrium = i.qav-i.qmv, i.qmv+y[qp]
	}
	aorticLoss := r.heart.Rav * i.qav * i.qav
	if i.qav < 0 {
		aorticLoss = r.heart.Rar * i.qav * i.qav
	}
	for k, x := range [powers]float64{
		powFilling: i.pfill * fromAtrium, powVentricle: i.plv * fromHeart, powHead: i.head * y[qp], powLoop: max(0, -i.qav),
		powMitral: r.heart.Rmv * i.qmv * i.qmv, powAortic: aorticLoss, powCannula: r.pump.Resistance * y[qp] * y[qp],
		powZc: drop, powR: square(y[pc]-r.pv) / r.r, powOutflow: r.pv * (y[pc] - r.pv) / r.r,
		powRoot: i.pao * q, powFlow: q,
	} {
		b.power[k] += w * x
	}
}

// extremes widens the range of a signal by what it reaches within a step: at
// the nodes, and at the tops of the parabolas through three of them.
func (b *books) extremes(r *run, k int, x *[nodes]float64) {
	low, high := x[0], x[0]
	for _, v := range x[1:] {
		low, high = min(low, v), max(high, v)
	}
	spread := high - low
	b.low[k], b.high[k] = min(b.low[k], low), max(b.high[k], high)
	if low-spread > b.low[k] && high+spread < b.high[k] {
		return
	}
	for j := 0; j+2 < nodes; j++ {
		at, ok := vertex(lobattoAt[j:j+3], x[j:j+3])
		if !ok {
			continue
		}
		r.peek(at)
		v := r.signals()[k]
		b.low[k], b.high[k] = min(b.low[k], v), max(b.high[k], v)
	}
}

// vertex is the place of the extreme of the parabola through three points, if
// it lies between them.
func vertex(t, x []float64) (at float64, ok bool) {
	rise1, rise2 := (x[1]-x[0])/(t[1]-t[0]), (x[2]-x[1])/(t[2]-t[1])
	bend := (rise2 - rise1) / (t[2] - t[0])
	if bend == 0 {
		return 0, false
	}
	at = (t[0]+t[1])/2 - rise1/(2*bend)
	return at, at > t[0] && at < t[2]
}

// join takes in the books of another stretch of time.
func (b *books) join(o *books) {
	b.time += o.time
	b.open += o.open
	for k := range signals {
		b.integral[k] += o.integral[k]
		b.low[k], b.high[k] = min(b.low[k], o.low[k]), max(b.high[k], o.high[k])
	}
	for k := range powers {
		b.power[k] += o.power[k]
	}
}

// of is the range of a signal.
func (b *books) of(k int) Range {
	if math.IsNaN(b.time) {
		return Range{b.time, b.time, b.time}
	}
	return Range{Mean: b.integral[k] / b.time, Min: b.low[k], Max: b.high[k]}
}

// opening is how long the aortic valve is open, s. A trickle is none: where blood
// stands in front of the valve, rounding opens it.
func (b *books) opening() (open float64, opened bool) {
	const trickle = 1e-3 // mL/s
	if b.high[sigValve] < trickle {
		return 0, false
	}
	return b.open, true
}

// surplus is EEP - mean P, mmHg; NaN unless mean flow is positive.
func (b *books) surplus() float64 {
	if !(b.power[powFlow] > 0) {
		return math.NaN()
	}
	return b.power[powRoot]/b.power[powFlow] - b.integral[sigPao]/b.time
}
