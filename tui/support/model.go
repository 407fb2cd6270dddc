package support

import (
	"math"
	"slices"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tree/study"
	"afterbeat/tree/support"
	"afterbeat/tui"
	_ "afterbeat/tui/background"
	"afterbeat/tui/explain"
	"afterbeat/tui/layout"
	"afterbeat/tui/page"
	"afterbeat/tui/warnlist"
)

// view is what the screen shows.
type view int

const (
	waves     view = iota // native and supported over one another
	sweep                 // retained pulse against share, pressures against speed
	energy                // power against share, or of the coupled state
	indices               // of both waves
	held                  // what is the same in all states
	depends               // what moves the forecast, and what would prove it wrong
	ventricle             // the parameters of ventricle and pump
)

// paged tells a view of text that scrolls.
func (v view) paged() bool { return v == held || v == depends || v == ventricle }

// The state that the screen begins with: the forecast where there is one, else
// the yardstick that is no identity, at half of the flow.
const (
	coupledPosing  support.Posing = "coupled"
	firstYardstick                = support.LateValvePosing
	firstShare                    = 0.5
)

// Model is the screen.
type Model struct {
	area       tui.Area
	theme      tui.Theme
	study      study.Study
	comparison *study.Comparison // nil while it is computed
	forecast   *study.Forecast   // nil while there is none
	posing     support.Posing    // the one wanted; kept while comparisons come and go
	share      float64           // so is the share
	speed      float64           // and the speed; 0: the middle one
	answer     int               // of the comparison, with that posing
	at         int               // of the speeds of the forecast, nearest to it
	state      int               // of the answer, with the share nearest to it
	view       view
	table      bool // numbers in place of the picture
	flow       bool // in place of pressure
	figured    bool // figures of the forecast in place of indices
	curves     curves
	picture    string     // of the view, the state and the size
	words      [][]string // of each answer: what its power means, and what not
	request    int        // of the curves asked for last
	page       page.Scroll
	pageKeys   page.Keys
	warnings   warnlist.Model
	numbers    explain.Model
	moved      moved // a what-if
}

var _ tui.Screen = Model{}

// New is the screen before anything was computed.
func New() Model {
	return Model{
		posing: coupledPosing, share: firstShare, pageKeys: page.NewKeys(),
		warnings: warnlist.New("Warnings of the study", nil), numbers: explain.New(),
	}
}

// Typing is false: there is no text field.
func (m Model) Typing() bool { return false }

// Show takes over what has been computed. Posing, share and speed stay.
func (m Model) Show(s study.Study) (tui.Screen, tea.Cmd) {
	m.study, m.comparison, m.forecast = s, s.Comparison, nil
	if f := s.Forecast; f != nil && f.Reason == "" && len(f.Speeds) > 0 && m.there() {
		m.forecast = f
	}
	m.warnings = m.warnings.Hold(s.Warnings())
	m.curves, m.moved = curves{}, moved{}
	m.request++ // what is under way belongs to another study
	m = m.placed()
	m.numbers = m.numbers.Hold(m.explained())
	return m.worded().drawn().prepare()
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
		m.curves = curves{} // pages are of the theme that was
	}
	m.area, m.theme = a, t
	m.warnings, m.numbers = m.warnings.Resize(a, t), m.numbers.Resize(a, t)
	m.page = m.page.Resize(a.Height - 1)
	return m.worded().drawn().prepare()
}

// there tells that there are states to show.
func (m Model) there() bool {
	return m.comparison != nil && len(m.comparison.Answers) > 0 && len(m.comparison.Answers[0].Supported) > 0
}

// coupled tells that the forecast is shown.
func (m Model) coupled() bool { return m.forecast != nil && m.posing == coupledPosing }

// viewing is the view shown: one of the forecast is kept until there is one.
func (m Model) viewing() view {
	if !m.coupled() && (m.view == depends || m.view == ventricle) {
		return waves
	}
	return m.view
}

