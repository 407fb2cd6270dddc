package fitting

import (
	"context"
	"errors"
	"math"

	"gonum.org/v1/gonum/floats"

	"afterbeat/data"
)

// FitSpan fits a model to all samples of a span: it minimises the sum over runs
// and samples of (P_model - P)² with all parameters >= 0 and free values of Pd
// (and QL of wk4p) at the beginning of each run, and adds intervals (see the
// package documentation). Modelled, Residual and the criteria are of the average
// beat, cut from the modelled pressure as it was from the measured one.
//
// A span of fewer than eight beats is an error: [ErrTooShort]. Of a fit
// interrupted by ctx the best point is returned, without intervals, together with
// the error of ctx.
func FitSpan(ctx context.Context, m Model, s Span, set Settings) (Result, error) {
	if err := s.check(); err != nil {
		return Result{}, err
	}
	if s.beatsInRuns() < fewBeats {
		return Result{}, ErrTooShort
	}
	f := newSpanFit(newBeatFit(m, s.Beats), s)
	r := f.result()
	err := f.doubt(ctx, &r, set.WithDefaults())
	f.judge(&r)
	return r, err
}

// ErrTooShort says that a span has too few beats for a fit of its own.
var ErrTooShort = errors.New("fitting: a fit to the whole span needs 8 usable beats")

// SpanInfo says what a fit to the whole span rests on.
type SpanInfo struct {
	Runs, Samples   int
	Duration        float64 // s
	RMSE            float64 // of the residual over all samples, mmHg
	CorrelationTime float64 // of the beat means of the residual, s; +Inf where they do not forget
	Blocks          int
	BlockLength     float64 // s
}

// spanFit is a fit to a span at work. The fit to the average beat stands behind
// it: what a systematic error does is taken from there.
type spanFit struct {
	beat     *beatFit
	span     Span
	moments  *spanMoments
	fitted   // the fit to the span
	residual [][]float64
	info     SpanInfo
}

func newSpanFit(b *beatFit, s Span) *spanFit {
	m := b.model
	f := &spanFit{beat: b, span: s, moments: newSpanMoments(m, s)}
	period := float64(s.Samples()) / s.Rate
	best := f.searched(period)
	linear := m.Linear()
	f.fitted = fitted{model: m, theta: best.theta, x: best.x, low: best.low, high: best.high, pulse: f.beat.pulse}
	f.converged, f.evaluations = finite(best.sum), best.evaluations
	f.curvature = &curvature{n: linear + m.Shapes()}
	sum := 0.0
	f.residual = make([][]float64, len(f.moments.runs))
	f.moments.residuals(best.shape[:m.Shapes()], best.x[:linear], func(part stretch) {
		f.residual[part.run] = append(f.residual[part.run], part.residual...)
		sum += floats.Dot(part.residual, part.residual)
		for i := range f.curvature.n {
			for j := range i + 1 {
				f.curvature.a[i][j] += floats.Dot(part.effects[i], part.effects[j])
				f.curvature.a[j][i] = f.curvature.a[i][j]
			}
		}
	})
	f.curvature.bounds(f.x[:linear])
	for i := range m.Shapes() {
		f.curvature.free[linear+i] = f.low[i] < f.theta[i] && f.theta[i] < f.high[i]
	}
	f.info = SpanInfo{
		Runs: len(s.Runs), Samples: f.moments.samples, Duration: f.moments.duration(),
		RMSE: math.Sqrt(sum / float64(f.moments.samples)),
	}
	return f
}

// fewSamples are as many as a whole range of shapes is scanned on; on more, the
// search goes downhill from the best places found on the first of them, and from
// the fit to the average beat.
const fewSamples = 4096

func (f *spanFit) searched(period float64) *search {
	first := f.span.first(fewSamples)
	part := newSpanSearch(newSpanMoments(f.beat.model, first), period)
	part.run()
	if first.total() == f.moments.samples {
		return part
	}
	var best *search
	evaluations := part.evaluations
	for _, theta := range f.starts(part.theta) {
		s := newSpanSearch(f.moments, period)
		s.near, s.theta = true, theta
		for i := range s.shapes {
			s.theta[i] = max(s.low[i], min(s.high[i], theta[i]))
			s.bend[i] = float64(f.moments.samples) * f.beat.search.bend[i]
		}
		s.run()
		evaluations += s.evaluations
		if best == nil || s.sum < best.sum || !finite(best.sum) {
			best = s
		}
	}
	best.evaluations = evaluations
	return best
}

// starts are the place found on the first samples, and that of the fit to the
// average beat where it is another one.
func (f *spanFit) starts(found [maxShapes]float64) [][maxShapes]float64 {
	all := [][maxShapes]float64{found}
	for i := range f.beat.model.Shapes() {
		if math.Abs(found[i]-f.beat.theta[i]) > gridStep {
			return append(all, f.beat.theta)
		}
	}
	return all
}

// result is the fit to the span, as yet without doubt.
func (f *spanFit) result() Result {
	r := f.span.blank(f.model, BasisSpan)
	r.Span = &f.info
	r.take(f.values())
	r.Evaluations = f.evaluations
	average, _ := f.span.Average()
	r.compare(average, f.modelled())
	r.Converged = f.converged && finite(r.SumOfSquares)
	return r
}

// modelled is the average beat of the modelled pressure.
func (f *spanFit) modelled() data.Period {
	n := f.span.Samples()
	p := data.Period{Samples: make([]float64, n), Rate: f.span.Rate}
	beats := float64(f.span.beatsInRuns())
	for i, r := range f.span.Runs {
		for k, from := range r.Onsets[:r.beats()] {
			step := float64(r.Onsets[k+1]-from) / float64(n)
			for j := range n {
				at := float64(from) + float64(j)*step
				whole := min(int(at), len(r.Pressure)-2)
				part := at - float64(whole)
				value := func(j int) float64 { return r.Pressure[j] - f.residual[i][j] }
				p.Samples[j] += ((1-part)*value(whole) + part*value(whole+1)) / beats
			}
		}
	}
	return p
}

// judge decides which parameters the span determines, and adds warnings and the
// criteria of choice.
func (f *spanFit) judge(r *Result) {
	f.identify(r)
	f.beat.criteria(r)
	f.outflow(r)
	f.beat.warn(r)
	f.warnOfWander(r)
}

// outflow is what other outflow pressures do: the same as to the fit to the
// average beat.
func (f *spanFit) outflow(r *Result) {
	for _, pv := range otherOutflows(r.OutflowPressure) {
		r.addOutflow(pv, f.beat.shifted(&f.fitted, asMeasured(pv), [maxUnknowns]float64{}))
	}
}
