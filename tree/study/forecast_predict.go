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

// take fills the estimates with their values, as yet without doubt.
func (s *ForecastState) take(now, native drawn) {
	for _, e := range s.estimates() {
		*e.into = data.Estimate{Value: e.of(now, native), Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: noDraws}
		if why := missing(&s.CoupledState); why != "" {
			e.into.Identified, e.into.Why = false, why
		}
	}
	s.Against.Posing = support.CoupledPosing
	s.ValveOpenDraws = 0
	if s.ValveOpened {
		s.ValveOpenDraws = 1
	}
}

// drawnEstimate is an estimate of a state, as a function of a draw's numbers at
// its speed and natively.
type drawnEstimate struct {
	into *data.Estimate
	of   func(now, native drawn) float64
}

func (s *ForecastState) estimates() []drawnEstimate {
	c := &s.Against
	retained := func(i int) func(drawn, drawn) float64 {
		return func(now, native drawn) float64 { return ratio(now[i], native[i]) }
	}
	number := func(i int) func(drawn, drawn) float64 { return func(now, _ drawn) float64 { return now[i] } }
	change := func(i int) func(drawn, drawn) float64 {
		return func(now, native drawn) float64 { return now[i] - native[i] }
	}
	return []drawnEstimate{
		{&s.MeanPressure, number(drawnMean)},
		{&s.Output, number(drawnOutput)},
		{&s.PulsePressure, number(drawnPulse)},
		{&s.RetainedPulse, retained(drawnPulse)},
		{&s.EEPressure, number(drawnEEP)},
		{&s.SurplusEnergy, number(drawnSHE)},
		{&s.FillingPress, number(drawnFilling)},
		{&s.Resistance, retained(drawnResistance)},
		{&s.ValveOpenTime, number(drawnOpen)},
		{&s.PumpSwing, number(drawnSwing)},
		{&s.PressureChange, change(drawnMean)},
		{&s.OutputChange, change(drawnOutput)},
		{&s.InputPower, func(now, _ drawn) float64 { return now[drawnSteady] + now[drawnPulsatile] }},
		{&s.SteadyPower, number(drawnSteady)},
		{&s.PulsatilePower, number(drawnPulsatile)},
		{&c.RetainedPressure, retained(drawnPulse)},
		{&c.RetainedFlow, retained(drawnRootSwing)},
		{&c.RetainedPI, func(now, native drawn) float64 {
			return ratio(now[drawnRootSwing]/now[drawnOutput], native[drawnRootSwing]/native[drawnOutput])
		}},
		{&c.RetainedSHE, retained(drawnSHE)},
		{&c.RetainedPower, retained(drawnPulsatile)},
		{&c.FlowAmplitude, func(now, native drawn) float64 { return ratio(native[drawnRootSwing], now[drawnRootSwing]) }},
		{&c.PulsatilePower, func(now, native drawn) float64 { return ratio(native[drawnPulsatile], now[drawnPulsatile]) }},
		{&c.MeanPressureChange, change(drawnMean)},
	}
}

// ratio is a/b, NaN unless b is positive.
func ratio(a, b float64) float64 {
	if !(b > 0) {
		return math.NaN()
	}
	return a / b
}

// strokeVolumeRow is the row of the stroke volume in [Forecast.Mismatch].
const strokeVolumeRow = 2

// mismatch sets the native state of the model beside the average beat.
func (f *Forecast) mismatch() []Mismatch {
	b, n := f.Comparison.Fit.Beats, &f.Native
	mean, pulse := b.Pressure.Period.Mean(), measuredPulse(b)
	if cuff := f.Comparison.Fit.Cuff; cuff != nil {
		mean, pulse = cuff.MeanPressure(), cuff.Pulse()
	}
	period := b.Flow.Period.Duration()
	return []Mismatch{
		{"mean pressure", "mmHg", mean, n.Arterial.Mean},
		{"pulse pressure", "mmHg", pulse, n.CoupledState.PulsePressure()},
		{"stroke volume", "mL", b.Flow.Period.Mean() * period, n.Flow() * period},
		{"ejection time", "s", ejectionTime(b.Flow.Period), n.ValveOpen},
	}
}

// measuredPulse is the pulse pressure of the average beat, mmHg.
func measuredPulse(b Beats) float64 {
	low, high := b.Pressure.Period.Extremes()
	return high - low
}

// held lists what is the same at every speed. What is not identified keeps its
// interval.
func (f *Forecast) held(outflow data.Origin) []ForecastHeld {
	k := f.nominal
	l := k.Load
	still := func(v float64) data.Estimate {
		return data.Estimate{Value: v, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: "held"}
	}
	var all []ForecastHeld
	add := func(quantity, unit string, e data.Estimate, o data.Origin) {
		all = append(all, ForecastHeld{quantity, unit, e, o})
	}
	if !f.match.byResistance() {
		add("R", "mmHg s/mL", still(l.R*f.match.factor), data.Estimated)
	}
	add("C", "mL/mmHg", still(l.C), data.Estimated)
	if l.Kind != support.WK2 {
		add("Zc", "mmHg s/mL", still(l.Zc), data.Estimated)
	}
	if l.Kind == support.WK4S || l.Kind == support.WK4P {
		add("L", "mmHg s2/mL", still(l.L), data.Estimated)
	}
	add("outflow pressure", "mmHg", still(l.OutflowPressure), outflow)
	add("heart rate", "1/min", still(60/k.Ventricle.Period), data.Measured)
	for _, p := range f.Ventricle {
		if p.Symbol == "Emax" {
			e := p.Estimate
			if e.Identified {
				e.Total, e.Random, e.Why = data.NoInterval(), data.NoInterval(), "held"
			}
			add("contractility, Emax", p.Unit, e, p.Origin)
		}
	}
	switch f.match.what {
	case MatchFlow:
		add("mean flow", "L/min", still(litresPerMinute*k.Filling.Flow), data.Estimated)
	case MatchPressure:
		add("mean pressure", "mmHg", still(f.Native.Arterial.Mean), data.Estimated)
	}
	return all
}
