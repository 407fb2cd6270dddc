package support

import (
	"math"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tree/study"
	"afterbeat/tree/support"
	"afterbeat/tui"
	_ "afterbeat/tui/background"
	"afterbeat/tui/layout"
	"afterbeat/tui/page"
	"afterbeat/tui/warnlist"
)

// view is what the screen shows.
type view int

const (
	waves   view = iota // native and supported over one another
	sweep               // retained pulse against share
	energy              // power against share
	indices             // of both waves
	held                // what is the same in all states
)

// The state that the screen begins with: the posing that is no identity, at
// half of the flow.
const (
	firstPosing = support.LateValvePosing
	firstShare  = 0.5
)

// Model is the screen.
type Model struct {
	area       tui.Area
	theme      tui.Theme
	study      study.Study
	comparison *study.Comparison // nil while it is computed
	posing     support.Posing    // the one shown; kept while comparisons come and go
	share      float64           // so is the share
	answer     int               // of the comparison, with that posing
	state      int               // of the answer, with the share nearest to it
	view       view
	table      bool // numbers in place of the picture
	flow       bool // in place of pressure
	curves     curves
	picture    string     // of the view, the state and the size
	words      [][]string // of each answer: what its power means, and what not
	request    int        // of the curves asked for last
	page       page.Scroll
	pageKeys   page.Keys
	warnings   warnlist.Model
}

var _ tui.Screen = Model{}

// New is the screen before anything was computed.
func New() Model {
	return Model{
		posing: firstPosing, share: firstShare, pageKeys: page.NewKeys(),
		warnings: warnlist.New("Warnings of the study", nil),
	}
}

// Typing is false: there is no text field.
func (m Model) Typing() bool { return false }

// Show takes over what has been computed. Posing and share stay.
func (m Model) Show(s study.Study) (tui.Screen, tea.Cmd) {
	m.study, m.comparison = s, s.Comparison
	m.warnings = m.warnings.Hold(s.Warnings())
	m.curves = curves{}
	m.request++ // what is under way belongs to another study
	return m.placed().worded().drawn().prepare()
}

// worded wraps the words of each answer on its power.
func (m Model) worded() Model {
	m.words = nil
	if !m.there() {
		return m
	}
	for _, a := range m.comparison.Answers {
		var lines []string
		for _, w := range a.PowerSection().Words {
			lines = append(lines, layout.Wrap(layout.Clean(w.String(), m.theme), m.area.Width)...)
		}
		m.words = append(m.words, lines)
	}
	return m
}

// Resize takes over size and theme.
func (m Model) Resize(a tui.Area, t tui.Theme) (tui.Screen, tea.Cmd) {
	if t != m.theme {
		m.page = m.page.Hold(nil)
	}
	m.area, m.theme = a, t
	m.warnings = m.warnings.Resize(a, t)
	m.page = m.page.Resize(a.Height - 1)
	return m.worded().drawn().prepare()
}

// there tells that there are states to show.
func (m Model) there() bool {
	return m.comparison != nil && len(m.comparison.Answers) > 0 && len(m.comparison.Answers[0].Supported) > 0
}

// count is how many shares there are.
func (m Model) count() int { return len(m.shown().Supported) }

// shown is the answer of the posing shown.
func (m Model) shown() support.Answer {
	if !m.there() {
		return support.Answer{}
	}
	return m.comparison.Answers[m.answer]
}

// placed finds posing and share in the comparison.
func (m Model) placed() Model {
	m.answer, m.state = 0, 0
	if !m.there() {
		return m
	}
	for i, a := range m.comparison.Answers {
		if a.Posing == m.posing {
			m.answer = i
		}
	}
	supported := m.shown().Supported
	for i, s := range supported {
		if math.Abs(s.Share-m.share) < math.Abs(supported[m.state].Share-m.share) {
			m.state = i
		}
	}
	return m
}

// Update answers a key, or takes over curves that were asked for.
func (m Model) Update(msg tea.Msg) (tui.Screen, tea.Cmd) {
	switch msg := msg.(type) {
	case curvesMsg:
		if msg.request == m.request {
			m.curves = msg.curves
			m.page = m.page.Hold(msg.curves.held)
		}
	case tea.KeyMsg:
		m = m.press(msg)
	}
	return m.drawn(), nil
}

func (m Model) press(msg tea.KeyMsg) Model {
	if m.warnings.Open() || key.Matches(msg, m.warnings.Keys.Open) {
		m.warnings = m.warnings.Update(msg)
		return m
	}
	switch k := m.bindings(); {
	case key.Matches(msg, k.more):
		return m.shareBy(1)
	case key.Matches(msg, k.less):
		return m.shareBy(-1)
	case key.Matches(msg, k.next, k.previous):
		return m.otherPosing(msg, k)
	case key.Matches(msg, k.flow):
		m.flow = !m.flow
	case key.Matches(msg, k.table):
		m.table = !m.table
	case key.Matches(msg, k.sweep):
		m.view = toggled(m.view, sweep)
	case key.Matches(msg, k.energy):
		m.view = toggled(m.view, energy)
	case key.Matches(msg, k.indices):
		m.view = toggled(m.view, indices)
	case key.Matches(msg, k.held):
		m.view = toggled(m.view, held)
	case m.view == held:
		m.page = m.page.Update(msg, m.pageKeys)
	}
	return m
}

func toggled(now, v view) view {
	if now == v {
		return waves
	}
	return v
}

// shareBy goes to another share; at the ends it stays.
func (m Model) shareBy(n int) Model {
	m.state = max(0, min(m.state+n, m.count()-1))
	m.share = m.shown().Supported[m.state].Share
	return m
}

// otherPosing goes round the posings, at the same share.
func (m Model) otherPosing(msg tea.KeyMsg, k keyMap) Model {
	n, by := len(m.comparison.Answers), 1
	if key.Matches(msg, k.previous) {
		by = -1
	}
	m.answer = (m.answer + by + n) % n
	m.posing = m.shown().Posing
	return m
}
