package app

import (
	"fmt"
	"slices"
	"strings"
	"unicode/utf8"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"
	"github.com/charmbracelet/x/ansi"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tui"
	"afterbeat/tui/layout"
)

// The smallest terminal that the screens fit into, and the width from which
// the caution fits on one row.
const (
	leastWidth  = 60
	leastHeight = 15
	oneRow      = len(casenote.Caution)
)

// View is the whole frame.
func (m Model) View() (frame string) {
	size := m.size
	if size == (tui.Area{}) {
		size = tui.Area{Width: 80, Height: 24}
	}
	defer caught(func(at string) { frame = clamp(m.faultRows(at), size, m.theme) })
	switch {
	case m.size == (tui.Area{}):
		return clamp([]string{casenote.Caution}, size, m.theme)
	case m.small():
		return clamp(m.smallRows(), size, m.theme)
	}
	rows := append(m.head(), m.body()...)
	return clamp(append(rows, m.status(size.Width), m.keyRow(size.Width)), size, m.theme)
}

// small tells that the screens do not fit.
func (m Model) small() bool {
	return m.size.Width < leastWidth || m.size.Height < leastHeight
}

// area is what a screen gets: two rows above it and two below are the root's.
func (m Model) area() tui.Area {
	return tui.Area{Width: m.size.Width, Height: max(m.size.Height-4, 1)}
}

// head is the caution, and the stages. Where the caution takes two rows, the
// stages stand behind its end, short.
func (m Model) head() []string {
	if m.size.Width >= oneRow {
		return []string{casenote.Caution, m.title(m.size.Width-cellsOfStages) + m.stages(true)}
	}
	rows := layout.Wrap(data.Clean(casenote.Caution), m.size.Width)
	rows[1] += "  " + m.stages(false)
	return rows[:2]
}

// cellsOfStages is the width of the stages with their names.
const cellsOfStages = 53

// title is program and label, or file, in width cells.
func (m Model) title(width int) string {
	name := m.options.Title.String()
	if m.present.Label != "" {
		name = m.present.Label
	}
	return layout.Pad(layout.Clean("afterbeat "+name, m.theme), width-1) + " "
}

// stages are the six stages: [3 Fit] is open, (4 Tree) not possible yet.
func (m Model) stages(named bool) string {
	var b strings.Builder
	for _, s := range tui.Stages() {
		name := fmt.Sprint(int(s))
		if named || s == m.open {
			name += " " + s.String()
		}
		switch {
		case s == m.open:
			name = "[" + name + "]"
		case s.Missing(m.study) != "":
			name = "(" + name + ")"
		default:
			name = " " + name + " "
		}
		b.WriteString(name)
	}
	return b.String()
}

// body is the open stage or the help, with an error over its last rows.
func (m Model) body() []string {
	a := m.area()
	var rows []string
	if m.helping {
		rows = m.helpRows()
		rows = rows[min(m.scroll, len(rows)):]
	} else if rows = m.why(m.open).rows(m); rows == nil {
		rows = strings.Split(m.screens[m.open].View(), "\n")
	}
	rows = append(rows[:min(len(rows), a.Height)], make([]string, max(a.Height-len(rows), 0))...)
	over := m.errorRows(a.Width)
	over = over[:min(len(over), a.Height)]
	copy(rows[len(rows)-len(over):], over)
	return rows
}

// keyRow lists the keys that work now, those of the screen first; the last ones
// of the root are always there.
func (m Model) keyRow(width int) string {
	always, more := m.keysNow()
	end := listed(shortened(always), width, "")
	return listed(more, width, end)
}

// shortened are bindings that stand on the last row of every stage, in fewer
// words than the help has.
func shortened(always []key.Binding) []key.Binding {
	out := slices.Clone(always)
	for i := range out {
		if h := out[i].Help(); h == keys.save.Help() {
			out[i].SetHelp(h.Key, "save")
		}
	}
	return out
}

// keysNow are the keys that work now, in two parts of which the first is always
// listed.
func (m Model) keysNow() (always, more []key.Binding) {
	switch {
	case m.naming:
		return []key.Binding{keys.confirm, keys.back}, nil
	case m.leaving == asks:
		return []key.Binding{keys.first, keys.discard, keys.stay}, nil
	case m.helping:
		return keys.helpKeys(), nil
	case m.typing():
		return nil, m.screens[m.open].Keys()
	case m.offer != nil:
		return m.offer.keys(), nil
	case m.small():
		return []key.Binding{keys.quit}, nil
	}
	most, others := m.everywhere()
	return most, append(m.ofScreen(), others...)
}

