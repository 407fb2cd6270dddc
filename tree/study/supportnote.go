package study

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/data/unit"
	"afterbeat/tree/heart"
	"afterbeat/tree/support"
)

// Note is the same for a person to read.
func (s SolvedSupport) Note() casenote.Note {
	n := casenote.Note{
		Program: "afterbeat", Version: Version, Title: data.Clean("Coupled state of " + baseName(s.File)),
		Warnings: s.Warnings, Reproduce: []string{"afterbeat", "solve", "support", baseName(s.File)}, Beside: "spec",
		Sections: []casenote.Section{s.givenSection()},
	}
	if len(s.States) > 0 {
		n.Sections = append(n.Sections, s.statesSection(), s.energySection())
	}
	if s.Step != nil {
		n.Sections = append(n.Sections, s.stepSection())
	}
	if s.Modular != nil {
		n.Sections = append(n.Sections, s.modulatedSection())
	}
	return n
}

// givenSection lists what the spec gives, and says what is held.
func (s SolvedSupport) givenSection() casenote.Section {
	v, l, p, f := s.Coupling.Ventricle, s.Coupling.Load, s.Coupling.Pump, s.Coupling.Filling
	section := casenote.Section{
		Title: "Given",
		Words: []data.Text{
			data.Clean("Ventricle, load and pump as given, in their periodic state; what is given is the same at every speed. A forecast only as far as what is given is that of a patient."),
			data.Clean("Not modelled: reflexes and autoregulation (resistance may change by 20 % either way), the right heart, the site of the graft."),
		},
		Rows: []casenote.Row{casenote.Words("activation", string(v.Activation)), s.loadRow()},
	}
	add := func(name string, value float64, unit string) {
		section.Rows = append(section.Rows, casenote.Quantity(name, data.Exact(value), unit, data.Assumed))
	}
	add("period", v.Period, "s")
	if v.Activation == heart.Cosine {
		add("Tes", v.Tes, "s")
		add("Tr", v.Tr, "s")
	}
	add("Emax", v.Emax, "mmHg/mL")
	add("Emin", v.Emin, "mmHg/mL")
	add("V0", v.V0, "mL")
	add("Rmv", v.Rmv, "mmHg s/mL")
	add("Rav", v.Rav, "mmHg s/mL")
	if v.Rar > 0 {
		add("Rar, backwards", v.Rar, "mmHg s/mL")
	}
	add("Pfill", f.Pressure, "mmHg")
	add("filling slope", f.Slope, "mmHg s/mL")
	if f.Slope > 0 {
		add("filling flow", f.Flow, "mL/s")
	}
	if s.Spec.Tree != "" {
		add("tree's resistance", l.R+l.Zc, "mmHg s/mL")
		add("tree's compliance", l.C, "mL/mmHg")
		add("rho c/A of its root", l.Zc, "mmHg s/mL")
	} else {
		for _, name := range l.Kind.Symbols() {
			add(name, l.Of(name), symbolUnit(name))
		}
	}
	add("Pv", l.OutflowPressure, "mmHg")
	if s.Spec.Pump != nil {
		add("pump a", p.A, "mmHg min2/10^6")
		add("pump b", p.B, "mmHg s min/(mL 1000)")
		add("pump c", p.C, "mmHg s2/mL2")
		add("pump Rc", p.Resistance, "mmHg s/mL")
		add("pump Lc", p.Inertance, "mmHg s2/mL")
		section.Rows = append(section.Rows, casenote.Words("pump draws from", s.Coupling.Inlet.String()))
	}
	return section
}

func symbolUnit(name string) string {
	switch name {
	case "C":
		return "mL/mmHg"
	case "L":
		return "mmHg s2/mL"
	}
	return "mmHg s/mL"
}

