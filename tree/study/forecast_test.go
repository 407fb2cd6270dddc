package study

import (
	"encoding/json"
	"math"
	"math/rand/v2"
	"runtime"
	"slices"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/fitting"
	"afterbeat/tree/heart"
	"afterbeat/tree/pump"
	"afterbeat/tree/support"
)

// coupledPatient is an invented patient whose traces are those of a ventricle,
// set up to eject so, coupled to a load.
type coupledPatient struct {
	coupling support.Coupling
	ejection support.Ejection
}

func (p coupledPatient) coupled(t testing.TB) *support.Coupled {
	t.Helper()
	c, err := support.SetUp(p.coupling, p.ejection)
	if err != nil {
		t.Fatal(err)
	}
	c.Pump = genericA(t).Pump
	k, err := support.NewCoupled(c)
	if err != nil {
		t.Fatal(err)
	}
	return k
}

func genericA(t testing.TB) pump.Set {
	t.Helper()
	p, ok := pump.ByName("generic A")
	if !ok {
		t.Fatal("no generic A")
	}
	return p
}

// setCalled is the choice of a set of coefficients.
func setCalled(set string) map[string]string { return map[string]string{"set": set} }

// recorded is the case of the patient: 24 beats of native pressure and flow at
// the root, 200 samples a second, with noise.
func (p coupledPatient) recorded(t testing.TB) (casefile.Case, folder) {
	t.Helper()
	const rate, beats = 200, 24
	n := int(math.Round(p.coupling.Ventricle.Period * rate))
	w, err := p.coupled(t).Waves(0, n)
	if err != nil {
		t.Fatal(err)
	}
	rng := rand.New(rand.NewPCG(1, 1))
	pressure, flow := make([]float64, n*beats), make([]float64, n*beats)
	for i := range pressure {
		pressure[i] = w.Pressure.Samples[i%n] + 0.3*rng.NormFloat64()
		flow[i] = w.RootFlow.Samples[i%n] + 2*rng.NormFloat64()
	}
	at := func(of []float64) func(float64) float64 {
		return func(s float64) float64 { return of[int(math.Round(s*rate))] }
	}
	pv := p.coupling.Load.OutflowPressure
	c := casefile.Case{Recording: "a.csv", Delay: "0", OutflowPressure: &pv, Replicates: ptr(few), Share: []float64{0.5}, Speed: []float64{7, 9, 10}}
	return c, folder{"a.csv": table(rate, n*beats, column{"aortic_pressure_mmHg", at(pressure)}, column{"aortic_flow_mL_s", at(flow)})}
}

// patients are two of invented people: a stiff aorta of old age, and a dilated
// heart on compliant arteries. Neither lies in the middle of the ranges.
func patients() map[string]coupledPatient {
	return map[string]coupledPatient{
		"stiff elderly aorta": {
			support.Coupling{
				Ventricle: heart.Ventricle{Period: 0.8, V0: 8, Rmv: 0.01, Rav: 0.006},
				Filling:   heart.Filling{Pressure: 21, Slope: heart.RampSlope},
				Load:      support.Windkessel{Kind: support.WK3, Values: fitting.Values{R: 1.2, C: 0.9, Zc: 0.1}, OutflowPressure: 8},
			},
			support.Ejection{StrokeVolume: 47, Time: 0.28, EndDiastolic: 150},
		},
		"compliant dilated heart": {
			support.Coupling{
				Ventricle: heart.Ventricle{Period: 0.7, V0: 22, Rmv: 0.012, Rav: 0.008},
				Filling:   heart.Filling{Pressure: 24, Slope: heart.RampSlope},
				Load:      support.Windkessel{Kind: support.WK3, Values: fitting.Values{R: 1.05, C: 1.9, Zc: 0.05}, OutflowPressure: 8},
			},
			support.Ejection{StrokeVolume: 44, Time: 0.26, EndDiastolic: 270},
		},
	}
}

