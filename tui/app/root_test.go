package app

import (
	"context"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"
	"time"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
	"afterbeat/tree/study"
	"afterbeat/tui"
)

func TestStartsOnTheFit(t *testing.T) {
	d := started(t, nil)
	d.wantView("[3 Fit]")
	d.wantView(" 4 Tree ")
	d.wantStatus("used: ")
	for _, s := range tui.Stages() {
		if got := d.screen(s); got.shown < 5 || got.study.Comparison == nil || got.area != (tui.Area{Width: 80, Height: 20}) {
			t.Errorf("%s: shown %d times, area %v", s, got.shown, got.area)
		}
	}
}

func TestEveryStageIsShownAtOnce(t *testing.T) {
	d := newDriver(t, nil)
	d.hold = true
	d.do(d.m.Init())
	var seen []study.Stage
	for len(d.waiting) > 0 {
		d.step(0)
		if p := d.screen(tui.Note).study.Pending(); len(seen) == 0 || seen[len(seen)-1] != p {
			seen = append(seen, p)
		}
	}
	want := []study.Stage{study.StageIntake, study.StageBeats, study.StageFit, study.StageTree, study.StageSupport, study.StageForecast, study.StageDone}
	if len(seen) != len(want) {
		t.Errorf("shown with pending %v, want %v", seen, want)
	}
}

func TestStartsWhereAPersonIsNeeded(t *testing.T) {
	for _, c := range []struct {
		name string
		next func(context.Context, study.Study) (study.Study, error)
		want string
		said string
	}{
		{"a choice", func(_ context.Context, s study.Study) (study.Study, error) {
			s.Intake = &study.Intake{}
			return s, &data.AmbiguousError{Role: "pressure", Names: []data.Text{data.Clean("a"), data.Clean("b\x1b")}, Flag: "--pressure"}
		}, "[1 Intake]", "two channels could be the pressure: j/k, then enter"},
		{"a choice that is known early", func(ctx context.Context, s study.Study) (study.Study, error) {
			s, err := revealed(ctx, s)
			if s.Beats == nil {
				in := *s.Intake
				in.Selection = data.Selection{Pressure: -1, Flow: -1, Velocity: -1}
				in.Ambiguous = &data.AmbiguousError{Role: "flow", Names: make([]data.Text, 5)}
				s.Intake = &in
			}
			return s, err
		}, "[1 Intake]", "5 channels could be the flow: j/k, then enter"},
		{"no column chosen", func(ctx context.Context, s study.Study) (study.Study, error) {
			s, err := revealed(ctx, s)
			if s.Beats == nil {
				in := *s.Intake
				in.Selection = data.Selection{Pressure: -1, Flow: -1, Velocity: -1}
				s.Intake = &in
			}
			return s, err
		}, "[1 Intake]", "no column is known as a pressure or a flow: j/k, then e states its unit"},
		{"a choice that makes no sense", func(_ context.Context, s study.Study) (study.Study, error) {
			return s, &study.ChoiceError{Key: "site.q", What: "\x1b is no site"}
		}, "[1 Intake]", `Error: site of q: \x1b is no site`},
		{"no pulse", func(ctx context.Context, s study.Study) (study.Study, error) {
			s, err := revealed(ctx, s)
			if s.Beats != nil && s.Fit == nil {
				b := *s.Beats
				b.Reason = "no pulse in q"
				s.Beats = &b
			}
			return s, err
		}, "[2 Beats]", "no pulse in q"},
	} {
		d := newDriver(t, nil)
		d.m.next = c.next
		d.send(tea.WindowSizeMsg{Width: 80, Height: 24})
		d.do(d.m.Init())
		d.wantView(c.want)
		d.wantView(c.said)
	}
	d := newDriver(t, nil)
	d.m.next = func(_ context.Context, s study.Study) (study.Study, error) { return s, errAny }
	d.send(tea.WindowSizeMsg{Width: 80, Height: 24})
	d.keys("6")
	d.do(d.m.Init())
	d.wantView("[6 Note]")
}

