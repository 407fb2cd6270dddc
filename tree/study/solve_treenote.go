package study

import (
	"fmt"
	"math"
	"math/cmplx"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/data/unit"
	"afterbeat/tree"
)

// longTable is the number of segments that a note lists; --json has them all.
const longTable = 200

// Note is the same for a person to read.
func (s SolvedTree) Note() casenote.Note {
	n := casenote.Note{
		Program: "afterbeat", Version: Version, Title: data.Clean("Tree of arteries of " + baseName(s.File)),
		Warnings: s.Warnings, Reproduce: []string{"afterbeat", "solve", "tree", baseName(s.File)}, Beside: "spec",
		Sections: []casenote.Section{s.givenSection(), s.rootSection(), s.wavesSection(), s.powerSection(), s.wallSection()},
	}
	if s.Response != nil {
		n.Sections = append(n.Sections,
			s.responseSection("Response to a step of flow at the root", "1 mL/s from rest.", s.Response.FlowStep),
			s.responseSection("Response to a step of pressure at the root", "1 mmHg from rest.", s.Response.PressureStep))
	}
	return n
}

// givenSection lists what the spec gives.
func (s SolvedTree) givenSection() casenote.Section {
	line := s.Network.Line
	if line == "" {
		line = tree.Womersley
	}
	section := casenote.Section{Title: "Given", Rows: []casenote.Row{
		casenote.Words("table", baseName(s.Spec.Table)),
		casenote.Words("inflow", baseName(s.Spec.Inflow)),
		casenote.Words("line", string(line)),
	}}
	for _, v := range []struct {
		name  string
		value float64
		unit  string
	}{
		{"density", s.Network.Blood.Density, "g/mL"},
		{"viscosity", s.Network.Blood.Viscosity, "poise"},
		{"outflow pressure", s.Network.OutflowPressure, "mmHg"},
		{"wall time constant", s.Network.WallTau, "s"},
		{"mean flow", s.Inflow.Mean(), "mL/s"},
		{"period", s.Inflow.Duration(), "s"},
		{"harmonics", float64(s.Harmonics), ""},
	} {
		section.Rows = append(section.Rows, casenote.Quantity(v.name, data.Exact(v.value), v.unit, data.Assumed))
	}
	return section
}

// rootSection is the tree as a load at its root.
func (s SolvedTree) rootSection() casenote.Section {
	row := func(label string, v float64, unit string) casenote.Row {
		return casenote.Quantity(label, exactOrWhy(v, "every way is closed"), unit, data.Estimated)
	}
	section := casenote.Section{
		Title: "Load at the root",
		Words: []data.Text{data.Clean("Computed from what is given, so that no number has an interval.")},
		Rows: []casenote.Row{
			row("resistance", s.Resistance, "mmHg s/mL"),
			row("compliance", s.Compliance, "mL/mmHg"),
		},
	}
	t := casenote.Table{Header: []string{"frequency, Hz", "modulus of impedance, mmHg s/mL", "phase, deg"}}
	for k := range min(10, len(s.Impedance)) {
		z := s.Impedance[k]
		t.Rows = append(t.Rows, []casenote.Cell{exactCell(s.Frequency[k]), exactCell(cmplx.Abs(z)), exactCell(cmplx.Phase(z) * 180 / math.Pi)})
	}
	if len(t.Rows) > 0 {
		section.Tables = []casenote.Table{t}
	}
	return section
}

// exactOrWhy is a number without doubt, or the reason why there is none.
func exactOrWhy(v float64, why string) data.Estimate {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return data.Estimate{Value: math.NaN(), Why: why}
	}
	return data.Exact(v)
}

// segmentColumn is a column of a table with a row a segment.
type segmentColumn struct {
	header string
	of     func(i int) float64
}

func (s SolvedTree) segmentTable(columns ...segmentColumn) casenote.Table {
	t := casenote.Table{Header: []string{"id", "name"}}
	for _, c := range columns {
		t.Header = append(t.Header, c.header)
	}
	for i, segment := range s.Network.Segments {
		if i == longTable {
			t.Foot = fmt.Sprintf("%d further segments: --json has them.", len(s.Network.Segments)-longTable)
			break
		}
		cells := []casenote.Cell{{Words: data.Clean(segment.ID).Cut(8)}, {Words: data.Clean(segment.Name).Cut(18)}}
		for _, c := range columns {
			cells = append(cells, roundCell(c.of(i)))
		}
		t.Rows = append(t.Rows, cells)
	}
	return t
}

// roundCell is a computed number to five digits, for tables of many.
func roundCell(v float64) casenote.Cell {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return casenote.Cell{Words: data.Clean("undefined")}
	}
	if v != 0 {
		digits := math.Pow10(4 - int(math.Floor(math.Log10(math.Abs(v)))))
		v = math.Round(v*digits) / digits
	}
	return exactCell(v)
}

