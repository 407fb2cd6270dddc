package app

import (
	"bytes"
	"fmt"
	"io"
	"strings"
	"unicode/utf8"

	"github.com/charmbracelet/x/ansi"
	"github.com/charmbracelet/x/term"
)

// thin is a terminal that gets of each row only the cells that have changed.
// The renderer sends a changed row whole; on a slow link a step through beats
// or models takes a fifth of that.
//
// It reads what the renderer writes: a frame goes home, and then writes or
// passes each row. Anything else it hands on as it is, and forgets what is on
// the terminal, so that the next rows go whole.
type thin struct {
	to   io.Writer
	rows []string // on the terminal; nil is not known
}

// thinFile is a thin terminal that can be asked for its size.
type thinFile struct {
	term.File
	thin *thin
}

func (f thinFile) Write(p []byte) (int, error) { return f.thin.Write(p) }

// thinned is out, thin.
func thinned(out io.Writer) io.Writer {
	t := &thin{to: out}
	if f, ok := out.(term.File); ok {
		return thinFile{File: f, thin: t}
	}
	return t
}

// Write hands a frame on, or anything else as it is.
func (t *thin) Write(p []byte) (int, error) {
	rows, end, ok := frameOf(string(p))
	if !ok {
		t.rows = nil
		return t.to.Write(p)
	}
	if _, err := t.to.Write(t.changes(rows, end)); err != nil {
		t.rows = nil
		return 0, err
	}
	return len(p), nil
}

// frameOf takes a frame of the renderer apart: the rows that it writes, with
// skipped for those that it passes, and what it ends with.
func frameOf(s string) (rows []string, end string, ok bool) {
	body, ok := strings.CutPrefix(s, ansi.CursorHomePosition)
	at := strings.LastIndex(body, "\x1b[")
	if !ok || at < 0 || !strings.HasSuffix(body, "H") {
		return nil, "", false
	}
	body, end = body[:at], body[at:]
	body, erases := strings.CutSuffix(body, ansi.EraseScreenBelow)
	rows = strings.Split(body, "\n")
	for i, row := range rows {
		row, written := strings.CutSuffix(row, "\r")
		switch {
		case i == len(rows)-1 && row != "", written:
			rows[i] = strings.TrimSuffix(row, ansi.EraseLineRight)
		case row == "" && !erases:
			rows[i] = skipped
		default:
			return nil, "", false
		}
	}
	if erases { // all rows are written
		rows[0] = "\r" + strings.TrimPrefix(rows[0], "\r")
	}
	return rows, end, true
}

// skipped stands for a row that a frame passes; no row holds a line end.
const skipped = "\n"

// changes is what brings the terminal to a frame.
func (t *thin) changes(rows []string, end string) []byte {
	var b bytes.Buffer
	anew := strings.HasPrefix(rows[0], "\r")
	if anew { // as after a resize
		rows[0] = rows[0][1:]
		b.WriteString(ansi.CursorHomePosition + ansi.EraseScreenBelow)
	}
	if anew || len(rows) != len(t.rows) {
		t.rows = make([]string, len(rows))
		for i := range t.rows {
			t.rows[i] = skipped
		}
	}
	at := 0 // the row that the terminal is at
	for i, row := range rows {
		if row == skipped {
			continue
		}
		if change := rowChange(i+1, at, t.rows[i], row); change != "" {
			b.WriteString(change)
			at = i + 1
		}
		t.rows[i] = row
	}
	b.WriteString(end)
	return b.Bytes()
}

// rowChange is what brings row n from one text to another by the shorter way:
// cell by cell, or erased and written anew. The terminal is at row at.
func rowChange(n, at int, from, to string) string {
	erased := toCell(n, at, 0) + ansi.EraseLineRight
	is, simple := cellsOf(to)
	if !simple {
		return erased + to // erased first: behind the last cell is no place to erase from
	}
	anew := brush{}
	anew.WriteString(erased)
	anew.change(nil, is)
	was, known := cellsOf(from)
	if !known {
		return anew.String()
	}
	part := brush{at: -1, start: func(i int) string { return toCell(n, at, i) }}
	part.change(was, is)
	if part.Len() < anew.Len() {
		return part.String()
	}
	return anew.String()
}

// toCell goes to cell i of row n from row at.
func toCell(n, at, i int) string {
	switch {
	case n != at+1 || at == 0:
		return fmt.Sprintf("\x1b[%d;%dH", n, i+1)
	case i == 0:
		return "\r\n"
	}
	return fmt.Sprintf("\r\n\x1b[%dC", i)
}

// cell is a cell of a row: a rune, and the sequences that colour it.
type cell struct {
	rune
	colour string
}

var blank = cell{rune: ' '}

// cellsOf takes a row apart; ok is false where a rune takes another number of
// cells than one, or the row is not known.
func cellsOf(row string) (cells []cell, ok bool) {
	colour := ""
	for i := 0; i < len(row); {
		if n := colourLength(row[i:]); n > 0 {
			colour = recoloured(colour, row[i:i+n])
			i += n
			continue
		}
		r, n := utf8.DecodeRuneInString(row[i:])
		if r < ' ' || r == 0x7f {
			return nil, false
		}
		c := cell{r, colour}
		if r == ' ' && foreground(colour) {
			c = blank
		}
		cells = append(cells, c)
		i += n
	}
	return cells, ansi.StringWidth(row) == len(cells)
}

// recoloured is the colour after a sequence more. A foreground takes the place
// of another.
func recoloured(colour, sequence string) string {
	switch {
	case sequence == "\x1b[0m", sequence == "\x1b[m":
		return ""
	case foreground(sequence) && foreground(colour):
		return sequence
	}
	return colour + sequence
}

// foreground tells that a colour is one sequence for the colour of letters.
func foreground(colour string) bool {
	return (strings.HasPrefix(colour, "\x1b[3") || strings.HasPrefix(colour, "\x1b[9")) && strings.Count(colour, "m") == 1
}

// brush writes cells of one row.
type brush struct {
	strings.Builder
	start  func(i int) string // how to come to a cell of the row
	at     int                // the cell that the terminal is at; -1 before it came to the row
	colour string
}

// change writes the cells that differ.
func (b *brush) change(from, to []cell) {
	for i, c := range to {
		was := blank
		if i < len(from) {
			was = from[i]
		}
		if was != c {
			b.goTo(i, to)
			b.put(c)
		}
	}
	if len(to) < len(from) {
		b.goTo(len(to), to)
		b.WriteString(ansi.EraseLineRight)
	}
	b.colourTo("")
}

func (b *brush) put(c cell) {
	if c != blank || !foreground(b.colour) {
		b.colourTo(c.colour)
	}
	b.WriteRune(c.rune)
	b.at++
}

func (b *brush) colourTo(colour string) {
	if b.colour == colour {
		return
	}
	if b.colour != "" && !(foreground(b.colour) && foreground(colour)) {
		b.WriteString("\x1b[m")
	}
	b.WriteString(colour)
	b.colour = colour
}

// goTo goes to cell i of a row, over cells that stay or by a jump, whichever is
// shorter.
func (b *brush) goTo(i int, row []cell) {
	if b.at < 0 {
		b.WriteString(b.start(i))
		b.at = i
		return
	}
	jump, again := fmt.Sprintf("\x1b[%dC", i-b.at), 0
	for _, c := range row[b.at:i] {
		if again += utf8.RuneLen(c.rune); c.colour != b.colour && c != blank {
			again += len(jump)
		}
	}
	if again > len(jump) {
		b.WriteString(jump)
		b.at = i
	}
	for b.at < i {
		b.put(row[b.at])
	}
}