// statesSection has three tables with a row a speed.
func (s SolvedSupport) statesSection() casenote.Section {
	flows := []speedColumn{
		{"systemic flow mean, mL/s", func(c support.CoupledState) float64 { return c.Flow() }},
		{"back through the aortic valve, mL/s", func(c support.CoupledState) float64 { return c.Loop }},
	}
	section := casenote.Section{
		Title: "Periodic state at each speed",
		Words: []data.Text{data.Clean("Computed from what is given, so that no number has an interval. At speed 0 there is no pump. Minimum and maximum are those of the continuous beat.")},
		Tables: []casenote.Table{
			s.speedTable("speed, 1000/min", []speedColumn{
				{"arterial mean, mmHg", func(c support.CoupledState) float64 { return c.Arterial.Mean }},
				{"min, mmHg", func(c support.CoupledState) float64 { return c.Arterial.Min }},
				{"max, mmHg", func(c support.CoupledState) float64 { return c.Arterial.Max }},
				{"pulse pressure, mmHg", func(c support.CoupledState) float64 { return c.PulsePressure() }},
				{"EEP, mmHg", func(c support.CoupledState) float64 { return c.EEP }},
				{"SHE, erg/cm3", func(c support.CoupledState) float64 { return c.SHE }},
			}),
			s.speedTable("speed, 1000/min", []speedColumn{
				{"pump flow mean, mL/s", func(c support.CoupledState) float64 { return c.PumpFlow.Mean }},
				{"min, mL/s", func(c support.CoupledState) float64 { return c.PumpFlow.Min }},
				{"max, mL/s", func(c support.CoupledState) float64 { return c.PumpFlow.Max }},
				{"valve flow mean, mL/s", func(c support.CoupledState) float64 { return c.ValveFlow.Mean }},
				{"valve open, s", func(c support.CoupledState) float64 { return c.ValveOpen }},
			}),
			s.speedTable("speed, 1000/min", []speedColumn{
				{"filling pressure, mmHg", func(c support.CoupledState) float64 { return c.Filling }},
				{"volume min, mL", func(c support.CoupledState) float64 { return c.Volume.Min }},
				{"volume max, mL", func(c support.CoupledState) float64 { return c.Volume.Max }},
				{"stroke work, mJ", func(c support.CoupledState) float64 { return c.StrokeWork * unit.MilliwattPerMmHgMLPerS }},
			}),
		},
	}
	if s.Coupling.Ventricle.Rar > 0 {
		section.Words = append(section.Words, data.Clean("The aortic valve leaks: what runs back goes round through ventricle and pump and does not reach the body, so that the pump's flow is not the systemic flow."))
		section.Tables = append(section.Tables, s.speedTable("speed, 1000/min", flows))
	}
	return section
}

// energySection has the mean power of sources and of arterial sinks.
func (s SolvedSupport) energySection() casenote.Section {
	power := func(of func(support.CoupledEnergy) float64) func(support.CoupledState) float64 {
		return func(c support.CoupledState) float64 {
			return of(c.Energy) / s.Coupling.Ventricle.Period * unit.MilliwattPerMmHgMLPerS
		}
	}
	return casenote.Section{
		Title: "Power, mean over the beat",
		Words: []data.Text{data.Clean("What filling, ventricle and pump give to the blood, and where it goes. The power that the pump's motor takes is more, and is not known here. What is booked in Zc, or in R1 of a terminal, is absorbed by waves that travel on, and is no loss in blood.")},
		Tables: []casenote.Table{
			s.speedTable("speed, 1000/min", []speedColumn{
				{"from filling, mW", power(func(e support.CoupledEnergy) float64 { return e.Filling })},
				{"from ventricle, mW", power(func(e support.CoupledEnergy) float64 { return e.Ventricle })},
				{"from pump, mW", power(func(e support.CoupledEnergy) float64 { return e.Pump })},
			}),
			s.speedTable("speed, 1000/min", s.sinkColumns(power)),
		},
	}
}

// sinkColumns is where energy goes, mW; power makes a column of an energy.
func (s SolvedSupport) sinkColumns(power func(func(support.CoupledEnergy) float64) func(support.CoupledState) float64) []speedColumn {
	columns := []speedColumn{
		{"valves, mW", power(func(e support.CoupledEnergy) float64 { return e.Mitral + e.Aortic })},
		{"cannulas, mW", power(func(e support.CoupledEnergy) float64 { return e.Cannula })},
	}
	if s.Spec.Tree != "" {
		columns = append(columns,
			speedColumn{"segments, mW", power(func(e support.CoupledEnergy) float64 { return e.Segments })},
			speedColumn{"terminal R1, mW", power(func(e support.CoupledEnergy) float64 { return e.TerminalR1 })},
			speedColumn{"terminal R2, mW", power(func(e support.CoupledEnergy) float64 { return e.TerminalR2 })})
	} else {
		columns = append(columns,
			speedColumn{"Zc, mW", power(func(e support.CoupledEnergy) float64 { return e.Zc })},
			speedColumn{"R, mW", power(func(e support.CoupledEnergy) float64 { return e.R })})
	}
	return append(columns, speedColumn{"outflow, mW", power(func(e support.CoupledEnergy) float64 { return e.Outflow })})
}

