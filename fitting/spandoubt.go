package fitting

import (
	"context"
	"fmt"
	"math"
	"math/rand/v2"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"

	"afterbeat/data"
)

// IntervalSpan is the method of the intervals of a fit to the whole span.
const IntervalSpan = "span-blocks"

const (
	// blocksOf is the length of a block in correlation times.
	blocksOf = 3
	// enoughTimes is how many correlation times a span must have for the interval
	// of R to be as wide as it should.
	enoughTimes = 20
)

// doubt takes the intervals from the residual. With J the effects of the unknowns
// (factors of the columns, logarithms of the shapes) on the pressure and r the
// residual, in blocks b of the span,
//
//	covariance = B/(B-1) A⁻¹ (sum_b s_b s_b') A⁻¹,  A = J'J,  s_b = sum over b of J r
//
// (the sandwich of Huber 1967 and White 1980, in blocks as in Liang and Zeger
// 1986, Biometrika 73:13): a block holds whatever the residual remembers. Student's
// t has B - 1 degrees of freedom. A factor that is 0 is drawn too, and kept above.
func (f *spanFit) doubt(ctx context.Context, r *Result, s Settings) error {
	if !r.Converged {
		r.withoutInterval("the fit gave no number")
		return nil
	}
	r.IntervalMethod = IntervalSpan
	f.block()
	moves := f.blockMoves()
	random, systematic := s.streams()
	given := asMeasured(f.span.OutflowPressure)
	for i := range s.Replicates {
		if err := interrupted(ctx, i); err != nil {
			r.withoutInterval("interrupted")
			return err
		}
		move := drawMove(random, moves)
		one := Replicate{Calibration: given, pool: f.beat.source.pool, Values: f.moved(f.x, f.theta, move)}
		r.Replicates.Random = append(r.Replicates.Random, one)
		if one.Calibration = f.span.Systematic.draw(systematic, given.OutflowPressure); one.Calibration != given {
			one.Values = f.beat.shifted(&f.fitted, one.Calibration, move)
		}
		r.Replicates.Total = append(r.Replicates.Total, one)
	}
	r.takeIntervals()
	return nil
}

// block sets the length of the blocks.
func (f *spanFit) block() {
	period := f.info.Duration / float64(f.span.beatsInRuns())
	f.info.CorrelationTime = beatCorrelation(f.beatMeans(), period)
	breath := f.span.BreathPeriod
	if breath <= 0 {
		breath = defaultBreath
	}
	length := math.Max(blocksOf*f.info.CorrelationTime, breath)
	f.info.Blocks = fewestBlocks
	if n := math.Floor(f.info.Duration / length); n > fewestBlocks {
		f.info.Blocks = int(n)
	}
	f.info.BlockLength = f.info.Duration / float64(f.info.Blocks)
}

// beatMeans are the means of the residual over the beats, run by run.
func (f *spanFit) beatMeans() [][]float64 {
	all := make([][]float64, len(f.residual))
	for i, r := range f.span.Runs {
		for k, from := range r.Onsets[:r.beats()] {
			all[i] = append(all[i], floats.Sum(f.residual[i][from:r.Onsets[k+1]])/float64(r.Onsets[k+1]-from))
		}
	}
	return all
}

// beatCorrelation is the correlation time of a first-order process, from the
// lag-1 autocorrelation r of n beat means, rid of its bias:
//
//	rho = (n r + 1)/(n - 4),  time = -period/ln rho
//
// (Marriott and Pope 1954, Biometrika 41:390; from memory); 0 where rho is not
// positive. Beats on either side of a gap are no neighbours.
func beatCorrelation(runs [][]float64, period float64) float64 {
	mean, n, pairs := 0.0, 0, 0
	for _, run := range runs {
		mean += floats.Sum(run)
		n, pairs = n+len(run), pairs+max(0, len(run)-1)
	}
	mean /= float64(n)
	square, product := 0.0, 0.0
	for _, run := range runs {
		for i, v := range run {
			square += (v - mean) * (v - mean)
			if i > 0 {
				product += (v - mean) * (run[i-1] - mean)
			}
		}
	}
	if !(square > 0) || pairs == 0 || n <= 4 {
		return 0
	}
	lag := product / square * float64(n-1) / float64(pairs)
	switch rho := (float64(n)*lag + 1) / float64(n-4); {
	case rho >= 1:
		return math.Inf(1)
	case rho > 0:
		return -period / math.Log(rho)
	}
	return 0
}

