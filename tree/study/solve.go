package study

import (
	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tree/support"
)

// SolvedLoad is a given load under a given flow: what `solve load` gives.
type SolvedLoad struct {
	Spec     LoadSpec
	File     string
	Native   support.State
	Answer   *support.Answer // nil where no posing was asked for
	Warnings []data.Warning
}

// SolveLoad evaluates a spec. file is its name, for errors; read gives the bytes
// of the inflow file by the name that the spec gives it.
func SolveLoad(file string, spec LoadSpec, read func(string) ([]byte, error)) (SolvedLoad, error) {
	out := SolvedLoad{Spec: spec, File: file}
	load, err := spec.Load(file)
	if err != nil {
		return out, err
	}
	if spec.Inflow == "" {
		return out, &data.FileError{File: file, What: "inflow is missing", Hint: "name a file with the columns time_s,flow_mL_s"}
	}
	content, err := read(spec.Inflow)
	if err != nil {
		return out, err
	}
	flow, err := ReadPeriod(spec.Inflow, content)
	if err != nil {
		return out, err
	}
	out.Native = support.Native(load, flow, spec.Pv)
	out.Warnings = out.Native.Warnings
	if spec.Posing == "" {
		if len(spec.Shares) > 0 {
			return out, &data.FileError{File: file, What: "shares without a posing", Hint: `add posing = "late-valve"`}
		}
		return out, nil
	}
	wanted := spec.Shares
	if len(wanted) == 0 {
		wanted = standardShares()
	}
	answer, err := support.Pose(load, flow, spec.Pv, support.Posing(spec.Posing), wanted)
	if err != nil {
		return out, &data.FileError{File: file, What: err.Error()}
	}
	out.Answer = &answer
	out.Warnings = answer.Warnings()
	return out, nil
}

// Reason is nil: a load that could be evaluated has an answer.
func (s SolvedLoad) Reason() *string { return nil }

// Report is what --json prints.
func (s SolvedLoad) Report() LoadReport {
	r := LoadReport{Head: head(), LoadState: loadState(s.Native), Warnings: warningReports(s.Warnings)}
	if s.Answer == nil {
		return r
	}
	r.Posing = &s.Answer.Posing
	for i, state := range s.Answer.Supported {
		share := LoadShare{Share: Number(state.Share), ByConstruction: state.ByConstruction, LoadState: loadState(state)}
		share.RetainedPulse.Pressure = Number(s.Answer.Comparisons[i].RetainedPressure.Value)
		share.RetainedPulse.Flow = Number(s.Answer.Comparisons[i].RetainedFlow.Value)
		r.States = append(r.States, share)
	}
	return r
}

func loadState(s support.State) LoadState {
	return LoadState{
		Pressure: numbers(s.Pressure.Samples),
		Mean:     Number(s.MeanPressure.Value), Min: Number(s.MinPressure.Value), Max: Number(s.MaxPressure.Value),
		PulsePressure: Number(s.PulsePressure.Value), EEP: Number(s.EEP.Value), SHE: Number(s.SHE.Value),
		Energy: LoadPower{Number(s.Power.Input), Number(s.Power.Steady), Number(s.Power.Pulsatile)},
	}
}

func numbers(values []float64) []Number {
	out := make([]Number, len(values))
	for i, v := range values {
		out[i] = Number(v)
	}
	return out
}

// Note is the same for a person to read.
func (s SolvedLoad) Note() casenote.Note {
	n := casenote.Note{
		Program: "afterbeat", Version: Version, Title: data.Clean("Lumped load of " + baseName(s.File)),
		Warnings: s.Warnings, Reproduce: []string{"afterbeat", "solve", "load", baseName(s.File)}, Beside: "spec",
	}
	n.Sections = append(n.Sections, s.givenSection(), solvedSection(s.Native))
	if s.Answer != nil {
		n.Sections = append(n.Sections, s.Answer.StateSection(), s.Answer.ComparisonSection(), s.Answer.PowerSection())
	}
	return n
}

// givenSection lists what the spec gives.
func (s SolvedLoad) givenSection() casenote.Section {
	section := casenote.Section{Title: "Given", Rows: []casenote.Row{
		casenote.Words("model", s.Spec.Model),
		casenote.Words("inflow", baseName(s.Spec.Inflow)),
	}}
	for _, p := range []struct {
		name, unit string
		value      *float64
	}{{"R", "mmHg s/mL", s.Spec.R}, {"C", "mL/mmHg", s.Spec.C}, {"Zc", "mmHg s/mL", s.Spec.Zc}, {"L", "mmHg s2/mL", s.Spec.L}, {"Pv", "mmHg", &s.Spec.Pv}} {
		if p.value != nil {
			section.Rows = append(section.Rows, casenote.Quantity(p.name, data.Exact(*p.value), p.unit, data.Assumed))
		}
	}
	return section
}

// solvedSection gives the pressure that the load answers with.
func solvedSection(s support.State) casenote.Section {
	exact := func(label string, v float64, unit string) casenote.Row {
		return casenote.Quantity(label, data.Exact(v), unit, data.Estimated)
	}
	return casenote.Section{
		Title: "Pressure",
		Words: []data.Text{data.Clean("Computed from what is given, so that no number has an interval.")},
		Rows: []casenote.Row{
			exact("mean", s.MeanPressure.Value, "mmHg"),
			exact("min", s.MinPressure.Value, "mmHg"),
			exact("max", s.MaxPressure.Value, "mmHg"),
			exact("pulse pressure", s.PulsePressure.Value, "mmHg"),
			exact("energy-equivalent pressure", s.EEP.Value, "mmHg"),
			exact("surplus energy", s.SHE.Value, "erg/cm3"),
		},
	}
}
