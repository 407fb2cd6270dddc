package app

import (
	"fmt"
	"time"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

// leaving is how far the end is.
type leaving int

const (
	stays      leaving = iota
	asks               // whether unsaved choices may go
	savesFirst         // and quits when the note is saved
	interrupts         // as soon as the note is saved
	leaves             // nothing is answered any more
)

// keepAfter is how long after a change the choices are kept for a restart.
const keepAfter = time.Second

type (
	// SignalMsg says that the program is to end: the terminal was lost, or a
	// signal came.
	SignalMsg struct{}
	keepMsg   struct{}
	keptMsg   struct {
		err  error
		last bool // the end follows
	}
	offerMsg struct {
		found casefile.Case
		when  time.Time
		ok    bool
	}
)

// offer are the choices that an interrupted run has left.
type offer struct {
	found casefile.Case
	when  time.Time
	sure  bool // esc was pressed once; once more discards them
}

// question is what the status line asks.
func (o offer) question() string {
	when := o.when.Format("2 Jan 15:04")
	if o.sure {
		return fmt.Sprintf("Discard the choices of %s for good? esc again discards, r resumes", when)
	}
	return fmt.Sprintf("Choices of an interrupted run of %s: r resume, esc discard", when)
}

// keys are those that answer it.
func (o offer) keys() []key.Binding {
	forget := keys.forget
	if o.sure {
		forget.SetHelp("esc", "discard for good")
	}
	return []key.Binding{keys.resume, forget, keys.quit, keys.interrupt}
}

// quit ends the program, unless choices would be lost or a note is being saved.
func (m Model) quit() (Model, tea.Cmd) {
	switch {
	case m.writing:
		m.leaving = savesFirst
		return m, nil
	case m.unsaved():
		m.leaving = asks
		return m, nil
	}
	return m.end()
}

// end ends the program in order.
func (m Model) end() (Model, tea.Cmd) {
	m = m.halt()
	m.leaving = leaves
	return m, tea.Quit
}

// leaveKey answers the question whether unsaved choices may go.
func (m Model) leaveKey(msg tea.KeyMsg) (Model, tea.Cmd) {
	switch {
	case key.Matches(msg, keys.discard):
		m.outcome.Unsaved = true
		return m.end()
	case key.Matches(msg, keys.first):
		m.leaving = stays
		m, cmd := m.askName()
		if m.naming {
			m.leaving = savesFirst
		}
		return m, cmd
	case key.Matches(msg, keys.stay):
		m.leaving = stays
	}
	return m, nil
}

// interrupt ends the program at once, its unsaved choices kept for a restart.
// Only a save that is under way is waited for.
func (m Model) interrupt() (Model, tea.Cmd) {
	m.outcome.Interrupted = true
	if m.writing {
		m.leaving = interrupts
		return m, nil
	}
	m = m.halt()
	m.leaving = leaves
	return m, m.store(true)
}

// keepSoon sees to it that the choices are kept in a moment.
func (m Model) keepSoon() (Model, tea.Cmd) {
	if m.options.State == nil || m.keeping {
		return m, nil
	}
	m.keeping = true
	return m, m.after(keepAfter, keepMsg{})
}

// keep keeps the present choices.
func (m Model) keep() (Model, tea.Cmd) {
	m.keeping = false
	return m, m.store(false)
}

// store is the command that keeps the choices, or forgets them where nothing
// is unsaved.
func (m Model) store(last bool) tea.Cmd {
	to, order, c, unsaved, answered := m.options.State, m.changes, m.present, m.unsaved(), m.answered
	return func() tea.Msg {
		write := to.Clear
		if unsaved {
			write = func(order int) error { return to.Keep(order, c) }
		}
		err := write(order)
		if err == nil && answered { // not before the choices taken over are kept again
			err = to.Drop()
		}
		return keptMsg{err, last}
	}
}

// kept takes over whether the choices could be kept.
func (m Model) kept(msg keptMsg) (Model, tea.Cmd) {
	if msg.last {
		return m, tea.Quit
	}
	if msg.err != nil {
		m = m.complain(noticeOf(msg.err))
	}
	return m, nil
}

// lookForOffer looks for choices that an interrupted run has left.
func (m Model) lookForOffer() tea.Cmd {
	from := m.options.State
	if from == nil {
		return nil
	}
	return func() tea.Msg {
		c, when, ok := from.Kept()
		return offerMsg{c, when, ok}
	}
}

// offered offers choices that differ from those of the start. They are about
// the recording of the start, whatever they say. Those that do not differ need
// no answer.
func (m Model) offered(msg offerMsg) Model {
	msg.found.Recording = m.present.Recording
	switch {
	case !msg.ok || m.changes > 0:
	case same(msg.found, m.present):
		m.answered = true
	default:
		m.offer = &offer{found: msg.found, when: msg.when}
	}
	return m
}

// offerKey answers the question whether to resume; discarding is asked a second
// time. Whoever leaves instead is asked again at the next start.
func (m Model) offerKey(msg tea.KeyMsg) (Model, tea.Cmd) {
	switch {
	case key.Matches(msg, keys.resume):
		found := m.offer.found
		m.offer, m.answered = nil, true
		return m.change(data.Clean("the choices of the interrupted run"), found)
	case key.Matches(msg, keys.forget) && !m.offer.sure:
		return m.sure(true), nil
	case key.Matches(msg, keys.forget):
		m.offer, m.answered = nil, true
		m.said = data.Clean("the choices of the interrupted run are discarded")
		return m, m.store(false)
	case key.Matches(msg, keys.quit):
		return m.quit()
	}
	return m.sure(false), nil
}

// sure takes down whether the next esc discards the choices on offer; any other
// key than esc calls that off.
func (m Model) sure(yes bool) Model {
	o := *m.offer
	o.sure = yes
	m.offer = &o
	return m
}
