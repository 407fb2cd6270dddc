package fault

import "math"

const (
	ringFirst    = 0.6  // s after the flush that are fitted at first
	ringLeast    = 0.08 // s
	ringMost     = 0.9  // s
	ringDecays   = 5.0  // times 1/(zeta w) that are fitted then
	patternFrom  = 0.7  // s after the flush: the beats that tell what lies under it
	patternLong  = 2.0  // s of them
	patternFar   = 40.0 // s to either side that are searched
	lowestRing   = 1.5  // Hz
	highestRing  = 80.0 // Hz
	belowNyquist = 0.9  // of half the rate
)

// response fits what follows the end of a flush,
//
//	x(t) = b(t) + c + A s(t - t0),  s" + 2 zeta w s' + w² s = 0, s(0) = 1, s'(0) = 0,
//
// where b is the pulse that goes on underneath, taken from the stretch of the trace
// whose beats agree best with those after the flush. w, zeta and t0 are searched, c
// and A follow.
func (t Trace) response(flush Run, all []Run) (Response, bool) {
	base, ok := t.underneath(flush, all)
	first := ring{rate: t.Rate, from: t.lettingGo(flush)}
	first.values = t.ringing(first.from, ringFirst, base)
	if !ok || len(first.values) < 8 {
		return Response{}, false
	}
	at, _ := first.search(first.scan())
	again := first
	again.values = t.ringing(first.from, min(ringMost, max(ringLeast, ringDecays/(2*math.Pi*at.natural*at.damping))), base)
	if len(again.values) < 8 {
		return Response{}, false
	}
	at, rest := again.search(at)
	return Response{at.natural, at.damping}, 1-rest >= leastRing && at.natural < highestRing && at.natural < belowNyquist*t.Rate/2
}

// lettingGo is the first sample that has left the level of the flush by a twentieth of
// the fall that follows.
func (t Trace) lettingGo(flush Run) int {
	n := min(flush.To-flush.From, t.samples(0.2))
	top := quantile(sample(t.Values[flush.To-n:flush.To], fewInWindow), 0.5)
	end := min(len(t.Values), flush.To+t.samples(ringFirst))
	bottom := quantile(sample(t.Values[flush.To:end], fewInWindow), 0.5)
	i := flush.To
	for i > flush.From && t.Values[i-1] < top-0.05*(top-bottom) {
		i--
	}
	return i
}

// underneath gives the pulse under the end of a flush, as a distance in samples to the
// stretch that shows it; not ok where no beats are there to tell it.
func (t Trace) underneath(flush Run, all []Run) (func(i int) float64, bool) {
	from := flush.To + t.samples(patternFrom)
	to := from + t.samples(patternLong)
	if to > len(t.Values) {
		return nil, false
	}
	clear := func(a, b int) bool {
		if a < 0 || b > len(t.Values) {
			return false
		}
		for _, r := range all {
			if a < r.To+t.samples(patternFrom) && b > r.From {
				return false
			}
		}
		return true
	}
	distance := func(lag, stride int) float64 {
		sum, squares, n := 0.0, 0.0, 0.0
		for i := from; i < to; i += stride {
			d := t.Values[i] - t.Values[i-lag]
			sum, squares, n = sum+d, squares+d*d, n+1
		}
		return squares/n - sum*sum/(n*n)
	}
	best, least := 0, math.Inf(1)
	far, step := t.samples(patternFar), max(1, t.samples(0.01))
	for lag := -far; lag <= far; lag += step {
		if clear(flush.To-t.samples(0.05)-lag, to-lag) {
			if d := distance(lag, step); d < least {
				best, least = lag, d
			}
		}
	}
	for lag := best - step; !math.IsInf(least, 1) && lag <= best+step; lag++ {
		if clear(flush.To-t.samples(0.05)-lag, to-lag) {
			if d := distance(lag, 1); d < least {
				best, least = lag, d
			}
		}
	}
	if math.IsInf(least, 1) {
		level := quantile(sample(t.Values[from:to], fewInWindow), 0.5)
		return func(int) float64 { return level }, true
	}
	return func(i int) float64 { return t.Values[max(0, min(len(t.Values)-1, i-best))] }, true
}

