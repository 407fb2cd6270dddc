package study

import (
	"math"
	"testing"
)

// Moved later by whole samples, a period turns; by parts of one, it follows its
// trigonometric interpolation; moved back, it is what it was.
func TestLater(t *testing.T) {
	for _, n := range []int{7, 8} {
		x := make([]float64, n)
		wave := func(at float64) float64 { return 3 + 2*math.Sin(2*math.Pi*at/float64(n)) }
		for j := range x {
			x[j] = wave(float64(j))
		}
		for _, shift := range []float64{0, 1, 2.25, -3, float64(n)} {
			for j, v := range later(x, shift) {
				if want := wave(float64(j) - shift); math.Abs(v-want) > 1e-12 {
					t.Errorf("%d samples, %v later: sample %d is %v, want %v", n, shift, j, v, want)
				}
			}
			for j, v := range later(later(x, shift), -shift) {
				if math.Abs(v-x[j]) > 1e-12 {
					t.Errorf("%d samples, %v there and back: sample %d is %v, was %v", n, shift, j, v, x[j])
				}
			}
		}
	}
}
