package main

import (
	"bytes"
	"errors"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"syscall"
	"testing"
	"time"

	"github.com/creack/pty"

	"afterbeat/data/casenote"
)

// binary builds the program, once.
var binary = sync.OnceValues(func() (string, error) {
	folder, err := os.MkdirTemp("", "afterbeat")
	if err != nil {
		return "", err
	}
	path := filepath.Join(folder, "afterbeat")
	out, err := exec.Command("go", "build", "-o", path, ".").CombinedOutput()
	if err != nil {
		return "", errors.New(string(out))
	}
	return path, nil
})

// built is the program, for a test that takes its time.
func built(t *testing.T) string {
	t.Helper()
	if testing.Short() {
		t.Skip("builds and runs the program")
	}
	path, err := binary()
	if err != nil {
		t.Fatal(err)
	}
	return path
}

// patience is how long a test waits for what has to come: a forecast takes two
// seconds of a core, which a busy machine gives to many tests at once.
const patience = 4 * time.Minute

// session is the program on a pseudo-terminal that never answers a question.
type session struct {
	t      *testing.T
	cmd    *exec.Cmd
	tty    *os.File // the side of the person
	state  string
	folder string

	mu   sync.Mutex
	seen bytes.Buffer
	end  chan error
}

// on starts the program in an empty folder, on a terminal of 80x24.
func on(t *testing.T, env []string, args ...string) *session {
	t.Helper()
	s := &session{t: t, state: t.TempDir(), folder: t.TempDir(), end: make(chan error, 1)}
	s.start(env, nil, args...)
	return s
}

// start runs the program with the folders of the session; stdin is the terminal
// where it is nil.
func (s *session) start(env []string, stdin *os.File, args ...string) {
	s.t.Helper()
	person, program, err := pty.Open()
	if err != nil {
		s.t.Skip("no pseudo-terminal: ", err)
	}
	if err := pty.Setsize(person, &pty.Winsize{Cols: 80, Rows: 24}); err != nil {
		s.t.Fatal(err)
	}
	s.cmd = exec.Command(built(s.t), args...)
	s.cmd.Dir = s.folder
	s.cmd.Env = append([]string{
		"TERM=xterm-256color", "LANG=C.UTF-8", "HOME=" + s.folder, "XDG_STATE_HOME=" + s.state, "PATH=" + os.Getenv("PATH"),
	}, env...)
	s.cmd.Stdin, s.cmd.Stdout, s.cmd.Stderr = program, program, program
	if stdin != nil {
		s.cmd.Stdin = stdin
	}
	s.cmd.SysProcAttr = &syscall.SysProcAttr{Setsid: true, Setctty: true, Ctty: 1}
	if err := s.cmd.Start(); err != nil {
		s.t.Fatal(err)
	}
	_ = program.Close()
	s.tty = closable(s.t, person)
	s.t.Cleanup(func() {
		_ = s.cmd.Process.Kill()
		_ = s.tty.Close()
	})
	go func() {
		_, _ = io.Copy(s, s.tty)
		s.end <- s.cmd.Wait()
	}()
}

// closable is a terminal that closes while it is read from: package pty leaves
// it in blocking mode.
func closable(t *testing.T, f *os.File) *os.File {
	t.Helper()
	fd, err := syscall.Dup(int(f.Fd()))
	if err != nil {
		t.Fatal(err)
	}
	syscall.CloseOnExec(fd)
	if err := syscall.SetNonblock(fd, true); err != nil {
		t.Fatal(err)
	}
	_ = f.Close()
	return os.NewFile(uintptr(fd), "terminal")
}

func (s *session) Write(p []byte) (int, error) {
	s.mu.Lock()
	defer s.mu.Unlock()
	return s.seen.Write(p)
}

// output is all that the terminal was sent.
func (s *session) output() string {
	s.mu.Lock()
	defer s.mu.Unlock()
	return s.seen.String()
}

// wait waits until the terminal was sent text.
func (s *session) wait(text string) {
	s.t.Helper()
	for limit := time.Now().Add(patience); !strings.Contains(s.output(), text); time.Sleep(10 * time.Millisecond) {
		if time.Now().After(limit) {
			s.t.Fatalf("no %q in %q", text, s.output())
		}
	}
}

