package fitting

import "afterbeat/data"

// Replicate is one answer that the data allow: parameters, with the flow and
// the outflow pressure that belong to them. Computing something for every
// replicate and taking percentiles gives its 95 % interval.
type Replicate struct {
	Values Values
	Calibration
	source *source
	starts []int32 // first beats of the blocks drawn; empty: the average beat
}

// Flow is the average flow beat of the replicate, in its own scale.
func (r Replicate) Flow() data.Period {
	beat := r.source.flowBeat(r.starts)
	for i := range beat {
		beat[i] *= r.FlowScale
	}
	return data.Period{Samples: beat, Rate: r.source.beats.Rate}
}

// Replicates are the answers drawn for one fit, as many in each set. The n-th of
// both sets has the same random part. The sets are empty where there is no
// interval.
type Replicates struct {
	Random []Replicate // random error alone
	Total  []Replicate // random and systematic errors
}
