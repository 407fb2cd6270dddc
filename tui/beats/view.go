package beats

import (
	"fmt"
	"strconv"
	"strings"

	"afterbeat/data"
	"afterbeat/data/beat"
	"afterbeat/data/casenote"
	"afterbeat/tui"
	"afterbeat/tui/chart"
	"afterbeat/tui/layout"
)

// shares is how the area is divided.
type shares struct {
	both           bool // trace and overlay stand side by side
	trace, overlay tui.Area
	notes          int // lines of why there is no average beat
	numbers        int // lines of the tables
}

const (
	leastPlot  = 6   // lines
	easyPlot   = 10  // what the tables leave the plot, if they can
	mostRows   = 14  // lines of the tables
	bothFrom   = 160 // columns
	fullFrom   = 80  // columns; below, there is one column
	reasonsFor = 25  // cells of the table of reasons
	gap        = 2
	fixed      = 3 // the summary, the beat, the warnings
)

// divide gives each part its lines and columns.
func (m Model) divide() shares {
	s := shares{both: m.area.Width >= bothFrom, notes: len(m.notes())}
	free := m.area.Height - fixed - s.notes
	s.numbers = max(0, min(m.tableLines(), free-easyPlot))
	if s.numbers < 3 {
		s.numbers = max(0, min(m.tableLines(), 3, free-leastPlot))
	}
	plot := free - s.numbers
	if plot < leastPlot {
		plot = 0
	}
	if m.all {
		plot, s.numbers = free, 0
	}
	s.trace = tui.Area{Width: m.area.Width, Height: plot}
	s.overlay = s.trace
	if s.both {
		s.overlay.Width = m.area.Width * 2 / 5
		s.trace.Width = m.area.Width - s.overlay.Width - gap
	}
	return s
}

// tableLines is what the tables would take at most.
func (m Model) tableLines() int {
	if len(m.ready.signals) == 0 || !m.ready.leads {
		return 0
	}
	return min(max(len(m.signal().rows), len(m.ready.tally))+1, mostRows)
}

// notes say why there is no average beat, and what would cure it.
func (m Model) notes() []string {
	if m.ready.reason == "" {
		return nil
	}
	lines := layout.Wrap(m.clean("No average beat: "+m.ready.reason+"."), m.area.Width)
	return append(lines, layout.Wrap(m.clean("What would cure it: "+m.cure()), m.area.Width)...)
}

func (m Model) cure() string {
	switch {
	case m.ready.ambiguous:
		return "on the intake (1), enter on the right one."
	case m.ready.leads:
		return "restore beats with d, or choose a quieter or longer span on the intake (1, then [ and ])."
	case len(m.ready.signals) > 0:
		return "on the intake (1), another channel (enter), a longer or quieter span ([ and ]), or i where a channel is upside down."
	}
	return "a recording of arterial pressure, flow or velocity; if a column is one, state its unit on the intake (1, then e)."
}

func (m Model) clean(s string) data.Text { return layout.Clean(s, m.theme) }

// View is the screen.
func (m Model) View() string {
	switch {
	case m.list.Open():
		return m.list.View()
	case m.opened.Open():
		return m.opened.View()
	case m.ready.number == 0:
		return layout.Fit([]string{"The beats have not been looked for yet."}, m.area)
	}
	s := m.divide()
	var lines []string
	if summary := m.summary(); summary != "" {
		lines = append(lines, summary)
	}
	lines = append(lines, m.notes()...)
	if len(m.ready.signals) == 0 {
		return layout.Fit(append(lines, m.list.Count()), m.area)
	}
	lines = append(lines, m.pictures(s)...)
	lines = append(lines, m.beatLine())
	lines = append(lines, m.tables(s.numbers)...)
	return layout.Fit(append(lines, m.list.Count()), m.area)
}

// pictures are the trace, the overlay, or both.
func (m Model) pictures(s shares) []string {
	if s.trace.Height < 1 {
		return nil
	}
	if m.all {
		return layout.Lines(strings.Join(m.numbers(m.area.Width, s.trace.Height), "\n"), s.trace.Height)
	}
	if s.both {
		return layout.Beside(m.traceView(s.trace.Width, s.trace.Height), m.overlayLines(s), s.trace.Width+gap)
	}
	if m.aside && m.signal().ensemble >= 0 {
		return m.overlayLines(s)
	}
	return m.traceView(s.trace.Width, s.trace.Height)
}

// traceView is the trace with the beat under the cursor, > at its onset, or the
// list of the beats.
func (m Model) traceView(width, height int) []string {
	if m.trace.Table() {
		return m.listed(width, height)
	}
	return layout.Lines(m.trace.View(m.cursorMarks()...), height)
}

