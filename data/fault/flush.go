package fault

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/unit"
)

const (
	flushAbove  = 0.5  // of the pulse above the 98th percentile
	flushMoves  = 0.2  // of the pulse, that its level may
	flushFalls  = 0.12 // s in which it falls by most of its height
	leastFlush  = 0.15 // s
	mostFlush   = 30.0 // s
	flushJoin   = 0.05 // s that ringing may dip within a flush
	flushMargin = 0.1  // s left out before
	flushAfter  = 0.5  // s left out after, at least
	leastRing   = 0.98 // of the variance after the flush, that the oscillation explains
)

// Response is that of a pressure line, taken as a mass on a spring with a damper:
// P_line" + 2 zeta w P_line' + w² P_line = w² P, w = 2 pi Natural.
type Response struct {
	Natural float64 // Hz
	Damping float64 // zeta, of critical
}

// Gain is the amplitude of the line over that of the artery at f, Hz.
func (r Response) Gain(f float64) float64 {
	u := f / r.Natural
	return 1 / math.Hypot(1-u*u, 2*r.Damping*u)
}

// Flat is the frequency up to which the gain is within 10 % of 1, Hz.
func (r Response) Flat() float64 {
	const steps = 4000
	for i := 1; i <= steps; i++ {
		f := 2 * r.Natural * float64(i) / steps
		if math.Abs(r.Gain(f)-1) > 0.1 {
			return f
		}
	}
	return 2 * r.Natural
}

// flushed finds fast flushes of a pressure line, and the line's response from their
// ends.
func (t Trace) flushed(s scale) []Finding {
	if t.Quantity != unit.Pressure || t.Rate < leastRate {
		return nil
	}
	runs := t.flushes(s)
	if len(runs) == 0 {
		return nil
	}
	f := Finding{Code: data.CodeLine, Unusable: true, Number: math.NaN()}
	var natural, damping []float64
	for _, r := range runs {
		after := flushAfter
		if line, ok := t.response(r, runs); ok {
			natural, damping = append(natural, line.Natural), append(damping, line.Damping)
			after = max(after, 3/(2*math.Pi*line.Natural*line.Damping))
		}
		f.Runs = append(f.Runs, Run{max(0, r.From-t.samples(flushMargin)), min(len(t.Values), r.To+t.samples(min(after, 2)))})
	}
	if len(natural) == 0 {
		f.Text = fmt.Sprintf("%s of the line, after which no oscillation can be told: its natural frequency and damping are unknown", counted(len(runs), "fast flush", "fast flushes"))
		f.Cure = "the samples are left out; flush again and let go at once, without a beat in the first tenths of a second"
		return []Finding{f}
	}
	line := Response{median(natural), median(damping)}
	f.Number = line.Natural
	f.Text, f.Cure = line.words(len(natural))
	return []Finding{f}
}

// The least natural frequency, Hz: under 7 a line is unacceptable, from 24 on good for
// every detail (after Gardner 1981, Anesthesiology 54:227; from memory). In between
// the damping decides; the limit of 8 Hz for a gain within 10 % is an assumption.
const (
	leastNatural = 7.0
	leastEven    = 8.0
)

func (r Response) words(n int) (text, cure string) {
	text = fmt.Sprintf("the line has a natural frequency of %.3g Hz and a damping of %.2g (%s): its gain is within 10 %% up to %.2g Hz", r.Natural, r.Damping, counted(n, "flush", "flushes"), r.Flat())
	switch {
	case r.Natural >= leastNatural && r.Flat() >= leastEven:
		return text + ", enough for a pulse", "none needed; the samples of the flush are left out"
	case r.Damping < 0.6:
		return text + "; it rings: pulse pressure is too high, and Zc and C are off (at 8 Hz and 0.2 pulse pressure +4 %, Zc -9 %)",
			"a short stiff line without bubbles; then flush again"
	}
	return text + "; it is damped: pulse pressure is too low (at 5 Hz and 1.0 by 13 %, and Zc is lost)", "clear bubbles and clots, open the stopcock, tighten the line; then flush again"
}

// flushes are the stretches far above the pulse.
func (t Trace) flushes(s scale) []Run {
	limit := s.high + flushAbove*s.pulse
	var all []Run
	for i, v := range t.Values {
		if !(v > limit) {
			continue
		}
		if n := len(all); n > 0 && i-all[n-1].To <= t.samples(flushJoin) {
			all[n-1].To = i + 1
		} else {
			all = append(all, Run{i, i + 1})
		}
	}
	var out []Run
	for _, r := range all {
		if n := r.To - r.From; n >= t.samples(leastFlush) && n <= t.samples(mostFlush) && t.isPlateau(r, s) {
			out = append(out, r)
		}
	}
	return out
}

// isPlateau tells a flush from a high pulse: its second half moves by less than a
// fifth of a pulse, and at its end it falls at once.
func (t Trace) isPlateau(r Run, s scale) bool {
	n := r.To - r.From
	some := sample(t.Values[r.From+n/2:r.To-n/8], fewInWindow)
	if len(some) < 3 || quantile(some, 0.9)-quantile(some, 0.1) > flushMoves*s.pulse {
		return false
	}
	top, least := quantile(some, 0.5), math.Inf(1)
	for _, v := range t.Values[r.To:min(len(t.Values), r.To+t.samples(flushFalls))] {
		least = min(least, v)
	}
	return top-least >= 0.6*(top-s.high)+flushAbove*s.pulse*0.4
}
