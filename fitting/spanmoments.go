package fitting

import (
	"math"

	"gonum.org/v1/gonum/floats"
)

// The signals of a column: Q relaxed with either shape, Q, and dQ/dt.
const maxSignals = maxShapes + 2

// chunk is how many samples are worked on at a time: few enough to stay in the
// nearest memory.
const chunk = 512

// spanMoments is the least-squares problem of a span. Flow is linear between
// samples, so that what the columns make of it has an exact recursion (stepping),
// and each run begins with free values of Pd (and QL): the columns exp(-t/tau),
// whose factors may have either sign. With u the signals, c = M u the columns and
// e the beginnings of a run,
//
//	S = sum over runs, samples of (x'c + q'e - (P - Pv))²
//
// For a given shape the best q of each run is put in, which leaves the normal
// equations of x alone:
//
//	G = C'C - sum H'E⁻¹H,  b = C'P - sum H'E⁻¹p,  H = e'c, E = e'e, p = e'P
//
// together with their derivatives with respect to ln shape.
type spanMoments struct {
	model    Model
	h        float64 // s, between samples
	runs     []spanRun
	samples  int
	shapes   int
	signals  int                            // relaxed ones first, then Q, then dQ/dt where a column needs it
	mix      [maxLinear][maxSignals]float64 // M
	fixed    spanSums                       // of the signals that no shape moves
	total    float64                        // sum of (P - Pv)²
	all, one spanSums
	steps    [maxShapes]stepping
	y, dy    [maxShapes][chunk]float64
	e, de    [maxShapes][chunk]float64
}

type spanRun struct {
	pressure []float64 // above Pv, mmHg
	flow     []float64
	rise     []float64 // nil where no column needs it
	onsets   []int
}

// spanSums are sums over samples of products.
type spanSums struct {
	uu          [maxSignals][maxSignals]float64
	up          [maxSignals]float64
	du          [maxShapes][maxSignals]float64 // derivative of a relaxed signal with a signal
	dp          [maxShapes]float64
	ee, dee, ed [maxShapes][maxShapes]float64 // e with e, its derivative with e, e with the derivative of a signal
	eu, deu     [maxShapes][maxSignals]float64
	ep, dep     [maxShapes]float64
}

func newSpanMoments(m Model, s Span) *spanMoments {
	p := &spanMoments{model: m, h: 1 / s.Rate, shapes: m.Shapes(), signals: m.Shapes() + 1}
	for j, e := range m.Elements() {
		p.mix[j][e.Shape] += e.Relaxed
		p.mix[j][p.shapes] += e.Direct
		p.mix[j][p.shapes+1] += e.Rise
		if e.Rise != 0 {
			p.signals = p.shapes + 2
		}
	}
	for _, r := range s.Runs {
		one := spanRun{pressure: make([]float64, len(r.Pressure)), flow: r.Flow, onsets: r.Onsets}
		for j, v := range r.Pressure {
			one.pressure[j] = v - s.OutflowPressure
		}
		if p.signals > p.shapes+1 {
			one.rise = rise(r.Flow, s.Rate)
		}
		p.runs, p.samples = append(p.runs, one), p.samples+len(r.Flow)
	}
	p.fix()
	return p
}

// fix adds up what no shape moves.
func (p *spanMoments) fix() {
	q, d := p.shapes, p.shapes+1
	for _, r := range p.runs {
		p.total += floats.Dot(r.pressure, r.pressure)
		p.fixed.uu[q][q] += floats.Dot(r.flow, r.flow)
		p.fixed.up[q] += floats.Dot(r.flow, r.pressure)
		if r.rise != nil {
			p.fixed.uu[d][d] += floats.Dot(r.rise, r.rise)
			p.fixed.uu[q][d] += floats.Dot(r.flow, r.rise)
			p.fixed.up[d] += floats.Dot(r.rise, r.pressure)
		}
	}
	p.fixed.uu[d][q] = p.fixed.uu[q][d]
}

// normal makes spanMoments a problem.
func (p *spanMoments) normal(shape []float64, to *normal) {
	n := p.model.Linear()
	*to = normal{n: n, total: p.total}
	for s := range p.shapes {
		p.steps[s] = newStepping(p.h, shape[s])
	}
	p.all = p.fixed
	for _, r := range p.runs {
		p.one = spanSums{}
		p.sum(r)
		p.eliminate(to)
	}
	for i := range n {
		for j := range n {
			to.g[i][j] += p.mixed(i, func(k int) float64 { return p.signalOf(j, k) })
		}
		to.b[i] += p.mixed(i, func(k int) float64 { return p.all.up[k] })
		for s := range p.shapes {
			to.db[s][i] += p.mix[i][s] * p.all.dp[s]
			for j := range n {
				by := p.mixed(j, func(k int) float64 { return p.all.du[s][k] }) * p.mix[i][s]
				to.dg[s][i][j] += by
				to.dg[s][j][i] += by
			}
		}
	}
}

