package data

import (
	"fmt"
	"math"
	"slices"
)

const (
	// evenWithin is how far, in s, a row of an even clock may be from its
	// place: times printed in ms are up to 1 ms off, and 1 ms of a steep
	// upstroke (1000 mmHg/s) is 1 mmHg. A tenth of a step is always allowed.
	evenWithin = 1e-3
	// snap is the part of a step within which a row stands for a grid instant.
	snap = 0.01
)

// Uniform gives every channel on one even clock of the recording's rate (see
// [Recording.Clock]), from the first row to the last.
//
// If there is no hole and every row lies within 1 ms or a tenth of a step of
// its place on that clock, the values pass untouched, sample for row: the
// slices are then the channels' own, not to be changed. Otherwise values are
// interpolated linearly in time, rows that share a stamp or were stamped late
// first being spread evenly; an instant is NaN inside a hole, in the burst of
// rows that follows one, and beside a missing sample, unless a row lies within
// a hundredth of a step of it.
//
// A recording whose holes would take many times the samples that it has, or
// whose times do not advance, gives a [*FileError].
func (r *Recording) Uniform() (Grid, [][]float64, error) {
	p := paceOf(r.Time)
	c := clockOf(r.Time, p)
	if c.Rows < 2 || !(c.Duration > 0) {
		return Grid{}, nil, &FileError{File: r.Name.String(), What: "has no two times to make a clock of"}
	}
	times, lost := rowTimes(r.Time, p, c.Rate)
	g := Grid{Start: times[0], Rate: c.Rate, N: c.Rows}
	out := make([][]float64, len(r.Channels))
	if c.LongestStep <= p.hole && farthest(r.Time, times, p, c.Rate) <= tolerance(c.Rate) {
		for i, ch := range r.Channels {
			out[i] = ch.Values
		}
		return g, out, nil
	}
	n := math.Floor((times[c.Rows-1]-times[0])*c.Rate+snap) + 1
	if n > mostSamples(c.Rows) {
		return Grid{}, nil, &FileError{
			File: r.Name.String(),
			What: fmt.Sprintf("its holes, the longest of %s, would take %.3g samples at %.4g Hz; the file has %d", seconds(c.LongestStep), n, c.Rate, c.Rows),
			Hint: "use one stretch of it, with --from S and --to S",
		}
	}
	g.N = int(n)
	for i, ch := range r.Channels {
		out[i] = resample(times, without(ch.Values, lost), r.Time, p, g)
	}
	return g, out, nil
}

// mostSamples is how many samples a recording of some rows may become.
func mostSamples(rows int) float64 { return 1e6 + 20*float64(rows) }

// without gives the values with those of the lost rows missing.
func without(values []float64, lost []int) []float64 {
	if len(lost) == 0 {
		return values
	}
	values = slices.Clone(values)
	for _, k := range lost {
		values[k] = math.NaN()
	}
	return values
}

// tolerance is how far a row of an even clock may be from its place, s.
func tolerance(rate float64) float64 { return max(evenWithin, 0.1/rate) }

// farthest is the largest distance, s, of a row from its place on an even
// clock that starts anew after every hole. stamps are the times as written,
// which tell the holes.
func farthest(stamps, times []float64, p pace, rate float64) float64 {
	most, start := 0.0, 0
	for k, t := range times {
		if k > 0 && stamps[k]-stamps[k-1] > p.hole {
			start = k
		}
		most = max(most, math.Abs(t-times[start]-float64(k-start)/rate))
	}
	return most
}

// resample interpolates values at times linearly at the instants of g.
func resample(times, values, stamps []float64, p pace, g Grid) []float64 {
	out := make([]float64, g.N)
	i, last := 0, len(times)-2
	for k := range out {
		t := g.At(k)
		for i < last && times[i+1] <= t {
			i++
		}
		out[k] = interpolate(t, times[i:i+2], values[i:i+2], stamps[i+1]-stamps[i] > p.hole, snap/g.Rate)
	}
	return out
}

// interpolate gives the value at t between two samples, that of a sample
// within near of t, and NaN inside a hole.
func interpolate(t float64, times, values []float64, hole bool, near float64) float64 {
	before, after := t-times[0], times[1]-t
	switch {
	case before <= near:
		return values[0]
	case after <= near:
		return values[1]
	case hole:
		return math.NaN()
	}
	return (values[0]*after + values[1]*before) / (before + after)
}

// Within is the recording from one time to another, both on the file's own
// clock, the first included, the last not. Its values are shared with r; the
// warnings are those of the whole.
func (r *Recording) Within(s Span) *Recording {
	i, j := 0, 0
	for _, t := range r.Time {
		if t < s.From {
			i++
		}
		if t < s.To {
			j++
		}
	}
	j = max(i, j)
	cut := *r
	cut.Time = r.Time[i:j:j]
	cut.Channels = make([]Channel, len(r.Channels))
	for k, c := range r.Channels {
		c.Values = c.Values[i:j:j]
		cut.Channels[k] = c
	}
	return &cut
}
