package beat

import (
	"math"
	"slices"
	"sort"

	"gonum.org/v1/gonum/stat/distuv"

	"afterbeat/data"
)

// correlationTime is the integrated autocorrelation time of a series in steps,
//
//	tau = 1 + 2 sum rho_k,
//
// the sum up to where rho_2m + rho_2m+1 is no longer positive (initial positive
// sequence; Geyer 1992, Stat Sci 7:473, from memory), and at least 1. n/tau
// values would be as good if they were independent. A swing with breathing
// makes the later rho negative; they are left out, so that tau errs upwards.
func correlationTime(x []float64) float64 {
	mean, sd := meanSD(x)
	if !(sd > 0) {
		return 1
	}
	rho := func(k int) float64 {
		sum := 0.0
		for i := 0; i+k < len(x); i++ {
			sum += (x[i] - mean) * (x[i+k] - mean)
		}
		return sum / (sd * sd * float64(len(x)-1))
	}
	tau := -1.0
	for k := 0; k+1 < len(x); k += 2 {
		pair := rho(k) + rho(k+1)
		if pair <= 0 {
			break
		}
		tau += 2 * pair
	}
	return max(1, tau)
}

// medianInterval is the 95 % interval of a median by order statistics,
// x_(j) .. x_(n+1-j) with P(X < j) <= 0.025 for X binomial (n, 1/2) (e.g. Conover
// 1999, Practical Nonparametric Statistics, from memory); the distance of j from the
// middle is widened by sqrt(tau). why is set where there is no interval.
func medianInterval(x []float64) (i data.Interval, why string) {
	n := len(x)
	half := float64(n+1)/2 - float64(lowerRank(n))
	j := int(math.Floor(float64(n+1)/2 - half*math.Sqrt(correlationTime(x))))
	if lowerRank(n) < 1 || j < 1 {
		return data.NoInterval(), "too few independent beats for an interval"
	}
	s := slices.Clone(x)
	slices.Sort(s)
	return data.Interval{Low: s[j-1], High: s[n-j]}, ""
}

// lowerRank is the largest j with P(X < j) <= 0.025, X binomial (n, 1/2); 0
// where there is none (n < 6).
func lowerRank(n int) int {
	law := distuv.Binomial{N: float64(n), P: 0.5}
	return sort.Search(n, func(j int) bool { return law.CDF(float64(j)) > 0.025 })
}

// meanInterval is the 95 % interval of the time average over beats: the
// weighted mean of the beats' means, with
//
//	variance = tau n/(n-1) sum w² (m - M)² / (sum w)²
//
// and Student's t with n/tau - 1 degrees of freedom.
func meanInterval(beats []Beat) (i data.Interval, why string) {
	means := each(beats, func(b Beat) float64 { return b.Mean })
	n := float64(len(beats))
	tau := correlationTime(means)
	if n/tau < 2 {
		return data.NoInterval(), "too few independent beats for an interval"
	}
	m := timeAverage(beats)
	squares, weights := 0.0, 0.0
	for _, b := range beats {
		w := float64(b.Samples())
		squares += w * w * (b.Mean - m) * (b.Mean - m)
		weights += w
	}
	se := math.Sqrt(tau*n/(n-1)*squares) / weights
	t := distuv.StudentsT{Sigma: 1, Nu: n/tau - 1}.Quantile(0.975)
	return data.Interval{Low: m - t*se, High: m + t*se}, ""
}
