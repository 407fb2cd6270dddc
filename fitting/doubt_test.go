package fitting

import (
	"context"
	"errors"
	"math"
	"math/cmplx"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"afterbeat/data"
)

// Intervals cover the truth about as often as they say, over recordings drawn
// anew from the generator: amplitude 4 % independent from beat to beat, white
// noise 1 mmHg, AR(1) noise 0.8 mmHg with 0.3 s. In 400 recordings the shares
// were
//
//	beats     2     3     5     7     8    12    24    60
//	R      0.97  0.97  0.97  0.99  1.00  1.00  1.00  1.00
//	C      1.00  1.00  0.99  0.97  0.96  0.96  0.97  0.96
//	Zc     1.00  0.99  0.95  0.94  0.98  0.98  0.97  0.95
//
// so the interval of R is on the wide side (1.7 to 2 times two actual standard
// deviations at 8 to 60 beats), for noise at the ends of a block counts as
// storage.
func TestCoverage(t *testing.T) {
	trials, replicates, sizes := 150, 300, []int{3, 7, 12, 24, 60}
	if testing.Short() {
		trials, replicates, sizes = 80, 200, []int{5, 24}
	}
	m := model(t, "wk3")
	for _, beats := range sizes {
		hit := map[string]float64{}
		for trial := range trials {
			b := generate(beats, 160, 1, rand.New(rand.NewPCG(uint64(1000+trial), uint64(beats))))
			r := fit(t, m, b, Settings{Replicates: replicates, Seed: uint64(trial + 1)})
			for _, p := range r.Parameters {
				if p.Random.Contains(example.Of(p.Name)) {
					hit[p.Name] += 1 / float64(trials)
				}
			}
			if r.TotalResistance.Random.Contains(m.Resistance(example)) {
				hit["Z(0)"] += 1 / float64(trials)
			}
		}
		for _, name := range []string{"R", "C", "Zc", "Z(0)"} {
			if hit[name] < 0.89 { // 0.95 less three standard errors of 150 trials
				t.Errorf("%d beats: the interval of %s held the truth in %.3f of the trials", beats, name, hit[name])
			}
		}
	}
}

var someErrors = Systematic{Flow: 0.1, PressureScale: 0.03, PressureOffset: 2, Delay: 0.01, OutflowPressure: 10}

func TestRecoveryWithNoise(t *testing.T) {
	b := noisy(160, 24, 3)
	b.Systematic = someErrors
	r := fit(t, model(t, "wk3"), b, Settings{})
	if r.IntervalMethod != IntervalBlocks || !r.Identified() || len(r.Replicates.Random) != 1000 || len(r.Replicates.Total) != 1000 {
		t.Fatalf("method %q, identified %v, %d replicates", r.IntervalMethod, r.Identified(), len(r.Replicates.Random))
	}
	near(t, "with noise", r.Values, Values{R: 1, C: 1.5, Zc: 0.05}, 0.03)
	for _, p := range r.Parameters {
		if p.Random.Low >= p.Value || p.Random.High <= p.Value || p.Total.Width() <= p.Random.Width() {
			t.Errorf("%s = %v, random %v, total %v", p.Name, p.Value, p.Random, p.Total)
		}
	}
	if got := r.RMSE; got > 0.6 {
		t.Errorf("rmse of the average of 24 beats: %v mmHg", got)
	}
}

// A relative error of flow alone: R is what it is divided by, so its total
// interval follows from the normal distribution of the scale, and every
// replicate obeys the law of scale.
func TestSystematicFlowError(t *testing.T) {
	b := noisy(160, 60, 4)
	b.Systematic = Systematic{Flow: 0.2}
	r := fit(t, model(t, "wk3"), b, Settings{Replicates: 4000})
	for i, total := range r.Replicates.Total {
		random := r.Replicates.Random[i]
		near(t, "replicate", total.Values, Values{R: random.Values.R / total.FlowScale, C: random.Values.C * total.FlowScale, Zc: random.Values.Zc / total.FlowScale}, 1e-5)
		if t.Failed() {
			break
		}
	}
	p := r.Parameters[0]
	if math.Abs(p.Total.High/(p.Value/0.8)-1) > 0.03 || math.Abs(p.Total.Low/(p.Value/1.2)-1) > 0.03 {
		t.Errorf("R = %v, total %v, want about R/1.2 to R/0.8", p.Value, p.Total)
	}
}

// Outflow pressure and offset move the mean of pressure, and so R alone: R + Zc =
// (mean P - Pv)/mean Q.
func TestSystematicPressureError(t *testing.T) {
	for name, s := range map[string]Systematic{"outflow pressure": {OutflowPressure: 10}, "offset": {PressureOffset: 10}} {
		b := noisy(160, 60, 4)
		b.Systematic = s
		r := fit(t, model(t, "wk3"), b, Settings{Replicates: 4000})
		_, flow := b.Average()
		want := 20 / flow.Mean()
		if got := r.TotalResistance.Total.Width(); math.Abs(got/want-1) > 0.07 {
			t.Errorf("%s: interval of Z(0) %v wide, want about %v", name, got, want)
		}
	}
}

