package fit

import (
	"fmt"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/fitting"
	"afterbeat/tree/study"
	"afterbeat/tui"
	_ "afterbeat/tui/background"
	"afterbeat/tui/page"
	"afterbeat/tui/warnlist"
)

// view is what stands above the numbers.
type view int

const (
	drawn   view = iota // the curves
	opened              // the number under the cursor
	advised             // the recommendation in full
	tabled              // the curves as a table, over the whole area
)

// Model is the screen.
type Model struct {
	area     tui.Area
	theme    tui.Theme
	study    study.Study
	fit      *study.Fit // nil while it is computed
	sheets   []sheet    // one a result; one of the estimator where there is none
	shown    int        // the sheet shown
	name     string     // its model, kept while fits come and go
	cursor   int        // the number under the cursor
	moved    int        // the assumption moved, counted from 1; 0: none
	view     view
	flow     bool
	read     page.Scroll // what is opened, where it is longer than the picture
	pictures pictures
	request  int // of the pictures asked for last
	warnings warnlist.Model
}

var _ tui.Screen = Model{}

// New is the screen before anything was computed.
func New() Model {
	return Model{warnings: warnlist.New("Warnings of the fit and of what it rests on", warnlist.Elsewhere(nil))}
}

// Typing is false: there is no text field.
func (m Model) Typing() bool { return false }

// Show takes over what has been computed. The model shown stays, by its name;
// at first it is the one that goes downstream.
func (m Model) Show(s study.Study) (tui.Screen, tea.Cmd) {
	m.study, m.fit = s, s.Fit
	m.warnings = m.warnings.Hold(upToFit(s))
	m.sheets, m.pictures, m.moved = nil, pictures{}, 0
	m.request++ // what is under way belongs to another study
	if m.fit == nil {
		return m, nil
	}
	m.sheets = sheets(*m.fit)
	m.shown = max(m.fit.Chosen, 0)
	for i, r := range m.fit.Results {
		if r.Model.Name == m.name {
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
	m.warnings = m.warnings.Resize(a, t)
	return m.arranged().prepare()
}

// upToFit leaves out what the comparison warns of.
func upToFit(s study.Study) []warning {
	s.Comparison, s.Forecast = nil, nil
	return s.Warnings()
}

// Update answers a key, or takes over pictures that were asked for.
func (m Model) Update(msg tea.Msg) (tui.Screen, tea.Cmd) {
	switch msg := msg.(type) {
	case picturesMsg:
		if msg.request == m.request {
			m.pictures = msg.pictures
		}
	case tea.KeyMsg:
		return m.press(msg)
	}
	return m, nil
}

func (m Model) press(msg tea.KeyMsg) (tui.Screen, tea.Cmd) {
	if m.warnings.Open() || key.Matches(msg, m.warnings.Keys.Open) {
		m.warnings = m.warnings.Update(msg)
		return m, nil
	}
	switch k := m.bindings(); {
	case key.Matches(msg, k.choose):
		return m.choose()
	case key.Matches(msg, k.next):
		return m.step(1)
	case key.Matches(msg, k.previous):
		return m.step(-1)
	case key.Matches(msg, k.down):
		m.cursor, m.read = m.cursor+1, page.Scroll{}
	case key.Matches(msg, k.up):
		m.cursor, m.read = m.cursor-1, page.Scroll{}
	case key.Matches(msg, k.number):
		m.view, m.read = toggled(m.view, opened), page.Scroll{}
	case key.Matches(msg, k.why):
		m.view, m.read = toggled(m.view, advised), page.Scroll{}
	case key.Matches(msg, k.page.PageDown, k.page.PageUp):
		m.read = m.read.Update(msg, k.page)
	case key.Matches(msg, k.table):
		m.view = toggled(m.view, tabled)
	case key.Matches(msg, k.flow):
		m.flow = !m.flow
	case key.Matches(msg, k.more):
		m.moved = around(m.moved+1, 1+len(m.fit.Sensitivity))
	case key.Matches(msg, k.less):
		m.moved = around(m.moved-1, 1+len(m.fit.Sensitivity))
	}
	return m.arranged(), nil
}

func toggled(now, v view) view {
	if now == v {
		return drawn
	}
	return v
}

// around brings i into 0 .. n-1, from one end to the other.
func around(i, n int) int { return ((i % n) + n) % n }

// step shows another model.
func (m Model) step(by int) (tui.Screen, tea.Cmd) {
	m.shown = around(m.shown+by, m.count())
	m.name = m.result().Model.Name
	m.read = page.Scroll{}
	return m.arranged(), nil
}

// choose takes the model shown to the next stages, or gives the choice back
// where it was made already.
func (m Model) choose() (tui.Screen, tea.Cmd) {
	c := m.study.Inputs.Case
	m.name = m.result().Model.Name
	if m.takesBack() {
		c.Model = ""
		return m, tui.Change(fmt.Sprintf("%s is no longer chosen: the recommended model is used", m.name), c)
	}
	c.Model = m.name
	return m, tui.Change(fmt.Sprintf("%s chosen for the next stages; enter again takes it back", m.name), c)
}

// takesBack tells that the model shown is the one that a person chose.
func (m Model) takesBack() bool {
	return m.count() > 0 && m.study.Inputs.Case.Model == m.result().Model.Name
}

// arranged keeps the cursor on a number, and has what is opened ready.
func (m Model) arranged() Model {
	m.cursor = max(0, min(m.cursor, len(m.rows())-1))
	p, lines := m.plan(), []string(nil)
	switch {
	case m.view == opened && len(m.rows()) > 0:
		lines = m.opened(p)
	case m.view == advised && len(m.sheets) > 0:
		lines = m.advised(p)
	}
	rows := p.plot
	if len(lines) > rows {
		rows = m.area.Height - 1
	}
	m.read = m.read.Hold(lines).Resize(rows)
	return m
}

// count is how many models were fitted.
func (m Model) count() int {
	if m.fit == nil {
		return 0
	}
	return len(m.fit.Results)
}

// result is the fit shown; there must be one.
func (m Model) result() fitting.Result { return m.fit.Results[m.shown] }

// rows are the numbers shown.
func (m Model) rows() []row {
	if m.shown >= len(m.sheets) {
		return nil
	}
	return m.sheets[m.shown].rows
}

// beat tells that there is an average beat to draw.
func (m Model) beat() bool {
	return m.fit != nil && (m.fit.Beats.Pressure.Count > 0 || m.fit.Beats.Flow.Count > 0)
}