func (s *session) press(keys string) {
	s.t.Helper()
	if _, err := s.tty.WriteString(keys); err != nil {
		s.t.Fatal(err)
	}
}

// exit waits for the end and returns the exit code.
func (s *session) exit() int {
	s.t.Helper()
	select {
	case err := <-s.end:
		var code *exec.ExitError
		if err != nil && !errors.As(err, &code) {
			s.t.Fatal(err)
		}
		return s.cmd.ProcessState.ExitCode()
	case <-time.After(patience):
		s.t.Fatalf("the program goes on: %q", s.output())
		return 0
	}
}

// kept are the recovery files.
func (s *session) kept() []string {
	files, err := filepath.Glob(filepath.Join(s.state, "afterbeat", "*"))
	if err != nil {
		s.t.Fatal(err)
	}
	return files
}

// left checks that the terminal is as it was.
func (s *session) left() {
	s.t.Helper()
	out := s.output()
	for _, sequence := range []string{"\x1b[?1049l", "\x1b[?25h", "\x1b[?2004l"} {
		if !strings.Contains(out, sequence) {
			s.t.Errorf("no %q at the end", sequence)
		}
	}
	if strings.LastIndex(out, "\x1b[?25h") < strings.LastIndex(out, "\x1b[?25l") {
		s.t.Error("the cursor stays hidden")
	}
}

func TestVersionAsksTheTerminalNothing(t *testing.T) {
	s := on(t, nil, "--version")
	if code := s.exit(); code != 0 || strings.Contains(s.output(), "\x1b") || !strings.HasPrefix(s.output(), "afterbeat ") {
		t.Errorf("exit code %d, %q", code, s.output())
	}
}

func TestTheFirstScreenStandsWithoutAnAnswer(t *testing.T) {
	built(t)
	// A question would wait for five seconds at every start; a busy machine is not
	// slow at each of five.
	const starts, asked = 5, 4 * time.Second
	var s *session
	for n := 1; ; n++ {
		begin := time.Now()
		s = on(t, nil)
		s.wait("[3 Fit]")
		took := time.Since(begin)
		if took < asked {
			break
		}
		if n == starts {
			t.Fatalf("the first screen took %v, and no less before", took)
		}
		s.press("q")
		s.exit()
	}
	s.wait(casenote.Caution)
	s.press("q")
	if code := s.exit(); code != 0 || !strings.Contains(s.output(), "afterbeat: nothing was saved") {
		t.Errorf("exit code %d, %q", code, s.output())
	}
	s.left()
	out := s.output()
	for what, sequence := range map[string]string{
		"asks for a colour": "\x1b]1", "asks for the cursor": "\x1b[6n", "names the window": "\x1b]0", "writes to the clipboard": "\x1b]52",
		"takes the mouse": "\x1b[?1002h",
	} {
		if strings.Contains(out, sequence) {
			t.Errorf("%s: %q", what, out)
		}
	}
}

func TestADumbTerminalGetsTheNote(t *testing.T) {
	for _, term := range []string{"TERM=dumb", "TERM="} {
		s := on(t, []string{term})
		if code := s.exit(); code != 0 || strings.Contains(s.output(), "\x1b") || !strings.Contains(s.output(), "Note of a study") {
			t.Errorf("%s: exit code %d, %.300q", term, code, s.output())
		}
	}
}

// changed is a session with a choice made that is not saved.
func changed(t *testing.T, args ...string) *session {
	s := on(t, nil, args...)
	s.wait("used: ")
	s.press("1i")
	s.wait("nvert")
	return s
}

func TestEndsThatKeepTheChoices(t *testing.T) {
	for name, end := range map[string]func(*session){
		"ctrl+c": func(s *session) { s.press("\x03") },
		"TERM":   func(s *session) { _ = s.cmd.Process.Signal(syscall.SIGTERM) },
		"INT":    func(s *session) { _ = s.cmd.Process.Signal(syscall.SIGINT) },
		"HUP":    func(s *session) { _ = s.cmd.Process.Signal(syscall.SIGHUP) },
	} {
		s := changed(t)
		end(s)
		if code := s.exit(); code != exitInterrupted {
			t.Errorf("%s: exit code %d", name, code)
		}
		s.left()
		if !strings.Contains(s.output(), "afterbeat: interrupted; nothing was saved; the choices made since are offered at the next start") {
			t.Errorf("%s: %q", name, s.output())
		}
		files := s.kept()
		if len(files) != 1 {
			t.Fatalf("%s: kept %v", name, files)
		}
		info, err := os.Stat(files[0])
		if err != nil || info.Mode().Perm() != 0o600 {
			t.Errorf("%s: %v, %v", name, info.Mode(), err)
		}
	}
}

