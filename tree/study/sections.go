package study

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/casenote"
)

// checkSections describe the pulse of every channel that can have one.
func (b Beats) checkSections() []casenote.Section {
	var out []casenote.Section
	for i, ch := range b.Intake.Channels {
		if pulsatile(ch.Quantity) {
			out = append(out, b.Pulses[i].Section(ch.Name, unitOfValues(ch)))
		}
	}
	return out
}

// sections describe the beats that a study uses: those of the chosen channels,
// what was thrown away and why, and the average beat.
func (b Beats) sections() []casenote.Section {
	var out []casenote.Section
	for _, i := range b.chosen() {
		ch := b.Intake.Channels[i]
		out = append(out, b.Pulses[i].Section(ch.Name, unitOfValues(ch)))
	}
	if b.FlowInfo.Conversion != nil {
		out = append(out, b.FlowInfo.Conversion.Section(b.FlowInfo.ConversionErrors))
	}
	if b.Reason != "" {
		return append(out, casenote.Section{Title: "Average beat", Chief: true, Words: []data.Text{data.Clean("There is none: " + b.Reason + ".")}})
	}
	return append(out, b.averageSection())
}

// sections describe every fit, the estimators beside them, what the assumptions
// do, and the recommendation.
func (f Fit) sections() []casenote.Section {
	if f.Reason != "" {
		return []casenote.Section{{Title: "Fit", Chief: true, Words: []data.Text{data.Clean("There is none: " + f.Reason + ".")}}}
	}
	settings, _ := fitSettings(f.Beats.Intake.Case) // checked before the fit
	settings = settings.WithDefaults()
	out := []casenote.Section{f.Beats.assumptionSection(int(settings.Seed), settings.Replicates)}
	out = append(out, f.rowSection())
	for _, r := range f.Results {
		if r.Basis == f.Results[len(f.Results)-1].Basis { // the table has those of the average beat beside
			out = append(out, r.Section())
		}
	}
	if len(f.Results) > 0 {
		out = append(out, f.choiceSection())
	}
	if len(f.Sensitivity) > 0 {
		out = append(out, f.sensitivitySection())
	}
	if len(f.Estimators) > 0 {
		out = append(out, f.estimatorSection())
	}
	if f.Delay != nil {
		out = append(out, f.delaySection())
	}
	if f.Impedance != nil {
		out = append(out, f.impedanceSection())
	}
	return out
}

// choiceSection names the fit that goes downstream, and the recommended one.
func (f Fit) choiceSection() casenote.Section {
	s := casenote.Section{Title: "Which model", Tables: []casenote.Table{f.modelTable()}}
	if f.Recommended.Model == "" {
		s.Rows = append(s.Rows, casenote.Words("recommended", "none: "+f.Recommended.Why))
	} else {
		s.Rows = append(s.Rows, casenote.Words("recommended", f.Recommended.Model+", basis "+f.Recommended.Basis+": "+f.Recommended.Why))
	}
	if f.Chosen >= 0 {
		by := "as recommended"
		if f.named() {
			by = "by the person"
		}
		if f.BasisMissed() {
			by += "; the basis chosen was not fitted"
		}
		s.Rows = append(s.Rows, casenote.Words("used below", f.Results[f.Chosen].Model.Name+", basis "+f.Results[f.Chosen].Basis+", "+by))
	}
	return s
}

func (f Fit) modelTable() casenote.Table {
	names := f.Results[len(f.Results)-1].Model.Parameters()
	t := casenote.Table{Header: []string{"model", "basis"}}
	for _, p := range names {
		t.Header = append(t.Header, p.Name+", "+f.unitOf(p.Name))
	}
	t.Header = append(t.Header, "rms, mmHg", "AICc", "BIC")
	for _, r := range f.Results {
		if math.IsNaN(r.AICc) {
			t.Foot = "AICc and BIC undefined: " + r.CriterionReason + "."
		}
		row := []casenote.Cell{{Words: data.Clean(r.Model.Name)}, {Words: data.Clean(r.Basis)}}
		for _, s := range names {
			p, ok := r.Parameter(s.Name)
			switch {
			case !ok:
				row = append(row, casenote.Cell{Words: data.Clean("-")})
			case !p.Identified:
				row = append(row, casenote.Cell{Words: data.Clean("not id.")})
			default:
				row = append(row, casenote.Cell{Number: &casenote.Number{Estimate: p.Estimate, Origin: data.Estimated}})
			}
		}
		t.Rows = append(t.Rows, append(row, plain(r.RMSE), plain(r.AICc), plain(r.BIC)))
	}
	return t
}

// sensitivitySection says what one assumption at a time does to the fit used.
func (f Fit) sensitivitySection() casenote.Section {
	t := casenote.Table{Header: []string{"assumption", "change"}}
	parameters := f.Results[f.Chosen].Model.Parameters()
	for _, p := range parameters {
		t.Header = append(t.Header, p.Name+", %")
	}
	for _, s := range f.Sensitivity {
		row := []casenote.Cell{{Words: data.Clean(s.Assumption)}, {Words: data.Clean(s.Change)}}
		for _, p := range parameters {
			row = append(row, plain(s.Percent.Of(p.Name)))
		}
		t.Rows = append(t.Rows, row)
	}
	return casenote.Section{
		Title:  "What one assumption does",
		Words:  []data.Text{data.Clean("Change of the fit used, when one assumption is moved and all others stay.")},
		Tables: []casenote.Table{t},
	}
}

// unitOf is the unit of a parameter of the fits.
func (f Fit) unitOf(parameter string) string {
	for _, r := range f.Results {
		if p, ok := r.Parameter(parameter); ok {
			return p.Unit
		}
	}
	if f.Beats.FlowInfo.PerArea {
		return map[string]string{"R": "mmHg s/cm", "C": "cm/mmHg"}[parameter]
	}
	return map[string]string{"R": "mmHg s/mL", "C": "mL/mmHg"}[parameter]
}

// plain is a cell of a number that carries no interval of its own.
func plain(v float64) casenote.Cell {
	e := data.Estimate{Value: v, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true}
	return casenote.Cell{Number: &casenote.Number{Estimate: e, Origin: data.Estimated}}
}

// sections set the native state beside the supported ones; of what is held, only
// where no forecast says it for both.
func (c Comparison) sections(f *Forecast) []casenote.Section {
	if c.Reason != "" {
		return []casenote.Section{{
			Title: "Native against supported",
			Chief: true,
			Words: []data.Text{data.Clean(fmt.Sprintf("There is no comparison: %s.", c.Reason))},
		}}
	}
	var out []casenote.Section
	for _, a := range c.Answers {
		out = append(out, a.Sections()...)
	}
	if f != nil && f.Reason == "" {
		return append(out, f.heldSection())
	}
	return append(out, c.Answers[0].HeldSection())
}