// ringing is the trace after a flush without the pulse underneath.
func (t Trace) ringing(from int, seconds float64, base func(int) float64) []float64 {
	var out []float64
	if base == nil {
		return nil
	}
	for i := from; i < min(len(t.Values), from+t.samples(seconds)); i++ {
		v := t.Values[i] - base(i)
		if math.IsNaN(v) {
			return nil
		}
		out = append(out, v)
	}
	return out
}

// ring is a decaying oscillation, sampled.
type ring struct {
	values []float64
	rate   float64
	from   int
}

// swing is a point of the search; start is t0 before the first sample, s.
type swing struct{ natural, damping, start float64 }

// scan looks at a grid.
func (r ring) scan() swing {
	var best swing
	least := math.Inf(1)
	highest := min(highestRing, belowNyquist*r.rate/2)
	for natural := lowestRing; natural < highest; natural *= 1.12 {
		for _, damping := range []float64{0.05, 0.12, 0.2, 0.3, 0.42, 0.56, 0.75, 1, 1.4} {
			for start := range 6 {
				at := swing{natural, damping, 0.06 * float64(start) / natural}
				if rest := r.rest(at, max(1, len(r.values)/200)); rest < least {
					best, least = at, rest
				}
			}
		}
	}
	return best
}

// search goes downhill from a point by steps along the axes, halved where none leads
// down; rest is what the best leaves of the variance.
func (r ring) search(at swing) (best swing, rest float64) {
	rest = r.rest(at, 1)
	highest := min(highestRing, belowNyquist*r.rate/2)
	for step := 0.1; step > 1e-4; {
		moved := false
		for _, next := range []swing{
			{at.natural * (1 + step), at.damping, at.start},
			{at.natural / (1 + step), at.damping, at.start},
			{at.natural, at.damping * (1 + step), at.start},
			{at.natural, at.damping / (1 + step), at.start},
			{at.natural, at.damping, at.start + 0.1*step/at.natural},
			{at.natural, at.damping, max(0, at.start-0.1*step/at.natural)},
		} {
			if next.natural > highest || next.natural < lowestRing/2 {
				continue
			}
			if v := r.rest(next, 1); v < rest {
				at, rest, moved = next, v, true
			}
		}
		if !moved {
			step /= 2
		}
	}
	return at, rest
}

// rest is the part of the variance that c + A s leaves, over every stride-th sample.
func (r ring) rest(at swing, stride int) float64 {
	var n, s, ss, y, yy, sy float64
	for i := 0; i < len(r.values); i += stride {
		f, v := decay(at.natural, at.damping, at.start+float64(i)/r.rate), r.values[i]
		n, s, ss, y, yy, sy = n+1, s+f, ss+f*f, y+v, yy+v*v, sy+f*v
	}
	vs, vy, c := ss-s*s/n, yy-y*y/n, sy-s*y/n
	if !(vs > 0) || !(vy > 0) || c < 0 {
		return 1
	}
	return 1 - c*c/(vs*vy)
}

// decay is s at t after its start: with w = 2 pi natural and z the damping,
//
//	z < 1: exp(-z w t) (cos d t + z w/d sin d t),   d = w sqrt(1 - z²)
//	z > 1: exp(-z w t) (cosh d t + z w/d sinh d t), d = w sqrt(z² - 1)
//
// and (1 + w t) exp(-w t) between.
func decay(natural, z, t float64) float64 {
	w := 2 * math.Pi * natural
	switch d := w * math.Sqrt(math.Abs(1-z*z)); {
	case d*t < 1e-6:
		return (1 + z*w*t) * math.Exp(-z*w*t)
	case z < 1:
		sin, cos := math.Sincos(d * t)
		return math.Exp(-z*w*t) * (cos + z*w/d*sin)
	default:
		slow, fast := math.Exp((d-z*w)*t), math.Exp(-(d+z*w)*t)
		return (slow+fast)/2 + z*w/d*(slow-fast)/2
	}
}
