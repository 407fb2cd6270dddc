package app

import (
	"context"
	"errors"
	"io/fs"
	"maps"
	"os"
	"slices"
	"strings"
	"sync"
	"testing"
	"time"

	"github.com/charmbracelet/bubbles/key"
	tea "github.com/charmbracelet/bubbletea"
	"github.com/charmbracelet/lipgloss"
	"github.com/muesli/termenv"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/demo"
	"afterbeat/tree/study"
	"afterbeat/tui"
)

func TestMain(m *testing.M) {
	lipgloss.SetColorProfile(termenv.Ascii)
	os.Exit(m.Run())
}

// demoStudy is the study of the demo case, with few replicates.
var demoStudy = sync.OnceValue(func() study.Study {
	read := func(name string) ([]byte, error) { return fs.ReadFile(demo.Files(), name) }
	content, err := read(demo.CaseName)
	if err != nil {
		panic(err)
	}
	c, err := casefile.Read(demo.CaseName, content)
	if err != nil {
		panic(err)
	}
	few := 20
	c.Replicates = &few
	in, err := study.Read(c, read)
	if err != nil {
		panic(err)
	}
	s, err := study.Run(context.Background(), in, study.StageDone)
	if err != nil {
		panic(err)
	}
	return s
})

// revealed is the next stage of the demo study, in place of computing it.
func revealed(ctx context.Context, s study.Study) (study.Study, error) {
	if err := ctx.Err(); err != nil {
		return s, err
	}
	whole := demoStudy()
	switch s.Pending() {
	case study.StageIntake:
		s.Intake = whole.Intake
	case study.StageBeats:
		s.Beats = whole.Beats
	case study.StageFit:
		s.Fit = whole.Fit
	case study.StageTree:
		s.Tree = whole.Tree
	case study.StageSupport:
		s.Comparison = whole.Comparison
	case study.StageForecast:
		s.Forecast = whole.Forecast
	}
	return s, nil
}

// stub is a screen that does on a key what a screen may do.
type stub struct {
	name   string
	area   tui.Area
	theme  tui.Theme
	study  study.Study
	shown  int
	typing bool
	inner  bool // something that esc goes back from
	typed  string
	pasted int
	got    []string
	// pressed are the keys that came.
	pressed []string
	view    string // in place of the usual one
}

type ownMsg struct{ to string }

var stubKeys = struct{ invert, drop, label, typing, inner, back, own, complain, jump, fault, later, evil, blind key.Binding }{
	invert:   key.NewBinding(key.WithKeys("i"), key.WithHelp("i", "invert")),
	drop:     key.NewBinding(key.WithKeys("d"), key.WithHelp("d", "drop a beat")),
	label:    key.NewBinding(key.WithKeys("l"), key.WithHelp("l", "label")),
	typing:   key.NewBinding(key.WithKeys("/"), key.WithHelp("/", "filter")),
	inner:    key.NewBinding(key.WithKeys("o"), key.WithHelp("o", "open")),
	back:     key.NewBinding(key.WithKeys("esc"), key.WithHelp("esc", "back")),
	own:      key.NewBinding(key.WithKeys("w"), key.WithHelp("w", "work")),
	complain: key.NewBinding(key.WithKeys("e"), key.WithHelp("e", "complain")),
	jump:     key.NewBinding(key.WithKeys("n"), key.WithHelp("n", "to the note")),
	fault:    key.NewBinding(key.WithKeys("p"), key.WithHelp("p", "panic")),
	later:    key.NewBinding(key.WithKeys("P"), key.WithHelp("P", "panic later")),
	evil:     key.NewBinding(key.WithKeys("v"), key.WithHelp("v", "an evil view")),
	blind:    key.NewBinding(key.WithKeys("V"), key.WithHelp("V", "no view")),
}

const secret = "the measured value 123"

func (s stub) Update(msg tea.Msg) (tui.Screen, tea.Cmd) {
	switch msg := msg.(type) {
	case ownMsg:
		s.got = append(slices.Clone(s.got), msg.to)
	case tea.KeyMsg:
		s.pressed = append(slices.Clone(s.pressed), msg.String())
		return s.press(msg)
	}
	return s, nil
}

