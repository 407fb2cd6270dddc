package app

import (
	"context"
	"errors"
	"fmt"
	"time"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree/study"
	"afterbeat/tui"
)

// Progress is shown after the first of these, and changes no sooner than after
// the second.
const (
	firstTick = 300 * time.Millisecond
	laterTick = 500 * time.Millisecond
)

// job is the computing that runs, or has run last.
type job struct {
	number  int // of the request: a result of another is dropped
	running bool
	stage   study.Stage // empty while files are read
	shown   string      // progress; empty in the first moments
	ctx     context.Context
	stop    context.CancelFunc
}

// reading tells which case the inputs of the study were read for.
type reading struct {
	done bool
	of   casefile.Case
}

type (
	startMsg  struct{}
	loadedMsg struct {
		number int
		of     casefile.Case
		inputs study.Inputs
		err    error
	}
	stageMsg struct {
		number int
		study  study.Study
		err    error
	}
	tickMsg struct{ number int }
)

// compute starts to compute what is missing of the study of the present case.
func (m Model) compute() (Model, tea.Cmd) {
	m = m.halt()
	m.job.running, m.job.shown, m.defect = true, "", nil
	m.job.ctx, m.job.stop = context.WithCancel(m.base)
	tick := m.after(firstTick, tickMsg{m.job.number})
	m, cmd := m.proceed()
	return m, tea.Batch(cmd, tick)
}

// halt ends the computing; whatever it still returns is dropped.
func (m Model) halt() Model {
	if m.job.stop != nil {
		m.job.stop()
	}
	m.job = job{number: m.job.number + 1, stage: m.job.stage}
	return m
}

// proceed gives the command for what is to be computed next.
func (m Model) proceed() (Model, tea.Cmd) {
	ctx, number, s := m.job.ctx, m.job.number, m.study
	if !m.reading.fits(m.present) {
		m.job.stage = study.StageDone
		load, c := m.options.Load, m.present
		return m, func() tea.Msg {
			in, err := load(ctx, c)
			return loadedMsg{number, c, in, err}
		}
	}
	if m.job.stage = s.Pending(); m.job.stage == study.StageDone {
		return m.halt(), nil
	}
	next := m.next
	return m, func() tea.Msg {
		s, err := next(ctx, s)
		return stageMsg{number, s, err}
	}
}

// fits tells whether what was read serves c, too.
func (r reading) fits(c casefile.Case) bool { return r.done && same(files(r.of), files(c)) }

// files is the part of a case that bears on how its files are read.
func files(c casefile.Case) casefile.Case {
	return casefile.Case{Recording: c.Recording, Time: c.Time, Rate: c.Rate, Unit: c.Unit, Exclude: c.Exclude, Tree: c.Tree, Modulation: modulationFile(c)}
}

// loaded takes over the files.
func (m Model) loaded(msg loadedMsg) (Model, tea.Cmd) {
	switch {
	case msg.number != m.job.number:
		return m, nil
	case msg.err != nil && !m.reading.done:
		m = m.halt()
		m.failed = msg.err
		return m.end()
	case msg.err != nil:
		return m.broke(msg.err)
	}
	m.reading = reading{done: true, of: msg.of}
	m.study = study.Study{Inputs: msg.inputs}
	return m.further()
}

// computed takes over a stage. One with an error is not shown: the study stays
// as far as it came.
func (m Model) computed(msg stageMsg) (Model, tea.Cmd) {
	switch {
	case msg.number != m.job.number:
		return m, nil
	case msg.err != nil:
		return m.broke(msg.err)
	}
	m.study = msg.study
	return m.arrived().settle().further()
}

// further shows what has been computed, and computes on.
func (m Model) further() (Model, tea.Cmd) {
	m, shown := m.show()
	m, cmd := m.proceed()
	return m, tea.Batch(shown, cmd)
}

// broke ends the computing with an error, which a person can do something about
// at the first stage. That columns are ambiguous is no error there, but a
// question that the first stage asks.
func (m Model) broke(err error) (Model, tea.Cmd) {
	m = m.halt()
	if errors.Is(err, context.Canceled) {
		return m, nil
	}
	m = m.start(tui.Intake)
	n := noticeOf(err)
	n.computing = true
	m.defect = &n
	if n.question {
		m.said = n.text
		return m, nil
	}
	return m.complain(n), nil
}

// settle decides the stage to start on, the first that needs a person, and says
// what was assumed.
func (m Model) settle() Model {
	switch s := m.study; {
	case m.settled:
	case s.Beats == nil && s.Intake != nil && s.Intake.Ambiguous != nil:
		m.said = data.Clean(choose(s.Intake.Ambiguous))
		return m.start(tui.Intake)
	case s.Beats == nil && s.Intake != nil && unchosen(s.Intake.Selection):
		m.said = data.Clean("no column is known as a pressure or a flow: j/k, then e states its unit")
		return m.start(tui.Intake)
	case s.Fit != nil:
		if m.said == (data.Text{}) {
			m.said = assumed(s)
		}
		return m.start(tui.Fit)
	case s.Beats != nil && s.Beats.Reason != "":
		m.said = data.Clean(s.Beats.Reason)
		return m.start(tui.Beats)
	}
	return m
}

// unchosen tells that no column was taken for anything.
func unchosen(s data.Selection) bool { return max(s.Pressure, s.Flow, s.Velocity) < 0 }

// start opens the stage to start on, unless the user has moved.
func (m Model) start(s tui.Stage) Model {
	if !m.settled && !m.moved {
		m.open = s
	}
	m.settled = true
	return m
}

// cancel stops the computing at the user's wish.
func (m Model) cancel() Model {
	m = m.halt()
	m.said = data.Clean("stopped; the digit of a stage in ( ) goes on")
	if m.job.stage == study.StageForecast {
		m.said = data.Clean("stopped; 5 or 6 computes the forecast")
	}
	return m
}

// progress shows how far the computing is.
func (m Model) progress(msg tickMsg) (Model, tea.Cmd) {
	if msg.number != m.job.number || !m.job.running {
		return m, nil
	}
	m.job.shown = m.job.words()
	return m, m.after(laterTick, msg)
}

func (j job) words() string {
	if j.stage == study.StageDone {
		return "reading the recording 1/7, esc cancels"
	}
	at := map[study.Stage]int{study.StageIntake: 2, study.StageBeats: 3, study.StageFit: 4, study.StageTree: 5, study.StageSupport: 6, study.StageForecast: 7}[j.stage]
	return fmt.Sprintf("computing %s %d/7, esc cancels", j.stage, at)
}

// modulationFile is the part of a modulation that names a file.
func modulationFile(c casefile.Case) map[string]string {
	if file := c.Modulation["file"]; file != "" {
		return map[string]string{"file": file}
	}
	return nil
}
