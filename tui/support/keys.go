package support

import "github.com/charmbracelet/bubbles/key"

// keyMap are the keys of the screen.
type keyMap struct {
	more, less             key.Binding
	next, previous         key.Binding
	flow, table            key.Binding
	sweep, energy, indices key.Binding
	held                   key.Binding
}

func newKeys() keyMap {
	bind := func(shown, does string, keys ...string) key.Binding {
		return key.NewBinding(key.WithKeys(keys...), key.WithHelp(shown, does))
	}
	return keyMap{
		more:     bind("up", "share up", "up", "k", "+"),
		less:     bind("down", "share down", "down", "j", "-"),
		next:     bind("right", "posing", "right"),
		previous: bind("left", "posing before", "left"),
		flow:     bind("f", "flow", "f"),
		table:    bind("t", "table", "t"),
		sweep:    bind("w", "sweep", "w"),
		energy:   bind("e", "energy", "e"),
		indices:  bind("m", "indices", "m"),
		held:     bind("h", "what is held", "h"),
	}
}

// bindings are the keys as they work now: what has no effect is disabled, and
// what goes back says so.
func (m Model) bindings() keyMap {
	k := newKeys()
	there := m.there()
	for _, b := range []*key.Binding{&k.flow, &k.table, &k.sweep, &k.energy, &k.indices, &k.held} {
		b.SetEnabled(there)
	}
	moving := there && m.view != held
	k.more.SetEnabled(moving && m.count() > 1)
	k.less.SetEnabled(moving && m.count() > 1)
	k.next.SetEnabled(moving && len(m.comparison.Answers) > 1)
	k.previous.SetEnabled(moving && len(m.comparison.Answers) > 1)
	k.flow.SetEnabled(there && (m.view == waves || m.view == sweep))
	k.table.SetEnabled(there && (m.view == waves || m.view == sweep || m.view == energy))
	if m.flow {
		k.flow.SetHelp("f", "pressure")
	}
	if m.table {
		k.table.SetHelp("t", "picture")
	}
	for v, b := range map[view]*key.Binding{sweep: &k.sweep, energy: &k.energy, indices: &k.indices, held: &k.held} {
		if m.view == v {
			b.SetHelp(b.Help().Key, "back to the waves")
		}
	}
	return k
}

// Keys are the bindings that work now, the most useful first.
func (m Model) Keys() []key.Binding {
	if m.warnings.Open() {
		return m.warnings.Keys.Bindings()
	}
	k := m.bindings()
	all := []key.Binding{k.more, k.next, k.sweep, k.energy, k.flow, k.indices, k.held, k.table, k.less, m.warnings.Keys.Open, k.previous}
	if m.view == held && m.there() {
		all = append([]key.Binding{k.held}, m.pageKeys.Bindings()...)
	}
	var on []key.Binding
	for _, b := range all {
		if b.Enabled() {
			on = append(on, b)
		}
	}
	return on
}
