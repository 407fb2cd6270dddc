package fit

import (
	"context"
	"maps"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/fitting/harmonic"
	"afterbeat/tree/study"
	"afterbeat/tui"
	_ "afterbeat/tui/background"
	"afterbeat/tui/explain"
	"afterbeat/tui/page"
	"afterbeat/tui/warnlist"
)

type warning = data.Warning

// view is how the screen shows what it shows.
type view int

const (
	drawn   view = iota // a picture over the numbers
	advised             // the recommendation in full
	tabled              // the curves as a table, over the whole area
)

// picture is what is drawn.
type picture int

const (
	ofPressure picture = iota // with the model over it and the residual below
	ofFlow
	ofImpedance
	ofWaves
)

// Model is the screen.
type Model struct {
	area     tui.Area
	theme    tui.Theme
	study    study.Study
	fit      *study.Fit // nil while it is computed
	items    []item
	shown    int    // the item shown
	kept     string // its title, while fits come and go
	cursor   int    // the number under the cursor
	moved    int    // the assumption moved, counted from 1; 0: none
	view     view
	picture  picture
	read     page.Scroll // the recommendation, where it is longer than the picture
	pictures pictures
	weighed  map[int]weighed // by item; never changed, but replaced
	stop     context.CancelFunc
	request  int // of the pictures asked for last
	numbers  explain.Model
	warnings warnlist.Model
}

var _ tui.Screen = Model{}

// New is the screen before anything was computed.
func New() Model {
	return Model{
		numbers:  explain.New(),
		warnings: warnlist.New("Warnings of the fit and of what it rests on", warnlist.Elsewhere(nil)),
	}
}

// Typing is false: there is no text field.
func (m Model) Typing() bool { return false }

// Show takes over what has been computed. The way shown stays, by its name; at
// first it is the fit that goes downstream.
func (m Model) Show(s study.Study) (tui.Screen, tea.Cmd) {
	m.study, m.fit = s, s.Fit
	m.warnings = m.warnings.Hold(upToFit(s))
	m.items, m.pictures, m.moved = nil, pictures{}, 0
	m = m.halted()
	if m.fit == nil {
		return m.arranged(), nil
	}
	m.items = items(*m.fit)
	m.shown = 0
	for i, one := range m.items {
		if m.kept == "" && one.fitted() && one.result == m.fit.Chosen || one.title() == m.kept {
			m.shown = i
		}
	}
	return m.arranged().prepare()
}

// Resize takes over size and theme.
func (m Model) Resize(a tui.Area, t tui.Theme) (tui.Screen, tea.Cmd) {
	if t != m.theme {
		m.pictures = pictures{}
	}
	m.area, m.theme = a, t
	m.warnings, m.numbers = m.warnings.Resize(a, t), m.numbers.Resize(a, t)
	m = m.halted()
	return m.arranged().prepare()
}

// halted drops what is under way, which belongs to another study or size.
func (m Model) halted() Model {
	if m.stop != nil {
		m.stop()
	}
	m.stop, m.weighed = nil, nil
	m.request++
	return m
}

// upToFit leaves out what the comparison warns of.
func upToFit(s study.Study) []warning {
	s.Comparison, s.Forecast = nil, nil
	return s.Warnings()
}

// Update answers a key, or takes over what was asked for.
func (m Model) Update(msg tea.Msg) (tui.Screen, tea.Cmd) {
	switch msg := msg.(type) {
	case picturesMsg:
		if msg.request == m.request {
			m.pictures = msg.pictures
		}
	case weighedMsg:
		if msg.request == m.request {
			m.weighed = maps.Clone(m.weighed)
			if m.weighed == nil {
				m.weighed = map[int]weighed{}
			}
			m.weighed[msg.item] = msg.weighed
			m = m.arranged()
		}
	case tea.KeyMsg:
		return m.press(msg)
	}
	return m, nil
}

