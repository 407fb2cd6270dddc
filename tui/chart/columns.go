package chart

import "math"

// Columns brings the samples [from, to) of a uniform trace to width values, one
// a column, by the map that the package comment gives.
//
// A column that has samples takes the one furthest from their mean; then the
// largest and the smallest sample of the window are pinned into their columns,
// so the extremes of the result are the extremes of the window. (Where both
// fall into one column, one of them moves to the column beside it; of a single
// column only the sample furthest from the mean is left.) A column without
// samples lies in a hole, or between two samples of a window that has fewer
// samples than columns: it is interpolated linearly if at most gap samples are
// missing there (gap below 0 counts as 0), else it is NaN. A hole that leaves samples in every column it
// touches cannot be seen.
//
// NaN, values beyond ±1e300 and indices outside the trace are missing. An
// empty window gives NaN only, a width below 1 an empty result.
func Columns(trace []float64, from, to, width, gap int) []float64 {
	out := make([]float64, max(width, 0))
	for c := range out {
		out[c] = math.NaN()
	}
	if width < 1 || to <= from {
		return out
	}
	b := bins{from: from, n: to - from, width: width}
	for c := range out {
		first, end := b.samples(c, len(trace))
		out[c] = outlier(trace[first:end])
	}
	bridge(out, trace, b, max(gap, 0))
	first, end := b.window(len(trace))
	if low, high, ok := extremes(trace[first:end]); ok && width > 1 {
		pin(out, trace, b, first+low, first+high)
	}
	return out
}

// bins is the map between samples from .. from+n-1 and columns 0 .. width-1.
type bins struct{ from, n, width int }

// column is where sample i of the trace is drawn.
func (b bins) column(i int) int {
	if b.n == 1 || b.width == 1 {
		return 0
	}
	return (2*(i-b.from)*(b.width-1) + b.n - 1) / (2 * (b.n - 1))
}

// samples is the half-open range of a trace of length size that column c shows.
func (b bins) samples(c, size int) (first, end int) {
	first, end = b.edge(c), b.edge(c+1)
	return min(max(b.from+first, 0), size), min(max(b.from+end, 0), size)
}

// edge is the first sample of the window, counted from 0, that is drawn in
// column c or further right.
func (b bins) edge(c int) int {
	switch {
	case c == 0:
		return 0
	case c == b.width || b.n == 1 || b.width == 1:
		return b.n
	}
	q := 2 * (b.width - 1) // i (w-1)/(n-1) >= c - 1/2
	return ((2*c-1)*(b.n-1) + q - 1) / q
}

// window is the part of a trace of length size that the window covers.
func (b bins) window(size int) (first, end int) {
	return min(max(b.from, 0), size), min(max(b.from+b.n, 0), size)
}

// position is the place of column c in the trace, in samples.
func (b bins) position(c int) float64 {
	return float64(b.from) + float64(c)*float64(b.n-1)/float64(max(b.width-1, 1))
}

// Beyond largest, the difference of two numbers could overflow.
const largest = 1e300

// present says whether x is a value, and one that can be drawn.
func present(x float64) bool { return math.Abs(x) <= largest }

// outlier is the sample furthest from the mean of all of them, the first
// of equals; NaN where there is none.
func outlier(s []float64) float64 {
	sum, n := 0.0, 0
	for _, x := range s {
		if present(x) {
			sum += x
			n++
		}
	}
	mean := sum / float64(n)
	far, best := math.NaN(), -1.0
	for _, x := range s {
		if d := math.Abs(x - mean); present(x) && d > best {
			far, best = x, d
		}
	}
	return far
}

// extremes finds the first smallest and the first largest sample.
func extremes(s []float64) (low, high int, ok bool) {
	low, high = -1, -1
	for i, x := range s {
		if !present(x) {
			continue
		}
		if low < 0 || x < s[low] {
			low = i
		}
		if high < 0 || x > s[high] {
			high = i
		}
	}
	return low, high, low >= 0
}

// bridge interpolates the empty columns of out that lie in a hole of at most
// gap missing samples, or between two neighbouring samples.
func bridge(out, trace []float64, b bins, gap int) {
	for c := 0; c < len(out); c++ {
		if !math.IsNaN(out[c]) {
			continue
		}
		end := c
		for end < len(out) && math.IsNaN(out[end]) {
			end++
		}
		if c > 0 && end < len(out) {
			left := lastBefore(trace, b, c)
			right := firstFrom(trace, b, end)
			if right-left-1 <= gap {
				for k := c; k < end; k++ {
					out[k] = between(trace, left, right, b.position(k))
				}
			}
		}
		c = end
	}
}

// lastBefore is the last sample left of column c, whose left neighbour
// has one.
func lastBefore(trace []float64, b bins, c int) int {
	_, i := b.samples(c-1, len(trace))
	for i--; !present(trace[i]); i-- {
	}
	return i
}

// firstFrom is the first sample of column c, which has one.
func firstFrom(trace []float64, b bins, c int) int {
	i, _ := b.samples(c, len(trace))
	for ; !present(trace[i]); i++ {
	}
	return i
}

// between interpolates linearly at position x, in samples, and never leaves the
// range of the two samples.
func between(trace []float64, left, right int, x float64) float64 {
	u := min(max((x-float64(left))/float64(right-left), 0), 1)
	p, q := trace[left], trace[right]
	return min(max(p*(1-u)+q*u, min(p, q)), max(p, q))
}

// pin puts samples low and high of the trace, the extremes of the window, into
// their columns.
func pin(out, trace []float64, b bins, low, high int) {
	l, h := b.column(low), b.column(high)
	switch {
	case l != h || trace[low] == trace[high]:
	case low < high:
		l, h = apart(out, l)
	default:
		h, l = apart(out, h)
	}
	out[l], out[h] = trace[low], trace[high]
}

// apart gives the earlier and the later of two samples in column c a column
// each, preferring a neighbour that has a value.
func apart(out []float64, c int) (earlier, later int) {
	if c == len(out)-1 || c > 0 && math.IsNaN(out[c+1]) && !math.IsNaN(out[c-1]) {
		return c - 1, c
	}
	return c, c + 1
}
