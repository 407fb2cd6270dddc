package intake

import (
	"github.com/charmbracelet/bubbles/key"

	"afterbeat/tui"
	"afterbeat/tui/field"
	"afterbeat/tui/trace"
	"afterbeat/tui/warnlist"
)

// keyMap are the keys of the screen; those of the trace and of the list of
// warnings are their own.
type keyMap struct {
	Down, Up, Use, Site, SiteBack, Unit, Calibrate, Beside, Invert, Start, End, Clear key.Binding
	Set, Cancel                                                                       key.Binding // in a text field
	Trace                                                                             trace.Keys
	List                                                                              warnlist.Keys
}

func newKeys() keyMap {
	bind := func(shown, does string, keys ...string) key.Binding {
		return key.NewBinding(key.WithKeys(keys...), key.WithHelp(shown, does))
	}
	return keyMap{
		Down:      bind("j/down", "next channel", "j", "down"),
		Up:        bind("k/up", "channel before", "k", "up"),
		Use:       bind("enter", "use", "enter"),
		Site:      bind("o", "site", "o"),
		SiteBack:  bind("O", "site before", "O"),
		Unit:      bind("e", "unit", "e"),
		Calibrate: bind("c", "calibrate", "c"),
		Beside:    bind("m", "measured", "m"),
		Invert:    bind("i", "invert", "i"),
		Start:     bind("[", "start span", "["),
		End:       bind("]", "end span", "]"),
		Clear:     bind("w", "whole span", "w"),
		Set:       bind("enter", "set", "enter"),
		Cancel:    bind("esc", "cancel", "esc"),
		Trace:     trace.NewKeys(),
		List:      warnlist.NewKeys(),
	}
}

// Keys are the bindings that work now.
func (m Model) Keys() []key.Binding {
	k := m.keys
	switch {
	case m.question.open():
		return append([]key.Binding{k.Set, k.Cancel}, field.Keys()...)
	case m.list.Open():
		return k.List.Bindings()
	case len(m.ready.channels) == 0:
		return []key.Binding{k.List.Open}
	}
	own := []key.Binding{
		tui.Pair("j/k/up/down", "channel", k.Down, k.Up), k.Use, k.Site, k.Unit, k.Beside,
		k.Start, k.End, k.Clear, k.Invert, k.Calibrate,
	}
	own = append(own, k.Trace.Bindings()...)
	return append(own, k.List.Open, k.SiteBack)
}
