package app

import (
	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tui"
)

// keyMap are the keys of the root. A screen binds none of those that work
// while it is open.
type keyMap struct {
	stage                [6]key.Binding // by tui.Stage, from 1
	next, previous       key.Binding
	help, save, quit     key.Binding
	undo, redo           key.Binding
	ascii, redraw        key.Binding
	interrupt, suspend   key.Binding
	cancel, answer       key.Binding
	confirm, back        key.Binding // of the name of a note
	first, discard, stay key.Binding // of the question on quitting
	resume, forget       key.Binding // of the question on starting
	up, down             key.Binding // of the help
	pageUp, pageDown     key.Binding
	top, bottom, close   key.Binding
}

var keys = keyMap{
	stage:     stageKeys(),
	next:      key.NewBinding(key.WithKeys("tab"), key.WithHelp("tab", "next stage")),
	previous:  key.NewBinding(key.WithKeys("shift+tab"), key.WithHelp("shift+tab", "previous stage")),
	help:      key.NewBinding(key.WithKeys("?"), key.WithHelp("?", "help")),
	save:      key.NewBinding(key.WithKeys("s"), key.WithHelp("s", "save note")),
	quit:      key.NewBinding(key.WithKeys("q"), key.WithHelp("q", "quit")),
	undo:      key.NewBinding(key.WithKeys("u"), key.WithHelp("u", "undo")),
	redo:      key.NewBinding(key.WithKeys("ctrl+r"), key.WithHelp("ctrl+r", "redo")),
	ascii:     key.NewBinding(key.WithKeys("A"), key.WithHelp("A", "ASCII or Unicode")),
	redraw:    key.NewBinding(key.WithKeys("ctrl+l"), key.WithHelp("ctrl+l", "redraw")),
	interrupt: key.NewBinding(key.WithKeys("ctrl+c"), key.WithHelp("ctrl+c", "leave at once")),
	suspend:   key.NewBinding(key.WithKeys("ctrl+z"), key.WithHelp("ctrl+z", "to the shell")),
	cancel:    key.NewBinding(key.WithKeys("esc"), key.WithHelp("esc", "stop computing")),
	answer:    key.NewBinding(key.WithKeys("esc"), key.WithHelp("esc", "close error")),
	confirm:   key.NewBinding(key.WithKeys("enter"), key.WithHelp("enter", "save")),
	back:      key.NewBinding(key.WithKeys("esc"), key.WithHelp("esc", "back")),
	first:     key.NewBinding(key.WithKeys("s"), key.WithHelp("s", "save the note first")),
	discard:   key.NewBinding(key.WithKeys("y"), key.WithHelp("y", "discard and quit")),
	stay:      key.NewBinding(key.WithKeys("esc"), key.WithHelp("esc", "stay")),
	resume:    key.NewBinding(key.WithKeys("r"), key.WithHelp("r", "resume")),
	forget:    key.NewBinding(key.WithKeys("esc"), key.WithHelp("esc", "discard (asks again)")),
	up:        key.NewBinding(key.WithKeys("up", "k"), key.WithHelp("up/k", "up")),
	down:      key.NewBinding(key.WithKeys("down", "j"), key.WithHelp("down/j", "down")),
	pageUp:    key.NewBinding(key.WithKeys("pgup"), key.WithHelp("pgup", "page up")),
	pageDown:  key.NewBinding(key.WithKeys("pgdown"), key.WithHelp("pgdn", "page down")),
	top:       key.NewBinding(key.WithKeys("home", "g"), key.WithHelp("g", "top")),
	bottom:    key.NewBinding(key.WithKeys("end", "G"), key.WithHelp("G", "bottom")),
	close:     key.NewBinding(key.WithKeys("esc", "?"), key.WithHelp("esc", "close")),
}

func stageKeys() (out [6]key.Binding) {
	digits := [...]string{"1", "2", "3", "4", "5", "6"}
	for i, s := range tui.Stages() {
		out[i] = key.NewBinding(key.WithKeys(digits[i]), key.WithHelp(digits[i], s.String()))
	}
	return out
}

// stages is the binding of all digits, as it is listed.
func (k keyMap) stages() key.Binding {
	var all []string
	for _, b := range k.stage {
		all = append(all, b.Keys()...)
	}
	return key.NewBinding(key.WithKeys(all...), key.WithHelp("1-6", "stage"))
}

// helpKeys are the keys while the help is open.
func (k keyMap) helpKeys() []key.Binding {
	return []key.Binding{k.close, k.down, k.up, k.pageDown, k.pageUp, k.top, k.bottom, k.interrupt}
}

// everywhere are the keys that the root answers on every stage now: those used
// most, and the others.
func (m Model) everywhere() (most, others []key.Binding) {
	undo, redo, cancel, suspend := keys.undo, keys.redo, keys.cancel, keys.suspend
	undo.SetEnabled(len(m.past) > 0)
	redo.SetEnabled(len(m.future) > 0)
	cancel.SetEnabled(m.job.running && len(m.errors) == 0 && !m.screenWants(tea.KeyMsg{Type: tea.KeyEsc}))
	suspend.SetEnabled(!m.leader)
	return []key.Binding{keys.stages(), keys.save, keys.help, keys.quit},
		[]key.Binding{cancel, undo, redo, keys.next, keys.previous, keys.ascii, keys.redraw, suspend, keys.interrupt}
}
