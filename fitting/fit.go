package fitting

import (
	"context"
	"math"
)

// The bases of a fit.
const (
	BasisBeat = "beat" // the average beat, taken as periodic
	BasisSpan = "span" // all usable samples
)

// FitBeat fits a model to the average of the beats: it minimises the sum over
// samples of (P_model - P)² with all parameters >= 0, and adds intervals (see
// the package documentation).
//
// Beats that differ in length, hold a value that is not a number, or fewer than
// four samples, are an error. Of a fit interrupted by ctx the best point is
// returned, without intervals, together with the error of ctx.
func FitBeat(ctx context.Context, m Model, b Beats, s Settings) (Result, error) {
	if err := b.check(); err != nil {
		return Result{}, err
	}
	f := newBeatFit(m, b)
	r := f.result()
	err := f.doubt(ctx, &r, s.WithDefaults())
	f.judge(&r)
	return r, err
}

// fitted is where a search ended, and what bends about it.
type fitted struct {
	model       Model
	theta       [maxShapes]float64 // ln shape
	low, high   [maxShapes]float64 // the range of theta
	x           [maxLinear]float64
	curvature   *curvature
	converged   bool
	pulse       bool // the flow has one
	evaluations int
}

// shape is where the search ended, s.
func (f *fitted) shape() (shape [maxShapes]float64) {
	for i, t := range f.theta {
		shape[i] = math.Exp(t)
	}
	return shape
}

// values are the parameters of the fit.
func (f *fitted) values() Values { return f.moved(f.x, f.theta, [maxUnknowns]float64{}) }

// moved are the parameters at (x, theta) + move, kept within their bounds.
func (f *fitted) moved(x [maxLinear]float64, theta [maxShapes]float64, move [maxUnknowns]float64) Values {
	linear, shapes := f.model.Linear(), f.model.Shapes()
	var shape [maxShapes]float64
	for i := range linear {
		x[i] = max(0, x[i]+move[i])
	}
	for s := range shapes {
		shape[s] = math.Exp(max(f.low[s], min(f.high[s], theta[s]+move[linear+s])))
	}
	return f.model.Unpack(x[:linear], shape[:shapes])
}

// beatFit is a fit to one average beat at work.
type beatFit struct {
	fitted
	beats   Beats
	source  *source
	moments *moments
	search  *search
}

func newBeatFit(m Model, b Beats) *beatFit {
	f := &beatFit{fitted: fitted{model: m}, beats: b, source: newSource(b)}
	f.moments = newMoments(m, b.Samples(), b.Rate)
	f.search = newSearch(f.moments)
	f.moments.set(f.source.flow, f.source.pressure, asMeasured(b.OutflowPressure))
	f.pulse = f.moments.pulsatile()
	f.converged = f.search.run()
	f.theta, f.x, f.low, f.high, f.evaluations = f.search.theta, f.search.x, f.search.low, f.search.high, f.search.evaluations
	f.curvature = newCurvature(f.moments, f.search.shape[:m.Shapes()], f.x[:m.Linear()])
	for i := range m.Shapes() {
		f.curvature.free[m.Linear()+i] = f.search.low[i] < f.theta[i] && f.theta[i] < f.search.high[i]
		f.search.bend[i] = f.curvature.bend(m.Linear() + i)
	}
	return f
}

// sharp is the tolerance of a fit in ln shape, blunt that of a replicate, which
// only its scatter is asked of.
const (
	sharp = 1e-13
	blunt = 1e-7
)

// newSearch searches a beat's shapes, which are times, from so short that they
// move no harmonic by more than 1 % (w tau = 0.1 at the highest) to so long that
// only their ratio with the column's factor is felt (w tau = 1000 at the lowest).
func newSearch(m *moments) *search {
	s := &search{problem: m, shapes: m.Shapes(), tolerance: sharp}
	for i := range s.shapes {
		s.low[i] = math.Log(0.1 / m.omega[len(m.omega)-1])
		s.high[i] = math.Log(1000 / m.omega[1])
	}
	return s
}

// standing are the parameters at which the search stands.
func (f *beatFit) standing() Values {
	return f.model.Unpack(f.search.x[:f.model.Linear()], f.search.shape[:f.model.Shapes()])
}

// refit searches downhill from the fit to the average beat, for the moments as
// they are now.
func (f *beatFit) refit() Values {
	f.search.near, f.search.tolerance = true, blunt
	f.search.theta = f.theta
	f.search.run()
	return f.standing()
}

// shifted are the parameters of another fit, moved, under a calibration: scales
// act by their law, R, Zc and L going with pressure over flow, and what the rest
// of the calibration does to the fit to the average beat is added.
func (f *beatFit) shifted(of *fitted, c Calibration, move [maxUnknowns]float64) Values {
	f.moments.set(f.source.flow, f.source.pressure, c)
	f.refit()
	x, theta := of.x, of.theta
	linear, scale := f.model.Linear(), c.PressureScale/c.FlowScale
	for i := range linear {
		x[i] = scale*max(0, x[i]+move[i]) + f.search.x[i] - scale*f.x[i]
		move[i] = 0
	}
	for s := range f.model.Shapes() {
		theta[s] += f.search.theta[s] - f.theta[s]
	}
	return of.moved(x, theta, move)
}
