package app

import (
	"context"
	"time"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree/study"
	"afterbeat/tui"
	_ "afterbeat/tui/background" // before the terminal is asked for its colour
	"afterbeat/tui/field"
)

// Model is the root. It is a value; every method that changes it returns the
// changed one.
type Model struct {
	options Options
	theme   tui.Theme
	size    tui.Area // of the terminal; zero before it is known
	screens [7]tui.Screen
	open    tui.Stage
	moved   bool // by the user, so that the start no longer moves

	present casefile.Case
	past    []step
	future  []step
	saved   casefile.Case // what the note saved last was made of
	changes int           // of the case, ever

	study   study.Study
	reading reading
	job     job
	settled bool // the stage to start on is decided

	said   data.Text // what the last key did
	await  await     // what the status line says is still being computed
	errors []notice  // unanswered, the oldest first
	defect *notice   // why computing could not go on

	naming  bool // the name of a note is asked for
	name    field.Model
	refused data.Text // why the name was not taken
	writing bool      // a note is being saved
	leaving leaving
	helping bool
	scroll  int // of the help
	offer   *offer
	// answered tells that the choices which were found may be removed.
	answered bool
	keeping  bool // choices will be kept in a moment

	outcome Outcome
	failed  error // why nothing could be opened

	leader bool // of its session: no shell to return to
	moment time.Duration
	base   context.Context
	next   func(context.Context, study.Study) (study.Study, error)
	after  func(time.Duration, tea.Msg) tea.Cmd
}

// New makes the root. Its View works before the size of the terminal is known.
func New(o Options) Model {
	m := Model{
		options: o, theme: o.Theme, open: tui.Fit,
		present: o.Case, saved: o.Case,
		study: study.Study{Inputs: study.Inputs{Case: o.Case}},
		base:  context.Background(), leader: sessionLeader(), moment: aMoment,
		next: func(ctx context.Context, s study.Study) (study.Study, error) { return s.Next(ctx) },
		after: func(d time.Duration, msg tea.Msg) tea.Cmd {
			return tea.Tick(d, func(time.Time) tea.Msg { return msg })
		},
	}
	for _, s := range tui.Stages() {
		if m.screens[s] = o.Screens[s]; m.screens[s] == nil {
			m.screens[s] = missing{stage: s}
		}
	}
	return m
}

// Init starts to read and compute, and looks for choices of a run that was cut
// short.
func (m Model) Init() tea.Cmd {
	return guard(tea.Batch(func() tea.Msg { return startMsg{} }, m.lookForOffer()))
}

// Update takes one message.
func (m Model) Update(msg tea.Msg) (next tea.Model, cmd tea.Cmd) {
	defer caught(func(at string) { next, cmd = m.afterFault(at), nil })
	m, cmd = m.update(msg)
	return m, guard(cmd)
}

func (m Model) update(msg tea.Msg) (Model, tea.Cmd) {
	switch msg := msg.(type) {
	case tea.WindowSizeMsg:
		return m.resize(tui.Area{Width: msg.Width, Height: msg.Height})
	case tea.KeyMsg:
		return m.press(msg)
	case tea.ResumeMsg:
		return m, tea.ClearScreen
	case fromScreen:
		return m.take(msg)
	case startMsg:
		return m.compute()
	case loadedMsg:
		return m.loaded(msg)
	case stageMsg:
		return m.computed(msg)
	case tickMsg:
		return m.progress(msg)
	case savedMsg:
		return m.wrote(msg)
	case offerMsg:
		return m.offered(msg), nil
	case keepMsg:
		return m.keep()
	case keptMsg:
		return m.kept(msg)
	case SignalMsg:
		return m.interrupt()
	case faultMsg:
		return m.afterFault(string(msg)), nil
	}
	return m, nil
}

// resize hands the size down. A size of nothing is taken for one cell.
func (m Model) resize(a tui.Area) (Model, tea.Cmd) {
	m.size = tui.Area{Width: max(a.Width, 1), Height: max(a.Height, 1)}
	return m.lay()
}

// openStage shows a stage. Of one that cannot be shown yet the status line says
// why. Where the computing of what it shows was stopped, it goes on.
func (m Model) openStage(s tui.Stage) (Model, tea.Cmd) {
	if s < tui.Intake || s > tui.Note {
		return m, nil
	}
	m.open, m.moved, m.said = s, true, data.Text{}
	missing := s.Missing(m.study) != ""
	forecast := s >= tui.Support && m.study.Pending() == study.StageForecast
	if !missing && !forecast {
		return m, nil
	}
	if m.idle() && (m.defect == nil || !m.reading.fits(m.present)) {
		return m.compute()
	}
	if !missing {
		return m, nil
	}
	return m.saying(s, s.String()+": "), nil
}

// unsaved tells whether choices were made that no saved note has.
func (m Model) unsaved() bool { return !same(m.present, m.saved) }

var _ tea.Model = Model{}
