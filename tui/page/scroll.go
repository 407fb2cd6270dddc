package page

import (
	"fmt"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tui"
)

// Keys move through a page.
type Keys struct {
	Up, Down, PageUp, PageDown, First, Last key.Binding
}

// NewKeys are the keys of the screens.
func NewKeys() Keys {
	bind := func(shown, does string, keys ...string) key.Binding {
		return key.NewBinding(key.WithKeys(keys...), key.WithHelp(shown, does))
	}
	return Keys{
		Down:     bind("j/down", "line down", "j", "down"),
		Up:       bind("k/up", "line up", "k", "up"),
		PageDown: bind("space/pgdown", "page", " ", "pgdown"),
		PageUp:   bind("pgup", "page up", "pgup"),
		First:    bind("g/home", "top", "g", "home"),
		Last:     bind("G/end", "bottom", "G", "end"),
	}
}

// Bindings lists the keys, the most useful first, line up and line down as one.
func (k Keys) Bindings() []key.Binding {
	return []key.Binding{tui.Pair("j/k/up/down", "line", k.Down, k.Up), k.PageDown, k.PageUp, k.First, k.Last}
}

// Scroll is a window on lines. The zero Scroll shows nothing.
type Scroll struct {
	lines []string
	rows  int
	top   int // index of the first line shown
}

// Hold takes over other lines; the window stays where it is, as far as it can.
func (s Scroll) Hold(lines []string) Scroll {
	s.lines = lines
	return s.to(s.top)
}

// Resize makes the window that many lines high.
func (s Scroll) Resize(rows int) Scroll {
	s.rows = max(rows, 0)
	return s.to(s.top)
}

// Reveal moves the window, if need be, so that line i is in it, with two lines
// of what stands before it.
func (s Scroll) Reveal(i int) Scroll {
	if i >= s.top && i < s.top+s.rows {
		return s
	}
	return s.to(i - 2)
}

func (s Scroll) to(top int) Scroll {
	s.top = max(0, min(top, len(s.lines)-s.rows))
	return s
}

// Update answers a key; any other leaves the window where it is.
func (s Scroll) Update(msg tea.KeyMsg, k Keys) Scroll {
	page := max(s.rows-1, 1)
	switch {
	case key.Matches(msg, k.Up):
		return s.to(s.top - 1)
	case key.Matches(msg, k.Down):
		return s.to(s.top + 1)
	case key.Matches(msg, k.PageUp):
		return s.to(s.top - page)
	case key.Matches(msg, k.PageDown):
		return s.to(s.top + page)
	case key.Matches(msg, k.First):
		return s.to(0)
	case key.Matches(msg, k.Last):
		return s.to(len(s.lines))
	}
	return s
}

// Window is the lines shown.
func (s Scroll) Window() []string {
	return s.lines[s.top:min(s.top+s.rows, len(s.lines))]
}

// Lines is how many there are in all.
func (s Scroll) Lines() int { return len(s.lines) }

// Longer tells that there are more lines than the window shows.
func (s Scroll) Longer() bool { return len(s.lines) > s.rows }

// Top is the index of the first line shown.
func (s Scroll) Top() int { return s.top }

// Position says what is shown: "lines 1-18 of 120".
func (s Scroll) Position() string {
	shown := len(s.Window())
	if shown == 0 {
		return fmt.Sprintf("%d lines", len(s.lines))
	}
	return fmt.Sprintf("lines %d-%d of %d", s.top+1, s.top+shown, len(s.lines))
}
