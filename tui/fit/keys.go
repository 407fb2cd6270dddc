package fit

import (
	"github.com/charmbracelet/bubbles/key"

	"afterbeat/tui"
	"afterbeat/tui/page"
)

// keyMap are the keys of the screen.
type keyMap struct {
	previous, next, choose key.Binding
	up, down, number, why  key.Binding
	less, more             key.Binding
	flow, table            key.Binding
	page                   page.Keys // of a text that is longer than the area
}

func newKeys() keyMap {
	bind := func(shown, does string, keys ...string) key.Binding {
		return key.NewBinding(key.WithKeys(keys...), key.WithHelp(shown, does))
	}
	return keyMap{
		previous: bind("h/left", "model before", "left", "h"),
		next:     bind("l/right", "next model", "right", "l"),
		choose:   bind("enter", "use it", "enter"),
		up:       bind("k/up", "number above", "up", "k"),
		down:     bind("j/down", "number below", "down", "j"),
		number:   bind("x", "open number", "x"),
		why:      bind("r", "recommendation", "r"),
		less:     bind("[", "what-if back", "["),
		more:     bind("]", "what if", "]"),
		flow:     bind("f", "flow", "f"),
		table:    bind("t", "table", "t"),
		page:     page.NewKeys(),
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
	k.why.SetEnabled(len(m.sheets) > 0 && m.advice() != "" && m.view != tabled)
	switch m.view {
	case opened:
		closing(&k.number, "close")
	case advised:
		closing(&k.why, "close")
	}
	long := m.read.Longer()
	k.page.PageDown.SetEnabled(long)
	k.page.PageUp.SetEnabled(long)
	k.less.SetEnabled(models > 0 && len(m.fit.Sensitivity) > 0)
	k.more.SetEnabled(k.less.Enabled())
	k.flow.SetEnabled(m.fit != nil && m.fit.Beats.Flow.Count > 0 && m.fit.Beats.Pressure.Count > 0)
	if m.flow {
		k.flow.SetHelp("f", "pressure")
	}
	k.table.SetEnabled(m.beat())
	if m.view == tabled {
		closing(&k.table, "picture")
	}
	return k
}

// closing lets esc do too what goes back to the picture.
func closing(b *key.Binding, does string) {
	b.SetHelp(b.Help().Key+"/esc", does)
	b.SetKeys(append(b.Keys(), "esc")...)
}

// Keys are the bindings that work now, the most useful first.
func (m Model) Keys() []key.Binding {
	if m.warnings.Open() {
		return m.warnings.Keys.Bindings()
	}
	k := m.bindings()
	var on []key.Binding
	for _, b := range []key.Binding{
		tui.Pair("h/l/left/right", "model", k.next, k.previous), k.choose, tui.Pair("[/]", "what if", k.less, k.more),
		k.number, k.page.PageDown, k.page.PageUp, k.flow, k.why, k.table,
		tui.Pair("j/k/up/down", "number", k.down, k.up), m.warnings.Keys.Open,
	} {
		if b.Enabled() {
			on = append(on, b)
		}
	}
	return on
}
