package study

import (
	"context"
	"errors"
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/fitting"
	"afterbeat/tree/support"
)

// Predict sets up a ventricle from a fit and couples it to the pump of the case,
// at the speeds of the case. The intervals come from the replicates of the fit,
// each with a ventricle of its own. Choices that make no sense are an error;
// where no forecast is possible, the result has a Reason.
func Predict(ctx context.Context, c Comparison) (Forecast, error) {
	f := Forecast{Comparison: c}
	kase := f.caseOf()
	var err error
	if f.Pump, err = pumpOf(kase); err != nil {
		return f, err
	}
	speeds, err := speedsOf(kase, f.Pump.Set)
	if err != nil {
		return f, err
	}
	if f.match, err = matchingOf(kase); err != nil {
		return f, err
	}
	f.Matching = f.match.what
	if f.modulation, err = f.modulationOf(kase); err != nil {
		return f, err
	}
	if f.Middle, speeds = quoted(kase, speeds); kase.Quote != nil && !(*kase.Quote > 0 && *kase.Quote <= f.farthest()) {
		return f, &ChoiceError{Key: "quote", What: fmt.Sprintf("%v is no speed above 0 and up to %g", *kase.Quote, f.farthest()), Hint: "in 1000/min, for instance --quote 9"}
	}
	for _, n := range speeds {
		f.Speeds = append(f.Speeds, ForecastState{CoupledState: support.CoupledState{Speed: n}})
	}
	period := 1.0 // of no beat, so that wrong choices are found all the same
	if f.Reason = c.Reason; f.Reason == "" {
		period = c.Fit.Beats.Flow.Period.Duration()
	}
	if f.own, err = ventricleOf(kase, period); err != nil {
		return f, err
	}
	if f.Reason != "" {
		return f.without(), nil
	}
	return f.predict(ctx)
}

// without leaves out the states of a forecast that there is none of.
func (f Forecast) without() Forecast {
	f.Speeds, f.Middle = nil, 0
	return f
}

// caseOf is the case that the forecast is made for.
func (f Forecast) caseOf() casefile.Case { return f.Comparison.Fit.Beats.Intake.Case }

// fit is the fit that the forecast rests on.
func (f Forecast) fit() fitting.Result { return f.Comparison.Fit.Results[f.Comparison.Fit.Chosen] }

// speeds are those of the states, 1000/min.
func (f Forecast) speeds() []float64 {
	all := make([]float64, len(f.Speeds))
	for i := range f.Speeds {
		all[i] = f.Speeds[i].Speed
	}
	return all
}

// farthest is the highest speed at which anything is computed, 1000/min.
func (f Forecast) farthest() float64 { return farBeyond * f.Pump.High }

// predict does the work of Predict once the choices are known to make sense.
func (f Forecast) predict(ctx context.Context) (Forecast, error) {
	d, coupling, err := f.drawing()
	if errors.Is(err, support.ErrNotMet) {
		f.Reason = err.Error()
		return f.without(), nil
	}
	if err != nil {
		return f, err
	}
	f.nominal, f.drawn = coupling, d
	k, err := support.NewCoupled(f.supported(coupling))
	if err != nil {
		return f, err
	}
	if err := f.states(k, len(f.Comparison.Fit.Beats.Flow.Period.Samples)); err != nil {
		return f, err
	}
	if f.Middle = f.middleMet(); f.Middle < 0 {
		f.Reason = "at none of the speeds can be met what is to be matched; other speeds, or --match none"
		return f.without(), nil
	}
	f.Mismatch = f.mismatch()
	if err := f.intervals(ctx, d, coupling); err != nil {
		return f, err
	}
	f.Held = f.held(f.Comparison.Answers[0].OutflowOrigin)
	if f.Sensitivity, err = f.sensitivities(d, coupling); err != nil {
		return f, err
	}
	coupling = f.supported(coupling)
	coupling.Tolerance, coupling.Match = forecastTolerance, support.Match{Factor: coupling.Match.Factor}
	if k, err = support.NewCoupled(coupling); err != nil {
		return f, err
	}
	if f.Published, err = f.published(k); err != nil {
		return f, err
	}
	f.Disproof = f.disproof()
	f.Warnings = f.warnings()
	return f, ctx.Err()
}

