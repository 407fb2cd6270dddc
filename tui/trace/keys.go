package trace

import (
	"github.com/charmbracelet/bubbles/key"

	"afterbeat/tui"
)

// Keys are the keys of the window and its cursor.
type Keys struct {
	Left, Right, FarLeft, FarRight, First, Last key.Binding
	In, Out, Whole, Table                       key.Binding
}

// NewKeys are the keys of the screens: h l and the arrows by a column, H L by
// ten, g G to the ends.
func NewKeys() Keys {
	bind := func(shown, does string, keys ...string) key.Binding {
		return key.NewBinding(key.WithKeys(keys...), key.WithHelp(shown, does))
	}
	return Keys{
		Left:     bind("h/left", "cursor left", "h", "left"),
		Right:    bind("l/right", "cursor right", "l", "right"),
		FarLeft:  bind("H", "ten columns left", "H"),
		FarRight: bind("L", "ten columns right", "L"),
		First:    bind("g/home", "first sample", "g", "home"),
		Last:     bind("G/end", "last sample", "G", "end"),
		In:       bind("+/=", "zoom in", "+", "="),
		Out:      bind("-", "zoom out", "-"),
		Whole:    bind("0", "whole trace", "0"),
		Table:    bind("t", "trace as a table", "t"),
	}
}

// Bindings lists the keys, the most useful first, the two ways of a move as one.
func (k Keys) Bindings() []key.Binding {
	return []key.Binding{
		tui.Pair("h/l/left/right", "cursor", k.Left, k.Right), k.In, k.Out, k.Whole, k.Table,
		tui.Pair("H/L", "ten columns", k.FarLeft, k.FarRight), k.First, k.Last,
	}
}
