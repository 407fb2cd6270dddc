package app

import (
	"fmt"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tui/layout"
)

// smallRows say what to do in a terminal that is too small: in few words where
// the rows do not suffice for more.
func (m Model) smallRows() []string {
	caution := layout.Wrap(data.Clean(casenote.Caution), m.size.Width)
	if rows := append(caution, m.smallWords()...); len(rows) <= m.size.Height {
		return rows
	}
	least := fmt.Sprintf("min %dx%d", leastWidth, leastHeight)
	if last := len(caution) - 1; last+1 >= m.size.Height {
		if row := caution[last] + " " + least; len(row) <= m.size.Width {
			caution[last] = row
		}
		return caution
	}
	rows, keys := caution, m.wrapped(m.keyRow(leastWidth*2))
	if m.asked() {
		rows = append(rows, keys...)
	}
	rows = append(rows, m.wrapped(fmt.Sprintf("%dx%d, %s", m.size.Width, m.size.Height, least))...)
	rows = append(rows, m.wrapped(m.options.Screenless.String())...)
	if !m.asked() {
		rows = append(rows, keys...)
	}
	return append(rows, m.errorRows(m.size.Width)...)
}

// smallWords are the words below the caution where there is room.
func (m Model) smallWords() []string {
	rows := m.wrapped(fmt.Sprintf("This terminal is %dx%d; the screens need %dx%d.", m.size.Width, m.size.Height, leastWidth, leastHeight))
	if m.options.Screenless.Width() > 0 {
		rows = append(rows, m.wrapped("Without a screen: "+m.options.Screenless.String())...)
	}
	rows = append(rows, m.errorRows(m.size.Width)...)
	if m.asked() {
		rows = append(rows, m.wrapped(m.status(leastWidth*2))...)
	}
	return append(rows, m.wrapped(m.keyRow(leastWidth*2))...)
}

// asked tells that a question waits for an answer.
func (m Model) asked() bool { return m.naming || m.leaving == asks || m.offer != nil }

// wrapped is words in rows of the terminal's width; none without words.
func (m Model) wrapped(words string) []string {
	if words == "" {
		return nil
	}
	return layout.Wrap(layout.Clean(words, m.theme), m.size.Width)
}
