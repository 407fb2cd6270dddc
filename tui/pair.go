package tui

import (
	"slices"

	"github.com/charmbracelet/bubbles/key"
)

// Pair lists two bindings of one action, there and back, as one entry: "j/k/up/down
// channel". It works where either does.
func Pair(shown, does string, a, b key.Binding) key.Binding {
	both := key.NewBinding(key.WithKeys(slices.Concat(a.Keys(), b.Keys())...), key.WithHelp(shown, does))
	both.SetEnabled(a.Enabled() || b.Enabled())
	return both
}
