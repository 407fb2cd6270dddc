package support

import (
	"afterbeat/data"
	"afterbeat/tree/support"
	"afterbeat/tui/chart"
)

// drawn is the model with its picture drawn: once a key, so that frames cost
// nothing.
func (m Model) drawn() Model {
	m.picture = ""
	m.page = m.page.Hold(m.pageLines())
	if !m.there() || !m.curves.ready {
		return m
	}
	p := m.plan()
	if m.coupled() {
		m.picture = m.coupledPicture(p)
		return m
	}
	switch m.viewing() {
	case waves:
		m.picture = m.waves(p)
	case sweep:
		m.picture = m.overShare(p, m.sweepQuantity(), p.picture-1)
	case energy:
		lines := p.picture
		if !m.table {
			lines -= len(m.energyFigures())
		}
		if m.table || lines >= leastPicture {
			m.picture = m.overShare(p, pulsatilePower, lines-1)
		}
	}
	return m
}

// pageLines are those of the view that scrolls.
func (m Model) pageLines() []string {
	c := m.curves
	switch {
	case m.viewing() == depends:
		return c.coupled.depends
	case m.viewing() == ventricle:
		return c.coupled.ventricle
	case m.viewing() == held && m.coupled():
		return c.coupled.held
	case m.viewing() == held:
		return c.held
	}
	return nil
}

// waves are native and supported over one another, or as a table.
func (m Model) waves(p plan) string {
	t, of := m.curves.pressure, func(s support.State) data.Period { return s.Pressure }
	if m.flow {
		t, of = m.curves.flow, func(s support.State) data.Period { return s.Flow }
	}
	plot := t.plot(t.name)
	if m.table {
		plot.Series = []chart.Series{
			{Name: "native", Values: of(m.shown().Native).Samples},
			{Name: "supported", Values: of(m.shown().Supported[m.state]).Samples},
		}
		return plot.Table(p.width, p.plot, m.theme.Chart())
	}
	plot.Series = []chart.Series{
		{Name: "native", Values: t.native},
		{Name: "supported", Values: t.supported[m.answer][m.state]},
	}
	return plot.Draw(p.width, p.plot, m.theme.Chart())
}