// blockMoves are A⁻¹ s_b, less their mean, times sqrt(B/(B-1)).
func (f *spanFit) blockMoves() [][maxUnknowns]float64 {
	unknowns := f.drawn()
	blocks := f.info.Blocks
	moves := make([][maxUnknowns]float64, blocks)
	if len(unknowns) == 0 {
		return moves
	}
	a := mat.NewSymDense(len(unknowns), nil)
	for i, p := range unknowns {
		for j, q := range unknowns[:i+1] {
			a.SetSym(i, j, f.curvature.a[p][q])
		}
	}
	var chol mat.Cholesky
	if !chol.Factorize(a) {
		return moves
	}
	scores := f.scores(unknowns)
	mean := make([]float64, len(unknowns))
	for _, s := range scores {
		floats.AddScaled(mean, 1/float64(blocks), s)
	}
	factor := math.Sqrt(float64(blocks) / float64(blocks-1))
	for b, s := range scores {
		floats.Sub(s, mean)
		var x mat.VecDense
		if chol.SolveVecTo(&x, mat.NewVecDense(len(s), s)) != nil {
			continue // ill-conditioned: what came out is there all the same
		}
		for i, p := range unknowns {
			moves[b][p] = factor * x.AtVec(i)
		}
	}
	return moves
}

// drawn are the unknowns that have a doubt: those that are determined, and the
// factors at 0 that could be told from the others.
func (f *spanFit) drawn() (unknowns []int) {
	c := f.curvature
	for i := range c.n {
		onBound := i < f.model.Linear() && !c.free[i] && c.a[i][i] > 0 && c.alone(i) > tooAlike
		if c.determined(i) || onBound {
			unknowns = append(unknowns, i)
		}
	}
	return unknowns
}

// scores are the sums of J r over the blocks, for the unknowns.
func (f *spanFit) scores(unknowns []int) [][]float64 {
	scores := make([][]float64, f.info.Blocks)
	for b := range scores {
		scores[b] = make([]float64, len(unknowns))
	}
	at := 0 // samples before the stretch
	shape := f.shape()
	f.moments.residuals(shape[:f.model.Shapes()], f.x[:f.model.Linear()], func(part stretch) {
		n := len(part.residual)
		for from := 0; from < n; {
			b := (at + from) * f.info.Blocks / f.moments.samples
			to := min(n, ((b+1)*f.moments.samples+f.info.Blocks-1)/f.info.Blocks-at)
			for i, u := range unknowns {
				scores[b][i] += floats.Dot(part.effects[u][from:to], part.residual[from:to])
			}
			from = to
		}
		at += n
	})
	return scores
}

// drawMove draws from the multivariate t distribution with the covariance of the
// moves.
func drawMove(rng *rand.Rand, moves [][maxUnknowns]float64) (move [maxUnknowns]float64) {
	for _, m := range moves {
		g := rng.NormFloat64()
		for i, v := range m {
			move[i] += g * v
		}
	}
	chi2 := 0.0
	freedom := len(moves) - 1
	for range freedom {
		v := rng.NormFloat64()
		chi2 += v * v
	}
	wide := math.Sqrt(float64(freedom) / chi2)
	for i := range move {
		move[i] *= wide
	}
	return move
}

// warnOfWander warns of a residual that remembers for too long.
func (f *spanFit) warnOfWander(r *Result) {
	if r.IntervalMethod != IntervalSpan || f.info.Duration >= enoughTimes*f.info.CorrelationTime {
		return
	}
	slow := "the residual wanders over the whole span"
	if !math.IsInf(f.info.CorrelationTime, 1) {
		slow = fmt.Sprintf("the residual wanders with a correlation time of %.3g s in a span of %.3g s", f.info.CorrelationTime, f.info.Duration)
	}
	r.Warnings = append(r.Warnings, data.Warning{
		Code: data.CodeSlowWander, Text: fmt.Sprintf("%s: %s: the random interval of R is too narrow", r.Model.Name, slow),
		Cure: "a longer recording in a steady state, of 20 correlation times or more",
	})
}
