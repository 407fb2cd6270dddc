package main

import (
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
	"time"

	"afterbeat/data/casenote"
)

// pane is a shell in a terminal of tmux.
type pane struct {
	t      *testing.T
	socket string
	folder string
	state  string
}

// newPane opens a shell in an empty folder; the program is on its path.
func newPane(t *testing.T, width, height int, env ...string) *pane {
	t.Helper()
	t.Parallel()
	program := built(t)
	if _, err := exec.LookPath("tmux"); err != nil {
		t.Skip("tmux is not installed")
	}
	sockets, err := os.MkdirTemp("", "tm") // a socket's path has to be short
	if err != nil {
		t.Fatal(err)
	}
	p := &pane{t: t, socket: filepath.Join(sockets, "s"), folder: t.TempDir(), state: t.TempDir()}
	t.Cleanup(func() {
		_ = exec.Command("tmux", "-S", p.socket, "kill-server").Run()
		_ = os.RemoveAll(sockets)
	})
	args := []string{"-f", "/dev/null", "new-session", "-d", "-x", fmt.Sprint(width), "-y", fmt.Sprint(height), "-c", p.folder}
	for _, e := range append([]string{
		"LANG=C.UTF-8", "LC_ALL=", "NO_COLOR=", "HOME=" + p.folder, "XDG_STATE_HOME=" + p.state,
		"PATH=" + filepath.Dir(program) + ":" + os.Getenv("PATH"),
	}, env...) {
		args = append(args, "-e", e)
	}
	p.tmux(append(args, "env TERM=tmux-256color sh -i")...)
	p.run("PS1=re'ady> '")
	p.wait("ready>")
	return p
}

func (p *pane) tmux(args ...string) string {
	p.t.Helper()
	c := exec.Command("tmux", append([]string{"-S", p.socket, "-u"}, args...)...)
	c.Env = append(os.Environ(), "LC_ALL=C.UTF-8")
	out, err := c.CombinedOutput()
	if err != nil {
		p.t.Fatalf("tmux %q: %v: %s", args, err, out)
	}
	return string(out)
}

// shown is what stands on the terminal.
func (p *pane) shown() string { return p.tmux("capture-pane", "-p") }

// wait polls the terminal until text stands on it.
func (p *pane) wait(text string) {
	p.t.Helper()
	p.until("no "+text, func(shown string) bool { return strings.Contains(shown, text) })
}

func (p *pane) until(complaint string, ok func(shown string) bool) {
	p.t.Helper()
	for limit := time.Now().Add(patience); ; time.Sleep(20 * time.Millisecond) {
		shown := p.shown()
		if ok(shown) {
			return
		}
		if time.Now().After(limit) {
			p.t.Fatalf("%s:\n%s", complaint, shown)
		}
	}
}

// keys presses keys by the names that tmux gives them.
func (p *pane) keys(keys ...string) { p.tmux(append([]string{"send-keys"}, keys...)...) }

// types sends letters in one piece.
func (p *pane) types(text string) { p.tmux("send-keys", "-l", text) }

// run types a command line.
func (p *pane) run(line string) {
	p.types(line)
	p.keys("Enter")
}

// open opens the screens, and waits until everything is computed.
func (p *pane) open(line string) {
	p.t.Helper()
	p.run(line)
	p.wait("used: ")
	p.until("still computing", func(shown string) bool { return !strings.Contains(shown, "(5 Support)") })
}

// back waits for the shell, with the terminal as it was, and returns the exit
// code.
func (p *pane) back() string {
	p.t.Helper()
	p.until("the program goes on", func(shown string) bool {
		return strings.HasSuffix(strings.TrimSpace(shown), "\nready>")
	})
	p.run("echo code=$?.")
	p.until("the program goes on", func(shown string) bool { return regexp.MustCompile(`code=\d+\.`).MatchString(shown) })
	if flags := strings.TrimSpace(p.tmux("display-message", "-p", "#{alternate_on} #{cursor_flag}")); flags != "0 1" {
		p.t.Errorf("alternate screen and cursor are %s, want 0 1", flags)
	}
	return regexp.MustCompile(`code=(\d+)\.`).FindStringSubmatch(p.shown())[1]
}

func (p *pane) file(name string) string {
	p.t.Helper()
	content, err := os.ReadFile(filepath.Join(p.folder, name))
	if err != nil {
		p.t.Fatal(err)
	}
	return string(content)
}

// computed waits until the forecast, which comes last, stands.
func (p *pane) computed() {
	p.t.Helper()
	p.keys("5")
	p.wait("coupled speed")
}

