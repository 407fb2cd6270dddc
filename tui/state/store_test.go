package state

import (
	"io/fs"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"sync"
	"testing"
	"time"

	"github.com/google/go-cmp/cmp"
	"github.com/google/go-cmp/cmp/cmpopts"

	"afterbeat/data/casefile"
)

func choices(label string) casefile.Case {
	return casefile.Case{
		Recording: "pilot.csv", Label: label, Invert: []string{"q"},
		Site: map[string]string{"abp": "root"}, Drop: []float64{1.25},
	}
}

func TestFolder(t *testing.T) {
	for _, c := range []struct{ xdg, home, want string }{
		{"/x/state", "/home/u", "/x/state/afterbeat"},
		{"", "/home/u", "/home/u/.local/state/afterbeat"},
		{"relative", "/home/u", "/home/u/.local/state/afterbeat"}, // XDG: "consider the path invalid"
		{"", "", ""},
	} {
		env := map[string]string{"XDG_STATE_HOME": c.xdg, "HOME": c.home}
		got, err := Folder(func(k string) string { return env[k] })
		if got != c.want || (err != nil) != (c.want == "") {
			t.Errorf("%+v: %q, %v", c, got, err)
		}
	}
}

func TestKeepAndRecover(t *testing.T) {
	folder := filepath.Join(t.TempDir(), "a", "afterbeat")
	s := New(folder, "/data/pilot.csv")
	if _, _, ok := s.Kept(); ok {
		t.Error("something is kept before anything was")
	}
	want := choices("pilot-07")
	if err := s.Keep(1, want); err != nil {
		t.Fatal(err)
	}
	got, when, ok := New(folder, "/data/pilot.csv").Kept()
	if d := cmp.Diff(want, got, cmpopts.IgnoreUnexported(casefile.Case{}), cmpopts.EquateEmpty()); !ok || d != "" || when.IsZero() {
		t.Errorf("ok %v, at %v (-kept +recovered)\n%s", ok, when, d)
	}
	if _, _, ok := New(folder, "/data/other.csv").Kept(); ok {
		t.Error("the choices of one recording are offered for another")
	}
	if strings.Contains(s.Path(), "pilot") {
		t.Errorf("the name tells of the recording: %s", s.Path())
	}
}

func TestNobodyElseMayRead(t *testing.T) {
	folder := filepath.Join(t.TempDir(), "afterbeat")
	if err := os.Mkdir(folder, 0o755); err != nil {
		t.Fatal(err)
	}
	s := New(folder, "k")
	if err := s.Keep(1, choices("p1")); err != nil {
		t.Fatal(err)
	}
	for path, want := range map[string]fs.FileMode{folder: 0o700, s.Path(): 0o600} {
		info, err := os.Stat(path)
		if err != nil || info.Mode().Perm() != want {
			t.Errorf("%s: %v, %v, want %v", path, info.Mode().Perm(), err, want)
		}
	}
	if list, _ := os.ReadDir(folder); len(list) != 1 {
		t.Errorf("left behind: %v", list)
	}
}

func TestTheLatestChoicesWin(t *testing.T) {
	s := New(t.TempDir(), "k")
	var wg sync.WaitGroup
	for order := range 20 {
		wg.Go(func() {
			if err := s.Keep(order, choices("p"+string(rune('a'+order))+"1")); err != nil {
				t.Error(err)
			}
		})
	}
	wg.Wait()
	if c, _, ok := s.Kept(); !ok || c.Label != "pt1" {
		t.Errorf("kept %q, %v", c.Label, ok)
	}
}