// ofScreen are the keys of the open screen; esc closes an error first.
func (m Model) ofScreen() []key.Binding {
	all := slices.Clone(m.screens[m.open].Keys())
	if len(m.errors) == 0 {
		return all
	}
	all = slices.DeleteFunc(all, func(b key.Binding) bool { return key.Matches(tea.KeyMsg{Type: tea.KeyEsc}, b) })
	return append([]key.Binding{keys.answer}, all...)
}

// listed is as many keys with their words as fit into width before end, which
// follows them.
func listed(bindings []key.Binding, width int, end string) string {
	var b strings.Builder
	room := width
	if end != "" {
		room -= len(end) + 2
	}
	for _, k := range bindings {
		h := k.Help()
		if !k.Enabled() || h.Key == "" {
			continue
		}
		words := brief(h.Key) + " " + h.Desc
		if b.Len() > 0 {
			words = "  " + words
		}
		if ansi.StringWidth(b.String()+words) > room {
			continue // a shorter one may still fit
		}
		b.WriteString(words)
	}
	if b.Len() > 0 && end != "" {
		b.WriteString("  ")
	}
	return b.String() + end
}

// brief is the shortest way to name a key of which the help names all ways:
// "h/l/left/right" is "h/l", "space/pgdown" is "space", "left/right" stays.
func brief(shown string) string {
	parts := strings.Split(shown, "/")
	if shown == "/" || len(parts) == 2 && slices.Contains([]string{"up", "left"}, parts[0]) {
		return shown
	}
	letters := slices.DeleteFunc(slices.Clone(parts), func(p string) bool { return len(p) != 1 })
	if len(letters) == 0 {
		return parts[0]
	}
	return strings.Join(letters[:min(len(letters), 2)], "/")
}

// faultRows stand where a frame could not be made.
func (m Model) faultRows(at string) []string {
	rows := []string{casenote.Caution}
	if w := m.size.Width; w > 0 {
		rows = layout.Wrap(data.Clean(casenote.Caution), w)
	}
	return append(rows,
		"The program has a fault at "+at+".",
		"Nothing is lost. Another digit opens another stage; q quits.",
	)
}

// clamp cuts a frame to the size, from below and from the right, so that the
// caution stays. It lets no control byte through but colours, and in ASCII no
// byte from 0x80 on.
func clamp(rows []string, a tui.Area, t tui.Theme) string {
	var b strings.Builder
	for i, row := range rows[:min(len(rows), a.Height)] {
		if i > 0 {
			b.WriteByte('\n')
		}
		if !harmless(row, t) {
			row = defused(row, t)
		}
		if len(row) > a.Width && ansi.StringWidth(row) > a.Width {
			row = ansi.Truncate(row, a.Width, "")
		}
		b.WriteString(strings.TrimRight(row, " "))
	}
	return b.String()
}

// harmless tells that a row has printable ASCII only, or, where the theme has
// it, Unicode without control characters.
func harmless(row string, t tui.Theme) bool {
	for i := range len(row) {
		switch c := row[i]; {
		case c < ' ', c == 0x7f, c >= 0x80 && t.ASCII:
			return false
		case c == 0xc2 && i+1 < len(row) && row[i+1] < 0xa0: // U+0080 to U+009F
			return false
		}
	}
	return t.ASCII || utf8.ValidString(row)
}

// defused is a row with everything but text and colours made visible.
func defused(row string, t tui.Theme) string {
	var b strings.Builder
	for len(row) > 0 {
		if n := colourLength(row); n > 0 {
			b.WriteString(row[:n])
			row = row[n:]
			continue
		}
		n := strings.IndexByte(row[1:], '\x1b') + 1
		if n == 0 {
			n = len(row)
		}
		b.WriteString(visible(row[:n], t))
		row = row[n:]
	}
	return b.String()
}

// visible is text that keeps its spaces.
func visible(s string, t tui.Theme) string {
	parts := strings.Split(s, " ")
	for i, p := range parts {
		parts[i] = layout.Clean(p, t).String()
	}
	return strings.Join(parts, " ")
}

// colourLength is the length of the escape sequence for colour that s begins with; 0
// where it begins with none.
func colourLength(s string) int {
	if !strings.HasPrefix(s, "\x1b[") {
		return 0
	}
	for i := 2; i < len(s); i++ {
		switch c := s[i]; {
		case c == 'm':
			return i + 1
		case c != ';' && (c < '0' || c > '9'):
			return 0
		}
	}
	return 0
}
