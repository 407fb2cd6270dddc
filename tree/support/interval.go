package support

import (
	"context"
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/gonum/stat"

	"afterbeat/data"
	"afterbeat/fitting"
)

// WithIntervals pushes the replicates of the fit through the native and all
// supported states, each with its own parameters, flow and outflow pressure, and
// returns the answer with 95 % intervals (percentiles) on its figures and
// ratios: Random from the set of random errors, Total from that which has the
// systematic ones too. Ratios that hold by construction get none. Without
// replicates the answer comes back as it is. Unless ctx ends it, there is no
// error; the intervals do not depend on the number of cores.
func (a Answer) WithIntervals(ctx context.Context, m fitting.Model, r fitting.Replicates) (Answer, error) {
	if len(r.Random) == 0 || len(r.Total) == 0 {
		return a, nil
	}
	random, err := a.rows(ctx, m, r.Random)
	if err != nil {
		return a, err
	}
	total, err := a.rows(ctx, m, r.Total)
	if err != nil {
		return a, err
	}
	a.Supported, a.Comparisons = slices.Clone(a.Supported), slices.Clone(a.Comparisons)
	spread(a.Native.Figures.fields(), 0, random, total)
	for i := range a.Supported {
		spread(a.Supported[i].Figures.fields(), 1+i, random, total)
		a.Comparisons[i].spread(1+i, random, total)
	}
	return a, nil
}

// rows pushes one set of replicates.
func (a Answer) rows(ctx context.Context, m fitting.Model, set []fitting.Replicate) ([][]numbers, error) {
	take := func(i int) draw {
		return draw{load: fitting.Lumped{Model: m, Values: set[i].Values}, flow: set[i].Flow(), pv: set[i].OutflowPressure}
	}
	return push(ctx, len(set), take, a.Posing, a.Shares())
}

// spread puts intervals on the figures of one state.
func spread(fields [figureCount]*data.Estimate, state int, random, total [][]numbers) {
	for f, e := range fields {
		of := func(row []numbers) float64 { return row[state][f] }
		doubt(e, interval(e.Value, random, of), interval(e.Value, total, of))
	}
}

// spread puts intervals on the ratios of one supported state to the native one.
func (c *Comparison) spread(state int, random, total [][]numbers) {
	if c.ByConstruction {
		return
	}
	for i, e := range c.fields() {
		of := func(row []numbers) float64 { return compare(row[0], row[state])[i] }
		doubt(e, interval(e.Value, random, of), interval(e.Value, total, of))
		if ratio(i) == pressureChange && e.Total.Defined() {
			e.Identified, e.Why = true, "" // a change may be small beside its interval
		}
	}
}

// doubt gives a value its intervals, and says where it is not identified. A
// value that does not exist keeps its reason.
func doubt(e *data.Estimate, random, total data.Interval) {
	switch {
	case math.IsNaN(e.Value):
		return
	case !random.Defined() || !total.Defined():
		e.Identified, e.Why = false, "undefined in some of the replicates"
		return
	}
	e.Random, e.Total, e.Why = random, total, ""
	if width := random.Width(); width > math.Abs(e.Value) {
		e.Identified, e.Why = false, fmt.Sprintf("its random interval is %.0f %% of it wide", 100*width/math.Abs(e.Value))
	}
}

// interval is the 95 % interval about the value of a quantity: the distances of
// the percentiles 2.5 and 97.5 of its values in rows from their median, laid
// about the value. Noise that is left in a drawn beat raises its swing, and so
// shifts all replicates together; that shift is no doubt about the value. There
// is none where the quantity is undefined in a row.
func interval(value float64, rows [][]numbers, of func(row []numbers) float64) data.Interval {
	values := make([]float64, len(rows))
	for i, row := range rows {
		if values[i] = of(row); math.IsNaN(values[i]) {
			return data.NoInterval()
		}
	}
	slices.Sort(values)
	quantile := func(p float64) float64 { return stat.Quantile(p, stat.LinInterp, values, nil) }
	shift := value - quantile(0.5)
	return data.Interval{Low: quantile(0.025) + shift, High: quantile(0.975) + shift}
}