func TestStages(t *testing.T) {
	d := started(t, nil)
	for _, step := range []struct{ key, want string }{
		{"1", "[1 Intake]"},
		{"tab", "[2 Beats]"},
		{"6", "[6 Note]"},
		{"tab", "[1 Intake]"},
		{"shift+tab", "[6 Note]"},
		{"shift+tab", "[5 Support]"},
		{"4", "[4 Tree]"},
		{"3", "[3 Fit]"},
	} {
		d.keys(step.key)
		d.wantView(step.want)
	}
	d.keys("2 n")
	d.wantView("[6 Note]")
	if d.screen(tui.Beats).study.Comparison == nil {
		t.Error("a screen lost its study")
	}
}

func TestCommandsComeBackToTheirScreen(t *testing.T) {
	d := started(t, nil)
	d.hold = true
	d.keys("2 w 3")
	d.hold = false
	d.run()
	if got := d.screen(tui.Beats).got; strings.Join(got, " ") != strings.Repeat("shown ", len(got)-2)+"beats beats" {
		t.Errorf("beats got %q", got)
	}
	if got := strings.Join(d.screen(tui.Fit).got, " "); strings.Contains(got, "beats") {
		t.Errorf("fit got %q", got)
	}
}

func TestBurstsAndPastes(t *testing.T) {
	d := started(t, nil)
	d.keys("1")
	d.burst("il2d")
	if n := len(d.m.past); n != 3 {
		t.Errorf("%d changes of 3 in a burst", n)
	}
	d.wantView("[2 Beats]")
	d.burst("/qu 12?")
	if s := d.screen(tui.Beats); s.typed != "qu 12?" || d.quits {
		t.Errorf("typed %q, quits %v", s.typed, d.quits)
	}
	d.send(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune("pasted q"), Paste: true})
	if s := d.screen(tui.Beats); s.typed != "qu 12?pasted q" || s.pasted != 1 {
		t.Errorf("typed %q", s.typed)
	}
	d.keys("tab ctrl+z")
	d.wantView("[2 Beats]")
	d.keys("esc")
	d.send(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune("q"), Paste: true})
	d.send(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune("1uu"), Paste: true})
	d.wantView("[2 Beats]")
	d.wantStatus("pasted text goes into text fields only")
	if d.quits || len(d.m.past) != 3 {
		t.Error("a paste was taken for keys")
	}
}

func TestEscAndAKeyInOneRead(t *testing.T) {
	d := started(t, nil)
	d.keys("e ?")
	d.send(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune("1"), Alt: true})
	if d.m.helping || d.m.open != tui.Intake || len(d.m.errors) != 1 {
		t.Errorf("helping %v, on %v, %d errors", d.m.helping, d.m.open, len(d.m.errors))
	}
}

func TestUndoAndRedo(t *testing.T) {
	d := started(t, nil)
	first := d.m.present
	d.keys("1 i 2 d d")
	last := d.m.present
	if len(last.Drop) != 2 || len(last.Invert) != 1 {
		t.Fatalf("%+v", last)
	}
	d.keys("u u u")
	if !same(d.m.present, first) {
		t.Errorf("%+v", d.m.present)
	}
	d.wantStatus("undone: intake inverted")
	d.keys("u")
	d.wantStatus("nothing to undo")
	d.keys("ctrl+r ctrl+r ctrl+r")
	if !same(d.m.present, last) || !same(d.screen(tui.Fit).study.Inputs.Case, last) {
		t.Errorf("%+v", d.m.present)
	}
	d.keys("ctrl+r")
	d.wantStatus("nothing to redo")
	d.keys("u i ctrl+r")
	d.wantStatus("nothing to redo")
	if len(d.m.present.Drop) != 1 {
		t.Errorf("%+v", d.m.present)
	}
}

func TestQuickChangesDoNotTakeEachOtherBack(t *testing.T) {
	d := started(t, nil)
	d.hold = true
	d.burst("1i2i")
	d.hold = false
	d.run()
	if got := strings.Join(d.m.present.Invert, " "); got != "intake beats" {
		t.Errorf("inverted: %q", got)
	}
	if got := strings.Join(d.screen(tui.Fit).study.Inputs.Case.Invert, " "); got != "intake beats" {
		t.Errorf("shown inverted: %q", got)
	}
}