// A pressure that comes late by the delay of a calibration is set right by it.
func TestCalibrationUndoesWhatItSays(t *testing.T) {
	const n, late = 171, 0.0125
	flow := sample(exampleFlow, n, 0)
	p := Respond(Lumped{model(t, "wk3"), example}, flow, 5)
	x := p.Spectrum()
	for k := range x {
		x[k] *= cmplx.Exp(complex(0, -p.Omega(k)*late))
	}
	measured := data.FromSpectrum(x, n, p.Rate)
	for j, v := range measured.Samples {
		measured.Samples[j] = (v - 3) / 1.1
	}
	low := data.Period{Samples: scaled([][]float64{flow.Samples}, 1/0.8)[0], Rate: flow.Rate}
	f := newBeatFit(model(t, "wk3"), only(low, measured))
	f.moments.set(f.source.flow, f.source.pressure,
		Calibration{FlowScale: 0.8, PressureScale: 1.1, PressureOffset: 3, Delay: late, OutflowPressure: 5})
	f.search.run()
	near(t, "calibrated", f.standing(), Values{R: 1, C: 1.5, Zc: 0.05}, 1e-8)
}

// The replicates are what the intervals say, and carry the flow that was fitted.
func TestReplicatesCarryTheirFlow(t *testing.T) {
	b := noisy(100, 24, 5)
	b.Systematic = someErrors
	r := fit(t, model(t, "wk3"), b, Settings{Replicates: 200})
	if got := percentiles(r.Values.C, r.Replicates.Total, func(v Values) float64 { return v.C }); got != r.Parameters[1].Total {
		t.Errorf("interval %v, percentiles of the replicates %v", r.Parameters[1].Total, got)
	}
	one, total := r.Replicates.Random[17], r.Replicates.Total[17]
	flow, pressure := make([]complex128, 51), make([]complex128, 51)
	s := newSource(b)
	s.useBlocks(one.pool.block, one.pool.inflate)
	s.storage = newStorage(s, r.Values.R*r.Values.C)
	s.draw(one.starts, flow, pressure)
	want := data.FromSpectrum(flow, 100, b.Rate)
	for j, q := range one.Flow().Samples {
		if math.Abs(q-want.Samples[j]) > 1e-9 || math.Abs(total.Flow().Samples[j]-total.FlowScale*q) > 1e-9 {
			t.Fatalf("sample %d: flow %v, drawn %v", j, q, want.Samples[j])
		}
	}
	if one.FlowScale != 1 || total.FlowScale == 1 || total.OutflowPressure == 0 || one.OutflowPressure != 0 {
		t.Errorf("calibrations %+v and %+v", one.Calibration, total.Calibration)
	}
	// What the replicate says is a fit to its own draw, to the tolerance of replicates.
	f := newBeatFit(r.Model, only(want, data.FromSpectrum(pressure, 100, b.Rate)))
	near(t, "refit from scratch", one.Values, f.values(), 1e-5)
}

func TestSameSeedSameIntervals(t *testing.T) {
	b := noisy(100, 12, 6)
	b.Systematic = someErrors
	m := model(t, "wk3")
	first, again := fit(t, m, b, Settings{Replicates: 100}), fit(t, m, b, Settings{Replicates: 100, Seed: 1})
	if diff := cmp.Diff(first.Parameters, again.Parameters); diff != "" {
		t.Errorf("the default seed is not 1: %s", diff)
	}
	if other := fit(t, m, b, Settings{Replicates: 100, Seed: 2}); other.Parameters[0].Random == first.Parameters[0].Random {
		t.Error("another seed gives the same interval")
	}
	b.Systematic = Systematic{}
	for _, p := range fit(t, m, b, Settings{Replicates: 100}).Parameters {
		if p.Total != p.Random {
			t.Errorf("%s: total %v, random %v without systematic errors", p.Name, p.Total, p.Random)
		}
	}
}

func TestFewBeats(t *testing.T) {
	b := noisy(100, 5, 6)
	b.Systematic = someErrors
	r := fit(t, model(t, "wk3"), b, Settings{})
	if r.IntervalMethod != IntervalCovariance || !hasWarning(r, data.CodeFewBeats) {
		t.Errorf("method %q, warnings %v", r.IntervalMethod, r.Warnings)
	}
	for _, p := range r.Parameters[:2] {
		if !p.Random.Contains(p.Value) || p.Total.Width() <= p.Random.Width() {
			t.Errorf("%s = %v, random %v, total %v", p.Name, p.Value, p.Random, p.Total)
		}
	}
	if q := r.Replicates.Total[3].Flow(); len(q.Samples) != 100 {
		t.Errorf("flow of a replicate has %d samples", len(q.Samples))
	}
}

