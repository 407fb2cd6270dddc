package study

import (
	"context"
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/gonum/stat"

	"afterbeat/data"
	"afterbeat/tree/heart"
	"afterbeat/tree/support"
)

// intervals makes the draws, and gives every number its intervals.
func (f *Forecast) intervals(ctx context.Context, d *drawing, k support.Coupling) error {
	count := min(forecastDraws, len(d.replicates.Random), len(d.replicates.Total))
	random, err := d.rows(ctx, count, d.random)
	if err != nil {
		return err
	}
	d.choose(count)
	total, err := d.rows(ctx, count, d.total)
	if err != nil {
		return err
	}
	f.Draws = min(len(random), len(total))
	if err := f.ventricle(k, d, random, total); err != nil {
		return err
	}
	if f.Draws < 2 {
		return nil
	}
	for i := range len(f.Speeds) + 1 {
		s := f.state(i)
		random, total := met(random, i), met(total, i)
		if min(len(random), len(total)) < int(fewDraws*float64(f.Draws)) {
			f.unmet(s)
			continue
		}
		for _, e := range s.estimates() {
			doubt(e.into, random, total, func(r *row) float64 { return e.of(r.states[i], r.states[0]) })
		}
		opened := 0
		for j := range total {
			if total[j].opened[i] {
				opened++
			}
		}
		s.ValveOpenDraws = float64(opened) / float64(len(total))
	}
	if f.modulation != nil {
		f.Modulated.doubt(random, total)
	}
	limited := func(all []row) []row {
		return slices.DeleteFunc(slices.Clone(all), func(r row) bool { return math.IsNaN(r.limit) })
	}
	if random, total = limited(random), limited(total); min(len(random), len(total)) > f.Draws/2 {
		doubt(&f.ValveLimit, random, total, func(r *row) float64 { return r.limit })
	}
	return nil
}

// met are the draws in which state i has numbers: without matching all of them.
func met(all []row, i int) []row {
	return slices.DeleteFunc(slices.Clone(all), func(r row) bool { return math.IsNaN(r.states[i][drawnMean]) })
}

// unmet says of the estimates of a state why they have no interval.
func (f *Forecast) unmet(s *ForecastState) {
	for _, e := range s.estimates() {
		if !math.IsNaN(e.into.Value) {
			e.into.Why = "what is to be matched cannot be met in many of the draws"
		}
	}
}

// doubt gives a value its intervals over the draws. A value that there is none
// of keeps its reason.
func doubt(e *data.Estimate, random, total []row, of func(*row) float64) {
	if math.IsNaN(e.Value) {
		return
	}
	e.Why = ""
	e.Random = about(e.Value, valuesOf(random, of))
	e.Total = over(e.Value, valuesOf(total, of))
	e.Total.Low, e.Total.High = min(e.Total.Low, e.Random.Low), max(e.Total.High, e.Random.High)
	if !e.Total.Defined() {
		e.Random, e.Total = data.NoInterval(), data.NoInterval()
		e.Why = "undefined in some of the draws"
	}
}

func valuesOf(rows []row, of func(*row) float64) []float64 {
	values := make([]float64, len(rows))
	for i := range rows {
		values[i] = of(&rows[i])
	}
	slices.Sort(values)
	return values
}

func quantile(sorted []float64, p float64) float64 {
	return stat.Quantile(p, stat.LinInterp, sorted, nil)
}

// over is the 95 % interval of a value over draws of ranges: the percentiles 2.5
// and 97.5, and wide enough to hold the value, which need not be their middle.
func over(value float64, sorted []float64) data.Interval {
	if math.IsNaN(sorted[0]) {
		return data.NoInterval()
	}
	return data.Interval{Low: min(value, quantile(sorted, 0.025)), High: max(value, quantile(sorted, 0.975))}
}

// about is the 95 % interval about a value over draws of random error: the
// distances of the percentiles from their median. Noise that is left in a drawn
// beat shifts all draws together, which is no doubt about the value.
func about(value float64, sorted []float64) data.Interval {
	if math.IsNaN(sorted[0]) {
		return data.NoInterval()
	}
	shift := value - quantile(sorted, 0.5)
	return data.Interval{Low: min(value, quantile(sorted, 0.025)+shift), High: max(value, quantile(sorted, 0.975)+shift)}
}

