package app

import (
	"context"
	"errors"
	"io"
	"os"
	"os/signal"
	"syscall"

	tea "github.com/charmbracelet/bubbletea"
	"github.com/charmbracelet/lipgloss"
	"github.com/mattn/go-runewidth"
	"github.com/muesli/termenv"

	"afterbeat/tui"
)

// frames is how many frames a second are drawn at most: on a slow link more of
// them would only queue up.
const frames = 10

// Run opens the screens on a terminal, in for keys and out for frames, and
// returns when they are closed. An error is why nothing could be opened: the
// recording cannot be read, or the terminal not be used. A context that ends
// interrupts, as a signal does.
func Run(ctx context.Context, o Options, in io.Reader, out io.Writer) (Outcome, error) {
	runewidth.DefaultCondition.EastAsianWidth = false
	lipgloss.SetColorProfile(profile(o.Theme))
	m := New(o)
	m.base = context.WithoutCancel(ctx) // the computing ends with the program
	p := program(m, in, out, frames)
	stop := watch(ctx, p)
	defer stop()
	last, err := p.Run()
	m, ok := last.(Model)
	if !ok {
		return Outcome{}, err
	}
	return m.finish(err)
}

func profile(t tui.Theme) termenv.Profile {
	switch t.Colours {
	case 256:
		return termenv.ANSI256
	case 16:
		return termenv.ANSI
	}
	return termenv.Ascii
}

func program(m Model, in io.Reader, out io.Writer, frames int) *tea.Program {
	return tea.NewProgram(m,
		tea.WithInput(in), tea.WithOutput(thinned(out)), tea.WithAltScreen(), tea.WithFPS(frames), tea.WithoutSignalHandler())
}

// watch tells the program of the loss of the terminal and of signals to end.
func watch(ctx context.Context, p *tea.Program) (stop func()) {
	signals := make(chan os.Signal, 1)
	signal.Notify(signals, syscall.SIGHUP, syscall.SIGTERM, os.Interrupt)
	done := make(chan struct{})
	go func() {
		select {
		case <-signals:
		case <-ctx.Done():
		case <-done:
			return
		}
		p.Send(SignalMsg{})
	}()
	return func() {
		signal.Stop(signals)
		close(done)
	}
}

// finish leaves the recovery file as it has to be, and says how it all ended.
// err is that of the terminal: one that was lost interrupts.
func (m Model) finish(err error) (Outcome, error) {
	out, to := m.outcome, m.options.State
	switch {
	case m.failed != nil:
		return out, m.failed
	case errors.Is(err, tea.ErrProgramKilled):
		out.Interrupted = true
	case err != nil:
		return out, err
	}
	if out.Interrupted && m.unsaved() {
		out.Unsaved = true
		if to != nil && to.Keep(m.changes, m.present) == nil {
			out.Kept = to.Path()
			if m.answered {
				_ = to.Drop()
			}
		}
		return out, nil
	}
	_ = to.Remove() // a file that stays would only be offered once more
	if m.answered {
		_ = to.Drop()
	}
	out.Waiting = m.offer != nil
	return out, nil
}
