package casenote

import (
	"fmt"
	"strings"
)

// spelled are the signs that ASCII has a customary spelling for.
var spelled = map[rune]string{
	'°': "deg", 'µ': "u", 'μ': "u", 'Ω': "Ohm", '±': "+-", '×': "x", '·': "*",
	'²': "^2", '³': "^3", '≤': "<=", '≥': ">=", '≈': "~",
	'‐': "-", '‑': "-", '–': "-", '—': "-", '−': "-", '…': "...",
	'‘': "'", '’': "'", '“': `"`, '”': `"`,
}

// ascii writes text in bytes below 0x80: known signs are spelled out, every
// other rune becomes \u{e4}.
func ascii(text string) string {
	var b strings.Builder
	for _, r := range text {
		switch s, ok := spelled[r]; {
		case r < 0x80:
			b.WriteRune(r)
		case ok:
			b.WriteString(s)
		default:
			fmt.Fprintf(&b, `\u{%x}`, r)
		}
	}
	return b.String()
}
