package data

import (
	"fmt"
	"strings"
	"unicode"
	"unicode/utf8"

	"github.com/mattn/go-runewidth"
)

// Text is text from outside that is safe to show: it holds printable runes and
// single spaces only. [Clean] makes it; the zero value is the empty text.
type Text struct{ s string }

// Clean turns s into a [Text]. Printable runes stay, except that of a run of
// combining marks only the first two do; white space of any kind and length
// becomes one space, and none at either end; every other rune becomes visible:
// \x1b below U+0100, \u{202e} above, and \xff for a byte that is not UTF-8.
// Clean(Clean(s).String()) equals Clean(s).
func Clean(s string) Text {
	var b strings.Builder
	marks, gap := 0, false
	for len(s) > 0 {
		r, size := utf8.DecodeRuneInString(s)
		raw := s[:size]
		s = s[size:]
		if unicode.IsSpace(r) {
			gap = b.Len() > 0
			continue
		}
		if gap {
			b.WriteByte(' ')
			gap, marks = false, 0
		}
		if unicode.Is(unicode.M, r) {
			marks++
		} else {
			marks = 0
		}
		switch {
		case r == utf8.RuneError && size == 1:
			fmt.Fprintf(&b, `\x%02x`, raw[0])
		case marks > 2:
			fmt.Fprintf(&b, `\u{%x}`, r)
		case unicode.IsPrint(r):
			b.WriteRune(r)
		case r < 0x100:
			fmt.Fprintf(&b, `\x%02x`, r)
		default:
			fmt.Fprintf(&b, `\u{%x}`, r)
		}
	}
	return Text{b.String()}
}

// String returns the text.
func (t Text) String() string { return t.s }

// MarshalText makes a Text a JSON string.
func (t Text) MarshalText() ([]byte, error) { return []byte(t.s), nil }

// Width is the number of terminal cells that the text takes, by the widths of
// Unicode Standard Annex 11 with ambiguous runes counted as one cell.
func (t Text) Width() int { return cells.StringWidth(t.s) }

// Cut returns the text shortened to at most n cells; where something was cut
// off, it ends with "~".
func (t Text) Cut(n int) Text {
	if t.Width() <= n {
		return t
	}
	if n < 1 {
		return Text{}
	}
	return Text{cells.Truncate(t.s, n, "~")}
}

// cells measures text the same way under every locale.
var cells = &runewidth.Condition{EastAsianWidth: false, StrictEmojiNeutral: true}
