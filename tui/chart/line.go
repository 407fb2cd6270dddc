package chart

import (
	"strings"

	"afterbeat/data"
)

// line is a line being written, with the cells left in it. Spaces wait for
// what follows, so that none trails.
type line struct {
	b      *strings.Builder
	left   int
	spaces int
}

func (l *line) space(n int) {
	n = min(max(n, 0), l.left)
	l.spaces += n
	l.left -= n
}

func (l *line) flush() {
	l.b.WriteString(strings.Repeat(" ", l.spaces))
	l.spaces = 0
}

func (l *line) text(s data.Text) {
	if s = s.Cut(l.left); s.Width() > 0 {
		l.flush()
		l.b.WriteString(s.String())
		l.left -= s.Width()
	}
}

// sign writes one cell in its colour.
func (l *line) sign(on, key, off string) {
	if l.left > 0 {
		l.flush()
		l.b.WriteString(on + key + off)
		l.left--
	}
}
