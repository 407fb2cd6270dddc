package app

import (
	"bytes"
	"fmt"
	"io"
	"strconv"
	"strings"
	"testing"
	"time"
	"unicode/utf8"

	"github.com/charmbracelet/x/ansi"
	"pgregory.net/rapid"

	"afterbeat/tui"
)

// glass is a terminal of one cell a rune, as far as the renderer uses one. A
// row that is full keeps the cursor on its last cell until the next rune.
type glass struct {
	cells  [][]cell
	row    int
	column int
	colour string
}

func newGlass(width, height int) *glass {
	g := &glass{cells: make([][]cell, height)}
	for i := range g.cells {
		g.cells[i] = make([]cell, width)
		g.erase(i, 0)
	}
	return g
}

func (g *glass) Write(p []byte) (int, error) {
	for s := string(p); s != ""; {
		if rest, ok := strings.CutPrefix(s, "\x1b["); ok {
			end := strings.IndexFunc(rest, func(r rune) bool { return r >= '@' && r <= '~' })
			g.control(rest[end], rest[:end])
			s = rest[end+1:]
			continue
		}
		r, n := utf8.DecodeRuneInString(s)
		s = s[n:]
		g.put(r)
	}
	return len(p), nil
}

func (g *glass) put(r rune) {
	switch r {
	case '\r':
		g.column = 0
	case '\n':
		g.row = min(g.row+1, len(g.cells)-1)
	default:
		if g.column == len(g.cells[0]) {
			g.column, g.row = 0, min(g.row+1, len(g.cells)-1)
		}
		g.cells[g.row][g.column] = cell{r, g.colour}
		g.column++
	}
}

func (g *glass) control(final byte, arguments string) {
	width, height := len(g.cells[0]), len(g.cells)
	var n []int
	for _, a := range strings.Split(arguments, ";") {
		v, _ := strconv.Atoi(a)
		n = append(n, max(v, 1))
	}
	switch final {
	case 'H':
		g.row, g.column = min(n[0], height)-1, 0
		if len(n) > 1 {
			g.column = min(n[1], width) - 1
		}
	case 'C':
		g.column = min(g.column+n[0], width-1)
	case 'K':
		g.erase(g.row, min(g.column, width-1))
	case 'J':
		g.erase(g.row, min(g.column, width-1))
		for r := g.row + 1; r < height; r++ {
			g.erase(r, 0)
		}
		if arguments == "2" {
			for r := range g.cells {
				g.erase(r, 0)
			}
		}
	case 'm':
		g.colour = recoloured(g.colour, "\x1b["+arguments+"m")
	case 'h', 'l':
	default:
		panic(fmt.Sprintf("the glass knows no %q", final))
	}
}

func (g *glass) erase(row, from int) {
	for c := from; c < len(g.cells[row]); c++ {
		g.cells[row][c] = cell{rune: ' '}
	}
}

func (g *glass) String() string {
	var rows []string
	for _, row := range g.cells {
		text, colour := "", ""
		for _, c := range row {
			if c.rune == ' ' && foreground(c.colour) {
				c = blank
			}
			if c.colour != colour {
				text, colour = text+"<"+strings.TrimPrefix(c.colour, "\x1b")+">", c.colour
			}
			text += string(c.rune)
		}
		rows = append(rows, strings.TrimRight(text, " "))
	}
	return strings.Join(rows, "\n")
}

// frame writes a frame as the renderer of Bubble Tea 1.3.10 does on the
// alternate screen, last being the frame before.
func frame(w io.Writer, last, rows []string, width int) {
	var b bytes.Buffer
	b.WriteString("\x1b[H")
	for i, row := range rows {
		if i < len(last) && last[i] == row {
			if i < len(rows)-1 {
				b.WriteByte('\n')
			}
			continue
		}
		if i == 0 && last == nil {
			b.WriteByte('\r')
		}
		b.WriteString(row)
		if ansi.StringWidth(row) < width {
			b.WriteString("\x1b[K")
		}
		if i < len(rows)-1 {
			b.WriteString("\r\n")
		}
	}
	fmt.Fprintf(&b, "\x1b[%d;H", len(rows))
	_, _ = w.Write(b.Bytes())
}

