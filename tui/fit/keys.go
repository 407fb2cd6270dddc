package fit

import "github.com/charmbracelet/bubbles/key"

// keyMap are the keys of the screen.
type keyMap struct {
	previous, next, choose key.Binding
	up, down, number       key.Binding
	less, more             key.Binding
	flow, table            key.Binding
}

func newKeys() keyMap {
	bind := func(shown, does string, keys ...string) key.Binding {
		return key.NewBinding(key.WithKeys(keys...), key.WithHelp(shown, does))
	}
	return keyMap{
		previous: bind("left", "model before", "left", "h"),
		next:     bind("right", "model", "right", "l"),
		choose:   bind("enter", "use it", "enter"),
		up:       bind("up", "number above", "up", "k"),
		down:     bind("down", "number below", "down", "j"),
		number:   bind("x", "open number", "x"),
		less:     bind("[", "what-if back", "["),
		more:     bind("]", "what if", "]"),
		flow:     bind("f", "flow", "f"),
		table:    bind("t", "table", "t"),
	}
}

// bindings are the keys as they work now: what has no effect is disabled, and
// what goes back says so.
func (m Model) bindings() keyMap {
	k := newKeys()
	models := m.count()
	k.previous.SetEnabled(models > 1)
	k.next.SetEnabled(models > 1)
	k.choose.SetEnabled(models > 0)
	if m.takesBack() {
		k.choose.SetHelp("enter", "the recommended one")
	}
	numbers := len(m.rows())
	k.up.SetEnabled(numbers > 1)
	k.down.SetEnabled(numbers > 1)
	k.number.SetEnabled(numbers > 0 && m.view != tabled)
	if m.view == opened {
		k.number.SetHelp("x", "close the number")
	}
	k.less.SetEnabled(models > 0 && len(m.fit.Sensitivity) > 0)
	k.more.SetEnabled(k.less.Enabled())
	k.flow.SetEnabled(m.fit != nil && m.fit.Beats.Flow.Count > 0 && m.fit.Beats.Pressure.Count > 0)
	if m.flow {
		k.flow.SetHelp("f", "pressure")
	}
	k.table.SetEnabled(m.beat())
	if m.view == tabled {
		k.table.SetHelp("t", "picture")
	}
	return k
}

// Keys are the bindings that work now, the most useful first.
func (m Model) Keys() []key.Binding {
	if m.warnings.Open() {
		return m.warnings.Keys.Bindings()
	}
	k := m.bindings()
	var on []key.Binding
	for _, b := range []key.Binding{
		k.next, k.choose, k.more, k.number, k.flow, k.table, k.down, m.warnings.Keys.Open, k.previous, k.less, k.up,
	} {
		if b.Enabled() {
			on = append(on, b)
		}
	}
	return on
}
