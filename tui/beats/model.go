package beats

import (
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casefile"
	"afterbeat/tree/study"
	"afterbeat/tui"
	"afterbeat/tui/explain"
	"afterbeat/tui/trace"
	"afterbeat/tui/warnlist"
)

// Model is the screen.
type Model struct {
	keys  keyMap
	area  tui.Area
	theme tui.Theme
	case_ casefile.Case // as this screen last changed it

	asked  *study.Beats // what was last asked to be made ready
	number int          // of that request
	busy   bool         // what is shown is older than the case
	ready  ready

	shown   int  // index of the signal
	at      int  // the beat under the cursor
	aside   bool // the overlay is shown, where both do not fit
	over    bool // the beat under the cursor is drawn into the overlay
	all     bool // the numbers are shown in place of the plots
	placed  bool // the window was set to begin with
	trace   trace.Model
	overlay overlay
	list    warnlist.Model
	opened  explain.Model // the numbers, each with what stands behind it
}

var _ tui.Screen = Model{}

// New is the screen before beats were found.
func New() Model {
	return Model{keys: newKeys(), trace: trace.New(), opened: explain.New(), list: warnlist.New("Warnings of the beats", cures())}
}

// cures says what can be done about a warning from here.
func cures() map[data.Code]string {
	const keep = "d uses the beat under the cursor, or leaves it out; 1 opens the intake, where [ and ] set the span"
	return warnlist.Elsewhere(map[data.Code]string{data.CodeManyRejected: keep, data.CodeFewBeats: keep})
}

// Show takes over the beats; what is drawn is made ready in a command. Until
// then, and while they are found anew, the screen stays as it was.
func (m Model) Show(s study.Study) (tui.Screen, tea.Cmd) {
	m.case_ = s.Inputs.Case
	switch {
	case s.Beats == nil:
		m.busy = true
		return m, nil
	case s.Beats == m.asked:
		m.busy = m.ready.number != m.number
		return m, nil
	}
	m.asked = s.Beats
	m.number++
	m.busy = true
	return m, prepare(m.number, *s.Beats)
}

// take shows what was made ready, if it is the latest asked for. The cursor
// stays on the beat that it was on, as far as there still is one at that time.
func (m Model) take(r ready) (Model, tea.Cmd) {
	if r.number != m.number {
		return m, nil
	}
	middle, had := m.middle()
	m.ready, m.busy = r, false
	m.list = m.list.Hold(r.warnings)
	m.shown = max(0, min(m.shown, len(r.signals)-1))
	m, look := m.look()
	if had && m.placed && len(r.signals) > 0 {
		m.at = m.beatAt(middle)
		m, show := m.goTo(m.at)
		return m, tea.Batch(look, show)
	}
	m.at = 0
	m, show := m.spread()
	return m, tea.Batch(look, show)
}

// signal is the one shown; there must be one.
func (m Model) signal() signal { return m.ready.signals[m.shown] }

// look turns trace and overlay to the signal shown.
func (m Model) look() (Model, tea.Cmd) {
	m.opened = m.opened.Hold(m.explained())
	m, arranged := m.arrange()
	if len(m.ready.signals) == 0 {
		return m, arranged
	}
	var look tea.Cmd
	m.trace, look = m.trace.Look(m.signal().source)
	return m, tea.Batch(arranged, look)
}

// explained are the numbers of the signal shown.
func (m Model) explained() []explain.Number {
	if len(m.ready.signals) == 0 {
		return nil
	}
	var out []explain.Number
	for _, r := range m.signal().rows {
		out = append(out, r.number)
	}
	return out
}

// columnsOfBeat is how wide a beat is shown to begin with, at least.
const columnsOfBeat = 8

// spread shows as many beats as can be told apart.
func (m Model) spread() (Model, tea.Cmd) {
	beats := m.beatsShown()
	if len(beats) == 0 || m.area.Width == 0 {
		return m, nil
	}
	m.placed = true
	last := len(beats) - 1
	length := float64(beats[last].To-beats[0].From) / float64(len(beats))
	n := int(length * float64(max(m.divide().trace.Width, 1)) / columnsOfBeat)
	if n >= len(m.signal().source.Values) {
		return m, nil
	}
	var cmd tea.Cmd
	m.trace, cmd = m.trace.Show(beats[m.at].From+n/2-int(length), n)
	m, reveal := m.goTo(m.at)
	return m, tea.Batch(cmd, reveal)
}

func (m Model) beatsShown() []beat.Beat {
	if len(m.ready.signals) == 0 {
		return nil
	}
	return m.signal().beats
}

// goTo puts beat i under the cursor.
func (m Model) goTo(i int) (Model, tea.Cmd) {
	beats := m.beatsShown()
	if len(beats) == 0 {
		m.at = 0
		return m, nil
	}
	m.at = max(0, min(i, len(beats)-1))
	b := beats[m.at]
	var cmd tea.Cmd
	m.trace, cmd = m.trace.Reveal((b.From+b.To)/2, b.From, b.To)
	return m, cmd
}

// middle is the time in the middle of the beat under the cursor, s, of the
// leading channel, rounded to the millisecond where that is still inside.
func (m Model) middle() (t float64, ok bool) {
	beats := m.ready.beats
	if !m.ready.leads {
		beats = m.beatsShown()
	}
	if m.at >= len(beats) {
		return 0, false
	}
	b := beats[m.at]
	return inside(m.ready.grid.At(b.From), m.ready.grid.At(b.To)), true
}

// beatAt is the beat that holds time t, or the nearest one.
func (m Model) beatAt(t float64) int {
	beats := m.ready.beats
	if !m.ready.leads {
		beats = m.beatsShown()
	}
	for i, b := range beats {
		if t < m.ready.grid.At(b.To) {
			return i
		}
	}
	return max(len(beats)-1, 0)
}

// Resize takes over size and theme.
func (m Model) Resize(a tui.Area, t tui.Theme) (tui.Screen, tea.Cmd) {
	m.area, m.theme = a, t
	m, cmd := m.arrange()
	if m.placed {
		return m, cmd
	}
	m, spread := m.spread()
	return m, tea.Batch(cmd, spread)
}

// arrange gives the parts their areas, and orders what is missing.
func (m Model) arrange() (Model, tea.Cmd) {
	m.list, m.opened = m.list.Resize(m.area, m.theme), m.opened.Resize(m.area, m.theme)
	var cmd tea.Cmd
	m.trace, cmd = m.trace.Resize(m.divide().trace, m.theme)
	m, overlay := m.wantOverlay()
	return m, tea.Batch(cmd, overlay)
}

// wantOverlay orders the overlay, unless it is there.
func (m Model) wantOverlay() (Model, tea.Cmd) {
	o := m.order()
	if len(m.ready.signals) == 0 || m.signal().ensemble < 0 || o.area.Height < 1 || m.overlay.order == o {
		return m, nil
	}
	return m, overlaid(o, m.signal())
}

// order is the overlay that is wanted.
func (m Model) order() order {
	return order{m.ready.number, m.shown, m.divide().overlay, m.theme, m.trace.Table()}
}

// Typing is false: the screen has no text field.
func (m Model) Typing() bool { return false }
