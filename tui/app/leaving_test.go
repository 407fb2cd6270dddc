package app

import (
	"io/fs"
	"os"
	"strings"
	"testing"

	tea "github.com/charmbracelet/bubbletea"

	"afterbeat/data"
	"afterbeat/data/casenote"
	"afterbeat/tui"
	"afterbeat/tui/state"
)

// outcome is how the driver's program ended.
func (d *driver) outcome() Outcome {
	d.t.Helper()
	if !d.quits {
		d.t.Error("the program goes on")
	}
	o, err := d.m.finish(nil)
	if err != nil {
		d.t.Error(err)
	}
	return o
}

func TestSaveANote(t *testing.T) {
	d := started(t, nil)
	d.keys("6 l s")
	d.wantStatus("save the note as: demo.note.txt|")
	d.keys("enter")
	d.wantStatus("note saved to demo.note.txt")
	note := d.files["demo.note.txt"]
	if want := d.m.study.Note().Render(casenote.Options{}); note != want || !strings.HasPrefix(note, casenote.Caution) {
		t.Errorf("saved %q", note)
	}
	d.keys("s")
	d.wantStatus("save the note as: demo-2.note.txt|")
	d.keys("esc q")
	if o := d.outcome(); o.String() != "note saved to demo.note.txt in "+here(t) {
		t.Errorf("%q", o)
	}
}

// here is the folder that the tests run in, where notes without a folder go.
func here(t *testing.T) string {
	t.Helper()
	folder, err := os.Getwd()
	if err != nil {
		t.Fatal(err)
	}
	return folder
}

func TestAnExistingFileIsNotTouched(t *testing.T) {
	d := started(t, nil)
	d.files["demo.note.txt"] = "of another"
	d.keys("s enter")
	d.wantStatus("that file exists, and was not touched; another name: demo.note.txt|")
	if d.files["demo.note.txt"] != "of another" {
		t.Error("touched")
	}
	d.send(tea.KeyMsg{Type: tea.KeyHome})
	d.send(tea.KeyMsg{Type: tea.KeyRunes, Runes: []rune("q?"), Paste: true})
	d.wantStatus("save the note as: q?|demo.note.txt")
	d.keys("1 /")
	d.wantStatus("q?1/|demo")
	d.keys("enter")
	d.wantStatus("there is no folder: q?1/|demo.note.txt")
	d.keys("ctrl+u enter")
	d.wantStatus("a name is needed: |")
	d.burst("x y\n")
	d.keys("enter")
	if d.files["x y "] == "" {
		t.Errorf("saved: %v", d.files)
	}
}

func TestNamesThatFollow(t *testing.T) {
	for name, want := range map[string]string{
		"a.note.txt": "a-2.note.txt", "a-2.note.txt": "a-3.note.txt", "a-9.note.txt": "a-10.note.txt",
		"pilot-07.note.txt": "pilot-07-2.note.txt", "a-x.note.txt": "a-x-2.note.txt", "-.note.txt": "--2.note.txt",
		"a.txt": "a.txt",
	} {
		if got := following(name); got != want {
			t.Errorf("after %s: %s, want %s", name, got, want)
		}
	}
}

func TestQuit(t *testing.T) {
	for _, c := range []struct{ keys, want string }{
		{"q", "nothing was saved"},
		{"1 i u q", "nothing was saved"},
		{"1 i q y", "nothing was saved; the choices made since are discarded"},
		{"1 i q s enter", "note saved to demo.note.txt in HERE"},
		{"1 i q esc u q", "nothing was saved"},
		{"1 i q s esc q y", "nothing was saved; the choices made since are discarded"},
		{"s enter 1 i q y", "note saved to demo.note.txt in HERE; the choices made since are discarded"},
		{"s enter 1 i q s enter", "note saved to demo-2.note.txt in HERE"},
	} {
		d := started(t, nil)
		d.keys(c.keys)
		if got := strings.ReplaceAll(d.outcome().String(), here(t), "HERE"); got != c.want {
			t.Errorf("%s: %q, want %q", c.keys, got, c.want)
		}
	}
	d := started(t, nil)
	d.keys("1 i q")
	d.wantStatus("s save a note first, y discard them, esc stay")
	d.keys("q x enter")
	if d.quits {
		t.Error("quits without an answer")
	}
	d.keys("esc")
	if d.quits || d.m.leaving != stays {
		t.Error("esc does not stay")
	}
}

