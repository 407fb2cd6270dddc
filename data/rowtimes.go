package data

import "slices"

// A logger mostly samples evenly and stamps what it gets: with a clock that
// ticks slowly, so that rows share a stamp, or late, when rows have queued up.
// The first row of a tick keeps its stamp where ticks are coarse (they are cut,
// as to whole seconds). Else a row keeps its stamp unless it comes less than
// half a row's time before a later one that kept its own: it was stamped late
// then, for stamps can be late but not early.

// eachKept calls f for every two rows a < b that keep their stamps while none
// between them does.
func eachKept(time []float64, p pace, f func(a, b int)) {
	if p.coarse {
		last := 0
		eachRun(time, func(i, _ int) {
			if i > 0 {
				f(last, i)
			}
			last = i
		})
		return
	}
	b := len(time) - 1
	for i := b - 1; i >= 0; i-- {
		if time[i] <= time[b]-p.row/2*float64(b-i) {
			f(i, b)
			b = i
		}
	}
}

// holeBetween tells whether a step from row a to row b is a hole.
func holeBetween(time []float64, a, b int, p pace) bool {
	if time[b]-time[a] <= p.hole {
		return false
	}
	for i := a + 1; i <= b; i++ {
		if time[i]-time[i-1] > p.hole {
			return true
		}
	}
	return false
}

// rowTimes gives every row the time that it was probably taken at: rows
// between two that keep their stamps lie evenly between them, so that no
// sample is lost, as it would be if the rows of a stamp were averaged. Before
// the first and after the last that keeps its stamp rows go on at the rate, as
// do those that share the stamp before a hole. Times that are even already are
// returned as they are.
//
// lost lists the rows that were stamped in a burst after a hole; when they were
// taken is not known. The times never fall.
func rowTimes(time []float64, p pace, rate float64) (out []float64, lost []int) {
	if farthest(time, time, p, rate) <= tolerance(rate) {
		return time, nil // already as even as it needs to be
	}
	out = slices.Clone(time)
	first, last := len(time)-1, 0
	eachKept(time, p, func(a, b int) {
		first, last = min(first, a), max(last, b)
		step := (time[b] - time[a]) / float64(b-a)
		hole := b > a+1 && holeBetween(time, a, b, p)
		if hole && p.coarse {
			step = min(step, 1/rate)
		}
		for k := a + 1; k < b; k++ {
			out[k] = time[a] + float64(k-a)*step
			if hole && !p.coarse {
				lost = append(lost, k)
			}
		}
	})
	for k := range first {
		out[k] = time[first] - float64(first-k)/rate
	}
	for k := last + 1; k < len(out); k++ {
		out[k] = time[last] + float64(k-last)/rate
	}
	return out, lost
}