func (s stub) press(msg tea.KeyMsg) (tui.Screen, tea.Cmd) {
	if s.typing {
		switch {
		case key.Matches(msg, stubKeys.back):
			s.typing = false
		case msg.Paste:
			s.pasted++
			fallthrough
		default:
			s.typed += string(msg.Runes)
		}
		return s, nil
	}
	c := s.study.Inputs.Case
	switch k := stubKeys; {
	case key.Matches(msg, k.invert):
		if i := slices.Index(c.Invert, s.name); i >= 0 {
			c.Invert = slices.Delete(slices.Clone(c.Invert), i, i+1)
		} else {
			c.Invert = append(slices.Clone(c.Invert), s.name)
		}
		return s, tui.Change(s.name+" inverted", c)
	case key.Matches(msg, k.drop):
		c.Drop = append(slices.Clone(c.Drop), float64(len(c.Drop)))
		return s, tea.Batch(tui.Change("beat dropped", c), tui.Say("a beat was dropped"))
	case key.Matches(msg, k.label):
		c.Label = "pilot-07"
		c.Site = maps.Clone(c.Site)
		return s, tui.Change("labelled", c)
	case key.Matches(msg, k.typing):
		s.typing = true
	case key.Matches(msg, k.inner):
		s.inner = true
	case s.inner && key.Matches(msg, k.back):
		s.inner = false
	case key.Matches(msg, k.own):
		return s, tea.Batch(
			func() tea.Msg { return ownMsg{s.name} },
			nil,
			tea.Sequence(func() tea.Msg { return nil }, func() tea.Msg { return ownMsg{s.name} }))
	case key.Matches(msg, k.complain):
		return s, func() tea.Msg {
			return tui.SayMsg{Text: data.Clean(s.name + ": that is not possible\x1b[2J"), Error: true}
		}
	case key.Matches(msg, k.jump):
		return s, func() tea.Msg { return tui.GoMsg{Stage: tui.Note} }
	case key.Matches(msg, k.fault):
		panic(secret)
	case key.Matches(msg, k.later):
		return s, tea.Sequence(func() tea.Msg { panic(secret) })
	case key.Matches(msg, k.evil):
		s.view = evil
	case key.Matches(msg, k.blind):
		s.view = secret
	}
	return s, nil
}

// evil is a view that breaks every rule.
var evil = strings.Repeat("\x1b[2J\x1b]0;title\a\rover\tthe caution \x1b[31mred\x1b[0m \u009b31m \u202e ünï ┼ \xff\x00 "+strings.Repeat("wide 界 ", 60)+"\n", 100)

func (s stub) Show(st study.Study) (tui.Screen, tea.Cmd) {
	s.study = st
	s.shown++
	return s, func() tea.Msg { return ownMsg{"shown"} }
}

func (s stub) Resize(a tui.Area, t tui.Theme) (tui.Screen, tea.Cmd) {
	s.area, s.theme = a, t
	return s, nil
}

func (s stub) View() string {
	if s.view == secret {
		panic(secret)
	}
	if s.view != "" {
		return s.view
	}
	row := strings.Repeat(".", max(s.area.Width-len(s.name), 0)) + s.name
	rows := make([]string, s.area.Height)
	for i := range rows {
		rows[i] = row[:min(len(row), s.area.Width)]
	}
	return strings.Join(rows, "\n")
}

func (s stub) Keys() []key.Binding {
	k := stubKeys
	k.back.SetEnabled(s.typing || s.inner)
	return []key.Binding{k.back, k.invert, k.drop, k.label, k.typing, k.inner, k.own, k.complain, k.jump, k.fault, k.later, k.evil, k.blind}
}

func (s stub) Typing() bool { return s.typing }

// driver runs a root without a terminal: it sends messages and runs commands.
type driver struct {
	t       testing.TB
	m       Model
	waiting []tea.Cmd // not yet run
	hold    bool      // run nothing until told
	ticks   []tea.Msg // that time would bring
	quits   bool
	clears  int
	files   map[string]string
}

