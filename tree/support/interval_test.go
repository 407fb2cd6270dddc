package support

import (
	"context"
	"math"
	"math/rand/v2"
	"runtime"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/fitting"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"
)

// fitted fits wk3 to count beats of the worked example that differ by a factor
// of flow and by noise of pressure, both of which may be 0.
func fitted(t *testing.T, count int, flowSD, noise float64, errors fitting.Systematic) (fitting.Result, data.Period) {
	t.Helper()
	random := rand.New(rand.NewPCG(3, 4))
	b := fitting.Beats{Rate: halfSine(96).Rate, OutflowPressure: 5, Systematic: errors}
	for range count {
		q, factor := halfSine(96), 1+flowSD*random.NormFloat64()
		for j := range q.Samples {
			q.Samples[j] *= factor
		}
		p := fitting.Respond(example(t), q, 5)
		for j := range p.Samples {
			p.Samples[j] += noise * random.NormFloat64()
		}
		b.Flow, b.Pressure = append(b.Flow, q.Samples), append(b.Pressure, p.Samples)
	}
	r, err := fitting.FitBeat(context.Background(), example(t).Model, b, fitting.Settings{Replicates: 400})
	if err != nil {
		t.Fatal(err)
	}
	_, q := b.Average()
	return r, q
}

func withIntervals(t *testing.T, r fitting.Result, q data.Period, posing Posing, shares ...float64) Answer {
	t.Helper()
	a, err := answer(t, r.Load(), q, 5, posing, shares...).WithIntervals(context.Background(), r.Model, r.Replicates)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// Closed form: where flow is wrong by a factor and nothing else is, the load
// takes the factor up (R/f, C f, Zc/f) and pressure stays what it was. So the
// swing of flow is as wrong as its calibration, pulse pressure is not, and no
// ratio is.
func TestErrorOfFlowAloneStaysInTheFlow(t *testing.T) {
	r, q := fitted(t, 8, 0, 0, fitting.Systematic{Flow: 0.10})
	a := withIntervals(t, r, q, LateValvePosing, 0.5)
	for _, s := range []State{a.Native, a.Supported[0]} {
		near(t, "half-width of swing", s.FlowSwing.Total.Width()/2/s.FlowSwing.Value, 0.10, 0.015)
		near(t, "half-width of pulsatile power", s.PulsatilePower.Total.Width()/2/s.PulsatilePower.Value, 0.10, 0.015)
		near(t, "width of swing, random", s.FlowSwing.Random.Width(), 0, 1e-6)
		near(t, "width of pulse pressure", s.PulsePressure.Total.Width(), 0, 1e-5)
	}
	c := a.Comparisons[0]
	for _, e := range []data.Estimate{c.RetainedPressure, c.RetainedFlow, c.RetainedSHE, c.PulsatilePower} {
		near(t, "width of a ratio", e.Total.Width(), 0, 1e-6)
		if !e.Total.Defined() || !e.Identified {
			t.Errorf("ratio without an interval: %+v", e)
		}
	}
}

func TestIntervalsHoldTheValueAndTheRandomError(t *testing.T) {
	r, q := fitted(t, 24, 0.05, 1, fitting.Systematic{Flow: 0.1, PressureScale: 0.03, OutflowPressure: 10})
	a := withIntervals(t, r, q, LateValvePosing, 0.3, 0.8)
	figures := 0
	for _, s := range append([]State{a.Native}, a.Supported...) {
		for f, e := range s.Figures.fields() {
			figures++
			if !e.Total.Contains(e.Value) && figure(f) != flowPI { // the beats differ by a factor: no doubt of the index
				t.Errorf("figure %d at share %v: %v not in %v", f, s.Share, e.Value, e.Total)
			}
			if e.Random.Width() > 1.1*e.Total.Width()+1e-9 { // 400 replicates
				t.Errorf("figure %d at share %v: random %v is wider than total %v", f, s.Share, e.Random, e.Total)
			}
		}
	}
	for _, c := range a.Comparisons {
		if e := c.RetainedPressure; !e.Total.Contains(e.Value) || e.Total.Width() <= 0 {
			t.Errorf("retained pulse pressure %+v", e)
		}
	}
	if figures != 3*int(figureCount) {
		t.Fatalf("looked at %d figures", figures)
	}
}

// The identity has no interval, though what it is applied to has one.
func TestScaledKeepsItsRatiosExact(t *testing.T) {
	r, q := fitted(t, 12, 0.05, 1, fitting.Systematic{Flow: 0.1})
	a := withIntervals(t, r, q, ScaledPosing, 0.25)
	for i, e := range a.Comparisons[0].fields() {
		if e.Total.Defined() || e.Random.Defined() || e.Why != "by construction" {
			t.Errorf("ratio %d: %+v", i, *e)
		}
	}
	native, supported := a.Native.PulsePressure.Total, a.Supported[0].PulsePressure.Total
	near(t, "low end of pulse pressure", supported.Low, 0.75*native.Low, 1e-9)
	near(t, "high end of pulse pressure", supported.High, 0.75*native.High, 1e-9)
}

func TestIntervalsDoNotDependOnCores(t *testing.T) {
	r, q := fitted(t, 10, 0.05, 1, fitting.Systematic{Flow: 0.1})
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(1))
	one := withIntervals(t, r, q, LateValvePosing, 0, 0.5, 1)
	runtime.GOMAXPROCS(16)
	many := withIntervals(t, r, q, LateValvePosing, 0, 0.5, 1)
	exactly := cmp.Options{cmpopts.EquateNaNs(), cmpopts.IgnoreFields(Answer{}, "Load"), cmpopts.IgnoreUnexported(beat.Measures{})}
	if diff := cmp.Diff(one, many, exactly); diff != "" {
		t.Error(diff)
	}
}