func TestSingleBeatHasNoInterval(t *testing.T) {
	r := fit(t, model(t, "wk3"), noisy(160, 1, 7), Settings{})
	if r.IntervalMethod != IntervalNone || len(r.Replicates.Random) != 0 {
		t.Errorf("method %q, %d replicates", r.IntervalMethod, len(r.Replicates.Random))
	}
	for _, p := range r.Parameters {
		if p.Random.Defined() || p.Total.Defined() || !strings.Contains(p.Why, "single beat") || !p.Identified {
			t.Errorf("%s: %+v", p.Name, p.Estimate)
		}
	}
	if !math.IsNaN(r.AICc) || !strings.Contains(r.CriterionReason, "single beat") {
		t.Errorf("AICc %v, reason %q", r.AICc, r.CriterionReason)
	}
}

func TestInterruptedFitKeepsItsPoint(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	for _, beats := range []int{4, 24} {
		r, err := FitBeat(ctx, model(t, "wk3"), noisy(160, beats, 8), Settings{})
		if !errors.Is(err, context.Canceled) {
			t.Errorf("error %v", err)
		}
		near(t, "interrupted", r.Values, Values{R: 1, C: 1.5, Zc: 0.05}, 0.1)
		if r.IntervalMethod != IntervalNone || r.Parameters[0].Random.Defined() || len(r.Replicates.Random) != 0 {
			t.Errorf("method %q, interval %v", r.IntervalMethod, r.Parameters[0].Random)
		}
	}
}

func TestBlockLength(t *testing.T) {
	for _, c := range []struct {
		beats          int
		breath, period float64
		want           int
	}{
		{60, 0, 0.8, 5}, // 4 s
		{60, 5, 1, 5},   // one breath
		{60, 2, 1, 3},   // three beats
		{60, 0, 4, 3},   // a slow heart
		{24, 0, 0.8, 5}, //
		{12, 0, 0.8, 3}, // four blocks
		{8, 0, 0.8, 2},  //
	} {
		if got := blockLength(c.beats, c.breath, c.period); got != c.want {
			t.Errorf("%d beats, breath %v s, period %v s: block of %d, want %d", c.beats, c.breath, c.period, got, c.want)
		}
	}
}

// Student's t at 0.975 from the usual tables: 3.182 for 3 degrees of freedom,
// 2.201 for 11.
func TestInflation(t *testing.T) {
	for b, quantile := range map[float64]float64{4: 3.182, 12: 2.201} {
		if got, want := inflation(b), quantile/1.96*math.Sqrt(b/(b-1)); math.Abs(got/want-1) > 3e-4 {
			t.Errorf("%v blocks: %v, want %v", b, got, want)
		}
	}
}

// An AR(1) series of parameter phi has 1 + 2 sum phi^k = (1 + phi)/(1 - phi).
func TestCorrelationTime(t *testing.T) {
	rng := rand.New(rand.NewPCG(11, 0))
	x, v := make([]float64, 200000), 0.0
	for j := range x {
		v = 0.8*v + rng.NormFloat64()
		x[j] = v
	}
	if got := correlationTime(x[:20000]); math.Abs(got/9-1) > 0.25 {
		t.Errorf("correlation time %v, want about 9", got)
	}
	if got := correlationTime(make([]float64, 10)); got != 1 {
		t.Errorf("of zeros: %v", got)
	}
}

// The repair makes beats of a noiseless recording alike: what is left between a
// beat and the periodic response to its flow differs from beat to beat before,
// and by little after.
func TestStorageMakesBeatsPeriodic(t *testing.T) {
	const n = 160
	b := generate(6, n, 0, rand.New(rand.NewPCG(12, 0)))
	s := newSource(b)
	st := newStorage(s, example.R*example.C)
	var before, after []float64
	for i := range b.Count() {
		periodic := Respond(Lumped{model(t, "wk3"), example}, data.Period{Samples: b.Flow[i], Rate: b.Rate}, 0).Samples[n/2]
		before = append(before, b.Pressure[i][n/2]-periodic)
		p := slices.Clone(s.presses[i])
		st.repair(p, st.rise(i, 1))
		after = append(after, data.FromSpectrum(p, n, b.Rate).Samples[n/2]-periodic)
	}
	spread := func(x []float64) float64 { return slices.Max(x) - slices.Min(x) }
	if spread(before) < 1 || spread(after) > 0.2*spread(before) {
		t.Errorf("beats differ by %v mmHg before, by %v after", spread(before), spread(after))
	}
	if got, want := st.rise(5, 2), st.rise(5, 1)+st.rise(0, 1); math.Abs(got-want) > 1e-12 {
		t.Errorf("rise round the end %v, want %v", got, want)
	}
}

func hasWarning(r Result, code data.Code) bool {
	return slices.ContainsFunc(r.Warnings, func(w data.Warning) bool { return w.Code == code })
}
