package fitting

import (
	"context"
	"math"
	"math/rand/v2"
)

// How the intervals of a fit came about.
const (
	IntervalBlocks     = "blocks-of-beats"
	IntervalCovariance = "inflated-covariance"
	IntervalNone       = "none"
)

// fewBeats is the number of beats below which blocks of beats say too little.
const fewBeats = 8

// doubt draws the replicates and takes the intervals from them.
func (f *beatFit) doubt(ctx context.Context, r *Result, s Settings) error {
	var err error
	switch {
	case !r.Converged:
		r.withoutInterval("the fit gave no number")
		return nil
	case f.beats.Count() == 1:
		r.withoutInterval("a single beat: no scatter to judge by")
		return nil
	case f.beats.Count() < fewBeats:
		r.IntervalMethod = IntervalCovariance
		err = f.drawCovariance(ctx, r, s)
	default:
		r.IntervalMethod = IntervalBlocks
		err = f.drawBlocks(ctx, r, s)
	}
	if err != nil {
		r.withoutInterval("interrupted")
		return err
	}
	r.takeIntervals()
	return nil
}

// streams are the two sources of chance: that of random error does not depend
// on whether systematic errors are drawn.
func (s Settings) streams() (random, systematic *rand.Rand) {
	return rand.New(rand.NewPCG(s.Seed, 1)), rand.New(rand.NewPCG(s.Seed, 2))
}

// interrupted looks at ctx once in a while.
func interrupted(ctx context.Context, i int) error {
	if i%32 != 0 {
		return nil
	}
	return ctx.Err()
}

// drawBlocks resamples blocks of beats: each replicate is the average over
// blocks that begin at beats drawn at random, as many as make up the recording,
// fitted anew. The beats are counted round the end, so that each has the same
// chance (circular blocks: Politis and Romano 1992, in Exploring the Limits of
// Bootstrap, 263).
func (f *beatFit) drawBlocks(ctx context.Context, r *Result, s Settings) error {
	block := blockLength(f.beats.Count(), f.beats.BreathPeriod, float64(f.beats.Samples())/f.beats.Rate)
	f.source.useBlocks(block, inflation(float64(f.beats.Count())/float64(block)))
	if f.curvature.determined(f.model.Linear()) {
		f.source.storage = newStorage(f.source, math.Exp(f.theta[0]))
	}
	random, systematic := s.streams()
	starts := make([]int32, s.Replicates*f.source.blocks())
	for i := range starts {
		starts[i] = int32(random.IntN(f.beats.Count()))
	}
	flow, pressure := make([]complex128, len(f.source.flow)), make([]complex128, len(f.source.flow))
	given := asMeasured(f.beats.OutflowPressure)
	for i := range s.Replicates {
		if err := interrupted(ctx, i); err != nil {
			return err
		}
		one := Replicate{Calibration: given, pool: f.source.pool, starts: starts[i*f.source.blocks():][:f.source.blocks()]}
		f.source.draw(one.starts, flow, pressure)
		f.moments.set(flow, pressure, given)
		one.Values = f.refit()
		r.Replicates.Random = append(r.Replicates.Random, one)
		if one.Calibration = f.beats.Systematic.draw(systematic, given.OutflowPressure); one.Calibration != given {
			f.moments.set(flow, pressure, one.Calibration)
			one.Values = f.refit()
		}
		r.Replicates.Total = append(r.Replicates.Total, one)
	}
	return nil
}