func (m Model) cursorMarks() []chart.Mark {
	beats := m.beatsShown()
	if m.at >= len(beats) {
		return nil
	}
	b := beats[m.at]
	length := chart.Mark{Char: '='}
	if b.Rejected != "" {
		length.Char = '-'
	}
	from, to := m.ready.grid.At(b.From), m.ready.grid.At(max(b.From, b.To-1))
	length.Spans = []data.Span{{From: from, To: to}}
	return []chart.Mark{length, {Char: '>', At: []float64{from}}}
}

func (m Model) overlayLines(s shares) []string {
	o := m.overlay
	switch {
	case m.signal().ensemble < 0 || o.order.number == 0:
		return layout.Lines("", s.overlay.Height)
	case o.order.table:
		return layout.Lines(o.table, s.overlay.Height)
	}
	p := o.plot
	if m.over {
		p = o.with(m.signal(), m.at, fmt.Sprintf("beat %d", m.at+1))
	}
	return layout.Lines(p.Draw(s.overlay.Width, s.overlay.Height, m.theme.Chart()), s.overlay.Height)
}

// summary counts the beats and names the channel.
func (m Model) summary() string {
	var words []string
	if m.ready.leads {
		words = append(words, fmt.Sprintf("%d of %d beats used", m.ready.tally[0].n, total(m.ready.tally)))
	}
	if len(m.ready.signals) > 0 {
		s := m.signal()
		words = append(words, m.called(s, m.area.Width-len(strings.Join(words, "   "))-len("   ")))
	}
	if m.busy {
		words = append(words, "(working)")
	} else if len(m.ready.signals) > 0 {
		for _, q := range m.signal().quality { // as many as there is room for
			if line := strings.Join(append(words, q), "   "); len(line) <= m.area.Width {
				words = append(words, q)
			}
		}
	}
	return strings.Join(words, "   ")
}

// called names a signal in about width cells: its role, channel and site. Of a
// velocity the role says that its indices are those of a flow.
func (m Model) called(s signal, width int) string {
	role, site := s.role+": ", fmt.Sprintf(", site %s", s.site)
	if s.diameter != "" {
		role = "velocity: "
		site += fmt.Sprintf("; x %s cm2 = flow", casenote.Format(s.gain, data.NoInterval()))
		width -= len(role) + len(site)
	}
	return role + m.clean(s.name).Cut(max(min(width, 40), 8)).String() + site
}

// beatIs says of a velocity that the beat is shown as one, unlike the indices.
func (s signal) beatIs() string {
	if s.diameter != "" {
		return "velocity "
	}
	return ""
}

// made is how the flow came of the velocity.
func (s signal) made() string {
	return fmt.Sprintf("%s cm2 x velocity (diameter %s cm)", casenote.Format(s.gain, data.NoInterval()), s.diameter)
}

// beatLine says what is under the cursor.
func (m Model) beatLine() string {
	beats := m.beatsShown()
	if m.at >= len(beats) {
		return "no beats"
	}
	b := beats[m.at]
	from := m.ready.grid.At(b.From)
	words := fmt.Sprintf("beat %d of %d: %s; onset %s s", m.at+1, len(beats), m.fateOf(m.at), strconv.FormatFloat(from, 'f', 3, 64))
	rest := fmt.Sprintf(", %s%s to %s %s", m.signal().beatIs(), casenote.Format(b.Min, data.NoInterval()), casenote.Format(b.Max, data.NoInterval()), m.signal().source.Unit)
	length := fmt.Sprintf(", %s s long", strconv.FormatFloat(m.ready.grid.At(b.To)-from, 'f', 3, 64))
	switch {
	case len(words)+len(length)+len(rest) <= m.area.Width:
		words += length + rest
	case b.Rejected == beat.TooShort || b.Rejected == beat.TooLong: // what they are not used for
		words += length
	default:
		words += rest
	}
	if why := "; " + explained(b.Rejected); len(words)+len(why) <= m.area.Width && len(why) > 2 && m.byHand(m.at) == nothing {
		words += why
	}
	return m.clean(words).String()
}

// fateOf says whether a beat is used, and if not, why.
func (m Model) fateOf(i int) string {
	b := m.beatsShown()[i]
	switch m.byHand(i) {
	case dropped:
		return "dropped by hand"
	case kept:
		if b.Rejected != beat.Gap {
			return "restored by hand"
		}
	}
	if b.Rejected == "" {
		return "used"
	}
	return "not used, " + string(b.Rejected)
}
