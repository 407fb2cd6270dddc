package fault

import (
	"cmp"
	"fmt"
	"math"
	"math/cmplx"
	"slices"

	"gonum.org/v1/gonum/dsp/fourier"

	"afterbeat/data"
)

const (
	heldWindow   = 1 << 14 // samples of a window
	heldWindows  = 4       // windows looked at
	leastHeld    = 512     // samples
	leastJumps   = 20
	mostAlike    = 0.9  // correlation of successive jumps: above, the trace is smooth
	mostPaired   = 0.25 // the same, for holds of two samples and more: spikes jump twice
	leastInRow   = 0.3  // of the jumps, by size, have another one hold away
	oneLine      = 1.3  // within this factor, lines are sidebands of the strongest
	highestHeld  = 0.7  // of the rate
	lowestHeld   = 2.0  // Hz, the lowest true rate looked for
	leastLine    = 0.75 // of the strength that a hold leaves, see the package's page
	leastFolded  = 0.85 // of what lies outside the window by chance, must lie inside
	foldedBins   = 256
	mostOfJumps  = 0.005 // of the differences are capped: spikes
	candidates   = 24    // lines looked at
	scalloped    = 0.63  // of its height, at least, a line has in the nearest bin (2/pi)
	negligible   = 1e-3  // of the largest jump
	agreeingHeld = 0.02  // of the rate between windows
)

// held finds held samples, and gives the samples in a hold (1 where there is none).
func (t Trace) held() ([]Finding, float64) {
	w := jumps(t.Values)
	var rates []float64
	looked := 0
	for _, r := range windows(len(w), heldWindow, heldWindows) {
		if r.To-r.From < leastHeld {
			continue
		}
		looked++
		if f := trueRate(w[r.From:r.To], t.Rate); f > 0 {
			rates = append(rates, f)
		}
	}
	if len(rates) == 0 || 2*len(rates) <= looked {
		return nil, 1
	}
	rate := median(rates)
	agreeing := 0
	for _, f := range rates {
		if math.Abs(f-rate) <= agreeingHeld*rate {
			agreeing++
		}
	}
	if 2*agreeing <= looked {
		return nil, 1
	}
	k := t.Rate / rate
	return []Finding{{
		Code: data.CodeHeld, Number: rate,
		Text: fmt.Sprintf("each value is repeated for %.3g samples: the true rate is %.4g Hz, not %.4g, and nothing above %.3g Hz is measured", k, rate, t.Rate, rate/2),
		Cure: "export at the device's own rate, or take its analogue output; until then a foot is uncertain by one held value",
	}}, k
}

// windows are at most n windows of length samples, evenly over all; the whole
// where it is shorter.
func windows(all, length, n int) []Run {
	if all <= length {
		return []Run{{0, all}}
	}
	n = min(n, max(1, all/length))
	var out []Run
	for i := range n {
		from := (2*i + 1) * all / (2 * n)
		from = max(0, min(all-length, from-length/2))
		out = append(out, Run{from, from + length})
	}
	return out
}

// jumps are the squared differences, capped so that spikes do not rule; 0 beside a
// missing sample.
func jumps(values []float64) []float64 {
	w := make([]float64, len(values))
	for i := 1; i < len(values); i++ {
		if d := values[i] - values[i-1]; !math.IsNaN(d) && !math.IsInf(d, 0) {
			w[i] = d * d
		}
	}
	most := quantile(sample(w, fewInAll), 1-mostOfJumps)
	for i, v := range w {
		w[i] = min(v, most)
	}
	return w
}

// jump is a squared difference and its place.
type jump struct {
	at int
	w  float64
}

// trueRate is the rate at which jumps come, Hz; 0 where they come at every sample.
func trueRate(w []float64, rate float64) float64 {
	most := slices.Max(w)
	var some []jump
	sum, next := 0.0, 0.0
	for i, v := range w {
		if i > 0 {
			next += math.Sqrt(v * w[i-1])
		}
		if v > negligible*most {
			some = append(some, jump{i, v})
			sum += v
		}
	}
	if len(some) < leastJumps || next > mostAlike*sum {
		return 0
	}
	found := []hold{}
	for _, f := range lines(w, sum, rate) {
		for _, f := range []float64{f, 1 - f} { // a rate above rate/2 shows folded
			if f < 0.5 && next > mostPaired*sum {
				continue
			}
			if clear, ok := isHold(w, some, f, sum); ok {
				found = append(found, hold{f, clear})
				break
			}
		}
	}
	return clearest(found) * rate
}

