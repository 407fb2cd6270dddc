package beat

import (
	"math"
	"slices"
)

// Criteria says by what a pulse is looked for.
type Criteria string

const (
	// Measured is for a native pulse: every upstroke is found by itself.
	Measured Criteria = "measured"
	// Support is for a pulse of a few mmHg: upstrokes are found by what they
	// share, at the dominant period, and limits of the amplitude are wider.
	Support Criteria = "support"
)

// Settings of the search by a template.
const (
	templateRounds  = 3    // of averaging and matching anew
	templateBefore  = 0.35 // of the period, before the steepest rise
	templateAfter   = 0.45
	weakestMatch    = 0.3 // correlation of a candidate
	tempo           = 8.0 // weight of (log interval/period)² against a correlation
	restart         = 1.0 // what a break of the rhythm costs
	longestFollowed = 2.6 // periods from one upstroke to the next
	templateSmooth  = 0.03
	foldPhases      = 64
)

// steady finds the upstrokes of a faint pulse of a known period: the trace is
// matched with the average upstroke, which is then averaged anew over the
// matches (Woody 1967, Med Biol Eng 5:539, from memory), and of the places
// that match those are taken that follow one another most evenly, by dynamic
// programming (Ellis 2007, J New Music Res 36:51, from memory): the largest
//
//	sum r(t_i) - 8 sum (log (t_i+1 - t_i)/T)²
//
// with r the correlation and T the period there. It returns the feet of the
// upstrokes, in samples of the trace and parts of them.
func (t *trace) steady(windows []window) []float64 {
	fs := t.rateOfCoarse()
	period := periodAt(windows, fs)
	width := samplesIn(templateSmooth, fs)
	y := smooth(smooth(t.coarse, width), width)
	usual := usualPeriod(windows) * fs
	before, after := int(templateBefore*usual), int(math.Ceil(templateAfter*usual))
	if before < 1 || len(y) < before+after+2 {
		return nil
	}
	template, lift := t.seed(y, windows, before, after)
	var ends []float64
	for range templateRounds {
		r := correlations(y, template, before)
		ends = follow(r, period)
		if len(ends) < 2 {
			break
		}
		template, lift = averageUpstroke(y, ends, before, after)
	}
	onsets := make([]float64, 0, len(ends))
	for _, e := range ends {
		onset := (e - float64(before) + lift + 0.5) * float64(t.factor)
		if onset >= 1 && onset < float64(t.samples()-1) {
			onsets = append(onsets, onset)
		}
	}
	return onsets
}

// usualPeriod is the median period of the windows that have one, s.
func usualPeriod(windows []window) float64 {
	var periods []float64
	for _, w := range windows {
		if w.period > 0 {
			periods = append(periods, w.period)
		}
	}
	return median(periods)
}

// seed is the first template: the window whose period is nearest to the usual
// one, folded at its period, about the steepest rise.
func (t *trace) seed(y []float64, windows []window, before, after int) (template []float64, lift float64) {
	fs := t.rateOfCoarse()
	usual := usualPeriod(windows)
	best := windows[0]
	for _, w := range windows {
		if w.period > 0 && (best.period == 0 || math.Abs(w.period-usual) < math.Abs(best.period-usual)) {
			best = w
		}
	}
	T := best.period * fs
	piece := straightened(slices.Clone(y[best.from:best.to]))
	for i, m := range smooth(piece, int(T)) {
		piece[i] -= m
	}
	var sums, counts [foldPhases]float64
	for i, v := range piece {
		_, phase := math.Modf(float64(i) / T)
		k := min(foldPhases-1, int(phase*foldPhases))
		sums[k] += v
		counts[k]++
	}
	fold := make([]float64, foldPhases)
	for k := range fold {
		fold[k] = sums[k] / max(1, counts[k])
	}
	steepest, most := 0, 0.0
	at := func(k int) float64 { return fold[((k%foldPhases)+foldPhases)%foldPhases] }
	const h = foldPhases / 16
	for k := range fold {
		if rise := at(k+h) - at(k-h); rise > most {
			steepest, most = k, rise
		}
	}
	template = make([]float64, before+after)
	for i := range template {
		phase := float64(steepest) + float64(i-before)/T*foldPhases
		low := math.Floor(phase)
		template[i] = at(int(low)) + (phase-low)*(at(int(low)+1)-at(int(low)))
	}
	return normalise(template), footOf(template)
}

