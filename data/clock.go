package data

import (
	"math"
	"strconv"
)

// Clock describes the times. Its Rate is that of the rows that keep their
// stamps (see rowTimes), without those between which a hole lies; where every
// row does, it is the steps that are no holes over the time they take. It is
// rounded to ten digits, so that steps of 0.001 s are 1000 Hz.
func (r *Recording) Clock() Clock { return clockOf(r.Time, paceOf(r.Time)) }

func clockOf(time []float64, p pace) Clock {
	c := Clock{Rows: len(time)}
	if c.Rows < 2 {
		return c
	}
	c.Duration = time[c.Rows-1] - time[0]
	for i := 1; i < c.Rows; i++ {
		step := time[i] - time[i-1]
		c.LongestStep = max(c.LongestStep, step)
		if step == 0 {
			c.Repeated++
		}
	}
	rows, taken := 0, 0.0
	eachKept(time, p, func(a, b int) {
		if !holeBetween(time, a, b, p) {
			rows += b - a
			taken += time[b] - time[a]
		}
	})
	c.Rate = tenDigits(float64(rows) / taken)
	if !(c.Rate > 0) || math.IsInf(c.Rate, 0) {
		c.Rate = float64(c.Rows-1) / c.Duration
	}
	return c
}

// tenDigits rounds to ten significant digits.
func tenDigits(x float64) float64 {
	y, _ := strconv.ParseFloat(strconv.FormatFloat(x, 'g', 10, 64), 64)
	return y
}

// Holes lists the stretches that the clock jumps over, each from the time
// before to the time after: steps longer than 20 ms, than five rows take, and
// than 1.75 times the longest step of an ordinary window of 32 stamps.
func (r *Recording) Holes() []Span { return holesOf(r.Time, paceOf(r.Time)) }

func holesOf(time []float64, p pace) []Span {
	var holes []Span
	for i := 1; i < len(time); i++ {
		if time[i]-time[i-1] > p.hole {
			holes = append(holes, Span{time[i-1], time[i]})
		}
	}
	return holes
}