// mixed is row i of M times v.
func (p *spanMoments) mixed(i int, v func(k int) float64) float64 {
	sum := 0.0
	for k := range p.signals {
		if m := p.mix[i][k]; m != 0 {
			sum += m * v(k)
		}
	}
	return sum
}

// signalOf is signal k with column j.
func (p *spanMoments) signalOf(j, k int) float64 {
	return p.mixed(j, func(l int) float64 { return p.all.uu[k][l] })
}

// sum adds a run: its signals to all, its beginnings to one.
func (p *spanMoments) sum(r spanRun) {
	fading := 0
	for s := range p.shapes {
		fading = max(fading, p.steps[s].faded(len(r.flow)))
	}
	var last, dLast [maxShapes]float64
	for from := 0; from < len(r.flow); from += chunk {
		to := min(from+chunk, len(r.flow))
		p.advance(r, from, to, &last, &dLast)
		p.sumSignals(r, from, to)
		if from < fading {
			p.sumBeginnings(r, from, to)
		}
	}
}

// advance relaxes the flow over the chunk, from where it stood before it.
func (p *spanMoments) advance(r spanRun, from, to int, last, dLast *[maxShapes]float64) {
	n := to - from
	for s := range p.shapes {
		y, dy := p.y[s][:n], p.dy[s][:n]
		if from == 0 {
			y[0], dy[0] = 0, 0
			p.steps[s].relax(y[1:], dy[1:], r.flow[1:to], 0, 0, r.flow[0])
		} else {
			p.steps[s].relax(y, dy, r.flow[from:to], last[s], dLast[s], r.flow[from-1])
		}
		last[s], dLast[s] = y[n-1], dy[n-1]
	}
}

func (p *spanMoments) sumSignals(r spanRun, from, to int) {
	n := to - from
	for s := range p.shapes {
		y, dy := p.y[s][:n], p.dy[s][:n]
		p.all.up[s] += floats.Dot(y, r.pressure[from:to])
		p.all.dp[s] += floats.Dot(dy, r.pressure[from:to])
		for k := range p.signals {
			u := p.signal(r, k, from, to)
			if k >= s {
				v := floats.Dot(y, u)
				p.all.uu[s][k] += v
				if k != s {
					p.all.uu[k][s] += v
				}
			}
			p.all.du[s][k] += floats.Dot(dy, u)
		}
	}
}

// signal is signal k over the chunk.
func (p *spanMoments) signal(r spanRun, k, from, to int) []float64 {
	switch k {
	case p.shapes:
		return r.flow[from:to]
	case p.shapes + 1:
		return r.rise[from:to]
	}
	return p.y[k][:to-from]
}

func (p *spanMoments) sumBeginnings(r spanRun, from, to int) {
	n := to - from
	for s := range p.shapes {
		p.steps[s].fade(p.e[s][:n], p.de[s][:n], from)
	}
	for s := range p.shapes {
		e, de := p.e[s][:n], p.de[s][:n]
		p.one.ep[s] += floats.Dot(e, r.pressure[from:to])
		p.one.dep[s] += floats.Dot(de, r.pressure[from:to])
		for k := range p.signals {
			u := p.signal(r, k, from, to)
			p.one.eu[s][k] += floats.Dot(e, u)
			p.one.deu[s][k] += floats.Dot(de, u)
		}
		for t := range p.shapes {
			p.one.ee[s][t] += floats.Dot(e, p.e[t][:n])
			p.one.dee[s][t] += floats.Dot(de, p.e[t][:n])
			p.one.ed[s][t] += floats.Dot(e, p.dy[t][:n])
		}
	}
}

// duration is the duration of the span, s.
func (p *spanMoments) duration() float64 { return float64(p.samples) * p.h }

// newSpanSearch searches shapes from half a sample to a thousand times the time
// of a radian of the heart; the second one, L/Zc, to ten beats only: with a free
// beginning it is no different from a drift of the pressure there, and would take
// the total resistance along.
func newSpanSearch(p *spanMoments, period float64) *search {
	s := &search{problem: p, shapes: p.shapes, tolerance: sharp}
	for i := range s.shapes {
		s.low[i], s.high[i] = math.Log(p.h/2), math.Log(1000*period/(2*math.Pi))
		if i > 0 {
			s.high[i] = math.Log(10 * period)
		}
	}
	return s
}