// posings are those that can be shown, the forecast first.
func (m Model) posings() []support.Posing {
	var all []support.Posing
	if m.forecast != nil {
		all = append(all, coupledPosing)
	}
	if m.there() {
		for _, a := range m.comparison.Answers {
			all = append(all, a.Posing)
		}
	}
	return all
}

// count is how many shares there are, or speeds.
func (m Model) count() int {
	if m.coupled() {
		return len(m.forecast.Speeds)
	}
	return len(m.shown().Supported)
}

// shown is the answer of the yardstick shown.
func (m Model) shown() support.Answer {
	if !m.there() {
		return support.Answer{}
	}
	return m.comparison.Answers[m.answer]
}

// placed finds posing and share in the comparison, and the speed in the forecast.
func (m Model) placed() Model {
	m.answer, m.state, m.at = 0, 0, 0
	if !m.there() {
		return m
	}
	m = m.speedPlaced()
	wanted := m.posing
	if wanted == coupledPosing {
		wanted = firstYardstick
	}
	for i, a := range m.comparison.Answers {
		if a.Posing == wanted {
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
	var cmd tea.Cmd
	switch msg := msg.(type) {
	case curvesMsg:
		if msg.request == m.request {
			m.curves = msg.curves
		}
	case whatIfMsg:
		m, cmd = m.takeWhatIf(msg)
	case tea.KeyMsg:
		m, cmd = m.press(msg)
	}
	return m.drawn(), cmd
}

func (m Model) press(msg tea.KeyMsg) (Model, tea.Cmd) {
	if m.warnings.Open() || key.Matches(msg, m.warnings.Keys.Open) {
		m.warnings = m.warnings.Update(msg)
		return m, nil
	}
	if m.numbers.Open() || key.Matches(msg, m.numbers.Keys.Open) {
		m.numbers = m.numbers.Hold(m.explained()).Update(msg)
		return m, nil
	}
	switch k := m.bindings(); {
	case key.Matches(msg, k.whatIf):
		return m.moveBy(1)
	case key.Matches(msg, k.whatIfBack):
		return m.moveBy(-1)
	case key.Matches(msg, k.leave):
		m.moved = moved{}
	case key.Matches(msg, k.quote):
		return m, m.quote()
	case key.Matches(msg, k.more):
		return m.stepBy(1), nil
	case key.Matches(msg, k.less):
		return m.stepBy(-1), nil
	case key.Matches(msg, k.next):
		return m.otherPosing(1), nil
	case key.Matches(msg, k.previous):
		return m.otherPosing(-1), nil
	case key.Matches(msg, k.flow) && m.viewing() == indices:
		m.figured = !m.figured
	case key.Matches(msg, k.flow):
		m.flow = !m.flow
	case key.Matches(msg, k.table):
		m.table = !m.table
	default:
		return m.look(msg, k), nil
	}
	return m, nil
}

// look opens a view, or leaves it for the waves, or moves through its page.
func (m Model) look(msg tea.KeyMsg, k keyMap) Model {
	now := m.viewing()
	for v, b := range k.views() {
		if !key.Matches(msg, *b) {
			continue
		}
		m.view, m.moved = v, moved{}
		if now == v {
			m.view = waves
		}
		m.page = page.Scroll{}.Resize(m.area.Height - 1)
		return m
	}
	if now.paged() {
		m.page = m.page.Update(msg, m.pageKeys)
	}
	return m
}

// stepBy goes to another share or speed; at the ends it stays.
func (m Model) stepBy(n int) Model {
	if m.coupled() {
		m.at = max(0, min(m.at+n, m.count()-1))
		m.speed = m.forecast.Speeds[m.at].Speed
		return m
	}
	m.state = max(0, min(m.state+n, m.count()-1))
	m.share = m.shown().Supported[m.state].Share
	return m
}

// otherPosing goes round the posings, at the same share and speed.
func (m Model) otherPosing(by int) Model {
	all, now := m.posings(), m.shown().Posing
	if m.coupled() {
		now = coupledPosing
	}
	m.moved = moved{}
	m.posing = all[(slices.Index(all, now)+by+len(all))%len(all)]
	return m.placed()
}