func TestNothingIsKeptAfterAnOrderlyEnd(t *testing.T) {
	s := New(t.TempDir(), "k")
	must := func(err error) {
		t.Helper()
		if err != nil {
			t.Fatal(err)
		}
	}
	gone := func(when string) {
		t.Helper()
		if _, err := os.Stat(s.Path()); err == nil {
			t.Errorf("the file stands %s", when)
		}
	}
	must(s.Keep(1, choices("p1")))
	must(s.Clear(2))
	gone("after Clear")
	must(s.Keep(1, choices("p1")))
	gone("after a late Keep")
	must(s.Keep(3, choices("p1")))
	must(s.Remove())
	must(s.Remove())
	must(s.Keep(4, choices("p1")))
	gone("after Remove")
}

// under is what a session of another process has left in the folder of s.
func under(t *testing.T, s *Store, process, label string, age time.Duration) string {
	t.Helper()
	path := filepath.Join(filepath.Dir(s.Path()), s.stem+"-"+process+"-OTHER"+suffix)
	if err := os.WriteFile(path, casefile.Write(choices(label)), 0o600); err != nil {
		t.Fatal(err)
	}
	at := time.Now().Add(-age)
	if err := os.Chtimes(path, at, at); err != nil {
		t.Fatal(err)
	}
	return path
}

func TestSessionsLeaveEachOthersFilesAlone(t *testing.T) {
	first := New(t.TempDir(), "k")
	second := New(filepath.Dir(first.Path()), "k")
	live := under(t, first, strconv.Itoa(os.Getppid()), "live-1", 0)
	if _, _, ok := second.Kept(); ok {
		t.Error("the choices of a session that runs are offered")
	}
	for _, end := range []func() error{second.Drop, func() error { return second.Clear(1) }, second.Remove} {
		if err := end(); err != nil {
			t.Error(err)
		}
	}
	if _, err := os.Stat(live); err != nil {
		t.Errorf("the file of another session is gone: %v", err)
	}
	if err := first.Keep(1, choices("p1")); err != nil {
		t.Fatal(err)
	}
	if err := second.Remove(); err != nil {
		t.Fatal(err)
	}
	if _, err := os.Stat(first.Path()); err != nil {
		t.Errorf("the file of the first session is gone: %v", err)
	}
}

func TestTheLatestThatWasLeftIsOfferedFirst(t *testing.T) {
	s := New(t.TempDir(), "k")
	const nobody = "999999999" // above the greatest number of a process
	older, newer := under(t, s, nobody+"1", "older-1", time.Hour), under(t, s, nobody, "newer-1", time.Minute)
	for _, want := range []string{"newer-1", "older-1"} {
		if c, _, ok := s.Kept(); !ok || c.Label != want {
			t.Errorf("offered %q, %v, want %q", c.Label, ok, want)
		}
		if err := s.Drop(); err != nil {
			t.Fatal(err)
		}
	}
	for _, path := range []string{older, newer} {
		if _, err := os.Stat(path); err == nil {
			t.Errorf("answered, and still there: %s", path)
		}
	}
}

func TestNoFolderIsAnErrorInWords(t *testing.T) {
	file := filepath.Join(t.TempDir(), "file")
	if err := os.WriteFile(file, nil, 0o600); err != nil {
		t.Fatal(err)
	}
	if err := New(filepath.Join(file, "afterbeat"), "k").Keep(1, choices("p1")); err == nil || !strings.Contains(err.Error(), "kept") {
		t.Error(err)
	}
}

func TestABrokenFileIsNotOffered(t *testing.T) {
	s := New(t.TempDir(), "k")
	for _, content := range []string{"", "recording = ", "\x00"} {
		if err := os.WriteFile(s.Path(), []byte(content), 0o600); err != nil {
			t.Fatal(err)
		}
		if _, _, ok := s.Kept(); ok {
			t.Errorf("%q is offered", content)
		}
	}
}

func TestNoStore(t *testing.T) {
	var s *Store
	_, _, ok := s.Kept()
	if ok || s.Keep(1, choices("p1")) != nil || s.Clear(1) != nil || s.Remove() != nil || s.Drop() != nil || s.Path() != "" {
		t.Error("the nil store does something")
	}
}