// ventricle fills the table of parameters.
func (f *Forecast) ventricle(k support.Coupling, d *drawing, random, total []row) error {
	ranges, err := freeOf(f.caseOf(), d.nominal.strokeVolume)
	if err != nil {
		return err
	}
	v := k.Ventricle
	set := func(symbol, meaning, unit string, value float64, of func(*row) float64) {
		e := data.Estimate{Value: value, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: noDraws}
		if len(random) > 1 && len(total) > 1 {
			doubt(&e, random, total, of)
		}
		if width := e.Total.Width(); width > math.Abs(value) {
			e.Identified, e.Why = false, "it follows from what the traces do not fix"
		}
		f.Ventricle = append(f.Ventricle, VentricleParameter{symbol, meaning, unit, e, data.Estimated})
	}
	known := func(symbol, meaning, unit string, value float64) {
		f.Ventricle = append(f.Ventricle, VentricleParameter{symbol, meaning, unit, data.Exact(value), data.Measured})
	}
	drawnFrom := func(symbol, meaning, unit string, value float64, r freeRange, o data.Origin, why string) {
		if ranges.given[symbol] {
			known(symbol, meaning, unit, value)
			return
		}
		f.Ventricle = append(f.Ventricle, VentricleParameter{symbol, meaning, unit, data.Estimate{
			Value: value, Total: data.Interval{Low: r.low, High: r.high}, Random: data.NoInterval(), Identified: o == data.Measured, Why: why,
		}, o})
	}
	const why = "not fixed by the traces; drawn evenly"
	period := data.Exact(v.Period)
	f.Ventricle = append(f.Ventricle, VentricleParameter{"T", "heart period", "s", period, data.Measured})
	switch edv := "EDV"; {
	case f.own.whole:
		known("Emax", "end-systolic elastance", "mmHg/mL", v.Emax)
		known("Emin", "diastolic elastance", "mmHg/mL", v.Emin)
		if v.Activation == heart.Cosine {
			known("Tes", "time to end systole", "s", v.Tes)
			known("Tr", "time of relaxation", "s", v.Tr)
		}
		set(edv, "end-diastolic volume, native", "mL", f.Native.Volume.Max, func(r *row) float64 { return r.edv })
	default:
		set("Emax", "end-systolic elastance", "mmHg/mL", v.Emax, func(r *row) float64 { return r.ventricle.Emax })
		set("Emin", "diastolic elastance", "mmHg/mL", v.Emin, func(r *row) float64 { return r.ventricle.Emin })
		set("Tes", "time to end systole", "s", v.Tes, func(r *row) float64 { return r.ventricle.Tes })
		set("Tr", fmt.Sprintf("time of relaxation, %.2g Tes", v.Tr/v.Tes), "s", v.Tr, func(r *row) float64 { return r.ventricle.Tr })
		drawnFrom(edv, "end-diastolic volume, native", "mL", d.choice.edv, ranges.edv, ranges.volumeOrigin, ranges.volumeWhy)
	}
	drawnFrom("V0", "volume at no pressure", "mL", d.choice.v0, ranges.v0, data.Assumed, why)
	drawnFrom("Pfill", "filling pressure, native", "mmHg", d.choice.pfill, ranges.pfill, data.Assumed, why)
	drawnFrom("Rmv", "mitral valve", "mmHg s/mL", d.choice.rmv, ranges.rmv, data.Assumed, why)
	drawnFrom("Rav", "aortic valve", "mmHg s/mL", d.choice.rav, ranges.rav, data.Assumed, why)
	if v.Rar > 0 {
		known("Rar", "aortic valve to flow back", "mmHg s/mL", v.Rar)
	}
	f.Ventricle = append(f.Ventricle, f.slope(d.slopeError))
	return nil
}

// slope is that of the filling line, with its relative error.
func (f *Forecast) slope(relative float64) VentricleParameter {
	half, why := f.own.slope*relative, "from a ramp study of 35 patients"
	if f.own.slopeGiven {
		why = "given"
	}
	return VentricleParameter{"slope", "fall of filling pressure with output", "mmHg s/mL", data.Estimate{
		Value: f.own.slope, Total: data.Interval{Low: max(0, f.own.slope-half), High: f.own.slope + half}, Random: data.NoInterval(),
		Identified: true, Why: fmt.Sprintf("%s, +-%.0f %%", why, 100*relative),
	}, givenOr(f.own.slopeGiven, data.Assumed)}
}

// givenOr is the origin of what the case gives, or another.
func givenOr(given bool, other data.Origin) data.Origin {
	if given {
		return data.Measured
	}
	return other
}