func (s SolvedTree) wavesSection() casenote.Section {
	at := func(i int) *SegmentState { return &s.Pulsing.Segments[i] }
	section := casenote.Section{
		Title: "Pressure and flow at the inlet of each segment",
		Words: []data.Text{data.Clean("Pulse is the greatest less the least sample.")},
		Tables: []casenote.Table{s.segmentTable(
			segmentColumn{"pressure mean, mmHg", func(i int) float64 { return at(i).InletPressure.Mean }},
			segmentColumn{"pulse, mmHg", func(i int) float64 { return at(i).InletPressure.Pulse }},
			segmentColumn{"flow mean, mL/s", func(i int) float64 { return at(i).InletFlow.Mean }},
			segmentColumn{"pulse, mL/s", func(i int) float64 { return at(i).InletFlow.Pulse }},
		)},
	}
	if math.IsInf(s.Resistance, 1) {
		section.Words = append(section.Words, data.Clean("Every way out is closed, so that mean pressure has no value."))
	}
	return section
}

// powerSection is the ledger, with that of steady flow beside it where asked for.
func (s SolvedTree) powerSection() casenote.Section {
	section := casenote.Section{
		Title: "Power, mean over the beat",
		Words: []data.Text{data.Clean("What flows into the root, and where it goes: lost in the segments, absorbed in R1 of the terminals, lost in R2, passed on against the outflow pressure. Of the arterial side only: what drives the flow spends more.")},
	}
	section.Tables = append(section.Tables, powerTable("pulsating flow", s.Pulsing))
	if s.Steady != nil {
		section.Tables = append(section.Tables, powerTable("the same mean flow, steady", *s.Steady))
	}
	if b := s.Pulsing.Ledger.Balance(); !math.IsNaN(b) {
		section.Rows = append(section.Rows, casenote.Words("balance", fmt.Sprintf("%.1g of the input is unaccounted for", math.Abs(b))))
	}
	return section
}

func powerTable(title string, state TreeState) casenote.Table {
	t := casenote.Table{Header: []string{title, "steady part, mW", "pulsatile part, mW"}}
	add := func(name string, steady, pulsatile float64) {
		t.Rows = append(t.Rows, []casenote.Cell{
			{Words: data.Clean(name)}, roundCell(steady * unit.MilliwattPerMmHgMLPerS), roundCell(pulsatile * unit.MilliwattPerMmHgMLPerS),
		})
	}
	add("input", state.Power.Steady, state.Power.Pulsatile)
	for _, term := range state.Ledger.Terms {
		add(term.Name, term.Steady, term.Pulsatile)
	}
	return t
}

func (s SolvedTree) wallSection() casenote.Section {
	at := func(i int) *SegmentState { return &s.Pulsing.Segments[i] }
	return casenote.Section{
		Title: "Loss and wall shear stress of each segment",
		Words: []data.Text{data.Clean("Shear stress at the inlet, from Womersley's profile. The oscillatory index is 0 where the stress never turns, 0.5 where it has no mean.")},
		Tables: []casenote.Table{s.segmentTable(
			segmentColumn{"loss, mW", func(i int) float64 { return at(i).Loss.Total() * unit.MilliwattPerMmHgMLPerS }},
			segmentColumn{"shear mean, dyn/cm2", func(i int) float64 { return at(i).Shear.Mean }},
			segmentColumn{"amplitude, dyn/cm2", func(i int) float64 { return at(i).Shear.Amplitude }},
			segmentColumn{"index", func(i int) float64 { return at(i).Shear.Oscillatory }},
		)},
	}
}

// responseSection has a row a bed.
func (s SolvedTree) responseSection(title, step string, beds []tree.BedResponse) casenote.Section {
	t := casenote.Table{Header: []string{"id", "name", "final, mL/s", "t10, s", "t50, s", "t90, s"}}
	for i, b := range beds {
		if i == longTable {
			t.Foot = fmt.Sprintf("%d further beds: --json has them.", len(beds)-longTable)
			break
		}
		segment := s.Network.Segments[b.Segment]
		t.Rows = append(t.Rows, []casenote.Cell{
			{Words: data.Clean(segment.ID).Cut(8)},
			{Words: data.Clean(segment.Name).Cut(18)},
			roundCell(b.Outflow.Final), roundCell(b.Outflow.T10), roundCell(b.Outflow.T50), roundCell(b.Outflow.T90),
		})
	}
	return casenote.Section{
		Title:  title,
		Words:  []data.Text{data.Clean(step + " First times at which the outflow of each bed passes 10, 50 and 90 % of its final change, with the outflow pressure taken as 0. A property of the tree alone, the same natively and on support.")},
		Tables: []casenote.Table{t},
	}
}
