package beat

import (
	"math"
	"slices"
)

// leastPulseToNoise is the smallest pulse, over the noise, that is called one.
const leastPulseToNoise = 2.0

// swingPart of a beat is smoothed over before its range is taken.
const swingPart = 32

// most of the beats that the figure is taken from.
const noiseBeats = 400

// pulseAndNoise sets the amplitude of the average beat beside what is left of
// the single beats when the average and a straight line (breathing) are taken
// off. The amplitude is freed of noise by what the averages of every other beat
// and of the rest have in common. The noise is the median over the beats of the standard deviation
// of that rest. Both NaN with fewer than two used beats.
func pulseAndNoise(beats []Beat, values []float64) (pulse, noise float64) {
	good := used(beats)
	if step := (len(good) + noiseBeats - 1) / noiseBeats; step > 1 {
		for i := range len(good) / step {
			good[i] = good[i*step]
		}
		good = good[:len(good)/step]
	}
	n := len(good)
	if n < 2 {
		return math.NaN(), math.NaN()
	}
	size := max(4, int(math.Round(median(each(good, func(b Beat) float64 { return float64(b.Samples()) })))))
	pieces := make([][]float64, n)
	half := [2][]float64{make([]float64, size), make([]float64, size)}
	for i, b := range good {
		pieces[i] = make([]float64, size)
		for j := range pieces[i] {
			pieces[i][j] = values[b.From+j*b.Samples()/size]
		}
		for j, v := range levelled(pieces[i]) {
			half[i%2][j] += v / float64((n+1-i%2)/2)
		}
	}
	average := make([]float64, size)
	for j := range average {
		average[j] = (half[0][j]*float64((n+1)/2) + half[1][j]*float64(n/2)) / float64(n)
	}
	rest := make([]float64, n)
	piece := make([]float64, size)
	for i := range pieces {
		for j, v := range pieces[i] {
			piece[j] = v - average[j]
		}
		_, sd := meanSD(straightened(piece))
		rest[i] = sd * math.Sqrt(float64(n)/float64(n-1))
	}
	return swing(half[0], half[1]), median(rest)
}

// levelled takes the mean off x, in place.
func levelled(x []float64) []float64 {
	mean, _ := meanSD(x)
	for i := range x {
		x[i] -= mean
	}
	return x
}

// swing is the range of the average of two halves, times the root of the part of
// its variance that the halves share,
//
//	(max - min) sqrt(cov(a, b)/var((a + b)/2)).
func swing(a, b []float64) float64 {
	both := make([]float64, len(a))
	for i := range both {
		both[i] = (a[i] + b[i]) / 2
	}
	both = smooth(both, len(both)/swingPart)
	shared := math.Sqrt(max(0, dot(a, b)/dot(both, both)))
	return (slices.Max(both) - slices.Min(both)) * min(1, shared)
}
