package beat

import (
	"math"

	"gonum.org/v1/gonum/stat/distuv"

	"afterbeat/data"
)

// jackknifeSeconds is the least time that a block of the jackknife covers: a
// breath where none was found (an assumption: 15 a minute).
const jackknifeSeconds = 4

// LeaveOut returns the measures of the average beat of a signal with one block
// of successive beats left out in turn. A block is three beats or 4 s, whichever
// is longer, and a single beat where that leaves fewer than four blocks. Fewer
// than two beats have none.
func (e Ensemble) LeaveOut(signal int) []Measures {
	var out []Measures
	for _, p := range e.LeaveOutAverages(signal) {
		out = append(out, Measure(p))
	}
	return out
}

// LeaveOutAverages are the average beats that [Ensemble.LeaveOut] measures.
func (e Ensemble) LeaveOutAverages(signal int) []data.Period {
	n := len(e.Used)
	if n < 2 {
		return nil
	}
	block := max(3, int(math.Ceil(jackknifeSeconds*e.Rate/float64(e.N))))
	if n/block < 4 {
		block = 1
	}
	all := sum(e.Beats[signal], e.N)
	var out []data.Period
	for from := 0; from+block <= n; from += block {
		to := from + block
		if n-to < block {
			to = n
		}
		left := sum(e.Beats[signal][from:to], e.N)
		p := data.Period{Samples: make([]float64, e.N), Rate: e.Rate}
		for j := range p.Samples {
			p.Samples[j] = (all[j] - left[j]) / float64(n-(to-from))
		}
		out = append(out, p)
	}
	return out
}

// sum adds beats sample by sample.
func sum(beats [][]float64, n int) []float64 {
	out := make([]float64, n)
	for _, b := range beats {
		for j, v := range b {
			out[j] += v
		}
	}
	return out
}

// JackknifeInterval is the 95 % interval about a value whose g values with one
// block left out are given,
//
//	se² = (g-1)/g sum (v_i - mean v)²,   value -+ t(0.975, g-1) se
//
// (Tukey 1958; Kunsch 1989, Ann Stat 17:1217, for blocks; from memory). There is
// none where any value is undefined, or fewer than two are given.
func JackknifeInterval(value float64, leftOut []float64) data.Interval {
	g := float64(len(leftOut))
	if g < 2 {
		return data.NoInterval()
	}
	mean, sd := meanSD(leftOut)
	se := math.Sqrt((g - 1) / g * (g - 1) * sd * sd)
	if math.IsNaN(mean + se + value) {
		return data.NoInterval()
	}
	t := distuv.StudentsT{Sigma: 1, Nu: g - 1}.Quantile(0.975)
	return data.Interval{Low: value - t*se, High: value + t*se}
}
