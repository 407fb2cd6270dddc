package estimate

import (
	"fmt"
	"math"
)

const (
	// resting is the flow, over its maximum, below which it may have stopped.
	resting = 0.10
	// stopped is the flow, over its maximum, at which it has, and settling how long,
	// in periods, it may take from resting to there.
	stopped  = 0.001
	settling = 0.05
	// leaking is the mean flow in diastole, over the mean flow, above which the
	// methods of diastole do not apply: each percent of it puts about one percent
	// on tau, since what flows in delays the fall.
	leaking = 0.10
	// The part of the beat that the decay looks at, in fractions of the period
	// before the foot. It ends short of the foot, where averaging beats of
	// different length and the first of the inflow bend the trace, and begins late
	// enough that the valve has shut and the waves of early diastole, which bias
	// tau, have largely died down.
	lateFrom = 0.35
	lateTo   = 0.05
	// leastDiastole is the fewest samples from which a time constant is taken.
	leastDiastole = 4
)

// stretch is a run of samples from one to another, both included; they may be
// negative, since the beat is periodic.
type stretch struct{ from, to int }

func (s stretch) samples() int { return max(0, s.to-s.from+1) }

// at is sample j of a periodic trace.
func at(x []float64, j int) float64 {
	n := len(x)
	return x[((j%n)+n)%n]
}

// foot is the index of the lowest pressure.
func (b Beat) foot() int {
	foot := 0
	for j, v := range b.Pressure.Samples {
		if v < b.Pressure.Samples[foot] {
			foot = j
		}
	}
	return foot
}

// late is late diastole: from 35 % to 5 % of the period before the foot, but not
// before the flow has stopped.
func (b Beat) late() (s stretch, why string) {
	n := float64(len(b.Pressure.Samples))
	foot := b.foot()
	s = stretch{foot - int(math.Round(lateFrom*n)), foot - int(math.Round(lateTo*n))}
	if b.hasFlow() {
		if s.from = max(s.from, b.stop(foot)); s.samples() < leastDiastole {
			return s, "the flow does not stop before the foot of the pressure"
		}
	}
	return s, b.leaks(s)
}

// diastole is from where the flow stops to 5 % of the period before the foot; where
// there is no flow, late diastole.
func (b Beat) diastole() (s stretch, why string) {
	if !b.hasFlow() {
		return b.late()
	}
	foot := b.foot()
	s = stretch{b.stop(foot), foot - int(math.Round(lateTo*float64(len(b.Pressure.Samples))))}
	if s.samples() < leastDiastole {
		return s, "the flow does not stop before the foot of the pressure"
	}
	return s, b.leaks(s)
}

// stop is the first sample of the rest before the foot: from there on, up to the
// end of late diastole, the flow stays near nil, and it has come to nil there or
// changed its sign, back-flow included.
func (b Beat) stop(foot int) int {
	_, high := b.Flow.Extremes()
	q, n := b.Flow.Samples, len(b.Flow.Samples)
	end := foot - int(math.Round(lateTo*float64(n)))
	j := end
	for j > end-n && math.Abs(at(q, j)) <= resting*high {
		j--
	}
	j++
	for last := j + int(settling*float64(n)); j < last && math.Abs(at(q, j)) > stopped*high && at(q, j)*at(q, j-1) > 0; j++ {
	}
	return j
}

// leaks says why a stretch is no diastole: the flow does not stop there.
func (b Beat) leaks(s stretch) string {
	if !b.hasFlow() || s.samples() < leastDiastole {
		return ""
	}
	sum := 0.0
	for j := s.from; j <= s.to; j++ {
		sum += at(b.Flow.Samples, j)
	}
	if part := sum / float64(s.samples()) / b.Flow.Mean(); math.Abs(part) > leaking {
		return fmt.Sprintf("the flow does not stop in diastole: it is %.0f %% of its mean there", 100*part)
	}
	return ""
}

// integral is that of x - base over a stretch, by trapezia.
func integral(x []float64, base float64, s stretch, rate float64) float64 {
	sum := -(at(x, s.from) + at(x, s.to) - 2*base) / 2
	for j := s.from; j <= s.to; j++ {
		sum += at(x, j) - base
	}
	return sum / rate
}

// level is the pressure about sample j: the mean of three samples.
func (b Beat) level(j int) float64 {
	x := b.Pressure.Samples
	return (at(x, j-1) + at(x, j) + at(x, j+1)) / 3
}
