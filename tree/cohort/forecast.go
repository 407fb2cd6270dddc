package cohort

import (
	"afterbeat/tree/study"
	"afterbeat/tree/support"
)

// forecastColumns are of the coupled state at the speed that stands for the
// forecast in few words, and of the yardstick.
func forecastColumns() []Column {
	all := []Column{
		{"pump", "set of coefficients", func(r study.Report) string {
			if r.Pump == nil {
				return ""
			}
			return r.Pump.Name
		}},
		{"speed_1000_per_min", "of the forecast", func(r study.Report) string {
			if r.Forecast == nil {
				return ""
			}
			return number(r.Forecast.MiddleSpeed)
		}},
		{"forecast_reason", "why there is no forecast", func(r study.Report) string {
			if r.Forecast == nil || r.Forecast.Reason == nil {
				return ""
			}
			return *r.Forecast.Reason
		}},
	}
	for _, e := range []struct {
		name, unit, meaning string
		of                  func(study.Report) (study.EstimateReport, bool)
	}{
		{"retained_pulse_pressure", "", "pulse pressure on support over the native one, forecast", compared(atMiddle)},
		{"supported_pulse_pressure", "mmHg", "forecast", stated(atMiddle, func(s study.StateReport) study.EstimateReport { return s.PulsePressure })},
		{"supported_mean_pressure", "mmHg", "forecast", stated(atMiddle, func(s study.StateReport) study.EstimateReport { return s.MeanPressure })},
		{"supported_flow", "mL_s", "mean flow into the arteries, forecast", stated(atMiddle, func(s study.StateReport) study.EstimateReport { return s.Coupled.Output })},
		{"supported_pump_flow_swing", "mL_s", "greatest less least pump flow, forecast", stated(atMiddle, func(s study.StateReport) study.EstimateReport { return s.Coupled.PumpSwing })},
		{"supported_she", "erg_cm3", "surplus haemodynamic energy, forecast", stated(atMiddle, func(s study.StateReport) study.EstimateReport { return s.SHE })},
		{"valve_limit", "1000_per_min", "lowest speed at which the aortic valve stays shut, forecast", func(r study.Report) (study.EstimateReport, bool) {
			if r.Forecast == nil {
				return study.EstimateReport{}, false
			}
			return r.Forecast.ValveLimit, true
		}},
		{"late_valve_half_share_retained_pulse_pressure", "", "yardstick without a ventricle, no forecast", compared(halfLateValve)},
	} {
		all = append(all, estimates(e.name, e.unit, e.meaning, e.of)...)
	}
	return all
}

// atMiddle tells the coupled state at the middle speed of the forecast.
func atMiddle(r study.Report, p support.Posing, _, speed study.Number) bool {
	return r.Forecast != nil && p == support.CoupledPosing && speed == r.Forecast.MiddleSpeed
}

// halfLateValve tells the late-valve state in which the pump carries half.
func halfLateValve(_ study.Report, p support.Posing, share, _ study.Number) bool {
	return p == support.LateValvePosing && share == 0.5
}

// which tells one of the states of a report.
type which func(r study.Report, p support.Posing, share, speed study.Number) bool

func compared(is which) func(study.Report) (study.EstimateReport, bool) {
	return func(r study.Report) (study.EstimateReport, bool) {
		for _, c := range r.Comparison {
			if is(r, c.Posing, c.Share, c.Speed) {
				return c.Root.RetainedPressure, true
			}
		}
		return study.EstimateReport{}, false
	}
}

func stated(is which, of func(study.StateReport) study.EstimateReport) func(study.Report) (study.EstimateReport, bool) {
	return func(r study.Report) (study.EstimateReport, bool) {
		for _, s := range r.Supported {
			if s.Coupled != nil && is(r, s.Posing, s.Share, s.Coupled.Speed) {
				return of(s), true
			}
		}
		return study.EstimateReport{}, false
	}
}