func TestNoQuitWhileASaveRuns(t *testing.T) {
	d := started(t, nil)
	d.hold = true
	d.keys("s enter q ctrl+c")
	if d.m.leaving == leaves || len(d.files) > 0 {
		t.Fatalf("leaving %v, saved %v", d.m.leaving, d.files)
	}
	d.run()
	if o := d.outcome(); o.Saved != "demo.note.txt" || !o.Interrupted || d.files["demo.note.txt"] == "" {
		t.Errorf("%+v", o)
	}
}

// keeping is a driver that keeps its choices in folder.
func keeping(t *testing.T, folder string) *driver {
	return started(t, func(o *Options) { o.State = state.New(folder, "demo") })
}

func TestChoicesAreKeptAndOffered(t *testing.T) {
	folder := t.TempDir()
	d := keeping(t, folder)
	d.keys("2 d 1 i")
	if _, _, ok := d.m.options.State.Kept(); ok {
		t.Error("kept at once")
	}
	d.tick()
	if c, _, ok := d.m.options.State.Kept(); !ok || len(c.Invert) != 1 || len(c.Drop) != 1 {
		t.Errorf("kept %v: %+v", ok, c)
	}
	changed := d.m.present
	d = keeping(t, folder)
	d.wantStatus("Choices of an interrupted run of ")
	d.keys("2 d s ?")
	d.wantView("[3 Fit]")
	d.keys("r")
	if !same(d.m.present, changed) {
		t.Errorf("%+v", d.m.present)
	}
	d.keys("q")
	d.wantStatus("s save a note first")
	d.keys("y")
	d.outcome()
	d = keeping(t, folder)
	if strings.Contains(d.m.View(), "interrupted") {
		t.Error("offered after an orderly end")
	}
}

func TestAnOfferThatIsNotAnsweredStays(t *testing.T) {
	for name, leave := range map[string]tea.Msg{"q": keyOf("q"), "ctrl+c": keyOf("ctrl+c"), "hang-up": SignalMsg{}} {
		folder := t.TempDir()
		d := keeping(t, folder)
		d.keys("1 i")
		d.tick()
		left := d.m.options.State.Path()
		d = keeping(t, folder)
		d.wantView("r resume  esc discard (asks again)  q quit")
		d.send(leave)
		d.run()
		if got := d.outcome().String(); !strings.Contains(got, "stay on offer") {
			t.Errorf("%s: %q", name, got)
		}
		if _, err := os.Stat(left); err != nil {
			t.Errorf("%s: %v", name, err)
		}
		keeping(t, folder).wantStatus("Choices of an interrupted run of ")
	}
	folder := t.TempDir()
	d := keeping(t, folder)
	d.keys("1 i")
	d.tick()
	d = keeping(t, folder)
	if _, err := d.m.finish(tea.ErrProgramKilled); err != nil {
		t.Fatal(err)
	}
	keeping(t, folder).wantStatus("Choices of an interrupted run of ")
}

func TestASecondSessionLeavesTheFileOfTheFirst(t *testing.T) {
	folder := t.TempDir()
	first, second := keeping(t, folder), keeping(t, folder)
	first.keys("1 i")
	first.tick()
	second.keys("2 d")
	second.tick()
	second.keys("q y")
	second.outcome()
	if _, err := os.Stat(first.m.options.State.Path()); err != nil {
		t.Error(err)
	}
	if _, err := os.Stat(second.m.options.State.Path()); err == nil {
		t.Error("the second session leaves its file behind")
	}
}

func TestChoicesTakenOverAreInOneFile(t *testing.T) {
	folder := t.TempDir()
	d := keeping(t, folder)
	d.keys("1 i")
	d.tick()
	d = keeping(t, folder)
	d.keys("r")
	files := func() int {
		list, err := os.ReadDir(folder)
		if err != nil {
			t.Fatal(err)
		}
		return len(list)
	}
	if files() != 1 {
		t.Error("the choices are gone before they are kept again")
	}
	d.tick()
	if _, err := os.Stat(d.m.options.State.Path()); err != nil || files() != 1 {
		t.Errorf("%d files, %v", files(), err)
	}
}

