package means

import (
	"context"
	"math"
	"math/rand/v2"

	"gonum.org/v1/gonum/stat/distuv"

	"afterbeat/data"
	"afterbeat/fitting"
)

// share is Zc as a part of the total resistance, and shareError its 95 %
// half-width.
const (
	share      = 0.05
	shareError = 0.03
)

// leastShare keeps a drawn share positive.
const leastShare = 0.002

// z95 is the half-width of the 95 % interval of a normal distribution, in standard
// deviations.
const z95 = 1.959963984540054

// own are the errors of a source beside those of the calibration, as standard
// normal numbers.
type own [3]float64

// problem is a load to be found from one kind of average beat.
type problem struct {
	model      fitting.Model
	beats      [][]float64
	rate       float64
	pv         float64
	systematic fitting.Systematic
	flow       bool // the beats are of flow, and belong into the replicates
	// values is the load of an average beat; NaN where there is none.
	values func(beat []float64, c fitting.Calibration, e own) fitting.Values
}

// replicates are the answers that the beats and the errors allow. A draw without
// an answer is left out.
func (p problem) replicates(ctx context.Context, s fitting.Settings) (all fitting.Replicates, method string, err error) {
	s = s.WithDefaults()
	count := len(p.beats)
	if count < 2 {
		return all, fitting.IntervalNone, nil
	}
	random, systematic := rand.New(rand.NewPCG(s.Seed, 1)), rand.New(rand.NewPCG(s.Seed, 2))
	draw, method := p.drawn(random)
	given := fitting.AsMeasured(p.pv)
	for i := range s.Replicates {
		if i%32 == 0 && ctx.Err() != nil {
			return fitting.Replicates{}, fitting.IntervalNone, ctx.Err()
		}
		beat := draw()
		c := p.systematic.Draw(systematic, p.pv)
		e := own{systematic.NormFloat64(), systematic.NormFloat64(), systematic.NormFloat64()}
		a, b := p.values(beat, given, own{}), p.values(beat, c, e)
		if !sound(a) || !sound(b) {
			continue
		}
		all.Random = append(all.Random, fitting.NewReplicate(a, given, p.wave(beat)))
		all.Total = append(all.Total, fitting.NewReplicate(b, c, p.wave(beat)))
	}
	return all, method, nil
}

// wave is the flow of a replicate.
func (p problem) wave(beat []float64) data.Period {
	if !p.flow {
		return data.Period{Rate: p.rate}
	}
	return data.Period{Samples: beat, Rate: p.rate}
}

func sound(v fitting.Values) bool {
	return !math.IsNaN(v.R+v.C+v.Zc) && !math.IsInf(v.R+v.C+v.Zc, 0)
}

// drawn gives average beats drawn anew.
func (p problem) drawn(rng *rand.Rand) (draw func() []float64, method string) {
	count, mean := len(p.beats), average(p.beats)
	if count < fitting.FewBeats {
		return p.jackknifed(rng, mean), fitting.IntervalCovariance
	}
	block, inflation := fitting.Blocks(count, 0, float64(len(mean))/p.rate)
	return func() []float64 {
		beat := make([]float64, len(mean))
		for left := count; left > 0; {
			from := rng.IntN(count)
			for j := range min(block, left) {
				for k, v := range p.beats[(from+j)%count] {
					beat[k] += v / float64(count)
				}
			}
			left -= block
		}
		for k, m := range mean {
			beat[k] = m + inflation*(beat[k]-m)
		}
		return beat
	}, fitting.IntervalBlocks
}

// jackknifed gives average beats whose scatter is that of the beats about their
// mean, over the square root of their number, with Student's t.
func (p problem) jackknifed(rng *rand.Rand, mean []float64) func() []float64 {
	count := float64(len(p.beats))
	t := distuv.StudentsT{Sigma: 1, Nu: count - 1}.Quantile(0.975) / z95
	factor := t / math.Sqrt(count*(count-1))
	return func() []float64 {
		beat := append([]float64(nil), mean...)
		for _, one := range p.beats {
			z := factor * rng.NormFloat64()
			for k, v := range one {
				beat[k] += z * (v - mean[k])
			}
		}
		return beat
	}
}

func average(beats [][]float64) []float64 {
	mean := make([]float64, len(beats[0]))
	for _, beat := range beats {
		for k, v := range beat {
			mean[k] += v / float64(len(beats))
		}
	}
	return mean
}

// drawnShare is the share of Zc in a draw.
func drawnShare(e float64) float64 { return max(leastShare, share+shareError/z95*e) }

// split is a load of a total resistance and a share of Zc in it.
func split(total, part float64) fitting.Values {
	return fitting.Values{R: (1 - part) * total, Zc: part * total}
}

// nothing is the load that there is none of.
func nothing() fitting.Values {
	nan := math.NaN()
	return fitting.Values{R: nan, C: nan, Zc: nan}
}

// stated marks a Zc that was taken and not estimated.
func stated(r fitting.Result) fitting.Result {
	for i := range r.Parameters {
		if p := &r.Parameters[i]; p.Name == "Zc" {
			p.Identified, p.Why = false, "taken for 5 % of the total resistance, not estimated"
		}
	}
	return r
}