func TestALostConnectionKeepsTheChoices(t *testing.T) {
	s := changed(t)
	_ = s.tty.Close()
	s.exit()
	if len(s.kept()) != 1 {
		t.Fatalf("kept %v", s.kept())
	}
	s.seen.Reset()
	s.start(nil, nil)
	s.wait("Choices of an interrupted run")
	s.press("r")
	s.wait("the choices of the interrupted run")
	s.press("q")
	s.wait("y discard")
	s.press("y")
	if code := s.exit(); code != 0 || len(s.kept()) != 0 {
		t.Errorf("exit code %d, kept %v", code, s.kept())
	}
}

func TestNoState(t *testing.T) {
	s := changed(t, "--no-state")
	s.press("\x03")
	if code := s.exit(); code != exitInterrupted || len(s.kept()) != 0 || !strings.Contains(s.output(), "are discarded") {
		t.Errorf("exit code %d, kept %v", code, s.kept())
	}
}

func TestNobodyCanWakeALeader(t *testing.T) {
	s := on(t, nil)
	s.wait("used: ")
	s.press("\x1a")
	s.wait("no shell to return to")
	s.press("q")
	if code := s.exit(); code != 0 {
		t.Errorf("exit code %d", code)
	}
}

func TestPlainTerminals(t *testing.T) {
	for _, c := range []struct {
		env    []string
		args   []string
		ascii  bool
		colour bool
	}{
		{nil, nil, false, true},
		{[]string{"NO_COLOR=1"}, nil, false, false},
		{nil, []string{"--no-color"}, false, false},
		{[]string{"LANG=C"}, nil, true, true},
		{nil, []string{"--ascii"}, true, true},
	} {
		s := on(t, c.env, c.args...)
		s.wait("used: ")
		s.press("5")
		s.wait("late-valve")
		s.press("q")
		s.exit()
		out := s.output()
		if got := strings.IndexFunc(out, func(r rune) bool { return r >= 0x80 }) < 0; got != c.ascii {
			t.Errorf("%v %v: ASCII %v, want %v", c.env, c.args, got, c.ascii)
		}
		if got := coloured(out); got && !c.colour {
			t.Errorf("%v %v: has colours", c.env, c.args)
		}
	}
}

// coloured tells whether output holds a sequence for colours.
func coloured(out string) bool {
	for rest, found := out, true; found; {
		if _, rest, found = strings.Cut(rest, "\x1b["); found {
			if end := strings.TrimLeft(rest, "0123456789;"); strings.HasPrefix(end, "m") {
				return true
			}
		}
	}
	return false
}

func TestStandardInputAndKeysFromTheTerminal(t *testing.T) {
	content, err := os.ReadFile(filepath.Join("..", "..", "data", "demo", "demo.csv"))
	if err != nil {
		t.Fatal(err)
	}
	read, write, err := os.Pipe()
	if err != nil {
		t.Fatal(err)
	}
	go func() {
		_, _ = write.Write(content)
		_ = write.Close()
	}()
	s := &session{t: t, state: t.TempDir(), folder: t.TempDir(), end: make(chan error, 1)}
	s.start(nil, read, "-")
	s.wait("standard input")
	s.wait("used: ")
	s.press("q")
	if code := s.exit(); code != 0 {
		t.Errorf("exit code %d, %q", code, s.output())
	}
}

func TestABrokenRecordingLeavesNoScreen(t *testing.T) {
	s := &session{t: t, state: t.TempDir(), folder: t.TempDir(), end: make(chan error, 1)}
	if err := os.WriteFile(filepath.Join(s.folder, "bad.csv"), []byte("time_s,abp_mmHg\n0,80\n0.1,eighty\n"), 0o600); err != nil {
		t.Fatal(err)
	}
	s.start(nil, nil, "bad.csv")
	if code := s.exit(); code != exitFile || !strings.Contains(s.output(), "afterbeat: bad.csv:3: ") {
		t.Errorf("exit code %d, %q", code, s.output())
	}
	s.left()
}
