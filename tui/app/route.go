package app

import (
	"reflect"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data/casefile"
	"afterbeat/tui"
)

// fromScreen is what a command of a screen has returned. base is the case that
// the screen knew when it gave the command.
type fromScreen struct {
	stage tui.Stage
	base  casefile.Case
	msg   tea.Msg
}

// of marks what a command of a screen returns as that screen's.
func (m Model) of(s tui.Stage, cmd tea.Cmd) tea.Cmd {
	base := m.present
	return through(cmd, func(msg tea.Msg) tea.Msg { return fromScreen{stage: s, base: base, msg: msg} })
}

// take answers a message of a screen: one for the root, or one of its own.
func (m Model) take(from fromScreen) (Model, tea.Cmd) {
	switch msg := from.msg.(type) {
	case tui.ChangeMsg:
		return m.change(msg.Said, rebase(from.base, msg.Case, m.present))
	case tui.SayMsg:
		if msg.Error {
			return m.complain(notice{text: msg.Text}), nil
		}
		m.said = msg.Text
		return m, nil
	case tui.GoMsg:
		return m.openStage(msg.Stage)
	}
	return m.ask(from.stage, func(s tui.Screen) (tui.Screen, tea.Cmd) { return s.Update(from.msg) })
}

// ask lets a screen change. One that breaks down stays as it was.
func (m Model) ask(s tui.Stage, f func(tui.Screen) (tui.Screen, tea.Cmd)) (out Model, cmd tea.Cmd) {
	defer caught(func(at string) { out, cmd = m.complain(faultAt(at)), nil })
	screen, cmd := f(m.screens[s])
	out = m
	out.screens[s] = screen
	return out, m.of(s, cmd)
}

// askAll lets every screen change.
func (m Model) askAll(f func(tui.Screen) (tui.Screen, tea.Cmd)) (Model, tea.Cmd) {
	var cmds []tea.Cmd
	for _, s := range tui.Stages() {
		var cmd tea.Cmd
		m, cmd = m.ask(s, f)
		cmds = append(cmds, cmd)
	}
	return m, tea.Batch(cmds...)
}

// show hands the study to every screen.
func (m Model) show() (Model, tea.Cmd) {
	return m.askAll(func(s tui.Screen) (tui.Screen, tea.Cmd) { return s.Show(m.study) })
}

// lay hands area and theme to every screen.
func (m Model) lay() (Model, tea.Cmd) {
	if m.size == (tui.Area{}) {
		return m, nil
	}
	return m.askAll(func(s tui.Screen) (tui.Screen, tea.Cmd) { return s.Resize(m.area(), m.theme) })
}

// through is cmd with every message that comes of it changed by f, those of
// the commands that it batches or lines up too.
func through(cmd tea.Cmd, f func(tea.Msg) tea.Msg) tea.Cmd {
	if cmd == nil {
		return nil
	}
	return func() tea.Msg {
		msg := cmd()
		if msg == nil {
			return nil
		}
		if list, ok := each(msg, func(c tea.Cmd) tea.Cmd { return through(c, f) }); ok {
			return list
		}
		return f(msg)
	}
}

// each is a message that holds commands, a batch or a sequence, with f applied
// to every one; ok is false for any other message.
func each(msg tea.Msg, f func(tea.Cmd) tea.Cmd) (list tea.Msg, ok bool) {
	v := reflect.ValueOf(msg)
	if !v.IsValid() || v.Kind() != reflect.Slice || v.Type().Elem() != reflect.TypeFor[tea.Cmd]() {
		return msg, false
	}
	out := reflect.MakeSlice(v.Type(), v.Len(), v.Len())
	for i := range v.Len() {
		out.Index(i).Set(reflect.ValueOf(f(v.Index(i).Interface().(tea.Cmd))))
	}
	return out.Interface(), true
}
