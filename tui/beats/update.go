package beats

import (
	"fmt"
	"math"
	"slices"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data/beat"
	"afterbeat/tui"
)

// Update answers a key, and what its commands bring.
func (m Model) Update(msg tea.Msg) (tui.Screen, tea.Cmd) {
	var cmd tea.Cmd
	switch msg := msg.(type) {
	case readyMsg:
		m, cmd = m.take(msg.ready)
	case overlayMsg:
		if msg.overlay.order == m.order() {
			m.overlay = msg.overlay
		}
	case tea.KeyMsg:
		switch {
		case msg.Paste:
		case m.list.Open() || key.Matches(msg, m.keys.List.Open):
			m.list = m.list.Update(msg)
		case m.opened.Open() || m.openNumber().Enabled() && key.Matches(msg, m.keys.Number):
			m.opened = m.opened.Update(msg)
		case len(m.ready.signals) > 0:
			m, cmd = m.press(msg)
		}
	default:
		m.trace, cmd = m.trace.Update(msg)
	}
	return m, cmd
}

// press answers a key of the screen itself.
func (m Model) press(msg tea.KeyMsg) (Model, tea.Cmd) {
	k := m.bindings()
	switch {
	case key.Matches(msg, k.Next):
		return m.goTo(m.at + 1)
	case key.Matches(msg, k.Previous):
		return m.goTo(m.at - 1)
	case key.Matches(msg, k.NextUnused):
		return m.seek(1)
	case key.Matches(msg, k.PreviousUnused):
		return m.seek(-1)
	case key.Matches(msg, k.First):
		return m.goTo(0)
	case key.Matches(msg, k.Last):
		return m.goTo(len(m.beatsShown()) - 1)
	case key.Matches(msg, k.Drop):
		return m.drop()
	case key.Matches(msg, k.Channel):
		m.shown = (m.shown + 1) % len(m.ready.signals)
		m, look := m.look()
		m, at := m.goTo(m.at)
		return m, tea.Batch(look, at)
	case key.Matches(msg, k.All):
		m.all = !m.all
		return m.arrange()
	case key.Matches(msg, k.Over):
		m.over = !m.over
		return m, nil
	case key.Matches(msg, k.Overlay):
		m.aside = !m.aside
		return m, nil
	case key.Matches(msg, k.Trace.In, k.Trace.Out, k.Trace.Whole, k.Trace.Table):
		var cmd tea.Cmd
		m.trace, cmd = m.trace.Update(msg)
		m, overlay := m.wantOverlay()
		return m, tea.Batch(cmd, overlay)
	}
	return m, nil
}

// seek goes to the next beat that is not used, in either direction.
func (m Model) seek(step int) (Model, tea.Cmd) {
	beats := m.beatsShown()
	for i := m.at + step; i >= 0 && i < len(beats); i += step {
		if beats[i].Rejected != "" || m.byHand(i) == dropped {
			return m.goTo(i)
		}
	}
	if step > 0 {
		return m, tui.Say("every beat after this one is used")
	}
	return m, tui.Say("every beat before this one is used")
}

// hand is what a person has said about a beat.
type hand int

const (
	nothing hand = iota
	dropped
	kept
)

// byHand is what the case says about beat i.
func (m Model) byHand(i int) hand {
	if !m.ready.leads || i >= len(m.ready.beats) {
		return nothing
	}
	b := m.ready.beats[i]
	within := func(t float64) bool { return m.ready.grid.At(b.From) <= t && t < m.ready.grid.At(b.To) }
	switch {
	case slices.ContainsFunc(m.case_.Drop, within):
		return dropped
	case slices.ContainsFunc(m.case_.Keep, within):
		return kept
	}
	return nothing
}

// restores tells whether drop would use the beat under the cursor again.
func (m Model) restores() bool {
	switch m.byHand(m.at) {
	case dropped:
		return true
	case kept:
		return false
	}
	return m.ready.leads && m.at < len(m.ready.beats) && m.ready.beats[m.at].Rejected != ""
}

// drop leaves the beat under the cursor out, or uses it; what was said about it
// by hand before is taken back first.
func (m Model) drop() (Model, tea.Cmd) {
	t, ok := m.middle()
	switch {
	case !ok:
		return m, tui.Say("there is no beat under the cursor")
	case !m.ready.leads:
		return m, tui.Say("no beats are cut yet: first settle which channels are used, on the intake (1)")
	}
	b, c := m.ready.beats[m.at], m.case_
	others := func(times []float64) []float64 {
		return slices.DeleteFunc(slices.Clone(times), func(t float64) bool {
			return m.ready.grid.At(b.From) <= t && t < m.ready.grid.At(b.To)
		})
	}
	name := fmt.Sprintf("beat %d", m.at+1)
	said := ""
	switch by := m.byHand(m.at); {
	case by == dropped:
		c.Drop, said = others(c.Drop), name+" restored"
	case by == kept:
		c.Keep, said = others(c.Keep), name+" no longer used against the rule"
	case b.Rejected == beat.Gap:
		return m, tui.Say(name + " holds a sample that cannot be used, so that it cannot be restored")
	case b.Rejected != "":
		c.Keep, said = append(slices.Clone(c.Keep), t), name+" restored"
	default:
		c.Drop, said = append(slices.Clone(c.Drop), t), name+" dropped"
	}
	m.case_, m.busy = c, true
	return m, tui.Change(said, c)
}

// inside is the middle between two times, rounded to the millisecond where that
// is still between them.
func inside(from, to float64) float64 {
	middle := (from + to) / 2
	if t := math.Round(middle*1e3) / 1e3; from < t && t < to {
		return t
	}
	return middle
}
