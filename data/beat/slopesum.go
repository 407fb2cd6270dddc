package beat

import (
	"math"
	"slices"
)

// Settings of the slope sum function and of the choice of its peaks.
const (
	sumLength    = 0.128 // s; Zong 2003
	sumSmoothing = 0.03  // s, width of each of two running means: -3 dB at 10.6 Hz
	blockLength  = 2.5   // s: holds at least one beat at 24 beats/min
	blocksAround = 4     // on either side, for the reference
	faintest     = 0.1   // the local reference is at least this part of the median one
	closest      = 0.22  // s, between upstrokes
	fastest      = 0.7   // of the period, where that is less
	// secondary waves (dicrotic, reversal) rise by at most this part of the
	// lower of the two upstrokes around, which are one period apart.
	secondaryPart = 0.75
	onePeriod     = 0.2 // within this part of it
	// Of the peaks, those above a part of the reference are upstrokes. The part
	// is where fewest peaks lie: between those of dicrotic waves and those of
	// weak beats. (Zong 2003 takes 60 % of an average that it follows.)
	lowestPart, highestPart, middlePart = 0.25, 0.55, 0.4
	partHalfWidth                       = 0.05
)

// upstrokes returns the indices in the coarse trace of the peaks of the slope
// sum function that are upstrokes; the peaks lie at their ends. period gives the
// period there, in samples of the coarse trace; nil where the rhythm is not
// regular.
func (t *trace) upstrokes(ssf []float64, period func(i int) float64) []int {
	fs := t.rateOfCoarse()
	reference := references(ssf, samplesIn(blockLength, fs))
	peaks := highest(ssf, func(i int) int {
		if period == nil {
			return samplesIn(closest, fs)
		}
		return max(1, int(min(closest*fs, fastest*period(i))))
	})
	heights := make([]float64, len(peaks))
	for i, p := range peaks {
		heights[i] = ssf[p] / reference[p]
	}
	limit := emptiest(heights)
	var out []int
	for i, p := range peaks {
		if heights[i] >= limit {
			out = append(out, p)
		}
	}
	if period == nil {
		return out
	}
	return primary(out, ssf, period)
}

// primary leaves out the secondary waves: an upstroke that lies between two
// higher ones which are one period apart. An early beat is none: the upstrokes
// around it are farther apart.
func primary(peaks []int, ssf []float64, period func(i int) float64) []int {
	var out []int
	for k, p := range peaks {
		higher := ssf[p] / secondaryPart
		before, after := k-1, k+1
		for before >= 0 && ssf[peaks[before]] < higher {
			before--
		}
		for after < len(peaks) && ssf[peaks[after]] < higher {
			after++
		}
		if before >= 0 && after < len(peaks) {
			apart := float64(peaks[after]-peaks[before]) / period(p)
			if math.Abs(apart-1) <= onePeriod {
				continue
			}
		}
		out = append(out, p)
	}
	return out
}

// slopeSum returns the smoothed trace and its slope sum function.
func (t *trace) slopeSum() (y, ssf []float64) {
	fs := t.rateOfCoarse()
	width := samplesIn(sumSmoothing, fs)
	y = smooth(smooth(t.coarse, width), width)
	rise := make([]float64, len(y))
	for i := 1; i < len(y); i++ {
		rise[i] = max(0, y[i]-y[i-1])
	}
	length := samplesIn(sumLength, fs)
	ssf = make([]float64, len(y))
	sum := 0.0
	for i := range ssf {
		sum += rise[i]
		if i >= length {
			sum -= rise[i-length]
		}
		ssf[i] = sum
	}
	return y, ssf
}

// references gives, for each sample, the height of a full upstroke there: the
// median over the blocks around of the largest value of each block.
func references(ssf []float64, size int) []float64 {
	blocks := max(1, len(ssf)/size)
	most := make([]float64, blocks)
	for b := range most {
		to := (b + 1) * size
		if b == blocks-1 {
			to = len(ssf)
		}
		most[b] = slices.Max(ssf[b*size : to])
	}
	local := make([]float64, blocks)
	floor := faintest * median(most)
	for b := range local {
		local[b] = max(floor, median(most[max(0, b-blocksAround):min(blocks, b+blocksAround+1)]))
	}
	out := make([]float64, len(ssf))
	for i := range out {
		out[i] = between(local, float64(i)/float64(size)-0.5)
	}
	return out
}

// between is the value of x at a place between its indices, linearly, and even
// beyond its ends.
func between(x []float64, at float64) float64 {
	at = max(0, min(at, float64(len(x)-1)))
	k := min(int(at), len(x)-1)
	if k+1 == len(x) || at == float64(k) { // the next sample may be missing
		return x[k]
	}
	return x[k] + (at-float64(k))*(x[k+1]-x[k])
}

// highest returns the local maxima of x of which none higher lies within the
// distance that apart gives, in order.
func highest(x []float64, apart func(i int) int) []int {
	var peaks []int
	for i := 1; i+1 < len(x); i++ {
		if x[i] > x[i-1] && x[i] >= x[i+1] {
			peaks = append(peaks, i)
		}
	}
	order := slices.Clone(peaks)
	slices.SortStableFunc(order, func(a, b int) int {
		switch {
		case x[a] > x[b]:
			return -1
		case x[a] < x[b]:
			return 1
		}
		return 0
	})
	taken := make([]bool, len(x))
	kept := order[:0]
	for _, p := range order {
		d := apart(p)
		if !slices.Contains(taken[max(0, p-d):min(len(x), p+d+1)], true) {
			taken[p] = true
			kept = append(kept, p)
		}
	}
	slices.Sort(kept)
	return kept
}

// emptiest returns the part of the reference, between lowestPart and
// highestPart, near which fewest heights lie; of several the one nearest to
// middlePart.
func emptiest(heights []float64) float64 {
	best, fewest := middlePart, math.MaxInt
	const steps = 30
	for k := 0; k <= steps; k++ {
		at := lowestPart + (highestPart-lowestPart)*float64(k)/steps
		n := 0
		for _, h := range heights {
			if math.Abs(h-at) < partHalfWidth {
				n++
			}
		}
		nearer := math.Abs(at-middlePart) < math.Abs(best-middlePart)
		if n < fewest || n == fewest && nearer {
			best, fewest = at, n
		}
	}
	return best
}
