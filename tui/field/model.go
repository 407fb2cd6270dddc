package field

import (
	"slices"
	"strings"
	"unicode"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/tui"
	"afterbeat/tui/layout"
)

// longest is the number of letters that a field takes.
const longest = 1000

// bar marks the place.
const bar = "|"

// Model is a text field. The zero Model is empty.
type Model struct {
	letters []rune
	at      int // letters before the place
}

// New is a field that holds value, with the place at its end.
func New(value string) Model {
	return Model{}.insert([]rune(value))
}

// Value is what stands in the field, as it was typed.
func (m Model) Value() string { return string(m.letters) }

// Update takes a key: letters, a paste, or one of [Keys]. Others do nothing.
func (m Model) Update(msg tea.KeyMsg) Model {
	n := len(m.letters)
	switch {
	case msg.Alt:
	case msg.Type == tea.KeyRunes, msg.Type == tea.KeySpace:
		m = m.insert(msg.Runes)
	case key.Matches(msg, keys.left):
		m.at = max(m.at-1, 0)
	case key.Matches(msg, keys.right):
		m.at = min(m.at+1, n)
	case key.Matches(msg, keys.start):
		m.at = 0
	case key.Matches(msg, keys.end):
		m.at = n
	case key.Matches(msg, keys.back) && m.at > 0:
		m = m.cut(m.at-1, m.at)
	case key.Matches(msg, keys.forward) && m.at < n:
		m = m.cut(m.at, m.at+1)
	case key.Matches(msg, keys.clear):
		m = Model{}
	}
	return m
}

// insert puts letters in at the place. Of a paste of several lines the line
// ends become spaces; other control characters are left out.
func (m Model) insert(letters []rune) Model {
	var in []rune
	for _, r := range letters {
		switch {
		case unicode.IsSpace(r):
			in = append(in, ' ')
		case !unicode.IsControl(r):
			in = append(in, r)
		}
	}
	in = in[:min(len(in), max(longest-len(m.letters), 0))]
	m.letters = slices.Concat(m.letters[:m.at], in, m.letters[m.at:])
	m.at += len(in)
	return m
}

func (m Model) cut(from, to int) Model {
	m.letters = slices.Concat(m.letters[:from], m.letters[to:])
	m.at = from
	return m
}

// View is the field in at most width cells. What does not fit is cut on the
// side away from the place, or on both; a cut end is a "~".
func (m Model) View(width int, t tui.Theme) string {
	before, after := shown(m.letters[:m.at], t), shown(m.letters[m.at:], t)
	left, right := cells(before), cells(after)
	room := max(width-len(bar), 0)
	if left+right > room {
		right = min(right, max(room/3, room-left))
		left = min(left, room-right)
	}
	return cutLeft(before, left) + bar[:min(len(bar), max(width, 0))] + cutRight(after, right)
}

// shown are letters made safe one by one, so that no space is lost.
func shown(letters []rune, t tui.Theme) []string {
	out := make([]string, len(letters))
	for i, r := range letters {
		if out[i] = " "; r != ' ' {
			out[i] = layout.Clean(string(r), t).String()
		}
	}
	return out
}

func cells(letters []string) int {
	n := 0
	for _, s := range letters {
		n += cell(s)
	}
	return n
}

func cell(s string) int {
	if s == " " {
		return 1
	}
	return data.Clean(s).Width()
}

// cutLeft keeps the last width cells.
func cutLeft(letters []string, width int) string {
	if cells(letters) <= width {
		return strings.Join(letters, "")
	}
	from, used := len(letters), 1
	for from > 0 && used+cell(letters[from-1]) <= width {
		from--
		used += cell(letters[from])
	}
	return "~"[:min(1, width)] + strings.Join(letters[from:], "")
}

// cutRight keeps the first width cells.
func cutRight(letters []string, width int) string {
	if cells(letters) <= width {
		return strings.Join(letters, "")
	}
	to, used := 0, 1
	for to < len(letters) && used+cell(letters[to]) <= width {
		used += cell(letters[to])
		to++
	}
	return strings.Join(letters[:to], "") + "~"[:min(1, width)]
}
