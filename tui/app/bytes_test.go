package app

import (
	"io"
	"strings"
	"sync"
	"testing"
	"time"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/tui"
)

// quickly is how many frames a second a test draws, so that it is short. What
// would be one frame may come as two, so that no fewer bytes are sent.
const quickly = 40

// line counts the bytes that would go to a terminal.
type line struct {
	mu sync.Mutex
	n  int
	at time.Time
}

func (l *line) Write(p []byte) (int, error) {
	l.mu.Lock()
	defer l.mu.Unlock()
	l.n += len(p)
	l.at = time.Now()
	return len(p), nil
}

// settled waits until more than before was sent, and nothing for five frames,
// and returns how much was sent. Where nothing is sent for a second, that is 0.
func (l *line) settled(before int) int {
	for begin := time.Now(); ; time.Sleep(5 * time.Millisecond) {
		l.mu.Lock()
		n, quiet := l.n-before, time.Since(l.at)
		l.mu.Unlock()
		if n > 0 && quiet > 5*time.Second/quickly || n == 0 && time.Since(begin) > time.Second/2 {
			return n
		}
	}
}

func (l *line) sent() int {
	l.mu.Lock()
	defer l.mu.Unlock()
	return l.n
}

// TestBytes holds what a slow link has to carry to its budget: 100 bytes for a
// status message, 600 for a step, 2000 for another screen; with colours a tenth
// more.
func TestBytes(t *testing.T) {
	for name, theme := range map[string]tui.Theme{"plain": {}, "colours": {Colours: 256}} {
		t.Run(name, func(t *testing.T) {
			if testing.Short() || raced {
				t.Skip("waits for frames")
			}
			t.Parallel()
			holdBudget(t, theme)
		})
	}
}

func holdBudget(t *testing.T, theme tui.Theme) {
	var out line
	p, _ := running(t, theme, &out)
	for _, step := range []struct {
		keys   string
		budget int
	}{
		{"u ctrl+r u", 100},
		{"1 j 2", 2000}, // j: the trace of another channel
		{"n n p", 600},
		{"3", 2000},
		{"left right ] ] left [ esc", 600},
		{"z", 2000}, // another picture
		{"left right", 600},
		{"w w enter j esc", 2000},
		{"4", 2000},
		{"j j k h l", 600},
		{"5", 2000},
		{"up down", 600},
		{"6 j", 2000}, // j: every line of the note moves
		{"s x", 100},
		{"esc ?", 2000},
	} {
		for _, k := range strings.Fields(step.keys) {
			before := out.sent()
			p.Send(keyOf(k))
			n := out.settled(before)
			t.Logf("%-7s %5d bytes", k, n)
			budget := step.budget
			if theme.Colours > 0 {
				budget += budget / 10
			}
			if n > budget {
				t.Errorf("%s sends %d bytes, of %d", k, n, budget)
			}
		}
	}
	before := out.sent()
	if n := out.settled(before); n > 0 {
		t.Errorf("%d bytes while nothing happens", n)
	}
}

// running is the program over the real screens and the demo, with its renderer.
// end waits for its end and returns the root.
func running(t *testing.T, theme tui.Theme, out io.Writer) (p *tea.Program, end func() Model) {
	t.Helper()
	o := composed(t, false).m.options
	o.Theme = theme
	m := New(o)
	m.next, m.moment = revealed, 100*time.Millisecond
	p = program(m, nil, out, quickly)
	ended := make(chan tea.Model)
	go func() {
		last, err := p.Run()
		if err != nil {
			t.Error(err)
		}
		ended <- last
	}()
	p.Send(tea.WindowSizeMsg{Width: 80, Height: 24})
	end = sync.OnceValue(func() Model {
		p.Quit()
		return (<-ended).(Model)
	})
	t.Cleanup(func() { end() })
	time.Sleep(time.Second) // the first frames
	return p, end
}