// A patient made by the coupled solver is set up from the native traces alone,
// and what the pump really leaves lies within the forecast. Pressure and stroke
// volume of the native state are met.
func TestForecastHoldsWhatThePumpReallyLeaves(t *testing.T) {
	for name, p := range patients() {
		t.Run(name, func(t *testing.T) {
			t.Parallel()
			c, f := p.recorded(t)
			s := whole(t, c, f)
			if s.Forecast.Reason != "" {
				t.Fatal(s.Forecast.Reason)
			}
			k := p.coupled(t)
			native, _ := k.At(0)
			for i := range s.Forecast.Speeds {
				got := &s.Forecast.Speeds[i]
				want, err := k.At(got.Speed)
				if err != nil {
					t.Fatal(err)
				}
				for _, one := range []struct {
					what  string
					got   data.Estimate
					truth float64
				}{
					{"pulse pressure", got.PulsePressure, want.PulsePressure()},
					{"retained pulse", got.RetainedPulse, want.PulsePressure() / native.PulsePressure()},
					{"mean pressure", got.MeanPressure, want.Arterial.Mean},
					{"output", got.Output, want.Flow()},
					{"filling pressure", got.FillingPress, want.Filling},
					{"time that the valve is open", got.ValveOpenTime, want.ValveOpen},
					{"EEP", got.EEPressure, want.EEP},
				} {
					if !one.got.Total.Contains(one.truth) {
						t.Errorf("speed %v: %s is %v, forecast %.4g, %.4g to %.4g", got.Speed, one.what, one.truth, one.got.Value, one.got.Total.Low, one.got.Total.High)
					}
				}
			}
			limit, err := k.ValveLimit(5, 14)
			if err != nil || !s.Forecast.ValveLimit.Total.Contains(limit) {
				t.Errorf("valve limit %v (%v), forecast %v", limit, err, s.Forecast.ValveLimit)
			}
			for _, m := range s.Forecast.Mismatch {
				if math.Abs(m.Percent()) > 3 {
					t.Errorf("native %s: measured %v, of the model %v", m.Quantity, m.Measured, m.Modelled)
				}
			}
		})
	}
}

// The acceptance set of published ranges (forecast.md 3.6, the root gates; the
// sources stand with each number) holds on the demo and on two further invented
// cases, with the default pump.
func TestForecastLiesWithinPublishedRanges(t *testing.T) {
	check := func(t *testing.T, s Study) {
		t.Helper()
		seen := 0
		for _, p := range s.Forecast.Published {
			switch {
			case p.Reason != "":
				t.Errorf("%s: %s", p.Name, p.Reason)
			case !p.Inside():
				t.Errorf("%s at %s is %.4g %s, published %g to %g (%s)", p.Name, p.At, p.Value, p.Unit, p.Low, p.High, p.Source)
			case p.Source == "":
				t.Errorf("%s has no source", p.Name)
			}
			seen++
		}
		if seen != 8 {
			t.Errorf("%d numbers beside published ranges, want 8", seen)
		}
		if w, ok := warned(s, data.CodePublished); ok {
			t.Errorf("warned: %v", w)
		}
	}
	t.Run("demo", func(t *testing.T) { check(t, sharedDemo(t)) })
	for name, p := range patients() {
		t.Run(name, func(t *testing.T) {
			c, f := p.recorded(t)
			c.Speed, c.Replicates = nil, ptr(fewest)
			check(t, whole(t, c, f))
		})
	}
}

// A forecast that leaves the published ranges says so.
func TestForecastOutsidePublishedRangesIsWarnedOf(t *testing.T) {
	s := demoWith(t, func(c *casefile.Case) { c.Pump, c.Speed, c.Replicates = setCalled("generic B"), nil, ptr(fewest) })
	outside := 0
	for _, p := range s.Forecast.Published {
		if p.Reason == "" && !p.Inside() {
			outside++
		}
	}
	if _, ok := warned(s, data.CodePublished); ok != (outside > 0) {
		t.Errorf("%d numbers outside, warned %v", outside, ok)
	}
}

// The forecast does not depend on the number of cores, nor on what was computed
// before.
func TestForecastIsTheSameEachTime(t *testing.T) {
	c := demoCase(t)
	c.Speed, c.Replicates = []float64{8, 9.5}, ptr(16)
	said := func() string {
		text, err := json.Marshal(whole(t, c, demoFolder(t)).Report(defaults))
		if err != nil {
			t.Fatal(err)
		}
		return string(text)
	}
	first := said()
	cores := runtime.GOMAXPROCS(1)
	alone := said()
	runtime.GOMAXPROCS(cores)
	if d := cmp.Diff(first, alone); d != "" {
		t.Error("on one core the forecast is another one")
	}
}