func TestWhatTakesLongerIsTakenLater(t *testing.T) {
	d := started(t, nil)
	d.m.moment = time.Millisecond
	c := d.m.present
	c.Label = "slow-1"
	release := make(chan bool)
	slow := d.m.of(tui.Beats, tea.Batch(tui.Say("at once"), func() tea.Msg {
		<-release
		return tui.ChangeMsg{Said: data.Clean("slow"), Case: c}
	}))
	m, rest := d.m.atOnce(slow)
	d.m = m
	if rest == nil || d.m.present.Label == "slow-1" {
		t.Fatal("waited for")
	}
	d.keys("1 i")
	close(release)
	d.do(rest)
	d.run()
	if d.m.present.Label != "slow-1" || len(d.m.present.Invert) != 1 {
		t.Errorf("%+v", d.m.present)
	}
}

func TestAKeyIsDoneBeforeTheNext(t *testing.T) {
	d := started(t, nil)
	d.hold = true
	d.burst("1iiidddq")
	if n := len(d.m.present.Drop); n != 3 || len(d.m.present.Invert) != 1 || d.m.leaving != asks {
		t.Errorf("dropped %d, inverted %v, leaving %v", n, d.m.present.Invert, d.m.leaving)
	}
}

func TestLateResultsAreDropped(t *testing.T) {
	d := started(t, nil)
	d.hold = true
	number := d.m.job.number
	c := d.m.present
	c.Model = "wk2"
	m, _ := d.m.change(data.Clean("model"), c)
	d.m = m
	fit := d.m.study
	d.send(stageMsg{number: number, study: study.Study{}})
	d.send(loadedMsg{number: number, inputs: study.Inputs{}})
	d.send(stageMsg{number: number, err: errAny})
	d.send(tickMsg{number})
	if d.m.study.Beats == nil || d.m.study.Beats != fit.Beats || len(d.m.errors) > 0 || d.m.job.shown != "" {
		t.Error("a late result was taken over")
	}
}

func TestOnlyWhatAChangeBearsOnIsComputed(t *testing.T) {
	loads, stages := 0, []study.Stage{}
	d := newDriver(t, func(o *Options) {
		load := o.Load
		o.Load = func(ctx context.Context, c casefile.Case) (study.Inputs, error) { loads++; return load(ctx, c) }
	})
	d.m.next = func(ctx context.Context, s study.Study) (study.Study, error) {
		stages = append(stages, s.Pending())
		return revealed(ctx, s)
	}
	d.do(d.m.Init())
	for _, c := range []struct {
		change func(*casefile.Case)
		loads  int
		stages int
	}{
		{func(c *casefile.Case) { c.Share = []float64{0.3} }, 0, 2},
		{func(c *casefile.Case) { c.Model = "wk2" }, 0, 4},
		{func(c *casefile.Case) { c.Invert = []string{"x"} }, 0, 6},
		{func(c *casefile.Case) { c.Unit = map[string]string{"x": "kPa"} }, 1, 6},
		{func(c *casefile.Case) { c.HeightCM = new(float64) }, 0, 1},
		{func(c *casefile.Case) { c.Label = "p-1" }, 0, 0},
	} {
		loads, stages = 0, nil
		next := d.m.present
		c.change(&next)
		m, cmd := d.m.change(data.Clean("changed"), next)
		d.m = m
		d.do(cmd)
		if loads != c.loads || len(stages) != c.stages {
			t.Errorf("read %d times, want %d; computed %v, want %d", loads, c.loads, stages, c.stages)
		}
		if d.m.study.Comparison == nil {
			t.Error("not computed to the end")
		}
	}
}

