package cohort

import (
	"math"
	"strconv"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tree/study"
)

// Column is a column of the table.
type Column struct {
	Name    string // with the unit where there is one
	Meaning string
	cell    func(study.Report) string
}

// keyColumns are the first columns; they do not come from a report.
func keyColumns() []Column {
	return []Column{
		{Name: "caution", Meaning: "for research only"},
		{Name: "file", Meaning: "base name of the recording"},
		{Name: "sha256", Meaning: "of the recording; empty where it cannot be read"},
		{Name: "settings", Meaning: "hash of the version, of all choices and of the files they name"},
		{Name: "status", Meaning: "done or failed"},
		{Name: "reason", Meaning: "why it failed"},
	}
}

// Columns lists the columns of the table in their order.
func Columns() []Column {
	return append(keyColumns(), results()...)
}

// results are the columns that come from the report of a study.
func results() []Column {
	var all []Column
	all = append(all, recordingColumns()...)
	all = append(all, beatColumns()...)
	all = append(all, fitColumns()...)
	return append(all, forecastColumns()...)
}

func recordingColumns() []Column {
	return []Column{
		{"rows", "samples in the file", func(r study.Report) string { return strconv.Itoa(r.Recording.Rows) }},
		{"duration_s", "of the whole file", func(r study.Report) string { return number(r.Recording.Duration) }},
		{"sampling_hz", "rate", func(r study.Report) string { return number(r.Recording.Rate) }},
		{"warnings", "codes, as help warnings lists them", func(r study.Report) string {
			var codes []string
			for _, w := range r.Warnings {
				codes = append(codes, string(w.Code))
			}
			return strings.Join(codes, ";")
		}},
	}
}

// beatColumns are of the channels that the study uses.
func beatColumns() []Column {
	of := func(role string, cell func(study.ChannelReport) string) func(study.Report) string {
		return func(r study.Report) string {
			for _, c := range r.Channels {
				if c.Role != nil && *c.Role == role {
					return cell(c)
				}
			}
			return ""
		}
	}
	count := func(n func(study.PulseReport) int) func(study.ChannelReport) string {
		return func(c study.ChannelReport) string {
			if !c.Pulse.Found {
				return ""
			}
			return strconv.Itoa(n(c.Pulse))
		}
	}
	// in shows a value of a channel that is calibrated.
	in := func(value func(study.ChannelReport) study.Number) func(study.ChannelReport) string {
		return func(c study.ChannelReport) string {
			if !c.Calibrated {
				return ""
			}
			return number(value(c))
		}
	}
	name := func(c study.ChannelReport) string { return c.Name.String() }
	site := func(c study.ChannelReport) string { return string(c.Site) }
	return []Column{
		{"pressure_channel", "column used as pressure", of("pressure", name)},
		{"pressure_site", "where it was measured", of("pressure", site)},
		{"heart_rate_per_min", "60 over the median interval", of("pressure", func(c study.ChannelReport) string { return number(c.Pulse.HeartRate) })},
		{"period_cv", "coefficient of variation of the interval", of("pressure", func(c study.ChannelReport) string { return number(c.Pulse.PeriodCV) })},
		{"beats_used", "of the pressure", of("pressure", count(func(p study.PulseReport) int { return p.BeatsUsed }))},
		{"beats_rejected", "of the pressure", of("pressure", count(func(p study.PulseReport) int { return p.BeatsRejected }))},
		{"systolic_mmHg", "median over the used beats", of("pressure", in(func(c study.ChannelReport) study.Number { return c.Systolic }))},
		{"diastolic_mmHg", "median over the used beats", of("pressure", in(func(c study.ChannelReport) study.Number { return c.Diastolic }))},
		{"mean_pressure_mmHg", "over the used beats", of("pressure", in(func(c study.ChannelReport) study.Number { return c.Mean }))},
		{"pulse_amplitude_mmHg", "systolic less diastolic", of("pressure", in(func(c study.ChannelReport) study.Number { return c.Amplitude }))},
		{"flow_channel", "column used as flow", of("flow", name)},
		{"velocity_channel", "column used as velocity", of("velocity", name)},
	}
}

