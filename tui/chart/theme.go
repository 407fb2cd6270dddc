package chart

import (
	"strings"

	"afterbeat/data"
)

// Theme is what the terminal can show, decided once at the start of the program
// and handed down. The zero Theme draws in Unicode without colours.
type Theme struct {
	ASCII   bool // every byte that comes out is below 0x80
	Colours int  // how many the terminal has: 16 or 256; below 16 no escape is written
}

// ink is what a cell is drawn with.
type ink uint8

const (
	plain  ink = iota
	first      // the first curve, a line
	second     // the second curve, of *
)

const reset = "\x1b[0m"

// escape starts an ink. Of the 256 colours 32 and 166, of the 16 colours 12 and
// 9: blue and orange or red, legible on black and on white.
func (t Theme) escape(i ink) string {
	switch {
	case i == plain || t.Colours < 16:
		return ""
	case t.Colours < 256:
		return [...]string{first: "\x1b[94m", second: "\x1b[91m"}[i]
	}
	return [...]string{first: "\x1b[38;5;32m", second: "\x1b[38;5;166m"}[i]
}

// change goes from one ink to another.
func (t Theme) change(from, to ink) string {
	switch {
	case from == to || t.Colours < 16:
		return ""
	case to == plain:
		return reset
	}
	return t.escape(to)
}

// spelled in ASCII: what stands in units and names of the trade.
var spelled = strings.NewReplacer(
	"²", "2", "³", "3", "µ", "u", "μ", "u", "·", " ", "×", "x", "±", "+-", "−", "-", "–", "-", "—", "-", "…", "...",
)

// clean makes text from outside safe to show in the theme: one line, no control
// bytes, in ASCII a ? for every rune that has no spelling there.
func (t Theme) clean(s string) data.Text {
	if t.ASCII {
		s = strings.Map(func(r rune) rune {
			if r >= 0x80 {
				return '?'
			}
			return r
		}, spelled.Replace(s))
	}
	return data.Clean(s)
}

// char is r if the theme can show it in one cell, else ?.
func (t Theme) char(r rune) rune {
	if c := t.clean(string(r)); c.String() == string(r) && c.Width() == 1 {
		return r
	}
	return '?'
}

// pick is the Unicode or the ASCII rune.
func (t Theme) pick(unicode, ascii rune) rune {
	if t.ASCII {
		return ascii
	}
	return unicode
}
