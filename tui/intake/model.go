package intake

import (
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/trace"
	"afterbeat/tui/warnlist"
)

// Model is the screen.
type Model struct {
	keys   keyMap
	area   tui.Area
	theme  tui.Theme
	inputs study.Inputs // with the case as this screen last changed it

	asked            study.Inputs // what was last asked to be made ready
	number, answered int          // of the latest request, and of the answer shown
	busy             bool         // what is shown is older than the case
	ready            ready
	found            found

	chosen   int  // the channel under the cursor
	seen     bool // a channel was chosen to begin with
	trace    trace.Model
	list     warnlist.Model
	question question
}

var _ tui.Screen = Model{}

// New is the screen before a recording was read.
func New() Model {
	return Model{keys: newKeys(), trace: trace.New(), list: warnlist.New("Warnings of the intake", warnlist.Intake())}
}

// Show takes over the study. What it needs of the recording is made ready in a
// command; until that is done the screen stays as it was.
func (m Model) Show(s study.Study) (tui.Screen, tea.Cmd) {
	m.inputs = s.Inputs
	m.found = foundIn(s)
	m = m.warned()
	if s.Inputs.Recording == nil {
		m.busy = true
		return m, nil
	}
	if s.Inputs.Recording == m.asked.Recording && same(s.Inputs.Case, m.asked.Case) {
		m.busy = m.answered != m.number
		return m, nil
	}
	m.asked = s.Inputs
	m.number++
	m.busy = true
	return m, prepare(m.number, s.Inputs)
}

// take shows what was made ready, if it is the latest asked for.
func (m Model) take(msg readyMsg) (Model, tea.Cmd) {
	if msg.number != m.number {
		return m, nil
	}
	m.answered, m.busy = msg.number, false
	m.ready = msg.ready
	m = m.warned()
	if !m.seen {
		s := m.ready.selection
		m.chosen, m.seen = max(s.Pressure, 0), true
		if s.Pressure < 0 {
			m.chosen = max(s.Flow, s.Velocity, 0)
		}
	}
	m.question = question{}
	return m.choose(m.chosen)
}

// choose puts channel i under the cursor.
func (m Model) choose(i int) (Model, tea.Cmd) {
	if len(m.ready.channels) == 0 {
		return m, nil
	}
	m.chosen = max(0, min(i, len(m.ready.channels)-1))
	m, resized := m.arrange()
	var look tea.Cmd
	m.trace, look = m.trace.Look(m.ready.channels[m.chosen].source)
	return m, tea.Batch(resized, look)
}

// Resize takes over size and theme.
func (m Model) Resize(a tui.Area, t tui.Theme) (tui.Screen, tea.Cmd) {
	m.area, m.theme = a, t
	m, cmd := m.arrange()
	return m, cmd
}

// arrange gives the parts their areas.
func (m Model) arrange() (Model, tea.Cmd) {
	m.list = m.list.Resize(m.area, m.theme)
	var cmd tea.Cmd
	m.trace, cmd = m.trace.Resize(tui.Area{Width: m.area.Width, Height: m.divide().plot}, m.theme)
	return m, cmd
}