func (m Model) press(msg tea.KeyMsg) (tui.Screen, tea.Cmd) {
	if m.warnings.Open() || key.Matches(msg, m.warnings.Keys.Open) && !m.numbers.Open() {
		m.warnings = m.warnings.Update(msg)
		return m, nil
	}
	k := m.bindings()
	switch {
	case key.Matches(msg, k.next):
		return m.step(1)
	case key.Matches(msg, k.previous):
		return m.step(-1)
	case m.numbers.Open():
		m.numbers = m.numbers.Update(msg)
		m.cursor = m.numbers.Cursor()
		return m, nil
	}
	switch {
	case key.Matches(msg, k.number):
		m.numbers = m.numbers.At(m.cursor).Toggle()
	case key.Matches(msg, k.choose):
		return m.choose()
	case key.Matches(msg, k.basis):
		return m.to(m.otherBasis())
	case key.Matches(msg, k.down):
		m.cursor++
	case key.Matches(msg, k.up):
		m.cursor--
	case key.Matches(msg, k.more):
		return m.move(1)
	case key.Matches(msg, k.less):
		return m.move(-1)
	case key.Matches(msg, k.leave):
		m.moved = 0
	default:
		return m.look(msg, k), nil
	}
	return m.arranged(), nil
}

// look changes how the screen shows what it shows.
func (m Model) look(msg tea.KeyMsg, k keyMap) Model {
	switch {
	case key.Matches(msg, k.why):
		m.view, m.read = toggled(m.view, advised), page.Scroll{}
	case key.Matches(msg, k.table):
		m.view = toggled(m.view, tabled)
	case key.Matches(msg, k.page.PageDown, k.page.PageUp):
		m.read = m.read.Update(msg, k.page)
		return m
	}
	for p, b := range k.pictures() {
		if key.Matches(msg, *b) {
			m.picture = toggled(m.picture, p)
		}
	}
	return m.arranged()
}

// toggled is v, or the zero value where it is v already.
func toggled[T view | picture](now, v T) T {
	if now == v {
		return 0
	}
	return v
}

// around brings i into 0 .. n-1, from one end to the other.
func around(i, n int) int { return ((i % n) + n) % n }

// step shows another way to the numbers.
func (m Model) step(by int) (tui.Screen, tea.Cmd) { return m.to(around(m.shown+by, len(m.items))) }

// to shows item i, with the same assumption moved.
func (m Model) to(i int) (tui.Screen, tea.Cmd) {
	m.shown, m.kept = i, m.items[i].title()
	if !m.item().fitted() {
		m.moved = 0
	}
	return m.arranged().weigh()
}

// otherBasis is the item of the same model on another basis; -1 where there is
// none.
func (m Model) otherBasis() int {
	for i, one := range m.items {
		if m.item().fitted() && one.fitted() && one.name == m.item().name && one.group != m.item().group {
			return i
		}
	}
	return -1
}

// move moves the next assumption, or the one before; beyond the last none is.
func (m Model) move(by int) (tui.Screen, tea.Cmd) {
	m.moved = around(m.moved+by, 1+m.moves())
	return m.arranged().weigh()
}

// arranged keeps the cursor on a number and the picture on one that there is, and
// has what is read ready.
func (m Model) arranged() Model {
	m.cursor = max(0, min(m.cursor, len(m.item().rows)-1))
	m.numbers = m.numbers.Hold(m.explained()).At(m.cursor)
	if !m.has(m.picture) {
		m.picture = ofPressure
	}
	if m.view == advised && len(m.items) > 0 {
		m.read = m.read.Hold(m.advised()).Resize(m.area.Height - 1)
	}
	return m
}

// item is the one shown; an empty one where there is none.
func (m Model) item() item {
	if m.shown >= len(m.items) {
		return item{result: -1}
	}
	return m.items[m.shown]
}

// fits is how many models were fitted, on all bases.
func (m Model) fits() int {
	if m.fit == nil {
		return 0
	}
	return len(m.fit.Results)
}

// beat tells that there is an average beat to draw.
func (m Model) beat() bool {
	return m.fit != nil && (m.fit.Beats.Pressure.Count > 0 || m.fit.Beats.Flow.Count > 0)
}

// has tells whether there is something to draw.
func (m Model) has(p picture) bool {
	switch {
	case m.fit == nil:
		return false
	case p == ofFlow:
		return m.fit.Beats.Flow.Count > 0 && m.fit.Beats.Pressure.Count > 0
	case p == ofImpedance:
		return len(harmonic.Shown(m.fit.Impedance)) > 0
	case p == ofWaves:
		return len(m.fit.Waves.Forward.Samples) > 0
	}
	return true
}
