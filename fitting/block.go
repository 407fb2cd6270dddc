package fitting

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"
)

const (
	leastBlock   = 3 // beats
	fewestBlocks = 4
	// mostBlocks are enough to know a scatter to 5 %: in a longer recording blocks
	// are longer instead, and drawing from an hour costs no more than from minutes.
	mostBlocks = 200
)

// blockLength is the length of a block in beats: three beats or one breath,
// whichever is longer, but never so long that fewer than four blocks make up
// the recording. Both periods in s; breath 0: 4 s.
func blockLength(beats int, breath, period float64) int {
	if breath <= 0 {
		breath = defaultBreath
	}
	want := math.Max(leastBlock, math.Ceil(breath/period-1e-9))
	want = math.Max(want, math.Ceil(float64(beats)/mostBlocks))
	return int(math.Max(1, math.Min(want, float64(beats/fewestBlocks))))
}

// inflation is the factor by which averages over b blocks are moved away from
// the average beat,
//
//	t(0.975, b-1)/1.96 sqrt(b/(b-1)),
//
// since the scatter of few blocks is too small by sqrt((b-1)/b), and a few
// blocks know their own scatter badly (Student's t). The percentiles of the
// replicates are then the interval, here and in all that is computed from them.
func inflation(b float64) float64 {
	t := distuv.StudentsT{Mu: 0, Sigma: 1, Nu: b - 1}.Quantile(0.975)
	return t / z95 * math.Sqrt(b/(b-1))
}
