package tree

import (
	"fmt"

	"afterbeat/tui/chart"
)

// drawn is the model with its pictures drawn: once a key, so that frames cost
// nothing.
func (m Model) drawn() Model {
	m.pictures = [2]string{}
	m.page = m.page.Hold(m.curves.made)
	if m.tree == nil || !m.curves.ready {
		return m
	}
	p := m.plan()
	switch m.view {
	case impedance:
		m.pictures = m.spectraPictures(p)
	case measured:
		m.pictures[0] = m.curves.measured[m.trace].Draw(p.width, max(p.height-3, 0), m.theme.Chart())
	case outline, beds:
		m.pictures = m.wavePictures(p)
	}
	return m
}

// labelCells is the width of the labels of both pictures, so that a step does not
// move them.
const labelCells = 4

// wavePictures are pressure and flow at the chosen segment over the root's.
func (m Model) wavePictures(p plan) (out [2]string) {
	i := m.segment()
	if p.plots == 0 || i < 0 {
		return out
	}
	c := m.curves
	here := "here"
	if m.view == beds {
		here = "bed"
	}
	draw := func(title string, t traces, own []float64) string {
		plot := chart.Plot{Title: title, X: c.x, Y: t.y, LabelWidth: labelCells}
		plot.Series = []chart.Series{{Name: "root", Values: t.root}, {Name: here, Values: own}}
		return plot.Draw(p.plotWidth, p.plotHeight, m.theme.Chart())
	}
	own := c.flow.each[i]
	if m.view == beds {
		own = c.beds[m.bed]
	}
	out[0] = draw("pressure", c.pressure, c.pressure.each[i])
	out[1] = draw("flow", c.flow, own)
	return out
}

// spectraPictures are modulus and phase of the impedance.
func (m Model) spectraPictures(p plan) (out [2]string) {
	width, height, _ := p.pair()
	for k, s := range []spectrum{m.curves.modulus, m.curves.phase} {
		plot := chart.Plot{
			Title: [...]string{"modulus", "phase"}[k], X: s.x, Y: s.y, LabelWidth: labelCells,
			Series: []chart.Series{{Name: "tree", Values: joined(s.tree, width)}, {Name: "measured", Values: s.measured}},
		}
		out[k] = plot.Draw(width, height, m.theme.Chart())
	}
	return out
}

// joined puts straight lines through evenly spaced values, several a column.
func joined(values []float64, width int) []float64 {
	if len(values) < 2 {
		return values
	}
	count := (len(values)-1)*max(1, width/len(values)) + 1
	out := make([]float64, count)
	for c := range out {
		at := float64(c) * float64(len(values)-1) / float64(count-1)
		k := min(int(at), len(values)-2)
		out[c] = values[k] + (at-float64(k))*(values[k+1]-values[k])
	}
	return out
}

// title of the chosen segment.
func (m Model) chosenWords() string {
	i := m.segment()
	if i < 0 {
		return "no segment has these letters"
	}
	s := m.tree.Segments[i]
	if m.view == beds {
		return fmt.Sprintf("Bed %s; its pressure at the end of %s", m.tree.Beds[m.bed].Name, s.Called())
	}
	return "At the end of " + s.Called()
}
