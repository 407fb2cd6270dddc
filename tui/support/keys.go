package support

import (
	"github.com/charmbracelet/bubbles/key"

	"afterbeat/tui"
)

// keyMap are the keys of the screen.
type keyMap struct {
	more, less             key.Binding
	next, previous         key.Binding
	flow, table            key.Binding
	sweep, energy, indices key.Binding
	held                   key.Binding
	depends, ventricle     key.Binding
	whatIf, whatIfBack     key.Binding
	leave, quote           key.Binding
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

		depends:   bind("d", "depends on", "d"),
		ventricle: bind("p", "ventricle, pump", "p"),

		whatIf:     bind("]", "what if", "]"),
		whatIfBack: bind("[", "what-if back", "["),
		leave:      bind("esc", "end what-if", "esc"),
		quote:      bind("n", "quote in the note", "n"),
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
	v := m.viewing()
	moving := there && !v.paged()
	k.more.SetEnabled(moving && m.count() > 1)
	k.less.SetEnabled(moving && m.count() > 1)
	k.next.SetEnabled(moving && len(m.posings()) > 1)
	k.previous.SetEnabled(moving && len(m.posings()) > 1)
	k.flow.SetEnabled(there && (v == waves || v == sweep || v == indices && m.coupled()))
	k.table.SetEnabled(there && (v == waves || v == sweep || v == energy && !m.coupled()))
	k.depends.SetEnabled(m.coupled())
	k.ventricle.SetEnabled(m.coupled())
	possible := m.coupled() && v == waves && !m.table && m.forecast.WhatIfs() > 0
	k.whatIf.SetEnabled(possible)
	k.whatIfBack.SetEnabled(possible)
	k.leave.SetEnabled(m.moved.at != 0)
	k.quote.SetEnabled(m.coupled() && !v.paged() && !m.quotes())
	return m.helped(k)
}

// helped names what the keys do as things stand.
func (m Model) helped(k keyMap) keyMap {
	if m.coupled() {
		k.more.SetHelp("up", "speed up")
		k.less.SetHelp("down", "speed down")
	}
	switch {
	case m.viewing() == indices && m.figured:
		k.flow.SetHelp("f", "indices")
	case m.viewing() == indices:
		k.flow.SetHelp("f", "figures")
	case m.flow:
		k.flow.SetHelp("f", "pressure")
	}
	if m.table {
		k.table.SetHelp("t", "picture")
	}
	for v, b := range k.views() {
		if m.viewing() == v {
			b.SetHelp(b.Help().Key, "back to the waves")
		}
	}
	return k
}

// views are the keys that open a view, and leave it.
func (k *keyMap) views() map[view]*key.Binding {
	return map[view]*key.Binding{
		sweep: &k.sweep, energy: &k.energy, indices: &k.indices, held: &k.held,
		depends: &k.depends, ventricle: &k.ventricle,
	}
}

// openNumber opens the numbers of the state shown, where there are some.
func (m Model) openNumber() key.Binding {
	b := m.numbers.Keys.Open
	b.SetEnabled(m.there())
	return b
}

// Keys are the bindings that work now, the most useful first.
func (m Model) Keys() []key.Binding {
	if m.warnings.Open() {
		return m.warnings.Keys.Bindings()
	}
	if m.numbers.Open() {
		return m.numbers.Bindings()
	}
	k := m.bindings()
	moves := "share"
	if m.coupled() {
		moves = "speed"
	}
	all := []key.Binding{
		tui.Pair("j/k/-/+/down/up", moves, k.less, k.more), k.leave, m.openNumber(), k.sweep, k.energy, k.depends, tui.Pair("left/right", "posing", k.previous, k.next),
		tui.Pair("[/]", "what if", k.whatIfBack, k.whatIf), k.quote, k.flow, k.indices, k.held, k.ventricle, k.table, m.warnings.Keys.Open,
	}
	if v := m.viewing(); v.paged() && m.there() {
		all = append([]key.Binding{*k.views()[v]}, m.pageKeys.Bindings()...)
	}
	var on []key.Binding
	for _, b := range all {
		if b.Enabled() {
			on = append(on, b)
		}
	}
	return on
}
