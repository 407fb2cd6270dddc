package note

import (
	"fmt"
	"strings"

	"github.com/charmbracelet/x/ansi"

	"afterbeat/tui"
	"afterbeat/tui/layout"
)

// View is the lines of the window, and where it stands in the note.
func (m Model) View() string {
	if missing := tui.Note.Missing(m.study); missing != "" {
		return layout.Fit([]string{strings.ToUpper(missing[:1]) + missing[1:] + "."}, m.area)
	}
	if len(m.lines) == 0 {
		return layout.Fit([]string{"The note is being put together."}, m.area)
	}
	window := m.scroll.Window()
	lines := make([]string, 0, len(window)+1)
	for i, line := range window {
		if m.shift > 0 || ansi.StringWidth(line) > m.textWidth() {
			line = cut(line, m.shift, m.textWidth())
		}
		lines = append(lines, m.margin(m.scroll.Top()+i)+line)
	}
	lines = layout.Lines(strings.Join(lines, "\n"), max(m.area.Height-1, 0))
	return layout.Fit(append(lines, m.foot()), m.area)
}

// cut is the part of a line from a cell on; "~" tells that it goes on.
func cut(line string, from, width int) string {
	part := ansi.Cut(line, from, from+width)
	if ansi.StringWidth(line) > from+width && width > 0 {
		part = ansi.Truncate(part, width-1, "") + "~"
	}
	return part
}

// margin marks the match at hand, where something was found.
func (m Model) margin(line int) string {
	switch {
	case len(m.matches) == 0:
		return ""
	case m.matches[m.match] == line:
		return "> "
	}
	return "  "
}

// foot is what is typed; else where the window stands, the match at hand, and
// how the note is saved.
func (m Model) foot() string {
	prompt := map[what]string{remark: "Remark: ", search: "Search: "}[m.typing]
	if prompt != "" {
		return prompt + m.field.View(m.area.Width-len(prompt), m.theme)
	}
	words := m.scroll.Position()
	if n := len(m.matches); n > 0 {
		words += fmt.Sprintf("   match %d of %d", m.match+1, n)
	}
	words += "   s saves it as text"
	if m.widest > m.textWidth() {
		words += ", right: longer lines"
	}
	return words
}