// newDriver starts a root over stubs, with the demo case.
func newDriver(t testing.TB, change func(*Options)) *driver {
	t.Helper()
	d := &driver{t: t, files: map[string]string{}}
	o := Options{
		Case: demoStudy().Inputs.Case, Title: data.Clean("demo.csv"), SaveAs: "demo.note.txt",
		Screenless: data.Clean("afterbeat study demo.csv"),
		Load: func(_ context.Context, c casefile.Case) (study.Inputs, error) {
			in := demoStudy().Inputs
			in.Case = c
			return in, nil
		},
		Save: func(name string, content []byte) error {
			if _, there := d.files[name]; there {
				return &data.FileError{File: name, What: "not saved", Err: fs.ErrExist, Hint: "add --replace"}
			}
			if strings.Contains(name, "/") {
				return &data.FileError{File: name, What: "there is no folder", Hint: "make it"}
			}
			d.files[name] = string(content)
			return nil
		},
		Screens: map[tui.Stage]tui.Screen{},
	}
	for _, s := range tui.Stages() {
		o.Screens[s] = stub{name: strings.ToLower(s.String())}
	}
	if change != nil {
		change(&o)
	}
	d.m = New(o)
	d.m.next, d.m.leader, d.m.moment = revealed, false, time.Minute // stubs never work long
	d.m.after = func(_ time.Duration, msg tea.Msg) tea.Cmd {
		return func() tea.Msg { d.ticks = append(d.ticks, msg); return nil }
	}
	return d
}

// started has a size and everything computed.
func started(t testing.TB, change func(*Options)) *driver {
	t.Helper()
	d := newDriver(t, change)
	d.do(d.m.Init())
	d.send(tea.WindowSizeMsg{Width: 80, Height: 24})
	if d.m.job.running {
		t.Fatal("the study does not come to its end")
	}
	return d
}

func (d *driver) send(msg tea.Msg) {
	d.t.Helper()
	m, cmd := d.m.Update(msg)
	d.m = m.(Model)
	d.do(cmd)
}

// do runs a command and all that follows, or puts it by.
func (d *driver) do(cmd tea.Cmd) {
	d.t.Helper()
	d.waiting = append(d.waiting, cmd)
	if !d.hold {
		d.run()
	}
}

// run runs what waits, to the end.
func (d *driver) run() {
	d.t.Helper()
	for n := 0; len(d.waiting) > 0; n++ {
		if n > 100_000 {
			d.t.Fatal("commands without end")
		}
		d.step(0)
	}
}

// step runs one of those that wait.
func (d *driver) step(i int) {
	d.t.Helper()
	cmd := d.waiting[i]
	d.waiting = slices.Delete(slices.Clone(d.waiting), i, i+1)
	if cmd == nil {
		return
	}
	msg := cmd()
	switch {
	case msg == nil:
	case isQuit(msg):
		d.quits = true
	case strings.HasSuffix(typeName(msg), "clearScreenMsg"):
		d.clears++
	default:
		var inner []tea.Cmd
		if _, ok := each(msg, func(c tea.Cmd) tea.Cmd { inner = append(inner, c); return c }); ok {
			d.waiting = append(d.waiting, inner...)
			return
		}
		m, cmd := d.m.Update(msg)
		d.m = m.(Model)
		d.waiting = append(d.waiting, cmd)
	}
}

func isQuit(msg tea.Msg) bool { _, ok := msg.(tea.QuitMsg); return ok }

// tick lets time bring what it would.
func (d *driver) tick() {
	ticks := d.ticks
	d.ticks = nil
	for _, msg := range ticks {
		d.send(msg)
	}
}

// keys presses keys, one a word: letters, or the names that Bubble Tea gives.
func (d *driver) keys(words string) {
	d.t.Helper()
	for _, w := range strings.Fields(words) {
		d.send(keyOf(w))
	}
}

func keyOf(word string) tea.KeyMsg {
	for t := tea.KeyType(-120); t < 128; t++ {
		if t != tea.KeyRunes && t.String() == word {
			return tea.KeyMsg{Type: t}
		}
	}
	return tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune(word)}
}

// burst is text that arrives in one read.
func (d *driver) burst(s string) {
	d.t.Helper()
	d.send(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune(s)})
}

func (d *driver) screen(s tui.Stage) stub { return d.m.screens[s].(stub) }

func (d *driver) rows() []string { return strings.Split(d.m.View(), "\n") }

// status is the last row but one.
func (d *driver) status() string {
	rows := d.rows()
	return rows[len(rows)-2]
}

func (d *driver) wantStatus(want string) {
	d.t.Helper()
	if got := d.status(); !strings.Contains(got, want) {
		d.t.Errorf("status %q, want %q", got, want)
	}
}

func (d *driver) wantView(want string) {
	d.t.Helper()
	if v := d.m.View(); !strings.Contains(v, want) {
		d.t.Errorf("want %q in\n%s", want, v)
	}
}

var errChoice = &study.ChoiceError{Key: "site.abp", What: `"x" is no site`, Hint: "sites: root, lvot"}

var errAny = errors.New("anything")
