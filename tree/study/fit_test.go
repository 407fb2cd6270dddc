package study

import (
	"math"
	"regexp"
	"slices"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

// wandering is noise with the correlation of a random walk, and no pulse.
func wandering() func(float64) float64 {
	step, at := noisy(steady(0), 0.05), 80.0
	return func(t float64) float64 {
		at += step(t)
		return at
	}
}

// allowance is what a recording allows.
type allowance struct {
	columns    []column
	change     func(*casefile.Case)
	fits       bool
	estimates  int
	reason     string // "" where something was estimated
	comparison string // "" where there is one
	code       data.Code
}

// allowances are those of recordings by what is in them.
func allowances() map[string]allowance {
	velocity := column{"lvot_velocity_cm_s", noisy(scaled(halfFlow, 0.25, 0), 0.2)}
	return map[string]allowance{
		"pressure and flow": {[]column{aortic("ao_mmHg"), outflowTo("ao_flow_mL_s")}, nil, true, 7, "", "", data.CodeDelay},
		"pressure and velocity without a diameter": {
			[]column{aortic("ao_mmHg"), velocity}, nil, true, 7, "", "state the diameter", data.CodePerArea,
		},
		"pressure and velocity with a diameter": {
			[]column{aortic("ao_mmHg"), velocity}, func(c *casefile.Case) { c.DiameterCM = ptr(2.2) }, true, 7, "", "", data.CodeDelay,
		},
		"pressure alone": {[]column{aortic("ao_mmHg")}, nil, false, 7, "", "nothing was fitted", data.CodeNoFlow},
		"flow alone":     {[]column{outflowTo("ao_flow_mL_s")}, nil, false, 0, "no arterial pressure: a fit needs one; name it with --pressure", "nothing was fitted", ""},
		"velocity alone": {[]column{velocity}, nil, false, 0, "no arterial pressure", "nothing was fitted", data.CodePerArea},
		"pressure in volts": {
			[]column{{"ao_pressure_V", noisy(scaled(halfPressure, 0.01, 0.2), 0.003)}, outflowTo("ao_flow_mL_s")},
			nil,
			false, 0, "ao_pressure_V is in V, without a scale", "nothing was fitted", data.CodeUncalibrated,
		},
		"flow in volts": {
			[]column{aortic("ao_mmHg"), {"ao_flow_V", noisy(scaled(halfFlow, 0.01, 0), 0.01)}},
			nil,
			false, 0, "ao_flow_V is in V, without a scale", "nothing was fitted", data.CodeUncalibrated,
		},
		"flow of a bed": {
			[]column{aortic("carotid_mmHg"), outflowTo("carotid_flow_mL_s")}, nil, true, 7, "", "that of one bed (carotid)", data.CodeRegional,
		},
		"flow of nowhere": {[]column{aortic("ao_mmHg"), outflowTo("flow_mL_s")}, nil, true, 7, "", "", data.CodeSiteUnknown},
		"limb for the root": {
			[]column{aortic("radial_mmHg"), outflowTo("ao_flow_mL_s")}, nil, true, 7, "", "", data.CodeStandIn,
		},
		"flow upside down": {
			[]column{aortic("ao_mmHg"), outflowTo("ao_flow_mL_s")},
			func(c *casefile.Case) { c.Invert = []string{"ao_flow"} },
			false, 0, "the mean flow is -87.5 mL/s, not positive; if the channel is upside down, give --invert ao_flow_mL_s", "nothing was fitted", data.CodeNegativeFlow,
		},
		"a pump at work already": {
			[]column{aortic("ao_mmHg"), {"ao_flow_mL_s", noisy(scaled(halfFlow, 0.3, 60), 0.5)}},
			nil,
			true, 7, "", "the flow at the root never stops (it falls to 6", "",
		},
		"a flat pressure": {[]column{{"ao_mmHg", steady(80)}, outflowTo("ao_flow_mL_s")}, nil, false, 0, "no pulse in ao_mmHg", "nothing was fitted", ""},
		"a pressure that wanders": {
			[]column{{"ao_mmHg", wandering()}, outflowTo("ao_flow_mL_s")}, nil, false, 0, "no pulse in ao_mmHg", "nothing was fitted", "",
		},
		"no artery": {[]column{{"ecg_mV", noisy(halfFlow, 1)}, {"pap_mmHg", noisy(halfPressure, 1)}}, nil, false, 0, "no channel is a pressure, a flow or a velocity", "nothing was fitted", ""},
	}
}

// What a recording allows: the reason where it allows no estimate, the reason
// where it allows no comparison, and the warning that belongs to it.
func TestWhatTheDataAllow(t *testing.T) {
	flags := 0
	for name, c := range allowances() {
		t.Run(name, func(t *testing.T) {
			choices := inventedCase()
			if c.change != nil {
				c.change(&choices)
			}
			s := fitted(t, choices, invented(c.columns...))
			if (len(s.Fit.Results) > 0) != c.fits || len(s.Fit.Estimators) != c.estimates {
				t.Errorf("%d fits, %d estimators", len(s.Fit.Results), len(s.Fit.Estimators))
			}
			got := ""
			if r := s.Reason(); r != nil {
				got = *r
			}
			if !strings.Contains(got, c.reason) || (got == "") != (c.reason == "") {
				t.Errorf("reason %q, want %q", got, c.reason)
			}
			if got = s.Comparison.Reason; !strings.Contains(got, c.comparison) || (got == "") != (c.comparison == "") {
				t.Errorf("comparison: reason %q, want %q", got, c.comparison)
			}
			if _, ok := warned(s, c.code); c.code != "" && !ok {
				t.Errorf("no warning %s among %v", c.code, s.Warnings())
			}
			flags += onlyFlagsThatThereAre(t, s)
		})
	}
	if flags < 15 {
		t.Errorf("%d flags were named: too few to have checked anything", flags)
	}
}

var named = regexp.MustCompile(`--[a-z][a-z-]*`)

// onlyFlagsThatThereAre checks that what cures a warning or a reason is a flag of
// a case, and counts them.
func onlyFlagsThatThereAre(t *testing.T, s Study) (seen int) {
	t.Helper()
	flags := map[string]bool{}
	for _, k := range casefile.Keys() {
		flags["--"+k.Flag] = true
	}
	said := s.Fit.Reason + "\n" + s.Comparison.Reason + "\n"
	for _, w := range s.Warnings() {
		said += w.Text + "\n" + w.Cure + "\n"
	}
	for _, flag := range named.FindAllString(said, -1) {
		if seen++; !flags[flag] {
			t.Errorf("there is no flag %s", flag)
		}
	}
	return seen
}

// A pressure alone gives the time constant of its diastole, RC, and no R or C.
func TestPressureAloneGivesTheTimeConstant(t *testing.T) {
	s := fitted(t, inventedCase(), invented(aortic("ao_mmHg")))
	e := s.Fit.Estimators[0]
	if !near(e.Tau, halfR*halfC, 0.02) || !math.IsNaN(e.R) || !math.IsNaN(e.C) {
		t.Errorf("%+v, made from %v s", e, halfR*halfC)
	}
	if s.Fit.Chosen >= 0 || s.Fit.Recommended.Model != "" {
		t.Errorf("chosen %d, recommended %+v", s.Fit.Chosen, s.Fit.Recommended)
	}
	// Above an outflow pressure the same fall is steeper by a known factor.
	c := inventedCase()
	c.OutflowPressure = ptr(50.0)
	if with := fitted(t, c, invented(aortic("ao_mmHg"))).Fit.Estimators[0]; with.Tau > 0.6*e.Tau {
		t.Errorf("tau %v s above 50 mmHg, %v above 0", with.Tau, e.Tau)
	}
}

// With a flow, the decay has tau = R C by the fit's total resistance: the
// three-element load answers 1.428571, as the worked example says.
func TestDecayStandsBesideTheFit(t *testing.T) {
	s := fitted(t, inventedCase(), invented(aortic("ao_mmHg"), outflowTo("ao_flow_mL_s")))
	e := s.Fit.Estimators[0]
	if e.Name != "decay" || !near(e.C, 1.428571, 0.02) || !near(e.R, halfR+halfZc, 0.01) {
		t.Errorf("%+v", e)
	}
}

// A model that a person names goes downstream; without one the recommended
// does. The report shows the one named, or all.
func TestModelByName(t *testing.T) {
	for model, want := range map[string]struct {
		used string
		all  bool
	}{"": {"wk3", true}, "all": {"wk3", true}, "wk2": {"wk2", false}, "wk3": {"wk3", false}} {
		s := demoFitted(t, func(c *casefile.Case) { c.Model = model })
		report := s.FitReport()
		if got := s.Fit.Results[s.Fit.Chosen].Model.Name; got != want.used || slices.ContainsFunc(report.Fits, func(r ModelReport) bool { return r.Model != want.used }) != want.all {
			t.Errorf("model %q: %s used, %d reported", model, got, len(report.Fits))
		}
		if report.Recommended == nil || report.Recommended.Model != "wk3" || report.Recommended.Why == "" {
			t.Errorf("model %q: recommended %+v", model, report.Recommended)
		}
	}
}

// Replicates are as many as asked for; another seed moves intervals, no values;
// the same seed nothing.
func TestReplicatesAndSeed(t *testing.T) {
	fit := func(seed int) (values [3]float64, low, high float64) {
		s := demoFitted(t, func(c *casefile.Case) { c.Seed, c.Replicates = &seed, ptr(100) })
		r := s.Fit.Results[s.Fit.Chosen]
		if len(r.Replicates.Random) != 100 || len(r.Replicates.Total) != 100 {
			t.Fatalf("%d, %d replicates", len(r.Replicates.Random), len(r.Replicates.Total))
		}
		p := r.TotalResistance
		return [3]float64{r.Values.R, r.Values.C, r.Values.Zc}, p.Total.Low, p.Total.High
	}
	v1, low1, high1 := fit(1)
	v2, low2, high2 := fit(2)
	again, low, high := fit(1)
	if v1 != v2 || v1 != again || low1 == low2 || high1 == high2 || low1 != low || high1 != high {
		t.Errorf("seed 1: %v %v %v; seed 2: %v %v %v; seed 1: %v %v %v", v1, low1, high1, v2, low2, high2, again, low, high)
	}
}

// Without systematic error the total interval is the random one; an error of
// the flow widens that of R, and the more the larger it is.
func TestErrorsWidenIntervals(t *testing.T) {
	width := func(errors map[string]string) (random, total float64) {
		s := demoFitted(t, func(c *casefile.Case) { c.Error, c.Replicates = errors, ptr(150) })
		p, _ := s.Fit.Results[s.Fit.Chosen].Parameter("R")
		return p.Random.Width(), p.Total.Width()
	}
	none := map[string]string{}
	for _, k := range errorKinds() {
		none[k.name] = "0"
	}
	random, total := width(none)
	if !near(total, random, 1e-9) {
		t.Errorf("without systematic error: total %v, random %v", total, random)
	}
	// R goes with 1/Q: a half-width of 20 % is some 40 % of R from end to end.
	none["flow"] = "20%"
	if _, wide := width(none); wide < 0.3*0.98 || wide > 0.6*0.98 {
		t.Errorf("with 20 %% of the flow: total %v", wide)
	}
	none["flow"] = "0.2"
	_, fraction := width(none)
	none["flow"] = "20 %"
	if _, percent := width(none); percent != fraction {
		t.Errorf("0.2 gives %v, 20 %% gives %v", fraction, percent)
	}
}