// hold is a frequency at which jumps come, cycles a sample, and the strength of its
// line as a part of what it should be.
type hold struct{ frequency, clear float64 }

// clearest is the strongest of the lowest lines, since multiples of the rate are lines
// too; 0 of none.
func clearest(found []hold) float64 {
	if len(found) == 0 {
		return 0
	}
	lowest := slices.MinFunc(found, func(a, b hold) int { return cmp.Compare(a.frequency, b.frequency) }).frequency
	best := hold{}
	for _, h := range found {
		if h.frequency <= oneLine*lowest && h.clear > best.clear {
			best = h
		}
	}
	return best.frequency
}

// lines are the frequencies, in cycles a sample, at which jumps may come, the
// strongest first.
func lines(w []float64, sum, rate float64) []float64 {
	n := len(w)
	x := fourier.NewFFT(n).Coefficients(nil, w)
	strength := make([]float64, len(x)+1) // the bin after the last is 0
	for j, c := range x {
		strength[j] = cmplx.Abs(c) / sum
	}
	var tops []int
	for j := max(2, int(lowestHeld*float64(n)/rate)); j < len(x); j++ {
		f := max(float64(j)/float64(n), 1-float64(j)/float64(n)) // folded, the weaker
		if s := strength[j]; s >= strength[j-1] && s >= strength[j+1] && s > scalloped*leastLine*sinc(f) {
			tops = append(tops, j)
		}
	}
	slices.SortStableFunc(tops, func(a, b int) int { return cmp.Compare(strength[b], strength[a]) })
	var out []float64
	for _, j := range tops[:min(candidates, len(tops))] {
		at := float64(j)
		if j+1 < len(x) {
			at += between(x[j-1], x[j], x[j+1])
		}
		out = append(out, at/float64(n))
	}
	return out
}

func frac(x float64) float64 { return x - math.Floor(x) }

// sinc is what rounding to whole samples leaves of a line at f cycles a sample.
func sinc(f float64) float64 { return math.Sin(math.Pi*f) / (math.Pi * f) }

// between is how far a line lies from the bin of its top, in bins, from the three
// coefficients there (Jacobsen and Kootsookos 2007, IEEE Signal Process Mag 24(3):123,
// from memory).
func between(before, top, after complex128) float64 {
	d := real((before - after) / (2*top - before - after))
	if !(math.Abs(d) <= 1) {
		return 0
	}
	return d
}

// line is |sum w exp(-2 pi i f t)|.
func line(some []jump, f float64) float64 {
	re, im := 0.0, 0.0
	for _, j := range some {
		sin, cos := math.Sincos(2 * math.Pi * frac(f*float64(j.at)))
		re += j.w * cos
		im += j.w * sin
	}
	return math.Hypot(re, im)
}

// isHold tells whether the jumps come with frequency f, in cycles a sample: their
// line is as strong as rounding to samples leaves it, on the clock folded with f
// they lie within one sample, which is the part f of it, and where the trace is steep
// one follows the other by one hold.
func isHold(w []float64, some []jump, f, sum float64) (clear float64, ok bool) {
	if !(f > 0) || f >= highestHeld {
		return 0, false
	}
	clear = line(some, f) / (sinc(f) * sum)
	return clear, clear >= leastLine && folded(some, f, sum) >= leastFolded && inRow(w, some, f, sum) >= leastInRow
}

// folded is how much of the jumps lies within one sample of the clock folded with f,
// from 0, as much as by chance, to 1.
func folded(some []jump, f, sum float64) float64 {
	bins := make([]float64, foldedBins)
	for _, j := range some {
		bins[int(frac(f*float64(j.at))*foldedBins)%foldedBins] += j.w
	}
	width := min(foldedBins-1, int(math.Ceil(f*foldedBins))+2)
	inside := 0.0
	for _, v := range bins[:width] {
		inside += v
	}
	most := inside
	for i := range foldedBins {
		inside += bins[(i+width)%foldedBins] - bins[i]
		most = max(most, inside)
	}
	chance := float64(width) / foldedBins
	return (most/sum - chance) / (1 - chance)
}

// inRow is the part of the jumps that have another of like size one hold away.
func inRow(w []float64, some []jump, f, sum float64) float64 {
	k, with := int(1/f), 0.0
	for _, j := range some {
		near := 0.0
		for i := j.at + k; i <= j.at+k+1 && i < len(w); i++ {
			near = max(near, w[i])
		}
		with += min(j.w, near)
	}
	return with / sum
}
