package intake

import (
	"math"
	"strconv"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tui/chart"
	"afterbeat/tui/layout"
)

// shares is how the height is divided.
type shares struct {
	head  bool // the lines about the file and what was measured beside it, and the heads of the table
	notes int  // lines of what is to be settled
	rows  int  // of the table, without its heads
	plot  int
}

const (
	leastPlot = 6  // lines
	easyPlot  = 10 // what the table leaves the plot, if it can
	lowScreen = 14 // lines; below, there are no heads
	mostNotes = 3
)

// divide gives each part its lines.
func (m Model) divide() shares {
	s := shares{head: m.area.Height >= lowScreen, notes: min(len(m.notes()), mostNotes)}
	free := m.area.Height - 2 - s.notes
	if s.head {
		free -= 3
	}
	n := len(m.ready.channels)
	s.rows = max(0, min(n, max(2, free-easyPlot)))
	if free-s.rows < leastPlot {
		s.rows = max(0, min(n, free-leastPlot))
	}
	if s.rows == 0 {
		s.rows = max(0, min(n, free))
	}
	if s.plot = free - s.rows; s.plot < leastPlot {
		s.plot = 0
	}
	return s
}

// notes say what has to be settled first.
func (m Model) notes() []string {
	if m.ready.unsettled == "" {
		return nil
	}
	return layout.Wrap(m.clean("To settle first: "+m.ready.unsettled+"."), m.area.Width)
}

func (m Model) clean(s string) data.Text { return layout.Clean(s, m.theme) }

// View is the screen.
func (m Model) View() string {
	switch {
	case m.list.Open():
		return m.list.View()
	case m.answered == 0 && m.inputs.Recording == nil:
		return layout.Fit([]string{"The recording has not been read yet."}, m.area)
	case m.answered == 0:
		return layout.Fit([]string{"The channels are being made ready."}, m.area)
	case len(m.ready.channels) == 0:
		return layout.Fit([]string{
			"The recording has no column of numbers besides the time.", "",
			"What would cure it: a file of comma-separated values with one column a channel,",
			"its name and unit in the header, such as abp_mmHg.",
		}, m.area)
	}
	s := m.divide()
	lines := m.notes()[:s.notes]
	if s.head {
		lines = append(lines, m.head(), "measured beside: "+besideOf(m.inputs.Case).String())
	}
	table := m.table(s.rows)
	if !s.head {
		table = table[1:]
	}
	lines = append(lines, table...)
	if s.plot > 0 {
		lines = append(lines, layout.Lines(m.trace.View(m.cursorMark()), s.plot)...)
	}
	last := []string{m.cursorLine(), m.list.Count()}
	if m.question.open() {
		last = m.question.lines(m.area.Width, m.theme)
	}
	return layout.Fit(append(lines, last...), m.area)
}

// cursorMark shows where the cursor is, under the trace.
func (m Model) cursorMark() chart.Mark {
	mark := chart.Mark{Name: "cursor", Char: '^'}
	if i := m.trace.Cursor(); i >= 0 {
		mark.At = []float64{m.ready.channels[m.chosen].source.Grid.At(i)}
	}
	return mark
}

// head says what the file is and what of it is used.
func (m Model) head() string {
	words := m.clean(m.ready.file.String()).Cut(m.area.Width/3).String() + ": " + m.ready.clock + ", " + spanWords(m.ready.span)
	if m.busy {
		words += " (working)"
	}
	return words
}

func spanWords(s data.Span) string {
	from, to := !math.IsInf(s.From, 0), !math.IsInf(s.To, 0)
	switch {
	case from && to:
		return "used from " + seconds(s.From) + " to " + seconds(s.To) + " s"
	case from:
		return "used from " + seconds(s.From) + " s"
	case to:
		return "used to " + seconds(s.To) + " s"
	}
	return "all used"
}

// seconds is a time on the file's clock to the millisecond, without needless
// zeros.
func seconds(t float64) string {
	return strconv.FormatFloat(math.Round(t*1e4)/1e4, 'f', -1, 64)
}

// cursorLine says what is under the cursor, and what the case does to the
// channel.
func (m Model) cursorLine() string {
	i, ch := m.trace.Cursor(), m.ready.channels[m.chosen]
	if i < 0 || i >= len(ch.Values) {
		return "no trace: " + m.ready.unsettled
	}
	at := ch.source.Grid.At(i)
	words := "cursor " + strconv.FormatFloat(at, 'f', 3, 64) + " s: " + m.valueAt(i)
	if at < m.ready.span.From || at >= m.ready.span.To {
		words += ", outside the span"
	}
	for _, s := range m.inputs.Excluded {
		if s.From <= at && at <= s.To {
			words += ", left out"
			break
		}
	}
	if c := m.corrections(); c != "" {
		words += "; as stated: " + c
	}
	if ch.upsideDown {
		words += "; upside down? i turns it back"
	}
	return m.clean(words).String()
}

func (m Model) valueAt(i int) string {
	ch := m.ready.channels[m.chosen]
	v := ch.Values[i]
	if math.IsNaN(v) {
		return "missing"
	}
	return casenote.Format(v, data.NoInterval()) + " " + ch.unit
}

// corrections are what the case does to the values of the chosen channel.
func (m Model) corrections() string {
	var words []string
	if m.names().inverted(m.inputs.Case, m.chosen) {
		words = append(words, "inverted")
	}
	if c := m.names().calibrated(m.inputs.Case, m.chosen).String(); c != "" {
		words = append(words, c)
	}
	return strings.Join(words, ", ")
}
