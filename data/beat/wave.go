package beat

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// line is a sine fitted to samples by least squares.
type line struct {
	frequency float64 // Hz
	amplitude float64 // half of max - min
	share     float64 // of the variance of the samples
}

// strongest is the sine between two frequencies that takes most of the variance
// of x at times t, both without their mean: a periodogram for uneven times
// (Lomb 1976, Astrophys Space Sci 39:447, from memory), on a grid of half the
// resolution, refined about the best.
func strongest(t, x []float64, low, high float64) line {
	best := line{frequency: math.NaN()}
	span := t[len(t)-1] - t[0]
	for f := low; f <= high; f += 1 / (2 * span) {
		if l := sineAt(t, x, f); l.share > best.share {
			best = l
		}
	}
	if math.IsNaN(best.frequency) {
		return best
	}
	for step := 1 / (4 * span); step > 1/(1000*span); step /= 2 {
		for _, f := range []float64{best.frequency - step, best.frequency + step} {
			if l := sineAt(t, x, f); l.share > best.share {
				best = l
			}
		}
	}
	return best
}

// sineAt fits a cos + b sin at one frequency to x, which has no mean.
func sineAt(t, x []float64, f float64) line {
	var cc, ss, cs, xc, xs, xx float64
	for i, at := range t {
		s, c := math.Sincos(2 * math.Pi * f * at)
		cc, ss, cs = cc+c*c, ss+s*s, cs+c*s
		xc, xs, xx = xc+x[i]*c, xs+x[i]*s, xx+x[i]*x[i]
	}
	det := cc*ss - cs*cs
	if !(det > 1e-9*cc*ss) || xx == 0 {
		return line{frequency: f}
	}
	a, b := (xc*ss-xs*cs)/det, (xs*cc-xc*cs)/det
	return line{f, math.Hypot(a, b), (a*xc + b*xs) / xx}
}

// sines is a sum of sines at multiples of a frequency.
type sines struct {
	frequency float64
	harmonics []int
	of        []float64 // cosine and sine of each
}

func (w sines) at(t float64) float64 {
	sum := 0.0
	for k, h := range w.harmonics {
		s, c := math.Sincos(2 * math.Pi * float64(h) * w.frequency * t)
		sum += w.of[2*k]*c + w.of[2*k+1]*s
	}
	return sum
}

// swing is max - min over a cycle.
func (w sines) swing() float64 {
	const instants = 400
	low, high := math.Inf(1), math.Inf(-1)
	for i := range instants {
		v := w.at(float64(i) / instants / w.frequency)
		low, high = min(low, v), max(high, v)
	}
	return high - low
}

// comb fits a wave of a frequency, with the given harmonics of it, to x at times
// t by least squares; ok is false where they do not determine it.
func comb(t, x []float64, frequency float64, harmonics []int) (w sines, ok bool) {
	a := mat.NewDense(len(t), 1+2*len(harmonics), nil)
	for i, at := range t {
		a.Set(i, 0, 1)
		for k, h := range harmonics {
			s, c := math.Sincos(2 * math.Pi * float64(h) * frequency * at)
			a.Set(i, 1+2*k, c)
			a.Set(i, 2+2*k, s)
		}
	}
	var normal mat.Dense
	normal.Mul(a.T(), a)
	var right, solved mat.VecDense
	right.MulVec(a.T(), mat.NewVecDense(len(x), x))
	if err := solved.SolveVec(&normal, &right); err != nil {
		return sines{}, false
	}
	return sines{frequency, harmonics, solved.RawVector().Data[1:]}, true
}