func TestAnswerWithoutReplicatesSaysSo(t *testing.T) {
	r, q := fitted(t, 1, 0, 0, fitting.Systematic{})
	a := withIntervals(t, r, q, LateValvePosing, 0.5)
	if e := a.Comparisons[0].RetainedPressure; e.Total.Defined() || e.Why == "" || !e.Identified {
		t.Errorf("retained pulse of a single beat: %+v", e)
	}
}

func TestIntervalsEndWithTheirContext(t *testing.T) {
	r, q := fitted(t, 8, 0.05, 1, fitting.Systematic{})
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	if _, err := answer(t, r.Load(), q, 5, LateValvePosing, 0.5).WithIntervals(ctx, r.Model, r.Replicates); err != context.Canceled {
		t.Errorf("error %v", err)
	}
}

func TestIntervalOfRows(t *testing.T) {
	rows := make([][]numbers, 1000)
	for i := range rows {
		rows[i] = make([]numbers, 1)
		rows[i][0][eep] = float64((i * 387) % 1000) // 0 .. 999 in another order
	}
	of := func(row []numbers) float64 { return row[0][eep] }
	got := interval(600, rows, of) // about 600 instead of the median, 499.5
	near(t, "low", got.Low, 125, 0.5)
	near(t, "high", got.High, 1075, 0.5)
	rows[500][0][eep] = math.NaN()
	if got := interval(600, rows, of); got.Defined() {
		t.Errorf("interval %v with a row undefined", got)
	}
}

func TestWideIntervalIsNotIdentified(t *testing.T) {
	e := pointEstimate(0.2, "")
	doubt(&e, data.Interval{Low: 0.05, High: 0.3}, data.Interval{Low: 0, High: 0.4})
	if e.Identified || !strings.Contains(e.Why, "125 %") {
		t.Errorf("%+v", e)
	}
	e = pointEstimate(0.2, "")
	doubt(&e, data.NoInterval(), data.Interval{Low: 0, High: 0.4})
	if e.Total.Defined() || e.Identified || e.Why == "" {
		t.Errorf("an interval out of undefined replicates: %+v", e)
	}
}
