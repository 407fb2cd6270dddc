package note

import (
	"fmt"
	"strings"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"
	"github.com/charmbracelet/x/ansi"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tree/study"
	"afterbeat/tui"
	_ "afterbeat/tui/background"
	"afterbeat/tui/field"
	"afterbeat/tui/page"
)

// what is typed in the field, if anything.
type what int

const (
	nothing what = iota
	remark
	search
)

// Model is the screen.
type Model struct {
	area    tui.Area
	theme   tui.Theme
	study   study.Study
	noted   noted    // the note as it will be saved
	lines   []string // those of the theme
	widest  int      // cells of the widest line
	scroll  page.Scroll
	shift   int // cells left out on the left
	typing  what
	field   field.Model
	sought  string // in lower case; empty: nothing
	matches []int  // lines that hold it
	match   int    // the one at hand
	request int    // of the note asked for last
}

var _ tui.Screen = Model{}

// New is the screen before anything was computed.
func New() Model { return Model{} }

// Typing tells that the field has the focus.
func (m Model) Typing() bool { return m.typing != nothing }

// there tells that there is a note.
func (m Model) there() bool { return tui.Note.Missing(m.study) == "" && len(m.lines) > 0 }

// Show takes over what has been computed. The lines of the note before stay
// until the new ones are there.
func (m Model) Show(s study.Study) (tui.Screen, tea.Cmd) {
	m.study = s
	if tui.Note.Missing(s) != "" {
		m = m.hold(noted{})
		m.typing = nothing
	}
	return m.render()
}

// Resize takes over size and theme.
func (m Model) Resize(a tui.Area, t tui.Theme) (tui.Screen, tea.Cmd) {
	m.area, m.theme = a, t
	m.scroll = m.scroll.Resize(a.Height - 1)
	return m.hold(m.noted), nil
}

// noted is the lines of a note, in both themes.
type noted struct{ unicode, ascii []string }

// notedMsg brings a note.
type notedMsg struct {
	request int
	noted   noted
}

// render asks for the note.
func (m Model) render() (tui.Screen, tea.Cmd) {
	m.request++
	if tui.Note.Missing(m.study) != "" {
		return m, nil
	}
	s, request := m.study, m.request
	return m, func() tea.Msg {
		n := s.Note()
		lines := func(o casenote.Options) []string {
			return strings.Split(strings.TrimSuffix(study.Text(n, o), "\n"), "\n")
		}
		return notedMsg{request: request, noted: noted{lines(casenote.Options{}), lines(casenote.Options{ASCII: true})}}
	}
}

// hold takes over a note, and looks in it for what was sought.
func (m Model) hold(n noted) Model {
	m.noted, m.lines, m.widest = n, n.unicode, 0
	if m.theme.ASCII {
		m.lines = n.ascii
	}
	for _, line := range m.lines {
		m.widest = max(m.widest, ansi.StringWidth(line))
	}
	m.scroll = m.scroll.Hold(m.lines)
	m.shift = m.shiftBy(0)
	return m.find()
}

// find lists the lines that hold what was sought.
func (m Model) find() Model {
	m.matches = nil
	if m.sought != "" {
		for i, line := range m.lines {
			if strings.Contains(strings.ToLower(line), m.sought) {
				m.matches = append(m.matches, i)
			}
		}
	}
	m.match = max(0, min(m.match, len(m.matches)-1))
	return m
}

// Update answers a key, or takes over the lines of a note.
func (m Model) Update(msg tea.Msg) (tui.Screen, tea.Cmd) {
	switch msg := msg.(type) {
	case notedMsg:
		if msg.request == m.request {
			m = m.hold(msg.noted)
		}
	case tea.KeyMsg:
		if m.typing != nothing {
			return m.enter(msg)
		}
		if key.Matches(msg, m.bindings().brief) {
			return m, m.shortened()
		}
		return m.press(msg), nil
	}
	return m, nil
}

func (m Model) press(msg tea.KeyMsg) Model {
	switch k := m.bindings(); {
	case key.Matches(msg, k.remark):
		m.typing, m.field = remark, field.New(m.study.Inputs.Case.Remark)
	case key.Matches(msg, k.search):
		m.typing, m.field = search, field.Model{}
	case key.Matches(msg, k.next):
		return m.goTo(m.match + 1)
	case key.Matches(msg, k.previous):
		return m.goTo(m.match - 1)
	case key.Matches(msg, k.end):
		m.sought = ""
		m = m.find()
		m.shift = m.shiftBy(0)
	case key.Matches(msg, k.left):
		m.shift = m.shiftBy(-shiftStep)
	case key.Matches(msg, k.right):
		m.shift = m.shiftBy(shiftStep)
	default:
		m.scroll = m.scroll.Update(msg, k.page)
	}
	return m
}

// shiftStep is how far left and right move, in cells.
const shiftStep = 20

// shiftBy is the cells left out on the left after a move.
func (m Model) shiftBy(n int) int {
	return max(0, min(m.shift+n, m.widest-m.textWidth()))
}

// textWidth is what is left for the lines: what was searched for has a margin.
func (m Model) textWidth() int { return max(m.area.Width-len(m.margin(0)), 0) }

// enter answers a key while something is typed.
func (m Model) enter(msg tea.KeyMsg) (tui.Screen, tea.Cmd) {
	k := newKeys()
	switch {
	case msg.Paste:
		m.field = m.field.Update(msg)
	case key.Matches(msg, k.cancel):
		m.typing = nothing
	case key.Matches(msg, k.accept) && m.typing == remark:
		return m.remarked()
	case key.Matches(msg, k.accept):
		return m.searched()
	default:
		m.field = m.field.Update(msg)
	}
	return m, nil
}

// shortened asks for the note in brief, or whole again.
func (m Model) shortened() tea.Cmd {
	c := m.study.Inputs.Case
	if c.Brief = !c.Brief; c.Brief {
		return tui.Change("a brief note: b has all sections again", c)
	}
	return tui.Change("a note of all sections", c)
}

// remarked puts the remark into the case.
func (m Model) remarked() (tui.Screen, tea.Cmd) {
	m.typing = nothing
	c := m.study.Inputs.Case
	text := data.Clean(m.field.Value()).String()
	switch {
	case text == c.Remark:
		return m, nil
	case text == "":
		c.Remark = ""
		return m, tui.Change("remark taken out of the note", c)
	}
	c.Remark = text
	return m, tui.Change("remark put at the end of the note", c)
}

// searched goes to the first match from the window on.
func (m Model) searched() (tui.Screen, tea.Cmd) {
	m.typing, m.match = nothing, 0
	m.sought = strings.ToLower(data.Clean(m.field.Value()).String())
	m = m.find()
	if m.sought == "" {
		return m, nil
	}
	if len(m.matches) == 0 {
		return m, tui.Say(fmt.Sprintf("%q does not stand in the note", m.sought))
	}
	for i, line := range m.matches {
		if line >= m.scroll.Top() {
			return m.goTo(i), nil
		}
	}
	return m.goTo(0), nil
}

// goTo shows a match; after the last comes the first.
func (m Model) goTo(i int) Model {
	n := len(m.matches)
	m.match = (i + n) % n
	m.scroll = m.scroll.Reveal(m.matches[m.match])
	m.shift = m.shiftBy(0)
	return m
}