func TestProgressAndCancel(t *testing.T) {
	d := newDriver(t, nil)
	d.hold = true
	d.send(tea.WindowSizeMsg{Width: 80, Height: 24})
	d.send(startMsg{})
	if strings.Contains(d.m.View(), "computing") || strings.Contains(d.m.View(), "reading") && !strings.Contains(d.m.View(), "esc") {
		t.Error("progress in the first moments")
	}
	d.send(tickMsg{d.m.job.number})
	d.wantStatus("reading the recording 1/7, esc cancels")
	for d.m.study.Beats == nil {
		d.step(0)
	}
	d.wantStatus("reading") // no sooner than the next tick
	d.send(tickMsg{d.m.job.number})
	d.wantStatus("computing fit 4/7, esc cancels")
	ctx := d.m.job.ctx
	d.keys("esc")
	if ctx.Err() == nil || d.m.job.running {
		t.Error("not cancelled")
	}
	d.hold = false
	d.run()
	if d.m.study.Fit != nil || d.m.study.Beats == nil {
		t.Error("computed on after esc")
	}
	d.wantStatus("stopped")
	d.keys("s")
	d.wantStatus("no note yet: stopped: press 6 to go on")
	d.keys("?")
	d.wantView("no note yet: stopped: press 6 to go on")
	d.keys("esc")
	d.wantView("Fit: nothing to show yet\nstopped: press 3 to go on")
	d.keys("5")
	if d.m.study.Comparison == nil {
		t.Error("the digit of a stage that is missing does not compute on")
	}
}

func TestEscGoesToTheScreenThatListsIt(t *testing.T) {
	d := started(t, nil)
	d.hold = true
	d.keys("1 o i")
	d.run()
	d.hold = true
	d.keys("i")
	for !d.m.job.running {
		d.step(0)
	}
	d.keys("esc")
	if d.screen(tui.Intake).inner || !d.m.job.running {
		t.Error("esc did not go to the screen")
	}
	d.keys("esc")
	if d.m.job.running {
		t.Error("esc did not cancel")
	}
}

func TestErrorsStayUntilAnswered(t *testing.T) {
	d := newDriver(t, nil)
	fails := true
	d.m.next = func(ctx context.Context, s study.Study) (study.Study, error) {
		if s.Pending() == study.StageFit && fails {
			s.Fit = &study.Fit{}
			return s, errChoice
		}
		return revealed(ctx, s)
	}
	d.send(tea.WindowSizeMsg{Width: 80, Height: 24})
	d.do(d.m.Init())
	d.wantView(`Error: site of abp: "x" is no site`)
	d.wantView("Hint: sites: root, lvot")
	if d.m.study.Fit != nil || d.m.study.Beats == nil {
		t.Error("the study does not stay as far as it came")
	}
	d.keys("1 2 e ?")
	d.wantView("Error (1 of 2): site of")
	d.keys("esc esc")
	d.wantView(`Error: beats: that is not possible\x1b[2J`)
	d.keys("enter")
	d.wantView("Error: beats")
	d.keys("esc")
	if strings.Contains(d.m.View(), "Error") {
		t.Error(d.m.View())
	}
	d.keys("i")
	d.wantView("Error: site of")
	fails = false
	d.keys("i")
	if strings.Contains(d.m.View(), "Error") || d.m.study.Fit == nil {
		t.Error("an error of the case before still stands")
	}
}

func TestAFirstReadingThatFailsEndsIt(t *testing.T) {
	broken := &data.FileError{File: "a.csv", Line: 3, What: "flow is not a number"}
	d := newDriver(t, func(o *Options) {
		o.Load = func(context.Context, casefile.Case) (study.Inputs, error) { return study.Inputs{}, broken }
	})
	d.do(d.m.Init())
	if _, err := d.m.finish(nil); !d.quits || err != error(broken) {
		t.Errorf("quits %v with %v", d.quits, err)
	}
}

