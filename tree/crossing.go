package tree

import "math"

// find looks for the times at which f, given step by step from time 0, first
// passes the fractions of the final value, not before a time from.
func (c *course) find(f []float64, step, from float64) {
	last := int(usable * float64(len(f)/2))
	for i, fraction := range fractions {
		if !math.IsNaN(c.times[i]) {
			continue
		}
		level := fraction * c.final
		for j := int(from / step); j < last; j++ {
			if f[j+1] < level {
				continue
			}
			at := 0.0
			if f[j] < level {
				at = passes(f, j, level)
			}
			c.times[i] = (float64(j) + at) * step
			c.front = c.front || c.steep(f, j, step)
			break
		}
	}
}

// passes is where between f[j] and f[j+1] the level is passed, 0 to 1, on the
// cubic through the four values around.
func passes(f []float64, j int, level float64) float64 {
	if j == 0 {
		return (level - f[0]) / (f[1] - f[0])
	}
	y0, y1, y2, y3 := f[j-1], f[j], f[j+1], f[j+2]
	low, high := 0.0, 1.0
	for range 40 {
		x := (low + high) / 2
		y := -x*(x-1)*(x-2)/6*y0 + (x+1)*(x-1)*(x-2)/2*y1 - (x+1)*x*(x-2)/2*y2 + (x+1)*x*(x-1)/6*y3
		if y < level {
			low = x
		} else {
			high = x
		}
	}
	return (low + high) / 2
}

// frontSlope is the change within a millisecond, relative to the final value,
// from which on a crossing counts as one of a wave front.
const frontSlope = 0.02

// steep tells whether the crossing after j lies on a front: within a few
// milliseconds around the slope is high.
func (c *course) steep(f []float64, j int, step float64) bool {
	reach := max(1, int(2e-3/step))
	for k := max(0, j-reach); k <= min(len(f)/2, j+reach); k++ {
		if math.Abs(f[k+1]-f[k]) > frontSlope*c.final*step/1e-3 {
			return true
		}
	}
	return false
}
