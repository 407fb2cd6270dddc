package fitting

import (
	"context"
	"math"
	"math/rand/v2"

	"gonum.org/v1/gonum/mat"
)

// drawCovariance draws replicates about the fit to the average beat, with
// Student's t of beats-1 degrees of freedom, from
//
//	covariance = s² tau_int (J'J)^-1 + (n-1)/n sum_i (u_i - mean u)(u_i - mean u)',  s² = S/(N - p)
//
// The first part is the Gauss-Newton covariance of the p unknowns u times the
// integrated autocorrelation time of the residual in samples: it takes what the
// model leaves for noise. What is slower than a beat, or the beats do not share,
// is fitted away and missing there; the second part, the jackknife over the n
// beats (u_i fitted without beat i; Tukey 1958), has it. The unknowns are the
// factors of the columns and the logarithms of the shapes; those on a bound or
// without effect stay put. A systematic error moves the fit to the average beat,
// and the same random part is added to that.
func (f *beatFit) drawCovariance(ctx context.Context, r *Result, s Settings) error {
	if f.curvature.determined(f.model.Linear()) {
		f.source.storage = newStorage(f.source, math.Exp(f.theta[0]))
	}
	factor, unknowns := f.spread(r)
	random, systematic := s.streams()
	given := asMeasured(f.beats.OutflowPressure)
	for i := range s.Replicates {
		if err := interrupted(ctx, i); err != nil {
			return err
		}
		move := studentMove(random, factor, unknowns, f.beats.Count()-1)
		one := Replicate{Calibration: given, pool: f.source.pool}
		one.Values = f.moved(f.x, f.theta, move)
		r.Replicates.Random = append(r.Replicates.Random, one)
		if one.Calibration = f.beats.Systematic.draw(systematic, given.OutflowPressure); one.Calibration != given {
			f.moments.set(f.source.flow, f.source.pressure, one.Calibration)
			f.refit()
			one.Values = f.moved(f.search.x, f.search.theta, move)
		}
		r.Replicates.Total = append(r.Replicates.Total, one)
	}
	return nil
}

// spread is the lower triangular factor of the covariance of those unknowns
// that can be told apart, and which they are.
func (f *beatFit) spread(r *Result) (factor *mat.TriDense, unknowns []int) {
	for i := range f.curvature.n {
		if f.curvature.determined(i) {
			unknowns = append(unknowns, i)
		}
	}
	if len(unknowns) == 0 {
		return nil, nil
	}
	a := mat.NewSymDense(len(unknowns), nil)
	for i, p := range unknowns {
		for j, q := range unknowns[:i+1] {
			a.SetSym(i, j, f.curvature.a[p][q])
		}
	}
	n := float64(len(r.Residual))
	scale := r.SumOfSquares / (n - float64(len(unknowns))) * correlationTime(r.Residual) / n
	var chol, cov mat.Cholesky
	var inverse mat.SymDense
	if !chol.Factorize(a) || chol.InverseTo(&inverse) != nil {
		return nil, nil
	}
	inverse.ScaleSym(scale, &inverse)
	f.addJackknife(&inverse, unknowns)
	if !cov.Factorize(&inverse) {
		return nil, nil // no residual, no spread
	}
	factor = mat.NewTriDense(len(unknowns), mat.Lower, nil)
	cov.LTo(factor)
	return factor, unknowns
}

// addJackknife adds the covariance of the unknowns by leaving out one beat after
// the other.
func (f *beatFit) addJackknife(cov *mat.SymDense, unknowns []int) {
	beats := f.beats.Count()
	n := float64(beats)
	flow, pressure := make([]complex128, len(f.source.flow)), make([]complex128, len(f.source.flow))
	fits := make([][maxUnknowns]float64, beats)
	var mean [maxUnknowns]float64
	for i := range fits {
		for k := range flow {
			flow[k] = (complex(n, 0)*f.source.flow[k] - f.source.flows[i][k]) / complex(n-1, 0)
			pressure[k] = (complex(n, 0)*f.source.pressure[k] - f.source.presses[i][k]) / complex(n-1, 0)
		}
		f.source.storage.repair(pressure, -f.source.storage.rise(i, 1)/(n-1))
		f.moments.set(flow, pressure, asMeasured(f.beats.OutflowPressure))
		f.refit()
		copy(fits[i][:], f.search.x[:f.model.Linear()])
		copy(fits[i][f.model.Linear():], f.search.theta[:f.model.Shapes()])
		for u, v := range fits[i] {
			mean[u] += v / n
		}
	}
	for i, p := range unknowns {
		for j, q := range unknowns[:i+1] {
			sum := cov.At(i, j)
			for _, u := range fits {
				sum += (n - 1) / n * (u[p] - mean[p]) * (u[q] - mean[q])
			}
			cov.SetSym(i, j, sum)
		}
	}
}

// studentMove draws from the multivariate t distribution.
func studentMove(rng *rand.Rand, factor *mat.TriDense, unknowns []int, freedom int) (move [maxUnknowns]float64) {
	var z [maxUnknowns]float64
	for i := range unknowns {
		z[i] = rng.NormFloat64()
	}
	chi2 := 0.0
	for range freedom {
		v := rng.NormFloat64()
		chi2 += v * v
	}
	wide := math.Sqrt(float64(freedom) / chi2)
	for i, u := range unknowns {
		for j := range i + 1 {
			move[u] += wide * factor.At(i, j) * z[j]
		}
	}
	return move
}

// correlationTime is the integrated autocorrelation time of a residual in
// samples, 1 + 2 sum rho_k up to the first rho_k <= 0; 1 for a residual of 0.
func correlationTime(residual []float64) float64 {
	mean, square := 0.0, 0.0
	for _, v := range residual {
		mean += v / float64(len(residual))
	}
	for _, v := range residual {
		square += (v - mean) * (v - mean)
	}
	time := 1.0
	for lag := 1; lag < len(residual) && square > 0; lag++ {
		sum := 0.0
		for j, v := range residual[lag:] {
			sum += (v - mean) * (residual[j] - mean)
		}
		if sum <= 0 {
			break
		}
		time += 2 * sum / square
	}
	return time
}

// autocorrelation is that of a periodic residual, about its mean, at lags up to
// half a period.
func autocorrelation(residual []float64) []float64 {
	n := len(residual)
	mean, square := 0.0, 0.0
	for _, v := range residual {
		mean += v / float64(n)
	}
	for _, v := range residual {
		square += (v - mean) * (v - mean)
	}
	if !(square > 0) {
		return nil
	}
	twice := make([]float64, 2*n)
	for j := range twice {
		twice[j] = residual[j%n] - mean
	}
	out := make([]float64, n/2+1)
	for lag := range out {
		for j, v := range twice[:n] {
			out[lag] += v * twice[j+lag] / square
		}
	}
	return out
}
