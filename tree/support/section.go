package support

import (
	"fmt"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/data/unit"
)

// Sections describe the answer for a note: states, what is retained, and power in
// one; of an identity no more than the rule, since its numbers follow from it.
// What is held equal, the same for every posing, is [Answer.HeldSection].
func (a Answer) Sections() []casenote.Section {
	if a.Posing.ByConstruction() {
		return []casenote.Section{{Title: fmt.Sprintf("By construction: %s", a.Posing), Words: texts(a.Posing.words())}}
	}
	return []casenote.Section{a.thinned().wholeSection()}
}

// mostRows is how many shares a table of a note has at most.
const mostRows = 7

// thinned has every second share and the half of them, where there are many.
func (a Answer) thinned() Answer {
	if len(a.Supported) <= mostRows {
		return a
	}
	var supported []State
	var comparisons []Comparison
	for i, s := range a.Supported {
		if i%2 == 0 || s.Share == 0.5 {
			supported, comparisons = append(supported, s), append(comparisons, a.Comparisons[i])
		}
	}
	a.Supported, a.Comparisons = supported, comparisons
	return a
}

// wholeSection has all of a yardstick. What is the same in all states is a row.
func (a Answer) wholeSection() casenote.Section {
	u := a.units()
	milliwatt := func(e data.Estimate) data.Estimate { return times(e, unit.MilliwattPerMmHgMLPerS) }
	mine := func(of func(*Figures) data.Estimate) func(i int) data.Estimate {
		return func(i int) data.Estimate {
			if i < 0 {
				return of(&a.Native.Figures)
			}
			return of(&a.Supported[i].Figures)
		}
	}
	retained := func(r ratio) func(i int) data.Estimate {
		return func(i int) data.Estimate {
			if i < 0 {
				return data.Exact(1)
			}
			return *a.Comparisons[i].fields()[r]
		}
	}
	return casenote.Section{
		Title: fmt.Sprintf("Yardstick: native and supported state, %s", a.Posing),
		Words: texts(a.Posing.words(), "Retained is supported over native. Power is that of the arterial side, mean over the beat: power in is the steady part, the same in all states, and the pulsatile part. "+a.Native.pulsatileWords()),
		Rows: []casenote.Row{
			casenote.Quantity("mean pressure, all states", a.Native.MeanPressure, "mmHg", data.Estimated),
			casenote.Quantity("steady power, all states", milliwatt(a.Native.SteadyPower), u.power, data.Estimated),
		},
		Tables: []casenote.Table{
			a.shareTable(
				shareColumn{"pulse pressure, mmHg", mine(func(f *Figures) data.Estimate { return f.PulsePressure })},
				shareColumn{"retained pulse of pressure", retained(retainedPressure)},
				shareColumn{"energy-equivalent pressure, mmHg", mine(func(f *Figures) data.Estimate { return f.EEP })},
			),
			a.shareTable(
				shareColumn{"swing of root flow, " + u.flow, mine(func(f *Figures) data.Estimate { return f.FlowSwing })},
				shareColumn{"retained swing of root flow", retained(retainedFlow)},
				shareColumn{"Gosling PI, flow", mine(func(f *Figures) data.Estimate { return f.FlowPI })},
			),
			a.shareTable(
				shareColumn{"surplus energy, erg/cm3", mine(func(f *Figures) data.Estimate { return f.SHE })},
				shareColumn{"pulsatile part of power, " + u.power, mine(func(f *Figures) data.Estimate { return milliwatt(f.PulsatilePower) })},
			),
		},
	}
}

// shareColumn is a column of a table of shares; i is -1 for the native state.
type shareColumn struct {
	header string
	of     func(i int) data.Estimate
}

