package fitting

import (
	"slices"

	"afterbeat/data"
)

// Replicate is one answer that the data allow: parameters, with the flow and
// the outflow pressure that belong to them. Computing something for every
// replicate and taking percentiles gives its 95 % interval.
type Replicate struct {
	Values Values
	Calibration
	pool   *pool
	starts []int32 // first beats of the blocks drawn; empty: the average beat
}

// Replicates are the answers drawn for one fit, as many in each set. The n-th of
// both sets has the same random part. The sets are empty where there is no
// interval.
type Replicates struct {
	Random []Replicate // random error alone
	Total  []Replicate // random and systematic errors
}

// Flow is the average flow beat of the replicate, in its own scale.
func (r Replicate) Flow() data.Period {
	beat := r.pool.flow(r.starts)
	for i := range beat {
		beat[i] *= r.FlowScale
	}
	return data.Period{Samples: beat, Rate: r.pool.beats.Rate}
}

// flow is what source.draw draws, over time; the average beat where starts is
// empty.
func (p *pool) flow(starts []int32) []float64 {
	if len(starts) == 0 {
		return slices.Clone(p.mean)
	}
	beat := make([]float64, len(p.mean))
	n := p.beats.Count()
	left := n
	for _, from := range starts {
		if left >= p.block {
			addTo(beat, p.runs[from])
			left -= p.block
			continue
		}
		for j := range left {
			addTo(beat, p.beats.Flow[(int(from)+j)%n])
		}
	}
	for i := range beat {
		beat[i] = p.inflate*beat[i]/float64(n) + (1-p.inflate)*p.mean[i]
	}
	return beat
}
