package explain

import (
	"fmt"
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/tui"
	_ "afterbeat/tui/background"
	"afterbeat/tui/layout"
	"afterbeat/tui/page"
)

// Keys are the keys of the list. Open opens it; the others work while it is open.
type Keys struct {
	Open, Close, Next, Previous key.Binding
	PageDown, PageUp            key.Binding
}

// NewKeys are the keys of the screens.
func NewKeys() Keys {
	bind := func(shown, does string, keys ...string) key.Binding {
		return key.NewBinding(key.WithKeys(keys...), key.WithHelp(shown, does))
	}
	p := page.NewKeys()
	return Keys{
		Open:     bind("enter", "explain", "enter"),
		Close:    bind("enter/esc", "close", "enter", "esc"),
		Next:     bind("j/down", "number below", "j", "down"),
		Previous: bind("k/up", "number above", "k", "up"),
		PageDown: p.PageDown,
		PageUp:   p.PageUp,
	}
}

// Model is the list, closed to begin with.
type Model struct {
	Keys Keys

	numbers []Number
	at      int
	open    bool
	area    tui.Area
	theme   tui.Theme
	read    page.Scroll
}

// New is a list without numbers.
func New() Model { return Model{Keys: NewKeys()} }

// Hold takes over the numbers; the cursor stays on the one of the same name.
func (m Model) Hold(numbers []Number) Model {
	name := ""
	if m.at < len(m.numbers) {
		name = m.numbers[m.at].Name
	}
	m.numbers = numbers
	for i, n := range numbers {
		if n.Name == name {
			return m.to(i)
		}
	}
	return m.to(m.at)
}

// At puts the cursor on number i.
func (m Model) At(i int) Model { return m.to(i) }

// Cursor is the index of the number under the cursor.
func (m Model) Cursor() int { return m.at }

// Len is how many numbers there are.
func (m Model) Len() int { return len(m.numbers) }

// Open tells whether the list is open.
func (m Model) Open() bool { return m.open && len(m.numbers) > 0 }

// Toggle opens the list, or closes it.
func (m Model) Toggle() Model {
	m.open = !m.Open()
	return m.to(m.at)
}

// Resize takes over the area of the open list, and the theme.
func (m Model) Resize(a tui.Area, t tui.Theme) Model {
	m.area, m.theme = a, t
	return m.to(m.at)
}

// to puts the cursor on number i, as far as there is one, and has its words
// ready while the list is open.
func (m Model) to(i int) Model {
	was := m.at
	m.at = max(0, min(i, len(m.numbers)-1))
	if !m.Open() {
		return m
	}
	if m.at != was {
		m.read = page.Scroll{}
	}
	m.read = m.read.Hold(m.numbers[m.at].Lines(m.textWidth(), m.theme)).Resize(m.area.Height - m.headLines() - 1)
	return m
}

// Update answers a key while the list is open, or opens it.
func (m Model) Update(msg tea.KeyMsg) Model {
	switch {
	case !m.Open() && key.Matches(msg, m.Keys.Open), m.Open() && key.Matches(msg, m.Keys.Close):
		return m.Toggle()
	case !m.Open():
	case key.Matches(msg, m.Keys.Next):
		return m.to(m.at + 1)
	case key.Matches(msg, m.Keys.Previous):
		return m.to(m.at - 1)
	case key.Matches(msg, m.Keys.PageDown):
		m.read = m.read.Update(msg, page.Keys{PageDown: m.Keys.PageDown})
	case key.Matches(msg, m.Keys.PageUp):
		m.read = m.read.Update(msg, page.Keys{PageUp: m.Keys.PageUp})
	}
	return m
}

// Bindings lists the keys that work while the list is open, the most useful
// first.
func (m Model) Bindings() []key.Binding {
	all := []key.Binding{m.Keys.Close}
	if len(m.numbers) > 1 {
		all = append(all, tui.Pair("j/k/up/down", "number", m.Keys.Next, m.Keys.Previous))
	}
	if m.read.Longer() {
		all = append(all, m.Keys.PageDown, m.Keys.PageUp)
	}
	return all
}

// The sizes that decide.
const (
	besideWidth = 76 // of the area, from which the list stands beside the words
	listCells   = 26
	gap         = 2
)

func (m Model) beside() bool { return m.area.Width >= besideWidth && len(m.numbers) > 1 }

// headLines stand above the words where the list has no room.
func (m Model) headLines() int {
	if m.beside() || len(m.numbers) < 2 {
		return 0
	}
	return 1
}

func (m Model) textWidth() int {
	if m.beside() {
		return m.area.Width - listCells - gap
	}
	return m.area.Width
}

// View is the list with the words of the number under the cursor.
func (m Model) View() string {
	rows := m.area.Height - 1
	foot := m.read.Position()
	if m.read.Longer() {
		foot += "   space and pgup read on"
	}
	lines := layout.Lines(strings.Join(m.read.Window(), "\n"), rows-m.headLines())
	switch {
	case m.beside():
		lines = layout.Beside(m.list(rows), lines, listCells+gap)
	case m.headLines() > 0:
		lines = append([]string{fmt.Sprintf("> number %d of %d (j, k)", m.at+1, len(m.numbers))}, lines...)
	}
	return layout.Fit(append(layout.Lines(strings.Join(lines, "\n"), rows), foot), m.area)
}

// list is the names with their values, about the cursor.
func (m Model) list(rows int) []string {
	from := max(0, min(m.at-rows/2, len(m.numbers)-rows))
	var lines []string
	for i := from; i < min(from+rows, len(m.numbers)); i++ {
		cursor := "  "
		if i == m.at {
			cursor = "> "
		}
		n := m.numbers[i]
		value := layout.Clean(n.short(), m.theme)
		room := listCells - len(cursor)
		name := layout.Clean(n.Name, m.theme)
		if name.Width()+1+value.Width() > room { // a number that is cut would be another
			value = data.Text{}
		}
		lines = append(lines, cursor+layout.Pad(name, room-value.Width())+value.String())
	}
	return lines
}
