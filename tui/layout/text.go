package layout

import (
	"fmt"
	"strings"

	"afterbeat/data"
	"afterbeat/tui"
)

// spelled in ASCII: signs of units and of the trade.
var spelled = strings.NewReplacer(
	"²", "2", "³", "3", "µ", "u", "μ", "u", "·", " ", "×", "x", "±", "+-", "−", "-", "–", "-", "—", "-", "…", "...", "°", "deg",
)

// Clean makes s safe to show in the theme. In ASCII, known signs are spelled
// out and every other rune becomes \u{e4}.
func Clean(s string, t tui.Theme) data.Text {
	if !t.ASCII || plain(s) {
		return data.Clean(s)
	}
	var b strings.Builder
	for _, r := range data.Clean(spelled.Replace(s)).String() {
		if r < 0x80 {
			b.WriteRune(r)
		} else {
			fmt.Fprintf(&b, `\u{%x}`, r)
		}
	}
	return data.Clean(b.String())
}

func plain(s string) bool {
	for i := range len(s) {
		if s[i] >= 0x80 {
			return false
		}
	}
	return true
}

// Pad cuts s to width cells and fills it up with spaces on the right.
func Pad(s data.Text, width int) string {
	s = s.Cut(width)
	return s.String() + blanks(width-s.Width())
}

// PadLeft cuts s to width cells and fills it up with spaces on the left.
func PadLeft(s data.Text, width int) string {
	s = s.Cut(width)
	return blanks(width-s.Width()) + s.String()
}

func blanks(n int) string { return strings.Repeat(" ", max(n, 0)) }

// Wrap breaks s between words into lines of at most width cells; a word that is
// longer is broken, too. At least one line comes out.
func Wrap(s data.Text, width int) []string {
	width = max(width, 1)
	var lines []string
	line, used := "", 0
	end := func() {
		lines = append(lines, line)
		line, used = "", 0
	}
	for _, word := range strings.Fields(s.String()) {
		w := data.Clean(word)
		if line != "" && used+1+w.Width() > width {
			end()
		}
		for ; line == "" && w.Width() > width; w = data.Clean(word) {
			head := prefix(word, width)
			lines = append(lines, head)
			word = word[len(head):]
		}
		if line != "" {
			line, used = line+" ", used+1
		}
		line, used = line+word, used+w.Width()
	}
	end()
	return lines
}

// prefix is the longest beginning of word that takes at most width cells, and
// at least one rune.
func prefix(word string, width int) string {
	end := 0
	for i, r := range word {
		if i > 0 && data.Clean(word[:i]+string(r)).Width() > width {
			break
		}
		end = i + len(string(r))
	}
	return word[:end]
}
