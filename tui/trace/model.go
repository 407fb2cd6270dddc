package trace

import (
	"math"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tui"
	"afterbeat/tui/chart"
)

// Model is the window. Every method that changes it returns the changed one,
// and a command where a picture has to be prepared.
type Model struct {
	Keys Keys

	source Source
	window window // the one wanted
	cursor int
	table  bool
	area   tui.Area
	theme  tui.Theme
	shown  picture
	kept   map[order]picture // a cache: adding to it changes nothing that is seen
}

// mostKept bounds the cache.
const mostKept = 64

// New is a window on nothing.
func New() Model { return Model{Keys: NewKeys(), kept: map[order]picture{}} }

// Look turns to a source. The window and the cursor stay where the clock is
// the same; else the whole is shown and the cursor stands in its middle.
func (m Model) Look(s Source) (Model, tea.Cmd) {
	if s.Grid != m.source.Grid || s.samples() != m.source.samples() {
		m.window, m.cursor = window{0, s.samples()}, s.samples()/2
	}
	m.source = s
	if s.samples() == 0 {
		m.shown = picture{}
	}
	return m.want()
}

// Resize takes over the size and the theme of the picture.
func (m Model) Resize(a tui.Area, t tui.Theme) (Model, tea.Cmd) {
	m.area, m.theme = a, t
	return m.want()
}

// Show sets the window to n samples about sample i, and the cursor to i.
func (m Model) Show(i, n int) (Model, tea.Cmd) {
	m.cursor = max(0, min(i, m.source.samples()-1))
	m.window = window{i - n/2, n}.within(m.source.samples())
	return m.want()
}

// Reveal sets the cursor to sample i and, where some of from <= k < to lies
// outside the window, moves it so that little of what comes next is hidden.
func (m Model) Reveal(i, from, to int) (Model, tea.Cmd) {
	m.cursor = max(0, min(i, m.source.samples()-1))
	switch w := m.window; {
	case from < w.from:
		m.window.from = to + (to - from) - w.n
	case to > w.from+w.n:
		m.window.from = from - (to - from)
	}
	m.window = m.window.within(m.source.samples())
	return m.want()
}

// want shows the wanted picture if it is there, and else orders it.
func (m Model) want() (Model, tea.Cmd) {
	if m.source.samples() == 0 || m.area.Width < 1 || m.area.Height < 1 {
		return m, nil
	}
	m.window = m.window.within(m.source.samples())
	o := order{m.source.ID, m.window, m.area, m.theme, m.table}
	if p, ok := m.kept[o]; ok {
		m.shown = p
		return m, nil
	}
	source := m.source
	return m, func() tea.Msg { return preparedMsg{source.prepare(o)} }
}

// Update answers a key of Keys, or a prepared picture; everything else is
// passed over.
func (m Model) Update(msg tea.Msg) (Model, tea.Cmd) {
	switch msg := msg.(type) {
	case preparedMsg:
		return m.take(msg.picture), nil
	case tea.KeyMsg:
		return m.press(msg)
	}
	return m, nil
}

// take keeps a picture, and shows it if it is the one wanted.
func (m Model) take(p picture) Model {
	if p.order.id != m.source.ID {
		return m
	}
	if len(m.kept) >= mostKept {
		m.kept = map[order]picture{}
	}
	m.kept[p.order] = p
	if p.order == (order{m.source.ID, m.window, m.area, m.theme, m.table}) {
		m.shown = p
	}
	return m
}

func (m Model) press(msg tea.KeyMsg) (Model, tea.Cmd) {
	if m.source.samples() == 0 {
		return m, nil
	}
	k, n := m.Keys, m.window.n
	switch {
	case key.Matches(msg, k.Left):
		return m.step(-1)
	case key.Matches(msg, k.Right):
		return m.step(1)
	case key.Matches(msg, k.FarLeft):
		return m.step(-10)
	case key.Matches(msg, k.FarRight):
		return m.step(10)
	case key.Matches(msg, k.First):
		return m.to(0)
	case key.Matches(msg, k.Last):
		return m.to(m.source.samples() - 1)
	case key.Matches(msg, k.In):
		return m.Show(m.cursor, n/2)
	case key.Matches(msg, k.Out):
		return m.Show(m.cursor, 2*n)
	case key.Matches(msg, k.Whole):
		return m.Show(m.cursor, m.source.samples())
	case key.Matches(msg, k.Table):
		m.table = !m.table
		return m.want()
	}
	return m, nil
}

// step moves the cursor by columns of the picture, and by at least a sample.
func (m Model) step(columns int) (Model, tea.Cmd) {
	perColumn := float64(max(m.window.n-1, 1)) / float64(max(m.shown.columns-1, 1))
	at := math.Round(float64(m.cursor-m.window.from)/perColumn) + float64(columns)
	i := m.window.from + int(math.Round(at*perColumn))
	if i == m.cursor || (i > m.cursor) != (columns > 0) {
		i = m.cursor + columns
	}
	return m.to(i)
}

// to sets the cursor; the window follows it by half its length.
func (m Model) to(i int) (Model, tea.Cmd) {
	m.cursor = max(0, min(i, m.source.samples()-1))
	if m.window.holds(m.cursor) {
		return m, nil
	}
	m.window.from = m.cursor - m.window.n/2
	return m.want()
}

// Cursor is the sample that the cursor stands on; -1 without a source.
func (m Model) Cursor() int {
	if m.source.samples() == 0 {
		return -1
	}
	return m.cursor
}

// Window is the stretch of samples wanted, from <= i < to.
func (m Model) Window() (from, to int) { return m.window.from, m.window.from + m.window.n }

// Ready tells whether what is wanted is what is shown.
func (m Model) Ready() bool {
	return m.shown.order == order{m.source.ID, m.window, m.area, m.theme, m.table}
}

// Table tells whether the trace is shown as a table.
func (m Model) Table() bool { return m.table }

// View is the picture with more marks in its row, in exactly the area of the
// last Resize. The cursor is such a mark: one row changes where it moves.
func (m Model) View(more ...chart.Mark) string {
	p := m.shown
	switch {
	case p.order.id == "":
		return ""
	case p.order.table:
		return p.table
	}
	p.plot.Marks = append(p.plot.Marks[:len(p.plot.Marks):len(p.plot.Marks)], more...)
	return p.plot.Draw(m.area.Width, m.area.Height, m.theme.Chart())
}
