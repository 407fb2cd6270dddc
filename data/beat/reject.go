package beat

import "math"

// Limits of the rejection; the reasons say where they come from.
const (
	reach         = 7   // beats on either side of a running median
	earlyPart     = 0.8 // of the running median interval
	earliestPart  = 0.5
	latePart      = 1.4
	latestPart    = 2.0
	scatterOfTime = 3.0 // robust standard deviations of the intervals
	leastFactor   = 1.3 // of amplitude, about the running median
	mostFactor    = 2.0
	scatterFactor = 4.0 // robust standard deviations of the amplitudes
	levelPart     = 1.0 // of the running median amplitude
	scatterLevel  = 5.0 // robust standard deviations of the minima
	leastShape    = 0.9 // correlation with the median beat
	scatterShape  = 5.0 // robust standard deviations of the correlations
	shapePoints   = 64
	// The same for a faint pulse (assumptions).
	faintLeastFactor = 2.0
	faintMostFactor  = 3.0
	faintLeastShape  = 0.6
	shapeBlock       = 60 // beats that share a median beat
)

// reject marks the beats that cannot be used, in the order of the reasons: one
// that is out in time is not judged by its amplitude.
func reject(c Criteria, beats []Beat, values []float64) {
	l := limitsOf(c)
	rejectByTime(beats)
	rejectByAmplitude(beats, l)
	rejectByLevel(beats)
	rejectByShape(beats, values, l)
}

// limits are those that the criteria change.
type limits struct{ leastFactor, mostFactor, leastShape float64 }

// limitsOf relaxes amplitude and shape for a pulse in which noise has a part.
func limitsOf(c Criteria) limits {
	if c == Support {
		return limits{faintLeastFactor, faintMostFactor, faintLeastShape}
	}
	return limits{leastFactor, mostFactor, leastShape}
}

// running is the median of x over the beats that count within reach of each
// beat, and a robust standard deviation about it.
func running(beats []Beat, of func(Beat) float64, about func(x []float64, m float64) float64) (medians, spreads []float64) {
	x := each(beats, of)
	counts := make([]bool, len(beats))
	for i, b := range beats {
		counts[i] = b.Rejected == ""
	}
	medians, spreads = make([]float64, len(x)), make([]float64, len(x))
	for i := range x {
		near := around(x, counts, i, reach)
		medians[i] = median(near)
		spreads[i] = about(near, medians[i])
	}
	return medians, spreads
}

func rejectByTime(beats []Beat) {
	medians, spreads := running(beats, func(b Beat) float64 { return b.Interval }, spread)
	short := make([]bool, len(beats))
	for i, b := range beats {
		scatter := scatterOfTime * spreads[i] / medians[i]
		early := max(earliestPart, min(earlyPart, 1-scatter))
		late := min(latestPart, max(latePart, 1+scatter))
		length := b.Interval / medians[i]
		short[i] = length < early
		switch {
		case b.Rejected != "":
		case i > 0 && short[i-1]:
			beats[i].Rejected = Early
		case short[i]:
			beats[i].Rejected = TooShort
		case length > late:
			beats[i].Rejected = TooLong
		case i > 0 && beats[i-1].Rejected == Early:
			beats[i].Rejected = AfterEarly
		case i > 0 && beats[i-1].Rejected == TooLong:
			beats[i].Rejected = AfterPause
		}
	}
}

func rejectByAmplitude(beats []Beat, l limits) {
	medians, spreads := running(beats, Beat.Amplitude, wideSpread)
	for i, b := range beats {
		factor := max(l.leastFactor, min(l.mostFactor, 1+scatterFactor*spreads[i]/medians[i]))
		ratio := b.Amplitude() / medians[i]
		if b.Rejected == "" && (ratio > factor || ratio < 1/factor) {
			beats[i].Rejected = Amplitude
		}
	}
}

func rejectByLevel(beats []Beat) {
	amplitudes, _ := running(beats, Beat.Amplitude, wideSpread)
	medians, spreads := running(beats, func(b Beat) float64 { return b.Min }, wideSpread)
	for i, b := range beats {
		limit := max(levelPart*amplitudes[i], scatterLevel*spreads[i])
		if b.Rejected == "" && math.Abs(b.Min-medians[i]) > limit {
			beats[i].Rejected = Level
		}
	}
}

// rejectByShape compares the beats with the median beat of the shapeBlock or so
// around them, since the shape changes slowly, with the heart rate for one.
func rejectByShape(beats []Beat, values []float64, l limits) {
	var shapes [][]float64
	var which []int
	for i, b := range beats {
		if b.Rejected == "" {
			shapes = append(shapes, shape(values, b))
			which = append(which, i)
		}
	}
	blocks := max(1, len(shapes)/shapeBlock)
	for k := range blocks {
		from, to := k*len(shapes)/blocks, (k+1)*len(shapes)/blocks
		for _, odd := range oddShapes(shapes[from:to], l.leastShape) {
			beats[which[from+odd]].Rejected = Shape
		}
	}
}

// oddShapes lists those that are unlike the median of all. Fewer than three have
// no odd one.
func oddShapes(shapes [][]float64, least float64) []int {
	if len(shapes) < 3 {
		return nil
	}
	middle := medianShape(shapes)
	r := make([]float64, len(shapes))
	for k, s := range shapes {
		r[k] = dot(s, middle)
	}
	m := median(r)
	limit := min(least, m-scatterShape*spread(r, m))
	var odd []int
	for k := range r {
		if r[k] < limit {
			odd = append(odd, k)
		}
	}
	return odd
}

// shape is the beat as means over shapePoints equal parts of it (or samples
// nearest to them, where it has fewer), less the line from the first to the last,
// on which breathing carries it, and less their mean, with unit sum of squares.
func shape(values []float64, b Beat) []float64 {
	out := make([]float64, shapePoints)
	step := float64(b.Samples()) / shapePoints
	for k := range out {
		from := b.From + int(float64(k)*step)
		to := max(from+1, b.From+int(float64(k+1)*step))
		for _, v := range values[from:to] {
			out[k] += v
		}
		out[k] /= float64(to - from)
	}
	first, rise := out[0], (out[shapePoints-1]-out[0])/(shapePoints-1)
	for k := range out {
		out[k] -= first + rise*float64(k)
	}
	return normalise(out)
}

// medianShape is the median of the shapes, point by point, normalised.
func medianShape(shapes [][]float64) []float64 {
	out := make([]float64, len(shapes[0]))
	column := make([]float64, len(shapes))
	for k := range out {
		for i, s := range shapes {
			column[i] = s[k]
		}
		out[k] = median(column)
	}
	return normalise(out)
}

// normalise takes off the mean and scales to unit sum of squares, in place; a
// constant becomes zero.
func normalise(x []float64) []float64 {
	mean := 0.0
	for _, v := range x {
		mean += v / float64(len(x))
	}
	sum := 0.0
	for i := range x {
		x[i] -= mean
		sum += x[i] * x[i]
	}
	for i := range x {
		if sum > 0 {
			x[i] /= math.Sqrt(sum)
		}
	}
	return x
}

func dot(a, b []float64) float64 {
	sum := 0.0
	for i := range a {
		sum += a[i] * b[i]
	}
	return sum
}