// shareTable has a row for the native state and one a supported state.
func (a Answer) shareTable(columns ...shareColumn) casenote.Table {
	t := casenote.Table{Header: []string{"share of pump"}}
	for _, c := range columns {
		t.Header = append(t.Header, c.header)
	}
	for i := -1; i < len(a.Supported); i++ {
		name := "native"
		if i >= 0 {
			if a.Supported[i].Share == 0 { // the native state again
				continue
			}
			name = shareName(a.Supported[i].Share)
		}
		cells := []casenote.Cell{{Words: data.Clean(name)}}
		for _, c := range columns {
			cells = append(cells, estimated(c.of(i)))
		}
		t.Rows = append(t.Rows, cells)
	}
	return t
}

// HeldSection says what is the same in all states, and what is not modelled.
func (a Answer) HeldSection() casenote.Section {
	s := casenote.Section{Title: "Held equal, natively and on support", Words: texts(
		"Between the states only the shape of the flow changes. Mean pressure follows from what is held, and is the same. The doubt of what is held stands with the fit.",
		"Not modelled: reflexes and autoregulation (resistance, and with it the pressure above outflow, may change by 20 % either way), the right heart, the site of the graft. "+
			"Real implants change everything at once: in 8 patients measured before and after, mean pressure rose by 16 mmHg, pulse pressure fell by 25 mmHg and output rose by 1.3 L/min (Eur J Heart Fail 2021;23:1955).",
	)}
	for _, h := range a.Held() {
		e := data.Estimate{Value: h.Value, Total: data.NoInterval(), Random: data.NoInterval(), Identified: true, Why: "held"}
		s.Rows = append(s.Rows, casenote.Quantity(h.Quantity, e, h.Unit, h.Origin))
	}
	return s
}

// words say what a posing is, and what it may claim.
func (p Posing) words() string {
	if p.ByConstruction() {
		return "Posing scaled: the native flow times 1-s, and a steady flow of s times its mean. On any linear load retained pulse is then 1-s, and retained surplus energy and pulsatile power (1-s)^2, by construction: an identity and a yardstick, never a forecast. At s = 0.5 half of the pulse is left, and a quarter of the surplus energy and of the pulsatile power."
	}
	return "Posing late-valve: what the native flow has above a threshold is ejected, the pump is steady, mean flow is kept; the valve opens later and closes earlier. No ventricle answers to the load: a yardstick, and no forecast of a ventricle and a pump."
}

// StateSection sets the native state beside the supported ones.
func (a Answer) StateSection() casenote.Section {
	u := a.units()
	return casenote.Section{
		Title: fmt.Sprintf("Native and supported state, %s", a.Posing),
		Words: texts(a.Posing.words()),
		Rows: []casenote.Row{
			casenote.Quantity("mean pressure, all states", a.Native.MeanPressure, "mmHg", data.Estimated),
		},
		Tables: []casenote.Table{
			a.stateTable([]quantity{
				{"pulse pressure, mmHg", func(f *Figures) data.Estimate { return f.PulsePressure }},
				{"energy-equivalent pressure, mmHg", func(f *Figures) data.Estimate { return f.EEP }},
				{"surplus energy, erg/cm3", func(f *Figures) data.Estimate { return f.SHE }},
			}),
			a.stateTable([]quantity{
				{"swing of root flow, " + u.flow, func(f *Figures) data.Estimate { return f.FlowSwing }},
				{"Gosling PI, flow", func(f *Figures) data.Estimate { return f.FlowPI }},
			}),
		},
	}
}

// PowerSection gives the power that enters the arteries, steady and pulsatile.
func (a Answer) PowerSection() casenote.Section {
	u := a.units()
	power := func(of func(*Figures) data.Estimate) func(*Figures) data.Estimate {
		return func(f *Figures) data.Estimate { return times(of(f), unit.MilliwattPerMmHgMLPerS) }
	}
	return casenote.Section{
		Title: fmt.Sprintf("Power into the arteries, %s", a.Posing),
		Words: texts("Power of the arterial side, mean over the beat; what a ventricle or a pump spends is more, and is not in the table. " + a.Native.pulsatileWords()),
		Tables: []casenote.Table{a.stateTable([]quantity{
			{"power in, " + u.power, power(func(f *Figures) data.Estimate { return f.InputPower })},
			{"steady part, " + u.power, power(func(f *Figures) data.Estimate { return f.SteadyPower })},
			{"pulsatile part, " + u.power, power(func(f *Figures) data.Estimate { return f.PulsatilePower })},
		})},
	}
}

