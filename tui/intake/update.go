package intake

import (
	"fmt"
	"math"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/unit"
	"afterbeat/tui"
)

// Update answers a key, and what its commands bring.
func (m Model) Update(msg tea.Msg) (tui.Screen, tea.Cmd) {
	var cmd tea.Cmd
	switch msg := msg.(type) {
	case readyMsg:
		m, cmd = m.take(msg)
	case tea.KeyMsg:
		switch {
		case m.question.open():
			m, cmd = m.typed(msg)
		case msg.Paste || len(m.ready.channels) == 0 && !key.Matches(msg, m.keys.List.Open):
		case m.list.Open() || key.Matches(msg, m.keys.List.Open):
			m.list = m.list.Update(msg)
		default:
			m, cmd = m.press(msg)
		}
	default:
		m.trace, cmd = m.trace.Update(msg)
	}
	return m, cmd
}

// press answers a key of the screen itself.
func (m Model) press(msg tea.KeyMsg) (Model, tea.Cmd) {
	k, c := m.keys, m.inputs.Case
	switch {
	case key.Matches(msg, k.Down):
		return m.choose(m.chosen + 1)
	case key.Matches(msg, k.Up):
		return m.choose(m.chosen - 1)
	case key.Matches(msg, k.Use):
		return m.use()
	case key.Matches(msg, k.Site):
		return m.site(1)
	case key.Matches(msg, k.SiteBack):
		return m.site(-1)
	case key.Matches(msg, k.Unit):
		return m.askUnit(), nil
	case key.Matches(msg, k.Calibrate):
		return m.askCalibration(), nil
	case key.Matches(msg, k.Beside):
		return m.askBeside(), nil
	case key.Matches(msg, k.Invert):
		said := "inverted"
		if m.names().inverted(c, m.chosen) {
			said = "no longer inverted"
		}
		return m.change(m.name()+" "+said, m.names().invert(c, m.chosen))
	case key.Matches(msg, k.Start):
		return m.span(false)
	case key.Matches(msg, k.End):
		return m.span(true)
	case key.Matches(msg, k.Clear):
		c.From, c.To = nil, nil
		return m.change("the whole recording is used", c)
	}
	var cmd tea.Cmd
	m.trace, cmd = m.trace.Update(msg)
	return m, cmd
}

// change keeps the changed case and sends it to the root.
func (m Model) change(said string, c casefile.Case) (Model, tea.Cmd) {
	if same(c, m.inputs.Case) {
		return m, tui.Say("nothing to change")
	}
	m.inputs.Case, m.busy = c, true
	return m, tui.Change(said, c)
}

// names are the channels as they can be called in the case.
func (m Model) names() names { return m.ready.names }

func (m Model) name() string { return m.ready.channels[m.chosen].Name.String() }

func (m Model) use() (Model, tea.Cmd) {
	c, role, ok := m.names().use(m.inputs.Case, m.chosen)
	switch {
	case !ok:
		return m, tui.Say(m.name() + " is no pressure, flow or velocity; if it is one, state its unit with e")
	case same(c, m.inputs.Case):
		return m, tui.Say(m.name() + " is already the " + role)
	}
	return m.change(fmt.Sprintf("%s is the %s", m.name(), role), c)
}

func (m Model) site(steps int) (Model, tea.Cmd) {
	c := m.inputs.Case
	site := m.ready.channels[m.chosen].Site
	if stated, ok := entry(m.names(), c.Site, m.chosen); ok {
		site = data.Site(stated)
	}
	site = siteAfter(site, steps)
	c.Site = set(m.names(), c.Site, m.chosen, string(site))
	return m.change(fmt.Sprintf("site of %s: %s", m.name(), site), c)
}