// loadRow names the load.
func (s SolvedSupport) loadRow() casenote.Row {
	if s.Spec.Tree != "" {
		return casenote.Words("tree", baseName(s.Spec.Tree))
	}
	return casenote.Words("load", string(s.Coupling.Load.Kind))
}

// speedColumn is a column of a table with a row a speed.
type speedColumn struct {
	header string
	of     func(support.CoupledState) float64
}

func (s SolvedSupport) speedTable(first string, columns []speedColumn) casenote.Table {
	t := casenote.Table{Header: []string{first}}
	for _, c := range columns {
		t.Header = append(t.Header, c.header)
	}
	for _, state := range s.States {
		cells := []casenote.Cell{exactCell(state.Speed)}
		for _, c := range columns {
			cells = append(cells, exactCell(c.of(state)))
		}
		t.Rows = append(t.Rows, cells)
	}
	return t
}

// exactCell is a number without doubt; what lies below the accuracy of the
// solver is nothing.
func exactCell(v float64) casenote.Cell {
	if math.Abs(v) < 1e-6 {
		v = 0
	}
	return casenote.Cell{Number: &casenote.Number{Estimate: data.Exact(v), Origin: data.Estimated}}
}

// stepSection has a row for the first beats and for every fifth after.
func (s SolvedSupport) stepSection() casenote.Section {
	t := casenote.Table{Header: []string{"end of beat, s", "arterial mean, mmHg", "total flow, mL/s", "filling pressure, mmHg"}}
	for i := range s.Step.BeatEnd {
		if i >= 5 && (i+1)%5 != 0 {
			continue
		}
		t.Rows = append(t.Rows, []casenote.Cell{
			exactCell(s.Step.BeatEnd[i]), exactCell(s.Step.Arterial[i]), exactCell(s.Step.Flow[i]), exactCell(s.Step.Filling[i]),
		})
	}
	return casenote.Section{
		Title: fmt.Sprintf("Step of speed from %.4g to %.4g, 1000/min", s.Step.From, s.Step.To),
		Words: []data.Text{data.Clean(fmt.Sprintf(
			"Beat means; the step falls at the start of a beat. Filling pressure follows its line with a lag of %.3g s, an assumption.", s.Coupling.FillingLag))},
		Tables: []casenote.Table{t},
	}
}

func (s SolvedSupport) modulatedSection() casenote.Section {
	m := s.Modular
	exact := func(label string, v float64, unit string) casenote.Row {
		return casenote.Quantity(label, data.Exact(v), unit, data.Estimated)
	}
	how := "free, over a long window"
	if locked := *s.Spec.Locked; locked > 0 {
		how = fmt.Sprintf("locked, one period in %d beats", locked)
	}
	return casenote.Section{
		Title: "Modulated speed",
		Rows: []casenote.Row{
			casenote.Words("modulation", baseName(s.Spec.Modulation)+": "+how),
			exact("window", m.Window, "s"),
			exact("arterial mean", m.Arterial.Mean, "mmHg"),
			exact("arterial min", m.Arterial.Min, "mmHg"),
			exact("arterial max", m.Arterial.Max, "mmHg"),
			exact("pulse pressure of the window", m.PulsePressure, "mmHg"),
			exact("pulse pressure, mean of beats", m.PulsePressureBeatMean, "mmHg"),
			exact("pump flow mean", m.PumpFlow.Mean, "mL/s"),
			exact("pump flow min", m.PumpFlow.Min, "mL/s"),
			exact("pump flow max", m.PumpFlow.Max, "mL/s"),
			exact("filling pressure", m.Filling, "mmHg"),
			exact("energy-equivalent pressure", m.EEP, "mmHg"),
			exact("surplus energy", m.SHE, "erg/cm3"),
		},
	}
}
