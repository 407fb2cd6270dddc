package support

import (
	"fmt"
	"math"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casenote"
	"afterbeat/tui/layout"
)

// index is a row of the indices.
type index struct {
	name string
	of   func(beat.Measures) float64
	key  beat.Index
	// pressureOnly tells an index that has no meaning in a flow.
	pressureOnly bool
}

func indexRows() []index {
	return []index{
		{"mean", func(m beat.Measures) float64 { return m.Mean }, "", false},
		{"greatest", func(m beat.Measures) float64 { return m.Max }, "", false},
		{"least", func(m beat.Measures) float64 { return m.Min }, "", false},
		{"amplitude", func(m beat.Measures) float64 { return m.Amplitude }, "", false},
		{"Gosling PI", func(m beat.Measures) float64 { return m.GoslingPI }, beat.GoslingPI, false},
		{"Pourcelot RI", func(m beat.Measures) float64 { return m.PourcelotRI }, beat.PourcelotRI, false},
		{"S/D", func(m beat.Measures) float64 { return m.SystolicRatio }, beat.SystolicRatio, false},
		{"time to peak, s", func(m beat.Measures) float64 { return m.TimeToPeak }, beat.TimeToPeak, false},
		{"maximum slope, per s", func(m beat.Measures) float64 { return m.MaxSlope }, beat.MaxSlope, false},
		{"form factor", func(m beat.Measures) float64 { return m.FormFactor }, beat.FormFactor, false},
		{"pulsatile power index", func(m beat.Measures) float64 { return m.PulsatilePower }, beat.PulsatilePower, false},
		{"augmentation index", func(m beat.Measures) float64 { return m.Augmentation }, beat.Augmentation, true},
	}
}

const indexCells = 14

// indices are the measures of both waves, native beside supported, and the
// reasons of those that do not exist.
func (m Model) indices() []string {
	a := m.shown()
	n, s := a.Native, a.Supported[m.state]
	words := "Of the computed waves, without intervals; amplitudes have theirs on the waves."
	return m.indexTable(flowUnit(*m.comparison), [4]beat.Measures{n.PressureMeasures, s.PressureMeasures, n.FlowMeasures, s.FlowMeasures}, words)
}

// indexTable has the measures of native and supported pressure, and of native and
// supported flow.
func (m Model) indexTable(flowUnit string, measures [4]beat.Measures, words string) []string {
	line := func(cells ...string) string {
		out := pad(cells[0], labelCells+1)
		for _, c := range cells[1:] {
			out += layout.PadLeft(data.Clean(c), indexCells)
		}
		return out
	}
	out := []string{
		line("", "pressure, mmHg", "", "flow, "+flowUnit, ""),
		line("", "native", "supported", "native", "supported"),
	}
	var remarks []string
	for _, i := range indexRows() {
		cells := []string{i.name}
		for k, of := range measures {
			if i.pressureOnly && k > 1 {
				cells = append(cells, "-")
				continue
			}
			v := i.of(of)
			cells = append(cells, casenote.Format(v, data.NoInterval()))
			if math.IsNaN(v) {
				remarks = append(remarks, fmt.Sprintf("%s, %s: %s", i.name, [...]string{"native pressure", "supported pressure", "native flow", "supported flow"}[k], of.Remark(i.key)))
			}
		}
		out = append(out, line(cells...))
	}
	out = append(out, words)
	for _, r := range remarks {
		out = append(out, layout.Wrap(layout.Clean(r, m.theme), m.area.Width)...)
	}
	return out
}
