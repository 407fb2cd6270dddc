package study

import (
	"encoding/json"
	"fmt"
	"math"
	"strings"
	"testing"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

// The keys that the design's page on commands gives in its examples of check,
// fit and study (its tree, ventricle, pump and response come later).
const (
	checkKeys = `caution program.name program.version
recording.file recording.sha256 recording.rows recording.duration_s recording.sampling_hz recording.longest_step_s recording.repeated_times
channels.name channels.quantity channels.unit channels.site channels.missing
channels.pulse.found channels.pulse.reason channels.pulse.heart_rate_bpm channels.pulse.period_s channels.pulse.period_cv channels.pulse.beats_used channels.pulse.beats_rejected
channels.pulse.rhythms.frequency_hz channels.pulse.rhythms.pulse_amplitude
channels.systolic channels.diastolic channels.mean channels.pulse_amplitude channels.gosling_pi channels.pourcelot_ri
reason warnings.code warnings.channel warnings.text warnings.cure`
	fitKeys = checkKeys + `
flow_unit beat.samples beat.sampling_hz beat.period_s beat.count beat.mean_pressure beat.mean_flow beat.end_minus_start_mmHg
beat.delay_s.value beat.delay_s.low beat.delay_s.high beat.delay_s.identified
fits.model fits.basis fits.site fits.parameters.R.value fits.parameters.R.low fits.parameters.R.high fits.parameters.R.random_low fits.parameters.R.random_high fits.parameters.R.identified
fits.parameters.C.value fits.parameters.Zc.value fits.total_resistance.value fits.interval_method fits.rmse_mmHg fits.sum_of_squares fits.aicc fits.bic fits.converged fits.warnings
estimators.name estimators.R estimators.C estimators.tau_s estimators.reason
recommended.model recommended.basis recommended.why`
	studyKeys = fitKeys + `
native.pressure.mean native.pressure.min native.pressure.max native.pressure.amplitude native.flow.mean native.flow.min native.flow.max native.flow.amplitude native.site
supported.pressure.mean supported.flow.amplitude
comparison.posing comparison.held comparison.by_construction comparison.root.retained_pulse_pressure.low comparison.root.retained_pulse_flow.value
energy.native.input energy.native.steady energy.native.pulsatile energy.native.balance energy.supported.input
sensitivity note`
)

// keysOf gathers the paths of a JSON value, lists left out of them; into says
// of each whether it was ever null.
func keysOf(v any, at string, into map[string]bool) {
	switch v := v.(type) {
	case map[string]any:
		for key, value := range v {
			into[at+key] = into[at+key] || value == nil
			keysOf(value, at+key+".", into)
		}
	case []any:
		for _, value := range v {
			keysOf(value, at, into)
		}
	}
}

// parsed is a report as another program reads it.
func parsed(t *testing.T, report any) map[string]any {
	t.Helper()
	text, err := json.Marshal(report)
	if err != nil {
		t.Fatal(err)
	}
	for _, word := range []string{":NaN", "Inf,", `"NaN"`} {
		if strings.Contains(string(text), word) {
			t.Errorf("the report holds %q", word)
		}
	}
	var v map[string]any
	if err := json.Unmarshal(text, &v); err != nil {
		t.Fatal(err)
	}
	return v
}

func TestReportsHaveTheKeysOfTheContract(t *testing.T) {
	s := demoWith(t, func(c *casefile.Case) { c.Delay, c.Replicates = "", ptr(fewest) }) // for a warning
	for name, c := range map[string]struct {
		report any
		keys   string
	}{
		"check": {s.Beats.Check(s.Warnings()), checkKeys},
		"fit":   {s.FitReport(), fitKeys},
		"study": {s.Report(defaults), studyKeys},
	} {
		keys := map[string]bool{}
		keysOf(parsed(t, c.report), "", keys)
		for _, key := range strings.Fields(c.keys) {
			if _, ok := keys[key]; !ok {
				t.Errorf("%s lacks %s", name, key)
			}
		}
	}
}

// Numbers are in full precision: what is read back is what was computed.
func TestNumbersAreInFullPrecision(t *testing.T) {
	s := sharedDemo(t)
	fits := parsed(t, s.FitReport())["fits"].([]any)
	for i, r := range s.Fit.Results {
		for _, p := range r.Parameters {
			got := fits[i].(map[string]any)["parameters"].(map[string]any)[p.Name].(map[string]any)
			if got["value"] != p.Value || got["low"] != p.Total.Low || got["random_high"] != p.Random.High {
				t.Errorf("%s of %s: %v, computed %+v", p.Name, r.Model.Name, got, p.Estimate)
			}
		}
	}
	for _, v := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		if text, err := Number(v).MarshalJSON(); err != nil || string(text) != "null" {
			t.Errorf("%v is %s, %v", v, text, err)
		}
	}
}

// estimates walks through all estimates of a report.
func estimates(v any, at string, each func(at string, e map[string]any)) {
	switch v := v.(type) {
	case map[string]any:
		if _, ok := v["random_low"]; ok {
			each(at, v)
		}
		for key, value := range v {
			estimates(value, at+"."+key, each)
		}
	case []any:
		for i, value := range v {
			estimates(value, fmt.Sprintf("%s[%d]", at, i), each)
		}
	}
}