func TestTmuxFromFileToSavedNote(t *testing.T) {
	p := newPane(t, 80, 24)
	p.open("afterbeat")
	for i, stage := range []string{"[1 Intake]", "[2 Beats]", "[3 Fit]", "[4 Tree]", "[5 Support]", "[6 Note]"} {
		p.keys(fmt.Sprint(i + 1))
		p.wait(stage)
		if first, _, _ := strings.Cut(p.shown(), "\n"); first != casenote.Caution {
			t.Errorf("the first row is %q", first)
		}
	}
	p.computed()
	p.keys("6", "s")
	p.wait("save the note as: demo.note.txt|")
	p.keys("Enter")
	p.wait("note saved to demo.note.txt")
	p.keys("q")
	if code := p.back(); code != "0" {
		t.Errorf("exit code %s", code)
	}
	p.wait("afterbeat: note saved to demo.note.txt")
	note, err := exec.Command(built(t)).Output() // without a terminal
	if err != nil || p.file("demo.note.txt") != string(note) {
		t.Errorf("%v: the note saved is not the one printed", err)
	}
	info, err := os.Stat(filepath.Join(p.folder, "demo.note.txt"))
	if err != nil || info.Mode().Perm() != 0o600 {
		t.Errorf("%v, %v", info.Mode(), err)
	}
	if files, _ := filepath.Glob(filepath.Join(p.state, "afterbeat", "*")); len(files) > 0 {
		t.Errorf("left behind: %v", files)
	}
}

func TestTmuxAnExistingFileStays(t *testing.T) {
	p := newPane(t, 80, 24)
	if err := os.WriteFile(filepath.Join(p.folder, "demo.note.txt"), []byte("of another"), 0o600); err != nil {
		t.Fatal(err)
	}
	p.open("afterbeat")
	p.keys("s", "Enter")
	p.wait("that file exists")
	p.keys("C-u")
	p.types("second one.txt")
	p.keys("Enter")
	p.wait("note saved to second one.txt")
	p.keys("q")
	p.back()
	if p.file("demo.note.txt") != "of another" || !strings.HasPrefix(p.file("second one.txt"), casenote.Caution) {
		t.Error("the wrong file was written")
	}
}

func TestTmuxUndoAndTheQuestion(t *testing.T) {
	p := newPane(t, 80, 24)
	p.open("afterbeat")
	p.keys("1", "i")
	p.wait("nvert")
	p.keys("u")
	p.wait("undone: ")
	p.keys("C-r")
	p.wait("done again: ")
	p.keys("q")
	p.wait("esc stay")
	p.keys("Escape")
	p.until("still asks", func(shown string) bool { return !strings.Contains(shown, "esc stay") })
	p.keys("q", "y")
	if code := p.back(); code != "0" {
		t.Errorf("exit code %s", code)
	}
	p.wait("nothing was saved; the choices made since are discarded")
}

func TestTmuxInterruptAndResume(t *testing.T) {
	p := newPane(t, 80, 24)
	p.open("afterbeat")
	p.keys("1", "i")
	p.wait("nvert")
	p.keys("C-c")
	if code := p.back(); code != "130" {
		t.Errorf("exit code %s", code)
	}
	p.run("clear; afterbeat")
	p.wait("Choices of an interrupted run")
	p.keys("r")
	p.wait("the choices of the interrupted run")
	p.keys("u")
	p.wait("undone: ")
	p.keys("q")
	p.back()
	if files, _ := filepath.Glob(filepath.Join(p.state, "afterbeat", "*")); len(files) > 0 {
		t.Errorf("left behind: %v", files)
	}
}

func TestTmuxBurstsAndPastes(t *testing.T) {
	p := newPane(t, 80, 24)
	p.open("afterbeat")
	p.types("2nnnn")
	p.wait("beat 5 of ")
	p.tmux("set-buffer", "1q\nq")
	p.tmux("paste-buffer", "-p")
	p.wait("pasted text goes into text fields only")
	p.wait("[2 Beats]")
	p.types("6r")
	p.tmux("set-buffer", "pasted q\x1b[2Jremark")
	p.tmux("paste-buffer", "-p")
	p.wait("pasted q")
	p.keys("Enter")
	p.wait("remark put at the end of the note")
	p.keys("s", "Enter")
	p.wait("note saved to demo.note.txt")
	p.keys("q")
	p.back()
	if note := p.file("demo.note.txt"); !strings.Contains(note, "pasted q") || strings.Contains(note, "\x1b") {
		t.Errorf("%.200q", note)
	}
}