// correlations is, for each sample of y, the correlation of the template with
// the piece of y of which that sample is number before, both straightened.
func correlations(y, template []float64, before int) []float64 {
	n := len(template)
	like := normalise(straightened(slices.Clone(template)))
	out := make([]float64, len(y))
	middle := float64(n-1) / 2
	squares := float64(n) * (float64(n)*float64(n) - 1) / 12
	for i := before; i+n-before <= len(y); i++ {
		var sum, sumOfSquares, slope, product float64
		for j, v := range y[i-before : i-before+n] {
			v -= y[i] // of like size, so that squares do not cancel
			sum += v
			sumOfSquares += v * v
			slope += v * (float64(j) - middle)
			product += v * like[j]
		}
		if rest := sumOfSquares - sum*sum/float64(n) - slope*slope/squares; rest > 1e-12*sumOfSquares {
			out[i] = product / math.Sqrt(rest)
		}
	}
	return out
}

// follow picks, of the maxima of r, those that follow one another most evenly.
func follow(r []float64, period func(i int) float64) []float64 {
	var at []int
	for i := 1; i+1 < len(r); i++ {
		if r[i] >= weakestMatch && r[i] > r[i-1] && r[i] >= r[i+1] {
			at = append(at, i)
		}
	}
	score, from := make([]float64, len(at)), make([]int, len(at))
	best, bestAt := 0.0, -1 // of those too long ago to be followed
	for k, i := range at {
		T := period(i)
		score[k], from[k] = r[i]+max(0, best-restart), -1
		if best > restart {
			from[k] = bestAt
		}
		for j := k - 1; j >= 0 && float64(i-at[j]) <= longestFollowed*T; j-- {
			d := float64(i - at[j])
			if d < fastest/1.4*T {
				continue
			}
			l := math.Log(d / T)
			if s := score[j] + r[i] - tempo*l*l; s > score[k] {
				score[k], from[k] = s, j
			}
		}
		for j := k; j >= 0; j-- { // what may now be broken off
			if float64(i-at[j]) > fastest*T {
				if score[j] > best {
					best, bestAt = score[j], j
				}
				break
			}
		}
	}
	last := -1
	for k := range at {
		if last < 0 || score[k] > score[last] {
			last = k
		}
	}
	var out []float64
	for k := last; k >= 0; k = from[k] {
		i := at[k]
		out = append(out, float64(i)+vertex(r[i-1], r[i], r[i+1]))
	}
	slices.Reverse(out)
	return out
}

// averageUpstroke is the mean of the pieces of y about each match, and its foot
// in samples from its beginning.
func averageUpstroke(y []float64, matches []float64, before, after int) (template []float64, lift float64) {
	template = make([]float64, before+after)
	column := make([]float64, 0, len(matches))
	for j := range template {
		column = column[:0]
		for _, m := range matches {
			if at := m + float64(j-before); at >= 0 && at <= float64(len(y)-1) {
				column = append(column, between(y, at)-between(y, m))
			}
		}
		template[j] = trimmedMean(column)
	}
	return template, footOf(template)
}

// trimmedMean leaves out the lowest and the highest tenth.
func trimmedMean(x []float64) float64 {
	s := slices.Clone(x)
	slices.Sort(s)
	cut := len(s) / 10
	mean, _ := meanSD(s[cut : len(s)-cut])
	return mean
}

// footOf is the foot of an upstroke by intersecting tangents, in samples.
func footOf(x []float64) float64 {
	steepest, slope := 1, 0.0
	for i := 1; i+1 < len(x); i++ {
		if s := (x[i+1] - x[i-1]) / 2; s > slope {
			steepest, slope = i, s
		}
	}
	if slope == 0 {
		return 0
	}
	lowest := steepest
	for i := steepest; i >= 0; i-- {
		if x[i] < x[lowest] {
			lowest = i
		}
	}
	tangent := float64(steepest) - (x[steepest]-x[lowest])/slope
	return max(float64(lowest), min(float64(steepest), tangent))
}
