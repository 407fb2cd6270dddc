package field

import "github.com/charmbracelet/bubbles/key"

// keyMap are the keys that edit, beside the letters themselves.
type keyMap struct {
	left, right, start, end key.Binding
	back, forward, clear    key.Binding
}

var keys = keyMap{
	left:    key.NewBinding(key.WithKeys("left"), key.WithHelp("left", "back a letter")),
	right:   key.NewBinding(key.WithKeys("right"), key.WithHelp("right", "on a letter")),
	start:   key.NewBinding(key.WithKeys("home"), key.WithHelp("home", "to the start")),
	end:     key.NewBinding(key.WithKeys("end"), key.WithHelp("end", "to the end")),
	back:    key.NewBinding(key.WithKeys("backspace"), key.WithHelp("backspace", "delete")),
	forward: key.NewBinding(key.WithKeys("delete"), key.WithHelp("delete", "delete to the right")),
	clear:   key.NewBinding(key.WithKeys("ctrl+u"), key.WithHelp("ctrl+u", "clear")),
}

// Keys are the bindings that edit, for the help.
func Keys() []key.Binding {
	return []key.Binding{keys.back, keys.clear, keys.left, keys.right, keys.start, keys.end, keys.forward}
}