// fitColumns are of the fit that goes downstream, or else the first.
func fitColumns() []Column {
	fit := func(cell func(study.ModelReport) string) func(study.Report) string {
		return func(r study.Report) string {
			if m, ok := chosen(r); ok {
				return cell(m)
			}
			return ""
		}
	}
	all := []Column{
		{"flow_unit", "mL/s, or cm/s for a fit per unit area", func(r study.Report) string {
			if r.FlowUnit == nil {
				return ""
			}
			return *r.FlowUnit
		}},
		{"mean_flow_mL_s", "of the average beat", func(r study.Report) string {
			if r.Beat == nil || perArea(r) {
				return ""
			}
			return number(r.Beat.MeanFlow)
		}},
		{"delay_s", "pressure behind flow", func(r study.Report) string {
			if r.Beat == nil {
				return ""
			}
			return number(r.Beat.Delay.Value)
		}},
		{"fit_site", "what the load belongs to", fit(func(m study.ModelReport) string { return string(m.Site) })},
		{"model", "that goes downstream", fit(func(m study.ModelReport) string { return m.Model })},
		{"basis", "of the fit", fit(func(m study.ModelReport) string { return m.Basis })},
		{"interval_method", "of the fit", fit(func(m study.ModelReport) string { return m.IntervalMethod })},
		{"rmse_mmHg", "of the fit", fit(func(m study.ModelReport) string { return number(m.RMSE) })},
	}
	for _, p := range []struct{ name, unit, areaUnit, meaning string }{
		{"R", "mmHg_s_mL", "mmHg_s_cm", "resistance"},
		{"C", "mL_mmHg", "cm_mmHg", "compliance"},
		{"Zc", "mmHg_s_mL", "mmHg_s_cm", "characteristic impedance"},
		{"L", "mmHg_s2_mL", "mmHg_s2_cm", "inertance"},
	} {
		for _, area := range []bool{false, true} {
			unit, meaning := p.unit, p.meaning
			if area {
				unit, meaning = p.areaUnit, meaning+" per unit area"
			}
			all = append(all, estimates(p.name, unit, meaning, func(r study.Report) (study.EstimateReport, bool) {
				m, ok := chosen(r)
				if !ok || perArea(r) != area {
					return study.EstimateReport{}, false
				}
				e, ok := m.Parameters[p.name]
				return e, ok
			})...)
		}
	}
	return all
}

func perArea(r study.Report) bool { return r.FlowUnit != nil && *r.FlowUnit != "mL/s" }

// chosen is the fit that goes downstream: the one named, or else recommended.
func chosen(r study.Report) (study.ModelReport, bool) {
	for _, m := range r.Fits {
		if r.Recommended != nil && m.Model == r.Recommended.Model && m.Basis == r.Recommended.Basis {
			return m, true
		}
	}
	if len(r.Fits) == 0 {
		return study.ModelReport{}, false
	}
	return r.Fits[0], true
}

// estimates are the six columns of a number with its doubt.
func estimates(name, unit, meaning string, of func(study.Report) (study.EstimateReport, bool)) []Column {
	part := func(cell func(study.EstimateReport) string) func(study.Report) string {
		return func(r study.Report) string {
			e, ok := of(r)
			if !ok || math.IsNaN(float64(e.Value)) {
				return ""
			}
			return cell(e)
		}
	}
	in := name
	if unit != "" {
		in += "_" + unit
	}
	return []Column{
		{in, meaning, part(func(e study.EstimateReport) string { return number(e.Value) })},
		{in + "_low", "of the total 95 % interval", part(func(e study.EstimateReport) string { return number(e.Low) })},
		{in + "_high", "of the total 95 % interval", part(func(e study.EstimateReport) string { return number(e.High) })},
		{in + "_random_low", "of the random 95 % interval", part(func(e study.EstimateReport) string { return number(e.RandomLow) })},
		{in + "_random_high", "of the random 95 % interval", part(func(e study.EstimateReport) string { return number(e.RandomHigh) })},
		{in + "_identified", "whether the data determine it", part(func(e study.EstimateReport) string { return strconv.FormatBool(e.Identified) })},
	}
}

// number has full precision; an undefined number is empty.
func number(n study.Number) string {
	v := float64(n)
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return ""
	}
	return strconv.FormatFloat(v, 'g', -1, 64)
}

// cells are the cells of a row in the order of [Columns].
func cells(key Key, file data.Text, failed string, r *study.Report) []string {
	row := []string{casenote.Caution, file.String(), key.SHA256, key.Settings, statusDone, ""}
	if failed != "" {
		row[4], row[5] = statusFailed, failed
	}
	for _, c := range results() {
		cell := ""
		if r != nil {
			cell = c.cell(*r)
		}
		row = append(row, cell)
	}
	return row
}