// span sets an end of the span at the cursor; at an end of the recording it is
// left open.
func (m Model) span(end bool) (Model, tea.Cmd) {
	i, c := m.trace.Cursor(), m.inputs.Case
	source := m.ready.channels[m.chosen].source
	if i < 0 {
		return m, tui.Say("there is no trace to set a span on")
	}
	at := math.Floor(source.Grid.At(i)*1e4) / 1e4 // the sample of the cursor stays in
	said, edge := "the span starts at ", "the start"
	if end {
		said, edge = "the span ends at ", "the end"
	}
	switch {
	case end && i == len(source.Values)-1:
		c.To = nil
		return m.change(said+edge, c)
	case !end && i == 0:
		c.From = nil
		return m.change(said+edge, c)
	}
	c, refused := span(c, at, end)
	if refused != "" {
		return m, tui.Say(refused)
	}
	return m.change(said+seconds(at)+" s", c)
}

func (m Model) askUnit() Model {
	stated, _ := entry(m.names(), m.inputs.Case.Unit, m.chosen)
	inFile := m.ready.channels[m.chosen].Unit.Name
	m.question = ask(ofUnit, "unit of "+m.name(), stated, func(text string) (string, bool) {
		if text == "" {
			return fmt.Sprintf("empty: as the file says (now %s)", inFile), true
		}
		u, ok := unit.Parse(text)
		switch {
		case !ok:
			return "no unit known here; for instance mmHg, kPa, mL/s, L/min, cm/s", false
		case u.Quantity == unit.Time:
			return "a unit of time; the channel is none", false
		case !u.Calibrated:
			return u.Name + ": not calibrated", true
		}
		return fmt.Sprintf("%s, a %s", u.Name, u.Quantity), true
	})
	return m
}

func (m Model) askCalibration() Model {
	now := m.names().calibrated(m.inputs.Case, m.chosen)
	inFile := m.ready.channels[m.chosen].Unit.Name
	m.question = ask(ofCalibration, "calibrate "+m.name(), now.String(), func(text string) (string, bool) {
		c, err := parseCalibration(text)
		if err != nil {
			return err.Error(), false
		}
		return c.answer(inFile), true
	})
	return m
}

func (m Model) askBeside() Model {
	now := besideOf(m.inputs.Case)
	velocity, mean := m.ready.selection.Velocity >= 0, m.found.pressure
	m.question = ask(ofBeside, "measured beside", now.typed(), func(text string) (string, bool) {
		b, err := now.changed(text)
		if err != nil {
			return err.Error(), false
		}
		if why := b.refused(velocity, mean); why != "" {
			return why, false
		}
		return b.String() + "; none clears one", true
	})
	return m
}

// typed answers a key while the text field is open.
func (m Model) typed(msg tea.KeyMsg) (Model, tea.Cmd) {
	switch {
	case key.Matches(msg, m.keys.Cancel):
		m.question = question{}
		return m, nil
	case !key.Matches(msg, m.keys.Set):
		m.question.field = m.question.field.Update(msg)
		return m, nil
	}
	text := m.question.text()
	if _, ok := m.question.judge(text); !ok {
		return m, nil // the answer stands under the field
	}
	of := m.question.subject
	m.question = question{}
	c := m.inputs.Case
	if of == ofBeside {
		b, _ := besideOf(c).changed(text)
		return m.change("measured beside the recording: "+b.String(), b.into(c))
	}
	if of == ofCalibration {
		k, _ := parseCalibration(text)
		said := "calibration of " + m.name() + " as in the file"
		if k.String() != "" {
			said = "calibration of " + m.name() + ": " + k.String()
		}
		return m.change(said, m.names().calibrate(c, m.chosen, k))
	}
	if text == "" {
		c.Unit = cleared(m.names(), c.Unit, m.chosen)
		return m.change("unit of "+m.name()+" as in the file", c)
	}
	c = m.names().withoutOtherRole(c, m.chosen, text)
	c.Unit = set(m.names(), c.Unit, m.chosen, text)
	return m.change("unit of "+m.name()+": "+text, c)
}

// Typing tells that the text field is open.
func (m Model) Typing() bool { return m.question.open() }