// drawing prepares the draws, and sets up the nominal ventricle: the middle of
// the ranges, or where that cannot be, the first point drawn that can.
func (f *Forecast) drawing() (*drawing, support.Coupling, error) {
	r, beats := f.fit(), f.Comparison.Fit.Beats
	settings, err := fitSettings(f.caseOf())
	if err != nil {
		return nil, support.Coupling{}, err
	}
	widths, err := halfWidths(f.caseOf())
	if err != nil {
		return nil, support.Coupling{}, err
	}
	d := &drawing{
		forecast: f, replicates: r.Replicates, model: r.Model, seed: settings.WithDefaults().Seed,
		nominal:    patientOf(r.Model, r.Values, r.OutflowPressure, beats.Flow.Period),
		slopeError: widths["filling-slope"],
	}
	d.nominal.own = f.own
	if math.IsNaN(d.nominal.ejection) && !f.own.whole {
		return d, support.Coupling{}, fmt.Errorf("%w: the flow has no clear rise and fall to read an ejection time off", support.ErrNotMet)
	}
	if err := d.nominal.load.Check(); err != nil {
		return d, support.Coupling{}, fmt.Errorf("%w with the fitted load: %w", support.ErrNotMet, err)
	}
	ranges, err := freeOf(f.caseOf(), d.nominal.strokeVolume)
	if err != nil {
		return d, support.Coupling{}, err
	}
	d.choice = ranges.nominal()
	coupling, err := d.nominal.setUp(d.choice, f.own.slope, 0)
	rng := newRand(d.seed, 999)
	for range mostTries {
		if err == nil {
			break
		}
		d.choice = ranges.draw(rng.Float64)
		coupling, err = d.nominal.setUp(d.choice, f.own.slope, 0)
	}
	if err == nil && !f.own.whole {
		coupling, err = d.relax()
	}
	return d, coupling, err
}

// relax chooses the time of relaxation by the pulse pressure that was measured,
// for the nominal ventricle and for all draws.
func (d *drawing) relax() (support.Coupling, error) {
	low, high := d.forecast.Comparison.Fit.Beats.Pressure.Period.Extremes()
	var err error
	k := d.nominal.ventricle(d.choice, d.nominal.own.slope)
	k.Tolerance = forecastTolerance
	d.nominal.relaxation, err = support.RelaxTo(k, d.nominal.asked(d.choice), high-low)
	if err != nil {
		return k, err
	}
	return d.nominal.setUp(d.choice, d.nominal.own.slope, 0)
}

// states fills the states with those of the nominal ventricle.
func (f *Forecast) states(k *support.Coupled, samples int) error {
	states, err := k.Sweep(append([]float64{0}, f.speeds()...))
	if err != nil {
		return err
	}
	for i, s := range states {
		waves, err := k.Waves(s.Speed, samples)
		if err != nil {
			return err
		}
		*f.state(i) = ForecastState{CoupledState: s, Waves: waves}
	}
	native := drawnOf(&states[0])
	for i := range states {
		f.state(i).take(drawnOf(&states[i]), native)
	}
	if f.modulation != nil {
		if f.Modulated, err = f.modulation.nominal(k, samples, native); err != nil {
			return err
		}
	}
	f.ValveLimit = f.limit(k, states)
	return nil
}

// middleMet is the index of the middle state, or of the next to it whose numbers
// exist; -1 where there is none.
func (f *Forecast) middleMet() int {
	best := -1
	for i := range f.Speeds {
		if missing(&f.Speeds[i].CoupledState) != "" {
			continue
		}
		if best < 0 || steps(i-f.Middle) < steps(best-f.Middle) {
			best = i
		}
	}
	return best
}

// steps is how far an index is away.
func steps(i int) int { return max(i, -i) }

// state is the native state for 0, else that of a speed.
func (f *Forecast) state(i int) *ForecastState {
	if i == 0 {
		return &f.Native
	}
	return &f.Speeds[i-1]
}

// noDraws is why a number has no interval before draws were made.
const noDraws = "computed without replicates of a fit"

// limit is the valve limit of the nominal ventricle, as yet without doubt.
func (f *Forecast) limit(k *support.Coupled, states []support.CoupledState) data.Estimate {
	e := data.Estimate{Value: valveLimit(k, states, f.farthest()), Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: noDraws}
	switch {
	case math.IsInf(e.Value, 1):
		e.Value, e.Identified = math.NaN(), false
		e.Why = fmt.Sprintf("the valve opens up to %.4g, twice the highest speed of the pump", f.farthest())
	case math.IsNaN(e.Value):
		e.Identified, e.Why = false, "it was not found: no periodic state near it, or what is to be matched cannot be met there"
	case e.Value == 0:
		e.Value, e.Identified = math.NaN(), false
		e.Why = "the valve does not open without a pump either"
	}
	return e
}