func TestTmuxSizes(t *testing.T) {
	p := newPane(t, 80, 24)
	p.open("afterbeat")
	for _, c := range []struct {
		width, height int
		want          string
	}{
		{50, 12, "the screens need"}, {200, 56, "[3 Fit]"}, {60, 15, "[3 Fit]"}, {30, 5, "Research use only."}, {100, 30, "[3 Fit]"}, {80, 24, "[3 Fit]"},
	} {
		p.tmux("resize-window", "-x", fmt.Sprint(c.width), "-y", fmt.Sprint(c.height))
		p.wait(c.want)
		p.until("the caution is not first", func(shown string) bool { return strings.HasPrefix(shown, "Research use only.") })
	}
	for i := range 30 {
		p.tmux("resize-window", "-x", fmt.Sprint(60+5*i), "-y", fmt.Sprint(15+i))
	}
	p.tmux("resize-window", "-x", "80", "-y", "24")
	p.wait("[3 Fit]")
	p.until("the last row is not the keys", func(shown string) bool {
		rows := strings.Split(strings.TrimRight(shown, "\n"), "\n")
		return len(rows) == 24 && strings.HasSuffix(rows[23], "q quit")
	})
	p.keys("q")
	p.back()
}

func TestTmuxASCII(t *testing.T) {
	p := newPane(t, 80, 24, "LANG=C")
	p.open("afterbeat")
	for _, stage := range []string{"1", "2", "3", "5", "6"} {
		p.keys(stage)
		p.wait("[" + stage + " ")
		if shown := p.shown(); strings.IndexFunc(shown, func(r rune) bool { return r >= 0x80 }) >= 0 {
			t.Errorf("not ASCII:\n%s", shown)
		}
	}
	p.keys("1", "A")
	p.until("no Unicode", func(shown string) bool { return strings.Contains(shown, "│") })
	p.keys("q")
	p.back()
}

func TestTmuxToTheShellAndBack(t *testing.T) {
	p := newPane(t, 80, 24)
	p.open("afterbeat")
	p.computed()
	p.keys("2")
	p.wait("[2 Beats]")
	p.keys("C-z")
	p.until("no shell", func(shown string) bool {
		return !strings.Contains(shown, "[2 Beats]") && strings.HasSuffix(strings.TrimSpace(shown), "\nready>")
	})
	p.run("fg")
	p.wait("[2 Beats]")
	p.wait("q quit")
	p.keys("q")
	p.back()
}

func TestTmuxHelp(t *testing.T) {
	p := newPane(t, 80, 24)
	p.open("afterbeat")
	p.keys("?")
	p.wait("Keys of 3 Fit")
	p.keys("G")
	p.wait("leave at once")
	p.keys("Escape")
	p.wait("[3 Fit]")
	p.until("the help stays", func(shown string) bool { return !strings.Contains(shown, "Keys") })
	p.keys("q")
	p.back()
}

func TestTmuxShare(t *testing.T) {
	p := newPane(t, 80, 24)
	p.open("afterbeat")
	p.keys("5")
	p.wait("share 0.5")
	p.keys("Up")
	p.wait("share 0.6")
	p.keys("Down", "Down")
	p.wait("share 0.4")
	p.keys("q")
	p.back()
}

// TestTmuxLongRecording opens ten minutes at 125 Hz, of a patient under
// intensive care, with escapes in its name.
func TestTmuxLongRecording(t *testing.T) {
	content, err := os.ReadFile(filepath.Join("..", "..", "..", "shared", "reference-data", "icu_art_ecg_125hz_600s.csv"))
	if err != nil {
		t.Skip("the reference recordings are not here: ", err)
	}
	p := newPane(t, 80, 24)
	if err := os.WriteFile(filepath.Join(p.folder, "a\x1b[2J b.csv"), content, 0o600); err != nil {
		t.Fatal(err)
	}
	p.run("afterbeat a*.csv")
	p.wait(`a\x1b[2J b.csv`)
	p.until("still computing", func(shown string) bool {
		return strings.Contains(shown, " 5 Support ") && strings.Contains(shown, "[3 Fit]")
	})
	p.keys("2")
	p.wait("beat 1 of ")
	p.keys("q")
	p.back()
}

// TestTmuxDemoInEveryStage is the picture of the whole: nothing of one stage is
// left on the next.
func TestTmuxNothingIsLeftOfTheStageBefore(t *testing.T) {
	p := newPane(t, 80, 24)
	p.open("afterbeat")
	p.computed() // from now on no progress is shown
	for range 2 {
		for _, stage := range []string{"1", "2", "3", "4", "5", "6"} {
			p.keys(stage)
			p.wait("[" + stage + " ")
			p.keys("C-l")
			before := p.shown()
			p.until("ctrl+l shows another frame than\n"+before, func(shown string) bool { return shown == before })
		}
	}
	p.keys("q")
	p.back()
}