// What is known of the ventricle narrows the forecast; a random interval lies
// within the total one.
func TestWhatIsKnownOfTheVentricleNarrowsTheForecast(t *testing.T) {
	volume := func(s Study) VentricleParameter {
		for _, p := range s.Forecast.Ventricle {
			if p.Symbol == "EDV" {
				return p
			}
		}
		t.Fatal("no EDV")
		return VentricleParameter{}
	}
	emax := func(s Study) float64 { return s.Forecast.Ventricle[1].Total.Width() }
	free := demoWith(t, func(c *casefile.Case) { c.Speed = []float64{7} })
	given := demoWith(t, func(c *casefile.Case) { c.Speed, c.EDVML = []float64{7}, ptr(200.0) })
	fraction := demoWith(t, func(c *casefile.Case) { c.Speed, c.EF = []float64{7}, ptr(0.25) })
	if v := volume(free); v.Identified || v.Origin != data.Assumed || v.Total != (data.Interval{Low: 110, High: 300}) {
		t.Errorf("EDV that nobody knows: %+v", v)
	}
	if v := volume(given); !v.Identified || v.Origin != data.Measured || v.Value != 200 || !(v.Total.Low > 160 && v.Total.High < 240) {
		t.Errorf("EDV given: %+v", v)
	}
	if v := volume(fraction); v.Origin != data.Measured || !v.Total.Contains(48/0.25) || v.Total.Low < 150 || v.Total.High > 250 {
		t.Errorf("EF given: %+v", v)
	}
	if !(emax(given) < 0.7*emax(free)) || !(emax(fraction) < 0.7*emax(free)) {
		t.Errorf("Emax is %.3g wide, with a volume %.3g, with a fraction %.3g", emax(free), emax(given), emax(fraction))
	}
	for _, s := range []Study{free, given, fraction} {
		for _, e := range s.Forecast.Speeds[0].estimates() {
			if e.into.Total.Low > e.into.Random.Low || e.into.Total.High < e.into.Random.High || !e.into.Random.Contains(e.into.Value) {
				t.Errorf("%+v", *e.into)
			}
		}
	}
}

// A volume and a fraction that say another stroke volume are warned of.
func TestVolumesThatDisagree(t *testing.T) {
	for fraction, want := range map[float64]bool{0.24: false, 0.45: true} {
		s := demoWith(t, func(c *casefile.Case) { c.Replicates, c.EDVML, c.EF = ptr(fewest), ptr(200.0), ptr(fraction) })
		if _, got := warned(s, data.CodeDisagree); got != want {
			t.Errorf("EF %v: warned %v", fraction, got)
		}
	}
}

// Where there is no comparison there is no forecast, for the same reason, and
// wrong choices are found all the same.
func TestNoForecastSaysWhy(t *testing.T) {
	s := demoWith(t, func(c *casefile.Case) {
		c.Site, c.Replicates = map[string]string{"lvot_velocity_cm_s": "carotid"}, ptr(fewest)
	})
	if s.Forecast.Reason == "" || s.Forecast.Reason != s.Comparison.Reason || len(s.Forecast.Speeds) != 0 {
		t.Errorf("reason %q, comparison %q", s.Forecast.Reason, s.Comparison.Reason)
	}
	if r := s.Report(defaults).Forecast; r == nil || *r.Reason != s.Forecast.Reason || !strings.Contains(s.Note().Render(defaults), "There is no forecast: the flow is that of one bed") {
		t.Error("the reason is not reported")
	}
	// A load that is none carries no ventricle.
	c := *sharedDemo(t).Comparison
	c.Fit.Results = slices.Clone(c.Fit.Results)
	c.Fit.Results[c.Fit.Chosen].Values.C = 0
	f, err := Predict(t.Context(), c)
	if err != nil || !strings.Contains(f.Reason, "no ventricle ejects as asked with the fitted load: C = 0") {
		t.Errorf("reason %q, error %v", f.Reason, err)
	}
}