// pulsatileWords says what the pulsatile power of a lumped load is not.
func (s State) pulsatileWords() string {
	const limit = "A lumped load knows the pulsatile power that enters it, and not where in the body it is lost."
	zc, ok := s.Ledger.Term("Zc")
	if !ok || !(zc.Pulsatile > 0) {
		return limit
	}
	return limit + fmt.Sprintf(" Natively %.0f %% of it goes into the characteristic impedance, which is a wave impedance and no loss in blood.", 100*zc.Pulsatile/s.Power.Pulsatile)
}

// ComparisonSection gives what is retained of the pulse.
func (a Answer) ComparisonSection() casenote.Section {
	s := casenote.Section{Title: fmt.Sprintf("Retained pulse, %s", a.Posing)}
	if a.Posing.ByConstruction() {
		s.Words = texts("These ratios follow from the posing alone and hold for every linear load: an identity, never a forecast, and so without an interval.")
	}
	s.Tables = []casenote.Table{a.ratioTable("Supported over native, at equal mean flow",
		[]ratio{retainedPressure, retainedFlow},
		"retained pulse of pressure", "retained swing of root flow")}
	return s
}

// quantity is a column of a table of states.
type quantity struct {
	header string
	of     func(*Figures) data.Estimate
}

// stateTable has a row for the native state and one a supported state.
func (a Answer) stateTable(columns []quantity) casenote.Table {
	t := casenote.Table{Header: []string{"share of pump"}}
	for _, c := range columns {
		t.Header = append(t.Header, c.header)
	}
	row := func(name string, f *Figures) {
		cells := []casenote.Cell{{Words: data.Clean(name)}}
		for _, c := range columns {
			cells = append(cells, estimated(c.of(f)))
		}
		t.Rows = append(t.Rows, cells)
	}
	row("native", &a.Native.Figures)
	for i := range a.Supported {
		if s := &a.Supported[i]; s.Share > 0 { // at share 0 it is the native state again
			row(shareName(s.Share), &s.Figures)
		}
	}
	return t
}

// ratioTable has a row a comparison.
func (a Answer) ratioTable(foot string, which []ratio, header ...string) casenote.Table {
	t := casenote.Table{Header: append([]string{"share of pump"}, header...), Foot: foot + "."}
	for i := range a.Comparisons {
		c := &a.Comparisons[i]
		if c.Share == 0 { // native over native
			continue
		}
		cells := []casenote.Cell{{Words: data.Clean(shareName(c.Share))}}
		for _, r := range which {
			cells = append(cells, estimated(*c.fields()[r]))
		}
		t.Rows = append(t.Rows, cells)
	}
	return t
}

func shareName(share float64) string { return fmt.Sprintf("%.4g", share) }

func estimated(e data.Estimate) casenote.Cell {
	return casenote.Cell{Number: &casenote.Number{Estimate: e, Origin: data.Estimated}}
}

// times scales an estimate with its doubt by a positive factor.
func times(e data.Estimate, factor float64) data.Estimate {
	e.Value *= factor
	for _, i := range []*data.Interval{&e.Total, &e.Random} {
		i.Low, i.High = factor*i.Low, factor*i.High
	}
	return e
}

func texts(paragraphs ...string) []data.Text {
	all := make([]data.Text, len(paragraphs))
	for i, p := range paragraphs {
		all[i] = data.Clean(p)
	}
	return all
}
