package beat

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/stat/distuv"
)

// For a mean of n values, single ones left out, the jackknife is the textbook
// interval mean -+ t sd/sqrt(n).
func TestJackknifeOfAMeanIsTheTextbookInterval(t *testing.T) {
	x := []float64{3, 1, 4, 1, 5, 9, 2, 6}
	mean, sd := meanSD(x)
	n := float64(len(x))
	var leftOut []float64
	for _, v := range x {
		leftOut = append(leftOut, (mean*n-v)/(n-1))
	}
	half := distuv.StudentsT{Sigma: 1, Nu: n - 1}.Quantile(0.975) * sd / math.Sqrt(n)
	got := JackknifeInterval(mean, leftOut)
	if math.Abs(got.Low-(mean-half)) > 1e-12 || math.Abs(got.High-(mean+half)) > 1e-12 {
		t.Errorf("got %v, want %v -+ %v", got, mean, half)
	}
	if JackknifeInterval(1, []float64{1}).Defined() || JackknifeInterval(1, []float64{1, math.NaN()}).Defined() {
		t.Error("an interval where there is none")
	}
}

// Over recordings whose amplitude varies from beat to beat, the interval of the
// pulse covers the true one about as often as it says.
func TestLeaveOutCovers(t *testing.T) {
	r := rand.New(rand.NewPCG(4, 2))
	const n, beats, runs = 32, 30, 400
	covered := 0
	for range runs {
		e := Ensemble{Rate: 40, N: n, Used: make([]Beat, beats), Beats: make([][][]float64, 1), EndMinusStart: []float64{0}}
		for range beats {
			a := 20 * (1 + 0.1*r.NormFloat64())
			b := make([]float64, n)
			for j := range b {
				b[j] = 80 + a*math.Cos(2*math.Pi*float64(j)/n)
			}
			e.Beats[0] = append(e.Beats[0], b)
		}
		var leftOut []float64
		for _, m := range e.LeaveOut(0) {
			leftOut = append(leftOut, m.Amplitude)
		}
		if JackknifeInterval(Measure(e.Average(0).Period).Amplitude, sixBlocks(t, leftOut)).Contains(40) {
			covered++
		}
	}
	if share := float64(covered) / runs; share < 0.90 || share > 0.985 {
		t.Errorf("95 %% intervals cover in %.1f %% of %d recordings", 100*share, runs)
	}
}

// sixBlocks fails where the blocks are not those of the doc comment:
// thirty beats of 0.8 s in blocks of 4 s are six blocks.

func sixBlocks(t *testing.T, leftOut []float64) []float64 {
	if len(leftOut) != 6 {
		t.Fatalf("%d blocks, want six", len(leftOut))
	}
	return leftOut
}
