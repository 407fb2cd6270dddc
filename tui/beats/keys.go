package beats

import (
	"slices"

	"github.com/charmbracelet/bubbles/key"

	"afterbeat/tui"
	"afterbeat/tui/explain"
	"afterbeat/tui/trace"
	"afterbeat/tui/warnlist"
)

// keyMap are the keys of the screen; those of the trace and of the list of
// warnings are their own.
type keyMap struct {
	Next, Previous, NextUnused, PreviousUnused, First, Last key.Binding
	Drop, Channel, Overlay, Over, All, Number               key.Binding
	Trace                                                   trace.Keys
	List                                                    warnlist.Keys
}

func newKeys() keyMap {
	bind := func(shown, does string, keys ...string) key.Binding {
		return key.NewBinding(key.WithKeys(keys...), key.WithHelp(shown, does))
	}
	return keyMap{
		Next:           bind("n/l/j/right/down", "next beat", "n", "right", "l", "down", "j"),
		Previous:       bind("p/h/k/left/up", "beat before", "p", "left", "h", "up", "k"),
		NextUnused:     bind("N", "next beat not used", "N"),
		PreviousUnused: bind("P", "beat not used before", "P"),
		First:          bind("g/home", "first beat", "g", "home"),
		Last:           bind("G/end", "last beat", "G", "end"),
		Drop:           bind("d", "drop", "d"),
		Channel:        bind("c", "channel", "c"),
		Overlay:        bind("o", "overlay", "o"),
		Over:           bind("b", "beat over average", "b"),
		All:            bind("i", "all indices", "i"),
		Number:         explain.NewKeys().Open,
		Trace:          trace.NewKeys(),
		List:           warnlist.NewKeys(),
	}
}

// bindings are the keys as they work now: what has no effect is disabled, and
// what goes back says so.
func (m Model) bindings() keyMap {
	k := m.keys
	k.Trace.Table.SetHelp("t", "table")
	if m.trace.Table() {
		k.Trace.Table.SetHelp("t", "picture")
	}
	if m.aside {
		k.Overlay.SetHelp("o", "trace")
	}
	if m.restores() {
		k.Drop.SetHelp("d", "restore")
	}
	if m.all {
		k.All.SetHelp("i", "back to the picture")
	}
	if len(m.ready.signals) == 0 {
		return k
	}
	there := len(m.beatsShown()) > 0
	for _, b := range []*key.Binding{&k.Next, &k.Previous, &k.NextUnused, &k.PreviousUnused, &k.First, &k.Last, &k.Drop} {
		b.SetEnabled(there)
	}
	averaged := m.signal().ensemble >= 0
	overlay := averaged && (m.divide().both || m.aside) && !m.all
	k.Channel.SetEnabled(len(m.ready.signals) > 1)
	k.All.SetEnabled(len(m.signal().rows) > 0)
	k.Number = m.openNumber()
	k.Overlay.SetEnabled(averaged && !m.divide().both && !m.all)
	k.Over.SetEnabled(overlay && !m.trace.Table())
	return k
}

// openNumber opens the numbers of the signal shown, where there are some.
func (m Model) openNumber() key.Binding {
	b := m.keys.Number
	b.SetEnabled(m.opened.Len() > 0)
	return b
}

// Keys are the bindings that work now.
func (m Model) Keys() []key.Binding {
	k := m.bindings()
	switch {
	case m.list.Open():
		return k.List.Bindings()
	case m.opened.Open():
		return m.opened.Bindings()
	case len(m.ready.signals) == 0:
		return []key.Binding{k.List.Open}
	}
	all := []key.Binding{
		tui.Pair("n/p/hjkl/arrows", "beat", k.Next, k.Previous), k.Drop, k.Overlay, k.Over, k.Channel, k.Number, k.All,
		tui.Pair("N/P", "beat not used", k.NextUnused, k.PreviousUnused),
	}
	all = append(all, k.Trace.In, k.Trace.Out, k.Trace.Whole, k.Trace.Table, k.List.Open, k.First, k.Last)
	return slices.DeleteFunc(all, func(b key.Binding) bool { return !b.Enabled() })
}
