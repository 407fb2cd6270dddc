package tree

import (
	"github.com/charmbracelet/bubbles/key"

	"afterbeat/tui"
	"afterbeat/tui/field"
)

// keyMap are the keys of the screen.
type keyMap struct {
	up, down, pageUp, pageDown, first, last key.Binding
	fold, unfold, foldAll                   key.Binding
	find, clear, keep, drop                 key.Binding
	waves                                   key.Binding
	beds, impedance, measured, made         key.Binding
}

func newKeys() keyMap {
	bind := func(shown, does string, keys ...string) key.Binding {
		return key.NewBinding(key.WithKeys(keys...), key.WithHelp(shown, does))
	}
	return keyMap{
		down:      bind("j/down", "next", "j", "down"),
		up:        bind("k/up", "previous", "k", "up"),
		pageDown:  bind("space/pgdown", "page", " ", "pgdown"),
		pageUp:    bind("pgup", "page up", "pgup"),
		first:     bind("g/home", "top", "g", "home"),
		last:      bind("G/end", "bottom", "G", "end"),
		fold:      bind("h/left", "fold", "h", "left"),
		unfold:    bind("l/right", "unfold", "l", "right"),
		foldAll:   bind("z", "fold all", "z"),
		find:      bind("/", "filter", "/"),
		clear:     bind("esc", "clear the filter", "esc"),
		keep:      bind("enter", "keep the filter", "enter"),
		drop:      bind("esc", "no filter", "esc"),
		waves:     bind("w", "waves alone", "w"),
		beds:      bind("b", "beds", "b"),
		impedance: bind("i", "impedance, reflection", "i"),
		measured:  bind("d", "measured traces", "d"),
		made:      bind("m", "how it was made", "m"),
	}
}

// bindings are the keys as they work now: what has no effect is disabled, and
// what goes back says so.
func (m Model) bindings() keyMap {
	k := newKeys()
	there := m.tree != nil
	listing := there && m.view != made
	for _, b := range []*key.Binding{&k.up, &k.down, &k.pageUp, &k.pageDown, &k.first, &k.last} {
		b.SetEnabled(listing && (m.view != measured || len(m.tree.Distal) > 0))
	}
	segments := there && (m.view == outline || m.view == impedance)
	for _, b := range []*key.Binding{&k.fold, &k.unfold, &k.foldAll} {
		b.SetEnabled(segments && !m.filtered())
	}
	k.find.SetEnabled(segments)
	k.clear.SetEnabled(segments && m.filtered())
	k.waves.SetEnabled(there && (m.view == outline || m.view == beds))
	for _, b := range k.views() {
		b.SetEnabled(there)
	}
	k.keep.SetEnabled(m.asking)
	k.drop.SetEnabled(m.asking)
	if len(m.folded) > 0 {
		k.foldAll.SetHelp("z", "unfold all")
	}
	if m.waves {
		k.waves.SetHelp("w", "back to the list")
	}
	for v, b := range k.views() {
		if m.view == v {
			b.SetHelp(b.Help().Key, "back to the segments")
		}
	}
	return k
}

// views are the keys that open a view, and leave it.
func (k *keyMap) views() map[view]*key.Binding {
	return map[view]*key.Binding{beds: &k.beds, impedance: &k.impedance, measured: &k.measured, made: &k.made}
}

// Keys are the bindings that work now, the most useful first.
func (m Model) Keys() []key.Binding {
	k := m.bindings()
	switch {
	case m.asking:
		return append([]key.Binding{k.keep, k.drop}, field.Keys()...)
	case m.warnings.Open():
		return m.warnings.Keys.Bindings()
	case m.view == made && m.tree != nil:
		all := append([]key.Binding{k.made}, m.pageKeys.Bindings()...)
		return append(all, k.beds, k.impedance, k.measured, m.warnings.Keys.Open)
	}
	all := []key.Binding{
		tui.Pair("j/k/up/down", "move", k.down, k.up), tui.Pair("h/l/left/right", "fold, unfold", k.fold, k.unfold), k.find, k.clear,
		k.beds, k.impedance, k.measured, k.waves, k.made, k.foldAll, k.pageDown, k.pageUp, k.first, k.last, m.warnings.Keys.Open,
	}
	var on []key.Binding
	for _, b := range all {
		if b.Enabled() {
			on = append(on, b)
		}
	}
	return on
}
