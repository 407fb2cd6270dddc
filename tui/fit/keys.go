package fit

import (
	"slices"

	"github.com/charmbracelet/bubbles/key"

	"afterbeat/tui"
	"afterbeat/tui/explain"
	"afterbeat/tui/page"
)

// keyMap are the keys of the screen.
type keyMap struct {
	previous, next, basis  key.Binding
	choose                 key.Binding
	up, down, number, why  key.Binding
	less, more, leave      key.Binding
	flow, impedance, waves key.Binding
	table                  key.Binding
	page                   page.Keys // of a text that is longer than the area
}

func newKeys() keyMap {
	bind := func(shown, does string, keys ...string) key.Binding {
		return key.NewBinding(key.WithKeys(keys...), key.WithHelp(shown, does))
	}
	return keyMap{
		previous:  bind("h/left", "way before", "left", "h"),
		next:      bind("l/right", "next way", "right", "l"),
		basis:     bind("b", "basis", "b"),
		choose:    bind("c", "use", "c"),
		up:        bind("k/up", "number above", "up", "k"),
		down:      bind("j/down", "number below", "down", "j"),
		number:    explain.NewKeys().Open,
		why:       bind("r", "recommendation", "r"),
		less:      bind("[", "what-if back", "["),
		more:      bind("]", "what if", "]"),
		leave:     bind("esc", "end what-if", "esc"),
		flow:      bind("f", "flow", "f"),
		impedance: bind("z", "impedance", "z"),
		waves:     bind("w", "waves", "w"),
		table:     bind("t", "table", "t"),
		page:      page.NewKeys(),
	}
}

// bindings are the keys as they work now: what has no effect is disabled, and
// what goes back says so.
func (m Model) bindings() keyMap {
	k := newKeys()
	fitted, many := m.item().fitted(), len(m.items) > 1
	k.previous.SetEnabled(many)
	k.next.SetEnabled(many)
	k.basis.SetEnabled(m.otherBasis() >= 0)
	k.choose.SetEnabled(fitted)
	if m.takesBack() {
		k.choose.SetHelp("c", "take back")
	}
	numbers := len(m.item().rows)
	k.up.SetEnabled(numbers > 1)
	k.down.SetEnabled(numbers > 1)
	k.number.SetEnabled(numbers > 0)
	k.why.SetEnabled(len(m.items) > 0)
	k.less.SetEnabled(fitted)
	k.more.SetEnabled(fitted)
	k.leave.SetEnabled(m.moved != 0)
	k.page.PageDown.SetEnabled(m.view == advised && m.read.Longer())
	k.page.PageUp.SetEnabled(k.page.PageDown.Enabled())
	k.table.SetEnabled(m.beat())
	for p, b := range k.pictures() {
		b.SetEnabled(m.has(p))
		if m.picture == p {
			b.SetHelp(b.Help().Key, "pressure")
		}
	}
	switch m.view {
	case advised:
		closing(&k.why, "close")
		k.leave.SetEnabled(false)
	case tabled:
		closing(&k.table, "picture")
		k.leave.SetEnabled(false)
	}
	return k
}

// pictures are the keys that show a picture in place of the pressure.
func (k *keyMap) pictures() map[picture]*key.Binding {
	return map[picture]*key.Binding{ofFlow: &k.flow, ofImpedance: &k.impedance, ofWaves: &k.waves}
}

// closing lets esc do too what goes back to the picture.
func closing(b *key.Binding, does string) {
	b.SetHelp(b.Help().Key+"/esc", does)
	b.SetKeys(append(b.Keys(), "esc")...)
}

// Keys are the bindings that work now, the most useful first.
func (m Model) Keys() []key.Binding {
	switch {
	case m.warnings.Open():
		return m.warnings.Keys.Bindings()
	case m.numbers.Open():
		k := m.bindings()
		all := append(m.numbers.Bindings(), tui.Pair("h/l/left/right", "model", k.previous, k.next))
		return slices.DeleteFunc(all, func(b key.Binding) bool { return !b.Enabled() })
	}
	k := m.bindings()
	all := []key.Binding{
		k.leave, tui.Pair("h/l/left/right", "model", k.previous, k.next), tui.Pair("[/]", "what if", k.less, k.more),
		k.number, k.choose, k.page.PageDown, k.page.PageUp, k.why, k.flow, k.impedance, k.waves, k.basis, k.table,
		tui.Pair("j/k/up/down", "number", k.down, k.up), m.warnings.Keys.Open,
	}
	return slices.DeleteFunc(all, func(b key.Binding) bool { return !b.Enabled() })
}
