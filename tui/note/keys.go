package note

import (
	"slices"

	"github.com/charmbracelet/bubbles/key"

	"afterbeat/tui"
	"afterbeat/tui/field"
	"afterbeat/tui/page"
)

// keyMap are the keys of the screen.
type keyMap struct {
	page           page.Keys
	remark, search key.Binding
	brief          key.Binding
	next, previous key.Binding // of what was searched for
	end            key.Binding // of the search
	left, right    key.Binding
	accept, cancel key.Binding // of a text field
}

func newKeys() keyMap {
	bind := func(shown, does string, keys ...string) key.Binding {
		return key.NewBinding(key.WithKeys(keys...), key.WithHelp(shown, does))
	}
	return keyMap{
		page:     page.NewKeys(),
		remark:   bind("r", "remark", "r"),
		search:   bind("/", "search", "/"),
		brief:    bind("b", "brief", "b"),
		next:     bind("n", "next match", "n"),
		previous: bind("N", "match before", "N"),
		end:      bind("esc", "end search", "esc"),
		left:     bind("h/left", "to the left", "left", "h"),
		right:    bind("l/right", "to the right", "right", "l"),
		accept:   bind("enter", "accept", "enter"),
		cancel:   bind("esc", "cancel", "esc"),
	}
}

// bindings are the keys as they work now.
func (m Model) bindings() keyMap {
	k := newKeys()
	there := m.there()
	k.remark.SetEnabled(there)
	k.search.SetEnabled(there)
	k.brief.SetEnabled(there)
	if m.study.Inputs.Case.Brief {
		k.brief.SetHelp("b", "all sections")
	}
	k.next.SetEnabled(len(m.matches) > 0)
	k.previous.SetEnabled(len(m.matches) > 0)
	k.end.SetEnabled(m.sought != "")
	wide := there && m.widest > m.textWidth()
	k.left.SetEnabled(wide)
	k.right.SetEnabled(wide)
	return k
}

// Keys are the bindings that work now, the most useful first.
func (m Model) Keys() []key.Binding {
	k := m.bindings()
	var all []key.Binding
	switch {
	case m.typing != nothing:
		all = slices.Concat([]key.Binding{k.accept, k.cancel}, field.Keys())
	case m.there():
		all = []key.Binding{
			tui.Pair("n/N", "match", k.next, k.previous), k.end, k.page.PageDown, k.remark, k.brief, k.search,
			tui.Pair("j/k/up/down", "line", k.page.Down, k.page.Up), k.page.PageUp, k.page.First, k.page.Last,
			tui.Pair("h/l/left/right", "sideways", k.left, k.right),
		}
	}
	return slices.DeleteFunc(all, func(b key.Binding) bool { return !b.Enabled() })
}
