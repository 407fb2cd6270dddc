package tree

import (
	"slices"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tree/study"
	"afterbeat/tui"
	_ "afterbeat/tui/background"
	"afterbeat/tui/field"
	"afterbeat/tui/page"
	"afterbeat/tui/warnlist"
)

// view is what the screen shows.
type view int

const (
	outline   view = iota // segments
	beds                  // groups of terminals
	impedance             // of the root, and reflection
	measured              // traces over those of the tree
	made                  // how the tree came about
)

// Model is the screen.
type Model struct {
	area     tui.Area
	theme    tui.Theme
	study    study.Study
	tree     *study.Tree // nil while there is none to show
	view     view
	chosen   string          // id of the segment under the cursor; kept while trees come and go
	folded   map[string]bool // by id; never changed in place
	filter   field.Model
	asking   bool // the filter has the focus
	rows     []int
	at       int // in rows
	bed      int // in tree.Beds
	trace    int // of the traces that were measured
	waves    bool
	curves   curves
	pictures [2]string
	request  int
	page     page.Scroll
	pageKeys page.Keys
	warnings warnlist.Model
}

var _ tui.Screen = Model{}

// New is the screen before anything was computed.
func New() Model {
	return Model{pageKeys: page.NewKeys(), folded: map[string]bool{}, warnings: warnlist.New("Warnings of the study", nil)}
}

// Typing tells that the filter has the focus.
func (m Model) Typing() bool { return m.asking }

// Show takes over what has been computed. The cursor stays on its segment.
func (m Model) Show(s study.Study) (tui.Screen, tea.Cmd) {
	before := m.tree
	m.study, m.tree = s, nil
	if s.Tree != nil && s.Tree.Reason == "" && len(s.Tree.Segments) > 0 {
		m.tree = s.Tree
	}
	m.warnings = m.warnings.Hold(s.Warnings())
	if m.tree == nil || before == nil || &m.tree.Segments[0] != &before.Segments[0] {
		m.curves = curves{}
	}
	m = m.listed().placed()
	return m.prepare()
}

// Resize takes over size and theme.
func (m Model) Resize(a tui.Area, t tui.Theme) (tui.Screen, tea.Cmd) {
	m.area, m.theme = a, t
	m.curves = curves{}
	m.warnings = m.warnings.Resize(a, t)
	m.page = m.page.Resize(a.Height - 1)
	return m.prepare()
}

// placed puts the cursor on the chosen segment, or near to where it was.
func (m Model) placed() Model {
	if m.tree == nil {
		m.at, m.bed, m.trace = 0, 0, 0
		return m
	}
	for k, i := range m.rows {
		if m.tree.Segments[i].ID == m.chosen {
			m.at = k
		}
	}
	m.at = max(0, min(m.at, len(m.rows)-1))
	m.bed = max(0, min(m.bed, len(m.tree.Beds)-1))
	m.trace = max(0, min(m.trace, len(m.tree.Distal)))
	return m
}

// segment is the index in the tree of the segment that is looked at: of a bed,
// its terminal of the largest flow. -1: none.
func (m Model) segment() int {
	switch {
	case m.tree == nil:
		return -1
	case m.view == beds && len(m.tree.Beds) > 0:
		all := m.tree.Beds[m.bed].Terminals
		return slices.MaxFunc(all, func(a, b int) int {
			if m.tree.Segments[a].FlowMeasures.Mean < m.tree.Segments[b].FlowMeasures.Mean {
				return -1
			}
			return 1
		})
	case len(m.rows) == 0:
		return -1
	}
	return m.rows[m.at]
}

// Update answers a key, or takes over curves that were asked for.
func (m Model) Update(msg tea.Msg) (tui.Screen, tea.Cmd) {
	switch msg := msg.(type) {
	case curvesMsg:
		if msg.request == m.request {
			m.curves = msg.curves
		}
	case tea.KeyMsg:
		m = m.press(msg)
	}
	return m.drawn(), nil
}

func (m Model) press(msg tea.KeyMsg) Model {
	switch {
	case m.asking:
		return m.typed(msg)
	case m.warnings.Open() || key.Matches(msg, m.warnings.Keys.Open):
		m.warnings = m.warnings.Update(msg)
		return m
	case m.tree == nil:
		return m
	}
	k := m.bindings()
	for v, b := range k.views() {
		if key.Matches(msg, *b) {
			return m.show(v)
		}
	}
	switch {
	case m.view == made:
		m.page = m.page.Update(msg, m.pageKeys)
	case key.Matches(msg, k.waves):
		m.waves = !m.waves
	case key.Matches(msg, k.find):
		m.asking = true
	case key.Matches(msg, k.clear):
		m.filter = field.Model{}
		return m.listed().placed()
	default:
		return m.move(msg, k)
	}
	return m
}

// show opens a view, or leaves it for the outline.
func (m Model) show(v view) Model {
	if m.view == v {
		v = outline
	}
	m.view, m.waves = v, false
	m.page = page.Scroll{}.Resize(m.area.Height - 1)
	return m
}

// typed gives a key to the filter.
func (m Model) typed(msg tea.KeyMsg) Model {
	k := m.bindings()
	switch {
	case key.Matches(msg, k.keep):
		m.asking = false
	case key.Matches(msg, k.drop):
		m.asking, m.filter = false, field.Model{}
	default:
		m.filter = m.filter.Update(msg)
	}
	return m.listed().placed()
}

// move moves the cursor, or folds.
func (m Model) move(msg tea.KeyMsg, k keyMap) Model {
	page := max(m.plan().rows-1, 1)
	for _, one := range []struct {
		b  key.Binding
		by int
	}{{k.down, 1}, {k.up, -1}, {k.pageDown, page}, {k.pageUp, -page}, {k.first, -1 << 30}, {k.last, 1 << 30}} {
		if key.Matches(msg, one.b) {
			return m.stepBy(one.by)
		}
	}
	switch {
	case key.Matches(msg, k.fold):
		return m.fold()
	case key.Matches(msg, k.unfold):
		return m.unfold()
	case key.Matches(msg, k.foldAll):
		return m.foldAll()
	}
	return m
}

// stepBy moves the cursor of the list that is shown; at the ends it stays.
func (m Model) stepBy(n int) Model {
	to := func(at, count int) int { return max(0, min(at+max(-count, min(n, count)), count-1)) }
	switch m.view {
	case beds:
		m.bed = to(m.bed, len(m.tree.Beds))
	case measured:
		m.trace = to(m.trace, len(m.tree.Distal)+1)
	default:
		m.at = to(m.at, len(m.rows))
		if i := m.segment(); i >= 0 {
			m.chosen = m.tree.Segments[i].ID
		}
	}
	return m
}
