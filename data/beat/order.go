package beat

import (
	"math"
	"slices"
)

// median of x, NaN where x is empty. It leaves x as it is.
func median(x []float64) float64 { return quantile(x, 0.5) }

// quantile of x by linear interpolation between order statistics, NaN where x
// is empty. It leaves x as it is.
func quantile(x []float64, p float64) float64 {
	if len(x) == 0 {
		return math.NaN()
	}
	s := slices.Clone(x)
	slices.Sort(s)
	at := p * float64(len(s)-1)
	k := min(int(at), len(s)-1)
	if k+1 == len(s) {
		return s[k]
	}
	return s[k] + (at-float64(k))*(s[k+1]-s[k])
}

// spread is the robust standard deviation, 1.4826 times the median absolute
// deviation from m; it equals the standard deviation for a normal law.
func spread(x []float64, m float64) float64 {
	d := make([]float64, len(x))
	for i, v := range x {
		d[i] = math.Abs(v - m)
	}
	return 1.4826 * median(d)
}

// wideSpread is the robust standard deviation from the upper quartile of the
// absolute deviations from m, 1/1.1503 of it: a swing with breathing, in which
// most values lie off the median, does not escape it.
func wideSpread(x []float64, m float64) float64 {
	d := make([]float64, len(x))
	for i, v := range x {
		d[i] = math.Abs(v - m)
	}
	return quantile(d, 0.75) / 1.1503
}

// meanSD returns the mean and the standard deviation with n-1.
func meanSD(x []float64) (mean, sd float64) {
	for _, v := range x {
		mean += v
	}
	mean /= float64(len(x))
	for _, v := range x {
		sd += (v - mean) * (v - mean)
	}
	return mean, math.Sqrt(sd / float64(len(x)-1))
}

// around returns the values of x within reach of index i that count, i itself
// included. Near an end it takes more from the other side.
func around(x []float64, counts []bool, i, reach int) []float64 {
	from := max(0, min(i-reach, len(x)-1-2*reach))
	to := min(len(x), max(i+reach+1, 2*reach+1))
	var out []float64
	for k := from; k < to; k++ {
		if counts[k] {
			out = append(out, x[k])
		}
	}
	return out
}
