package warnlist

import (
	"fmt"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/tui"
	_ "afterbeat/tui/background"
	"afterbeat/tui/layout"
	"afterbeat/tui/page"
)

// Keys are the keys of the list. Open is the one that the counted line names;
// the others work while the list is open.
type Keys struct {
	Open, Close key.Binding
	Page        page.Keys
}

// NewKeys are the keys of the screens.
func NewKeys() Keys {
	return Keys{
		Open:  key.NewBinding(key.WithKeys("v"), key.WithHelp("v", "read the warnings")),
		Close: key.NewBinding(key.WithKeys("v", "enter", "esc"), key.WithHelp("v/enter/esc", "close the list")),
		Page:  page.NewKeys(),
	}
}

// Bindings lists the keys that work while the list is open, the most useful first.
func (k Keys) Bindings() []key.Binding {
	return append([]key.Binding{k.Close}, k.Page.Bindings()...)
}

// Model is the list.
type Model struct {
	Keys Keys

	warnings []data.Warning
	cures    map[data.Code]string
	title    string
	area     tui.Area
	theme    tui.Theme
	scroll   page.Scroll
	open     bool
}

// New is a list without warnings. cures says, for a code, what can be done on
// the screen that it is shown on, such as "o sets the site"; the title heads the
// open list.
func New(title string, cures map[data.Code]string) Model {
	return Model{Keys: NewKeys(), title: title, cures: cures}
}

// Hold takes over the warnings.
func (m Model) Hold(warnings []data.Warning) Model {
	m.warnings = warnings
	return m.wrapped()
}

// Resize takes over the area of the open list, and the theme.
func (m Model) Resize(a tui.Area, t tui.Theme) Model {
	m.area, m.theme = a, t
	return m.wrapped()
}

// Open tells whether the list is open.
func (m Model) Open() bool { return m.open }

// Count is the counted line.
func (m Model) Count() string {
	switch n := len(m.warnings); n {
	case 0:
		return "no warnings"
	case 1:
		return "1 warning: v to read"
	default:
		return fmt.Sprintf("%d warnings: v to read", n)
	}
}

// Update answers a key.
func (m Model) Update(msg tea.KeyMsg) Model {
	switch {
	case !m.open:
		m.open = key.Matches(msg, m.Keys.Open)
	case key.Matches(msg, m.Keys.Close):
		m.open = false
	default:
		m.scroll = m.scroll.Update(msg, m.Keys.Page)
	}
	return m
}

// wrapped writes the lines of the list.
func (m Model) wrapped() Model {
	var lines []string
	add := func(head, text string) {
		for k, line := range layout.Wrap(layout.Clean(text, m.theme), m.area.Width-len(head)) {
			if k > 0 {
				head = fmt.Sprintf("%*s", len(head), "")
			}
			lines = append(lines, head+line)
		}
	}
	for i, w := range m.warnings {
		add(fmt.Sprintf("%d. ", i+1), fmt.Sprintf("%s: %s", w.Code, w.Text))
		if here := m.cures[w.Code]; here != "" {
			add("   ", "here: "+here)
		}
		add("   ", "cure: "+w.Cure)
	}
	if len(lines) == 0 {
		lines = []string{"Nothing to warn of."}
	}
	m.scroll = m.scroll.Hold(lines).Resize(m.area.Height - 1)
	return m
}

// View is the open list, in the area.
func (m Model) View() string {
	head := fmt.Sprintf("%s: %d   %s", m.title, len(m.warnings), m.scroll.Position())
	return layout.Fit(append([]string{head}, m.scroll.Window()...), m.area)
}