func TestThinShowsTheSame(t *testing.T) {
	row := rapid.Custom(func(t *rapid.T) string {
		row := ""
		for range rapid.IntRange(0, 4).Draw(t, "parts") {
			part := rapid.StringOfN(rapid.SampledFrom([]rune("  ab─╮*│")), 0, 3, -1).Draw(t, "part")
			row += rapid.SampledFrom([]string{"", "", "\x1b[32m", "\x1b[38;5;166m", "\x1b[m", "\x1b[1m"}).Draw(t, "colour") + part
		}
		if strings.Contains(row, "\x1b") {
			row += "\x1b[0m"
		}
		return strings.TrimRight(row, " ")
	})
	rapid.Check(t, func(rt *rapid.T) {
		const width, height = 12, 4
		plain, thinly := newGlass(width, height), newGlass(width, height)
		to := &thin{to: thinly}
		var last []string
		for range rapid.IntRange(1, 12).Draw(rt, "frames") {
			rows := make([]string, height)
			for i := range rows {
				if rows[i] = row.Draw(rt, "row"); last != nil && rapid.Bool().Draw(rt, "stays") {
					rows[i] = last[i]
				}
			}
			if rapid.IntRange(0, 5).Draw(rt, "cleared") == 0 {
				last = nil
				for _, w := range []io.Writer{plain, to} {
					_, _ = io.WriteString(w, "\x1b[2J")
					_, _ = io.WriteString(w, "\x1b[H")
				}
			}
			frame(plain, last, rows, width)
			frame(to, last, rows, width)
			last = rows
			if plain.String() != thinly.String() {
				rt.Fatalf("thin:\n%s\nplain:\n%s", thinly, plain)
			}
		}
	})
}

func TestThinHandsOnWhatItDoesNotKnow(t *testing.T) {
	for _, s := range []string{"", "\x1b[H", "\x1b[?1049h", "\x1b[Habc", "x\x1b[1;H", "\x1b[Ha\nb\x1b[2;H", "\x1b[H\n\x1b[J\x1b[2;H"} {
		var b bytes.Buffer
		to := &thin{to: &b, rows: []string{"a"}}
		if n, err := to.Write([]byte(s)); n != len(s) || err != nil || b.String() != s || to.rows != nil {
			t.Errorf("%q: %q, %d, %v", s, b.String(), n, err)
		}
	}
}

// TestThinUnderTheRenderer runs the program with its real renderer, and holds
// the terminal against the frame.
func TestThinUnderTheRenderer(t *testing.T) {
	if testing.Short() {
		t.Skip("waits for frames")
	}
	t.Parallel()
	screen := newGlass(80, 24)
	var count line
	p, end := running(t, tui.Theme{Colours: 256}, writers{screen, &count})
	for _, k := range strings.Fields("1 j l 2 n n 3 left ] 5 up 4 6 ? j esc ctrl+l 3 2 A n 5 down") {
		before := count.sent()
		p.Send(keyOf(k))
		count.settled(before)
	}
	before := screen.String()
	want := newGlass(80, 24)
	frame(want, nil, strings.Split(end().View(), "\n"), 80)
	if before != want.String() {
		t.Errorf("the terminal shows\n%s\nand the frame is\n%s", before, want)
	}
}

// writers writes to the first, and counts with the second.
type writers struct {
	to    *glass
	count *line
}

func (w writers) Write(p []byte) (int, error) {
	w.count.mu.Lock()
	defer w.count.mu.Unlock()
	w.count.n += len(p)
	w.count.at = time.Now()
	return w.to.Write(p)
}
