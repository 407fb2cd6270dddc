package app

import (
	"slices"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/tui"
)

// press takes a key. Letters that the terminal has sent in one piece are single
// presses, unless they go into a text field; what was pasted goes there only.
func (m Model) press(msg tea.KeyMsg) (Model, tea.Cmd) {
	switch {
	case m.leaving == leaves, m.leaving == interrupts:
		return m, nil
	case key.Matches(msg, keys.interrupt):
		return m.interrupt()
	case m.typing():
		return m.one(msg)
	case msg.Paste:
		m.said = data.Clean("pasted text goes into text fields only")
		return m, nil
	case msg.Alt: // esc and a key that came in one read: no key has alt
		m, first := m.press(tea.KeyMsg{Type: tea.KeyEsc})
		msg.Alt = false
		m, then := m.press(msg)
		return m, tea.Batch(first, then)
	case msg.Type == tea.KeyRunes && len(msg.Runes) > 1:
		return m.burst(msg.Runes)
	}
	return m.one(msg)
}

// burst presses letters one by one, until one of them opens a text field, which
// gets the rest.
func (m Model) burst(letters []rune) (Model, tea.Cmd) {
	var cmds []tea.Cmd
	for i, r := range letters {
		var cmd tea.Cmd
		if m.typing() {
			m, cmd = m.press(tea.KeyMsg{Type: tea.KeyRunes, Runes: letters[i:]})
			return m, tea.Batch(append(cmds, cmd)...)
		}
		m, cmd = m.press(letter(r))
		cmds = append(cmds, cmd)
	}
	return m, tea.Batch(cmds...)
}

func letter(r rune) tea.KeyMsg {
	if r == ' ' {
		return tea.KeyMsg{Type: tea.KeySpace, Runes: []rune{r}}
	}
	return tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune{r}}
}

// typing tells that a text field has the focus.
func (m Model) typing() bool {
	return m.naming || m.leaving == stays && !m.helping && m.screens[m.open].Typing()
}

// one takes one key: whoever has the focus gets it.
func (m Model) one(msg tea.KeyMsg) (Model, tea.Cmd) {
	switch {
	case m.naming:
		return m.nameKey(msg)
	case m.leaving == asks:
		return m.leaveKey(msg)
	case m.helping:
		return m.helpKey(msg), nil
	case m.typing():
		return m.toOpen(msg)
	case key.Matches(msg, keys.redraw):
		return m, tea.ClearScreen
	case m.offer != nil:
		return m.offerKey(msg)
	case key.Matches(msg, keys.quit):
		return m.quit()
	case m.small():
		return m, nil
	}
	if !key.Matches(msg, keys.help) { // which shows it in full
		m.said = data.Text{}
	}
	return m.browse(msg)
}

// browse takes a key while nothing is asked: those of the root first.
func (m Model) browse(msg tea.KeyMsg) (Model, tea.Cmd) {
	if s := slices.IndexFunc(keys.stage[:], func(b key.Binding) bool { return key.Matches(msg, b) }); s >= 0 {
		return m.openStage(tui.Stages()[s])
	}
	switch {
	case len(m.errors) > 0 && key.Matches(msg, keys.answer):
		m.errors = m.errors[1:]
		return m, nil
	case m.job.running && key.Matches(msg, keys.cancel) && !m.screenWants(msg):
		return m.cancel(), nil
	case key.Matches(msg, keys.next):
		return m.openStage(m.open%tui.Note + 1)
	case key.Matches(msg, keys.previous):
		return m.openStage((m.open+tui.Note-2)%tui.Note + 1)
	case key.Matches(msg, keys.help):
		m.helping, m.scroll = true, 0
		return m, nil
	case key.Matches(msg, keys.save):
		return m.askName()
	case key.Matches(msg, keys.undo):
		return m.undo()
	case key.Matches(msg, keys.redo):
		return m.redo()
	case key.Matches(msg, keys.ascii):
		m.theme.ASCII = !m.theme.ASCII
		return m.lay()
	case key.Matches(msg, keys.suspend):
		return m.toShell()
	}
	return m.toOpen(msg)
}

// toOpen gives a key to the screen of the open stage.
func (m Model) toOpen(msg tea.KeyMsg) (Model, tea.Cmd) {
	m, cmd := m.ask(m.open, func(s tui.Screen) (tui.Screen, tea.Cmd) { return s.Update(msg) })
	return m.atOnce(cmd)
}

// screenWants tells whether the open screen lists a key as one that works now.
func (m Model) screenWants(msg tea.KeyMsg) bool {
	return key.Matches(msg, m.screens[m.open].Keys()...)
}

// toShell stops the program, where there is a shell that could wake it.
func (m Model) toShell() (Model, tea.Cmd) {
	if m.leader {
		m.said = data.Clean("no shell to return to: afterbeat leads this session")
		return m, nil
	}
	return m, tea.Suspend
}