func TestAnOfferThatIsDiscarded(t *testing.T) {
	folder := t.TempDir()
	d := keeping(t, folder)
	d.keys("1 i")
	d.tick()
	d = keeping(t, folder)
	d.keys("esc")
	d.wantStatus("for good? esc again discards, r resumes")
	d.wantView("esc discard for good")
	d.keys("l") // calls it off
	d.wantStatus("Choices of an interrupted run of ")
	d.keys("esc")
	if _, _, ok := d.m.options.State.Kept(); !ok || d.m.offer == nil {
		t.Fatal("one esc discards")
	}
	d.keys("esc")
	d.wantStatus("the choices of the interrupted run are discarded")
	if _, _, ok := d.m.options.State.Kept(); ok || len(d.m.present.Invert) != 0 || d.m.offer != nil {
		t.Error("not discarded")
	}
	d.keys("1 l u")
	d.tick()
	if _, _, ok := d.m.options.State.Kept(); ok {
		t.Error("kept without unsaved choices")
	}
}

func TestInterrupt(t *testing.T) {
	for name, end := range map[string]tea.Msg{"ctrl+c": keyOf("ctrl+c"), "signal": SignalMsg{}} {
		folder := t.TempDir()
		d := keeping(t, folder)
		d.keys("1 i / x")
		d.hold = true
		d.send(end)
		d.step(0)
		if _, _, ok := d.m.options.State.Kept(); !ok || d.quits {
			t.Errorf("%s: kept %v before the end %v", name, ok, d.quits)
		}
		d.run()
		o := d.outcome()
		if !o.Interrupted || o.Kept == "" || o.String() != "interrupted; nothing was saved; the choices made since are offered at the next start" {
			t.Errorf("%s: %+v", name, o)
		}
		d.keys("q u")
		if len(d.m.present.Invert) != 1 {
			t.Error("a key is answered after the end")
		}
		keeping(t, folder).wantStatus("interrupted run")
	}
	d := keeping(t, t.TempDir())
	d.keys("ctrl+c")
	if o := d.outcome(); !o.Interrupted || o.Unsaved || o.Kept != "" {
		t.Errorf("%+v", o)
	}
	d = started(t, nil) // without a state folder
	d.keys("1 i ctrl+c")
	if o := d.outcome(); o.Kept != "" || o.String() != "interrupted; nothing was saved; the choices made since are discarded" {
		t.Errorf("%q", o)
	}
}

func TestTheLossOfTheTerminalKeepsChoices(t *testing.T) {
	d := keeping(t, t.TempDir())
	d.keys("1 i")
	o, err := d.m.finish(tea.ErrProgramKilled)
	if err != nil || !o.Interrupted || o.Kept == "" {
		t.Errorf("%+v, %v", o, err)
	}
	if _, err := d.m.finish(fs.ErrPermission); err == nil {
		t.Error("a terminal that cannot be used is no error")
	}
}

func TestAFolderThatCannotBeWrittenIsSaid(t *testing.T) {
	d := started(t, func(o *Options) { o.State = state.New("/dev/null/afterbeat", "demo") })
	d.keys("1 i")
	d.tick()
	d.wantView("Error: choices cannot be kept")
	d.keys("esc i")
	d.tick()
	if d.m.open != tui.Intake || d.m.present.Recording == "" {
		t.Error("work does not go on")
	}
}

func TestAnOfferIsAboutTheRecordingOfTheStart(t *testing.T) {
	folder := t.TempDir()
	st := state.New(folder, "demo")
	c := demoStudy().Inputs.Case
	c.Recording, c.Label = "/etc/passwd", "other-1"
	if err := st.Keep(1, c); err != nil {
		t.Fatal(err)
	}
	d := keeping(t, folder)
	d.keys("r")
	if d.m.present.Label != "other-1" || d.m.present.Recording != demoStudy().Inputs.Case.Recording {
		t.Errorf("%+v", d.m.present)
	}
	if d.m.said == (data.Text{}) {
		t.Error("says nothing")
	}
}