func TestAFaultIsAPlaceWithoutAValue(t *testing.T) {
	d := started(t, nil)
	d.keys("1 d")
	for _, k := range []string{"p", "P"} {
		d.keys(k)
		d.wantView("Error: the program has a fault at app.stub")
		if v := d.m.View(); strings.Contains(v, secret) || !strings.Contains(v, "stub_test.go:") {
			t.Errorf("%s", v)
		}
		d.keys("esc")
	}
	if len(d.m.present.Drop) != 1 {
		t.Error("a choice was lost")
	}
	d.m.next = func(context.Context, study.Study) (study.Study, error) { panic(secret) }
	d.keys("i")
	d.wantView("fault at app.Test")
	d.m.next = revealed
	d.keys("esc u")
	d.keys("3 V")
	d.wantView("Nothing is lost.")
	d.wantView("fault at app.stub.View")
	if rows := d.rows(); rows[0] != casenote.Caution {
		t.Error(rows[0])
	}
	d.keys("2")
	d.wantView("[2 Beats]")
}

func TestHelpIsMadeFromTheKeys(t *testing.T) {
	d := started(t, nil)
	d.keys("2 d ?")
	most, others := d.m.everywhere()
	for _, b := range slices.Concat(most, others, d.screen(tui.Beats).Keys()) {
		if b.Enabled() {
			d.send(keyOf("g"))
			found := false
			for range 40 {
				found = found || strings.Contains(d.m.View(), b.Help().Desc)
				d.keys("j")
			}
			if !found {
				t.Errorf("the help does not list %q", b.Help())
			}
		}
	}
	d.keys("G")
	bottom := d.m.scroll
	d.keys("j pgdown")
	if d.m.scroll != bottom || bottom == 0 {
		t.Errorf("scrolled to %d and %d", bottom, d.m.scroll)
	}
	d.wantView("  used: ")
	d.keys("pgup home k")
	d.wantView("Keys of 2 Beats")
	d.keys("i")
	if len(d.m.past) != 1 {
		t.Error("a key went through the help")
	}
	d.keys("?")
	if d.m.helping {
		t.Error("? does not close the help")
	}
}

func TestASCII(t *testing.T) {
	d := started(t, func(o *Options) { o.Title, o.Case.Label = data.Clean("münchen-07.csv"), "" })
	d.wantView("münchen")
	d.keys("A")
	if !d.screen(tui.Note).theme.ASCII {
		t.Error("the screens keep their theme")
	}
	d.wantView(`m\u{fc}n`)
	d.keys("A")
	d.wantView("münchen")
}

func TestSuspendAndRedraw(t *testing.T) {
	d := started(t, nil)
	d.keys("ctrl+l")
	if d.clears != 1 {
		t.Error("ctrl+l does not redraw")
	}
	_, cmd := d.m.one(keyOf("ctrl+z"))
	if cmd == nil || typeName(cmd()) != "tea.SuspendMsg" {
		t.Error("ctrl+z does not go to the shell")
	}
	d.m.leader = true
	_, cmd = d.m.one(keyOf("ctrl+z"))
	if cmd != nil {
		t.Error("ctrl+z stops a program that nobody can wake")
	}
	d.keys("ctrl+z")
	d.wantStatus("no shell to return to")
}

func TestSmall(t *testing.T) {
	d := started(t, nil)
	d.send(tea.WindowSizeMsg{Width: 40, Height: 12})
	d.wantView("This terminal is 40x12")
	d.wantView("Without a screen: afterbeat study")
	d.keys("1 i")
	if len(d.m.past) > 0 || d.m.open != tui.Fit {
		t.Error("a key worked that nobody sees the effect of")
	}
	d.keys("q")
	if !d.quits {
		t.Error("q does not quit")
	}
}

// A forecast that was stopped is computed on where it is shown: the yardsticks
// are there, so that the stage is not missing.
func TestStoppedForecastGoesOn(t *testing.T) {
	for _, c := range []struct {
		digit string
		on    bool
	}{{"3", false}, {"5", true}, {"6", true}} {
		d := newDriver(t, nil)
		d.hold = true
		d.send(tea.WindowSizeMsg{Width: 80, Height: 24})
		d.send(startMsg{})
		for d.m.study.Comparison == nil {
			d.step(0)
		}
		d.send(tickMsg{d.m.job.number})
		d.wantStatus("computing forecast 7/7, esc cancels")
		d.keys("esc")
		d.wantStatus("5 or 6 computes the forecast")
		d.hold = false
		d.run()
		if d.m.study.Forecast != nil {
			t.Fatal("computed on after esc")
		}
		d.keys(c.digit)
		d.run()
		if (d.m.study.Forecast != nil) != c.on {
			t.Errorf("after %s there is a forecast: %v", c.digit, !c.on)
		}
	}
}