// What is identified lies in its intervals, the random one inside the total one
// but for the chance of few replicates; what has no value says why.
func TestEstimatesLieInTheirIntervals(t *testing.T) {
	s := demoWith(t, func(c *casefile.Case) { c.Replicates, c.Share = ptr(200), []float64{0.3, 0.7, 1} })
	seen, bounded := 0, 0
	estimates(parsed(t, s.Report(defaults)), "", func(at string, e map[string]any) {
		seen++
		value, has := e["value"].(float64)
		low, hasLow := e["low"].(float64)
		high, hasHigh := e["high"].(float64)
		switch {
		case !has && e["reason"] == nil:
			t.Errorf("%s: no value and no reason", at)
		case hasLow != hasHigh:
			t.Errorf("%s: %v", at, e)
		case hasLow && e["identified"] == true:
			bounded++
			slack := 1e-12 + 1e-9*math.Abs(value)
			if low > value+slack || value > high+slack {
				t.Errorf("%s: %v not in %v to %v", at, value, low, high)
			}
		}
	})
	if seen < 100 || bounded < 50 {
		t.Errorf("%d estimates, %d with intervals: too few to have checked anything", seen, bounded)
	}
}

// Where there is no answer the reason is in the report, beside all that could be
// computed, and nothing else is missing from it.
func TestReasonIsInTheReport(t *testing.T) {
	flat := invented(column{"ao_mmHg", steady(80)}, column{"pleth", halfFlow})
	s := fitted(t, inventedCase(), flat)
	for name, report := range map[string]any{"check": s.Beats.Check(nil), "fit": s.FitReport(), "study": s.Report(defaults)} {
		v := parsed(t, report)
		if reason, _ := v["reason"].(string); !strings.Contains(reason, "no pulse in ao_mmHg") {
			t.Errorf("%s: reason %v", name, v["reason"])
		}
		first := v["channels"].([]any)[0].(map[string]any)
		if first["mean"] != 80.0 || first["systolic"] != nil || first["pulse"].(map[string]any)["reason"] == nil {
			t.Errorf("%s: %v", name, first)
		}
		for _, list := range []string{"channels", "warnings"} {
			if v[list] == nil {
				t.Errorf("%s: %s is null, not an empty list", name, list)
			}
		}
	}
	v := parsed(t, s.Report(defaults))
	for key, empty := range map[string]bool{"fits": true, "estimators": true, "supported": true, "comparison": true, "sensitivity": true} {
		if list, ok := v[key].([]any); !ok || (len(list) == 0) != empty {
			t.Errorf("%s: %v", key, v[key])
		}
	}
	if v["beat"] != nil || v["native"] != nil || v["recommended"] != nil || v["comparison_reason"] == nil || v["note"] == "" {
		t.Errorf("beat %v, native %v, recommended %v, comparison_reason %v", v["beat"], v["native"], v["recommended"], v["comparison_reason"])
	}
	// A flow alone has a pulse: check has an answer, a fit has none.
	s = fitted(t, inventedCase(), invented(outflowTo("ao_flow_mL_s")))
	if c, f := s.Beats.Check(nil).Reason, s.FitReport().Reason; c != nil || f == nil {
		t.Errorf("flow alone: check %v, fit %v", c, f)
	}
}

// A delay that was stated has its interval, one that was not that of the estimate.
func TestDelayInTheReport(t *testing.T) {
	stated := demoFitted(t, func(c *casefile.Case) { c.Error = map[string]string{"delay": "0.004"} }).FitReport().Beat.Delay
	if !stated.Identified || !near(float64(stated.Low), 0.021, 1e-9) || !near(float64(stated.High), 0.029, 1e-9) {
		t.Errorf("stated: %+v", stated)
	}
	unknown := demoFitted(t, func(c *casefile.Case) { c.Delay = "" })
	// The demo's pressure is 25 ms late; not stated, it is estimated and not used.
	if d := unknown.FitReport().Beat.Delay; !d.Identified || math.Abs(float64(d.Value)-0.025) > 0.001 || d.Used != 0 || d.UsedFrom != "assumed" {
		t.Errorf("unknown: %+v", d)
	}
	if w, ok := warned(unknown, data.CodeDelay); !ok || !strings.Contains(w.Text, "+10 ms would change C by") {
		t.Errorf("unknown: %v", w)
	}
}

// Fits per unit area say so by their unit of flow, and their parameters by their
// own; nothing measured has none.
func TestFlowUnit(t *testing.T) {
	for want, f := range map[string]folder{
		"mL/s": invented(aortic("ao_mmHg"), outflowTo("ao_flow_L_min")),
		"cm/s": invented(aortic("ao_mmHg"), column{"lvot_velocity_m_s", noisy(scaled(halfFlow, 0.0025, 0), 0.002)}),
		"":     invented(aortic("ao_mmHg")),
	} {
		s := fitted(t, inventedCase(), f)
		got := ""
		if u := s.FitReport().FlowUnit; u != nil {
			got = *u
		}
		if got != want {
			t.Errorf("flow unit %q, want %q", got, want)
		}
	}
}
