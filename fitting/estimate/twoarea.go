package estimate

import "math"

// ByTwoArea solves
//
//	int_a^b Q dt = C (P(b) - P(a)) + (1/R) int_a^b (P - Pv) dt
//
// over systole, from the foot to the end of the flow, and over diastole, the rest,
// for C and R (Self et al. 1994): two equations that hold for a two-element load.
// Where the flow does not stop the beat is cut where it has fallen to its mean
// after its peak: the equations ask for no rest. It does not apply where C or R
// comes out negative.
func ByTwoArea(b Beat) Estimate {
	e := newEstimate(TwoArea)
	if !b.hasFlow() {
		return e.without("it needs the wave of the flow")
	}
	n := len(b.Pressure.Samples)
	foot := b.foot()
	end := b.ejected(foot)
	if end-foot < leastDiastole || foot+n-end < leastDiastole {
		return e.without("systole and diastole cannot be told apart in the flow")
	}
	// Samples from one beat on into the next lie higher by what the beat rises.
	next := func(j int) float64 {
		if j >= n {
			return b.Rise
		}
		return 0
	}
	p := func(j int) float64 { return b.level(j) + next(j) }
	parts := [2]stretch{{foot, end}, {end, foot + n}}
	var q, dp, area [2]float64
	for i, s := range parts {
		q[i] = integral(b.Flow.Samples, 0, s, b.Flow.Rate)
		dp[i] = p(s.to) - p(s.from)
		area[i] = integral(b.Pressure.Samples, b.OutflowPressure, s, b.Pressure.Rate)
	}
	det := dp[0]*area[1] - dp[1]*area[0]
	if math.Abs(det) <= 1e-9*(math.Abs(dp[0]*area[1])+math.Abs(dp[1]*area[0])) {
		return e.without("the two equations say the same: pressure does not change from foot to end of systole")
	}
	e.C = (q[0]*area[1] - q[1]*area[0]) / det
	e.R = det / (dp[0]*q[1] - dp[1]*q[0])
	if !(e.C > 0) || !(e.R > 0) || math.IsInf(e.R, 0) {
		return e.without("it gives C %.3g and R %.3g, which is no load", e.C, e.R)
	}
	e.Tau = e.R * e.C
	return e
}

// ejected is the end of ejection after the foot: where the flow has stopped, else
// where it has fallen to its mean.
func (b Beat) ejected(foot int) int {
	n := len(b.Flow.Samples)
	if end := b.stop(foot) + n; end < foot+n-int(2*lateTo*float64(n)) && b.leaks(stretch{end, foot + n - int(lateTo*float64(n))}) == "" {
		return end
	}
	peak := foot
	for j := foot; j < foot+n; j++ {
		if at(b.Flow.Samples, j) > at(b.Flow.Samples, peak) {
			peak = j
		}
	}
	mean := b.Flow.Mean()
	j := peak
	for j < foot+n && at(b.Flow.Samples, j) > mean {
		j++
	}
	return j
}