// ending is a study whose fit fails.
func ending(err error) func(context.Context, study.Study) (study.Study, error) {
	return func(ctx context.Context, s study.Study) (study.Study, error) {
		if s.Pending() == study.StageFit {
			return s, err
		}
		return revealed(ctx, s)
	}
}

func TestAFailureStaysOnThePage(t *testing.T) {
	d := newDriver(t, nil)
	d.m.next = ending(errChoice)
	d.send(tea.WindowSizeMsg{Width: 80, Height: 24})
	d.do(d.m.Init())
	d.keys("esc 5")
	d.wantStatus(`Support: 1 Intake: site of abp: "x" is no site`)
	d.keys("x") // a key of nobody
	d.wantView("Support: nothing to show yet\n1 Intake: site of abp: \"x\" is no site\nsites: root, lvot")
	d.keys("s")
	d.wantStatus("no note yet: 1 Intake: site of abp")
	d.keys("1")
	if strings.Contains(d.m.View(), "nothing to show") || strings.Contains(d.m.View(), "Error") {
		t.Error("the failure covers the stage where it is cured")
	}
	d.m.next = revealed
	d.keys("i 5")
	if strings.Contains(d.m.View(), "nothing to show") || d.m.study.Comparison == nil {
		t.Error("a change does not cure it")
	}
}

func TestAChoiceMadeAtTheStart(t *testing.T) {
	d := newDriver(t, nil)
	d.m.next = ending(&study.ChoiceError{Key: "replicates", What: "0 are too few", Hint: "for instance --replicates 1000"})
	d.send(tea.WindowSizeMsg{Width: 80, Height: 24})
	d.do(d.m.Init())
	d.wantView("Error: replicates: 0 are too few")
	d.wantView("Hint: for instance replicates 1000")
	d.keys("esc 3 x")
	d.wantView("Fit: nothing to show yet\nreplicates: 0 are too few")
	d.wantView("it is chosen at the start, by --replicates or in the case file")
	d.keys("1 i esc 3 x")
	d.wantView("u takes the last change back")
}

// TestRecordingsThatNeedAPerson reads and computes in earnest.
func TestRecordingsThatNeedAPerson(t *testing.T) {
	for head, want := range map[string]string{
		"time_s,p1_mmHg,p2_mmHg":          "two channels could be the pressure: j/k, then enter",
		"time_s,p1_mmHg,p2_mmHg,p3_mmHg":  "three channels could be the pressure: j/k, then enter",
		"time_s,abp_mmHg,q1_mL_s,q2_mL_s": "two channels could be the flow: j/k, then enter",
		"time_s,a,b":                      "no column is known as a pressure or a flow: j/k, then e states its unit",
	} {
		var file strings.Builder
		file.WriteString(head + "\n")
		for i := range 1000 {
			seconds := float64(i) / 100
			value := fmt.Sprintf(",%.3f", 80+20*max(0, math.Sin(7*seconds)))
			fmt.Fprintf(&file, "%.2f%s\n", seconds, strings.Repeat(value, strings.Count(head, ",")))
		}
		d := composed(t, true, func(o *Options) {
			o.Case = casefile.Case{Recording: "x.csv"}
			o.Load = func(_ context.Context, c casefile.Case) (study.Inputs, error) {
				return study.Read(c, func(string) ([]byte, error) { return []byte(file.String()), nil })
			}
		})
		d.wantView("[1 Intake]")
		if got := d.status(); got != want {
			t.Errorf("%s: status %q, want %q", head, got, want)
		}
	}
}