// Speeds far apart: below the range of the pump blood flows back, above it the
// ventricle empties; each is warned of once, with its speeds.
func TestForecastWarnsOnceACode(t *testing.T) {
	s := demoWith(t, func(c *casefile.Case) { c.Speed, c.Replicates = []float64{5, 6, 12, 14}, ptr(fewest) })
	seen := map[data.Code]int{}
	for _, w := range s.Forecast.Warnings {
		seen[w.Code]++
	}
	for _, code := range []data.Code{data.CodeBackFlow, data.CodeSuction, data.CodeValveShut, data.CodeBeyondPump} {
		if seen[code] != 1 {
			t.Errorf("%s is warned of %d times in %v", code, seen[code], s.Forecast.Warnings)
		}
	}
	if w, _ := warned(s, data.CodeBackFlow); !strings.Contains(w.Text, "5, 6") {
		t.Errorf("back-flow without its speeds: %q", w.Text)
	}
}

// The largest effect comes first, and an assumption that is moved beyond its
// error does not count among those that matter most.
func TestSensitivitiesAreRanked(t *testing.T) {
	s := sharedDemo(t)
	all := s.Forecast.Sensitivity
	named := map[string]bool{}
	for i, one := range all {
		named[one.Assumption] = true
		if i > 0 && math.Abs(one.Difference) > math.Abs(all[i-1].Difference) {
			t.Errorf("%v comes after %v", one, all[i-1])
		}
		if want := one.RetainedPulse - s.Forecast.Speeds[0].RetainedPulse.Value; math.Abs(one.Difference-want) > 1e-12 {
			t.Errorf("%s %s: difference %v, want %v", one.Assumption, one.Change, one.Difference, want)
		}
	}
	for _, name := range []string{"delay", "output", "outflow-pressure", "diameter", "contractility, Emax", "filling slope", "compliance", "end-diastolic volume"} {
		if !named[name] {
			t.Errorf("%s was not moved", name)
		}
	}
	heaviest := s.Forecast.heaviest(2)
	if len(heaviest) != 2 || heaviest[0].Assumption == heaviest[1].Assumption || heaviest[0].Beyond || heaviest[1].Beyond {
		t.Errorf("heaviest: %v", heaviest)
	}
	if !strings.Contains(s.Forecast.Disproof, "9000/min") || !strings.Contains(s.Forecast.Disproof, "mmHg") {
		t.Errorf("disproof: %q", s.Forecast.Disproof)
	}
}

// C falls with pressure by the curve of Langewouters 1984, by hand at 60 years:
// p0 = 22.6 and p1 = 30.6 mmHg, so that from 80 to 90 mmHg
// (1 + (57.4/30.6)²)/(1 + (67.4/30.6)²) = 4.5187/5.8515.
func TestComplianceFallsWithPressure(t *testing.T) {
	if got := complianceRatio(80, 90, ageOf(casefile.Case{})); math.Abs(got-4.5187/5.8515) > 1e-4 {
		t.Errorf("%v", got)
	}
	// A woman of 30: p0 = 45.3 and p1 = 43.8 mmHg.
	if got := complianceRatio(80, 90, ageOf(casefile.Case{Age: ptr(30.0), Sex: "female"})); math.Abs(got-1.62766/2.04149) > 1e-4 {
		t.Errorf("%v", got)
	}
	if got := complianceRatio(85, 85, years{age: 35, female: true}); got != 1 {
		t.Errorf("%v at the same pressure", got)
	}
}

// Age and sex are of the tree and of the forecast.
func TestForecastFollowsTheAge(t *testing.T) {
	s := sharedDemo(t)
	c := s.Inputs.Case
	c.Age, c.Sex = ptr(82.0), "female"
	if now := s.With(c); now.Forecast != nil || now.Tree != nil || now.Comparison == nil {
		t.Error("what an age bears on stays")
	}
	if words := ageOf(c).words(); words != "a woman of 82 years" {
		t.Errorf("%q", words)
	}
}

// The ejection time of a half-sine is its length, but for what straight lines
// miss of a sine: 0.2 % of pi.
func TestEjectionTimeOfAHalfSine(t *testing.T) {
	p := data.Period{Samples: make([]float64, 200), Rate: 250}
	for i := range p.Samples {
		at := float64(i)/p.Rate - 0.1
		p.Samples[i] = -3
		if at > 0 && at < halfTs {
			p.Samples[i] = 300 * math.Sin(math.Pi*at/halfTs)
		}
	}
	if got := ejectionTime(p); !near(got, halfTs, 0.01) {
		t.Errorf("%v, want %v", got, halfTs)
	}
	for i := range p.Samples {
		p.Samples[i] = -1
	}
	if got := ejectionTime(p); !math.IsNaN(got) {
		t.Errorf("%v of a flow that never goes forward", got)
	}
}