// TestAnOutflowPressureAboveTheMean computes in earnest.
func TestAnOutflowPressureAboveTheMean(t *testing.T) {
	d := composed(t, true, func(o *Options) {
		above := 77.0
		o.Case.OutflowPressure = &above
	})
	d.wantView("[1 Intake]")
	d.wantView("Error: outflow pressure: ")
	d.keys("esc 5")
	d.wantView("Support: 1 Intake: outflow pressure: ")
	if v := d.m.View(); strings.Contains(v, "--outflow") || strings.Contains(v, "still") {
		t.Error(v)
	}
}

func TestTheWordsOfAChoice(t *testing.T) {
	for _, c := range []struct{ key, what, want string }{
		{"outflow_pressure", "a", "outflow pressure: a"},
		{"diameter_cm", "a", "diameter: a"},
		{"angle_deg", "a", "angle: a"},
		{"site.abp_mmHg", "b-c --x", "site of abp_mmHg: b-c x"},
		{"scale.p", "--error flow=10% or --diameter-cm", "scale of p: error flow=10% or diameter cm"},
	} {
		if got := inWords(&study.ChoiceError{Key: c.key, What: c.what}); got != c.want {
			t.Errorf("%q, want %q", got, c.want)
		}
	}
}

func TestAWordOfComputingGoesWhenItIsDone(t *testing.T) {
	d := newDriver(t, nil)
	d.hold = true
	d.send(tea.WindowSizeMsg{Width: 80, Height: 24})
	d.send(startMsg{})
	d.keys("5")
	d.wantStatus("Support: still being computed")
	for d.m.study.Fit == nil {
		d.step(0)
	}
	d.wantStatus("Support: still being computed")
	d.run()
	if strings.Contains(d.m.View(), "still") {
		t.Errorf("status %q", d.status())
	}
	d.keys("1 i s")
	d.wantStatus("no note yet: still being computed")
	d.run()
	if d.status() != "" {
		t.Errorf("status %q", d.status())
	}
}

func TestWhatWasAssumedCanBeReadInFull(t *testing.T) {
	d := newDriver(t, nil)
	d.m.next = func(ctx context.Context, s study.Study) (study.Study, error) {
		s, err := revealed(ctx, s)
		if s.Fit != nil && s.Comparison == nil {
			f := *s.Fit
			for _, a := range assumptions {
				f.Warnings = append(slices.Clip(f.Warnings), data.Warning{Code: a.code})
			}
			s.Fit = &f
		}
		return s, err
	}
	d.do(d.m.Init())
	d.send(tea.WindowSizeMsg{Width: 60, Height: 24})
	whole := d.m.said.String()
	d.wantStatus("~ (? all)")
	read := func() string {
		var seen []string
		for range 60 {
			for _, row := range d.rows()[2:22] {
				if n := len(seen); n == 0 || !slices.Contains(seen, row) {
					seen = append(seen, row)
				}
			}
			d.keys("j")
		}
		return strings.Join(strings.Fields(strings.Join(seen, " ")), " ")
	}
	d.keys("?")
	if got := read(); !strings.Contains(got, "The last message "+whole) {
		t.Errorf("%q is not in %q", whole, got)
	}
	d.keys("esc")
	d.wantStatus("used: ")
	d.keys("1 ?")
	if got := read(); !strings.Contains(got, "What is used, and what was assumed "+whole) {
		t.Errorf("%q is not in %q", whole, got)
	}
}

// TestNoKeyIsTakenUnlisted presses enter while an error stands.
func TestNoKeyIsTakenUnlisted(t *testing.T) {
	d := started(t, nil)
	d.keys("1 o e")
	row := d.rows()[23]
	if !strings.HasPrefix(row, "esc close error") || strings.Count(row, "esc ") != 1 {
		t.Errorf("keys %q", row)
	}
	d.keys("enter")
	if len(d.m.errors) != 1 || !slices.Contains(d.screen(tui.Intake).pressed, "enter") {
		t.Errorf("%d errors, the screen got %q", len(d.m.errors), d.screen(tui.Intake).pressed)
	}
	d.keys("esc")
	if len(d.m.errors) != 0 || !d.screen(tui.Intake).inner {
		t.Error("esc does not close the error alone")
	}
}
