package save

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"sync"
	"testing"

	"afterbeat/data"
)

// names lists what a folder holds, hidden files included.
func names(t *testing.T, dir string) string {
	t.Helper()
	entries, err := os.ReadDir(dir)
	if err != nil {
		t.Fatal(err)
	}
	var s []string
	for _, e := range entries {
		s = append(s, e.Name())
	}
	return strings.Join(s, " ")
}

func read(t *testing.T, path string) string {
	t.Helper()
	b, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	return string(b)
}

func write(t *testing.T, path, content string) {
	t.Helper()
	if err := os.WriteFile(path, []byte(content), 0o644); err != nil {
		t.Fatal(err)
	}
}

// noLinks is a file system without hard links.
func noLinks(_, _ string) error {
	return &os.LinkError{Op: "link", Err: errors.ErrUnsupported}
}

// ways are the two ways in which a file gets its name.
var ways = map[string]func(from, to string) error{"link": os.Link, "without links": noLinks}

func TestSavesANewFileForTheOwnerOnly(t *testing.T) {
	for way, link := range ways {
		t.Run(way, func(t *testing.T) {
			dir := t.TempDir()
			path := filepath.Join(dir, "a.note.txt")
			content := strings.Repeat("0123456789\n", 100_000)
			if err := file(path, []byte(content), false, link); err != nil {
				t.Fatal(err)
			}
			if read(t, path) != content {
				t.Error("the content did not come back")
			}
			if got := names(t, dir); got != "a.note.txt" {
				t.Errorf("the folder holds %q", got)
			}
			ownerOnly(t, path)
		})
	}
}

func TestExistingFileIsLeftAlone(t *testing.T) {
	for way, link := range ways {
		t.Run(way, func(t *testing.T) {
			dir := t.TempDir()
			path := filepath.Join(dir, "a.txt")
			write(t, path, "old")
			err := file(path, []byte("new"), false, link)
			var fe *data.FileError
			if !errors.As(err, &fe) || !errors.Is(err, fs.ErrExist) || !strings.Contains(fe.Hint, "--replace") || fe.File != path {
				t.Errorf("error %v does not say that the file exists and how to replace it", err)
			}
			if read(t, path) != "old" || names(t, dir) != "a.txt" {
				t.Errorf("the folder holds %q, the file %q", names(t, dir), read(t, path))
			}
		})
	}
}

// The name may be taken after the first look at it: the link still refuses.
func TestNameTakenMeanwhile(t *testing.T) {
	for way, link := range ways {
		t.Run(way, func(t *testing.T) {
			dir := t.TempDir()
			path := filepath.Join(dir, "a.txt")
			err := file(path, []byte("new"), false, func(from, to string) error {
				write(t, path, "theirs")
				return link(from, to)
			})
			if !errors.Is(err, fs.ErrExist) || read(t, path) != "theirs" || names(t, dir) != "a.txt" {
				t.Errorf("error %v, file %q, folder %q", err, read(t, path), names(t, dir))
			}
		})
	}
}

func TestReplaceKeepsNoOldMode(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "a.txt")
	write(t, path, "old and longer")
	if err := File(path, []byte("new"), true); err != nil {
		t.Fatal(err)
	}
	if read(t, path) != "new" || names(t, dir) != "a.txt" {
		t.Errorf("the folder holds %q, the file %q", names(t, dir), read(t, path))
	}
	ownerOnly(t, path)
	if err := File(filepath.Join(dir, "b.txt"), []byte("first"), true); err != nil {
		t.Errorf("replacing what is not there: %v", err)
	}
}

func TestRefusedTargets(t *testing.T) {
	dir := t.TempDir()
	in := func(name string) string { return filepath.Join(dir, name) }
	write(t, in("old.txt"), "old")
	if err := os.Mkdir(in("folder"), 0o700); err != nil {
		t.Fatal(err)
	}
	for name, to := range map[string]string{"link.txt": "old.txt", "dangling.txt": "nowhere.txt"} {
		if err := os.Symlink(to, in(name)); err != nil {
			t.Skipf("no symbolic links here: %v", err)
		}
	}
	before := names(t, dir)
	for _, c := range []struct{ path, want string }{
		{"", "no name to save under"},
		{in("folder"), "is a folder"},
		{in("folder") + "/", "is a folder"},
		{in("link.txt"), "is a symbolic link"},
		{in("dangling.txt"), "is a symbolic link"},
		{in("missing/a.txt"), "there is no folder"},
		{in("missing") + "/", "there is no folder"},
		{in("old.txt/a.txt"), "not saved"},
		{in(strings.Repeat("n", 300)), "not saved"},
		{in("nul\x00.txt"), "not saved"},
		{os.DevNull, "is not a regular file"},
	} {
		for _, replace := range []bool{false, true} {
			err := File(c.path, []byte("new"), replace)
			var fe *data.FileError
			if !errors.As(err, &fe) || !strings.Contains(err.Error(), c.want) || strings.Contains(err.Error(), ".afterbeat-") {
				t.Errorf("%q, replace %v: error %v, want %q", c.path, replace, err, c.want)
			}
		}
	}
	if got := names(t, dir); got != before || read(t, in("old.txt")) != "old" {
		t.Errorf("the folder holds %q, before %q", got, before)
	}
}

func TestOneOfManySaversWins(t *testing.T) {
	for way, link := range ways {
		t.Run(way, func(t *testing.T) {
			dir := t.TempDir()
			path := filepath.Join(dir, "a.txt")
			const savers = 20
			errs := make([]error, savers)
			var start, done sync.WaitGroup
			start.Add(1)
			for i := range savers {
				done.Go(func() {
					start.Wait()
					errs[i] = file(path, fmt.Appendf(nil, "saver %d", i), false, link)
				})
			}
			start.Done()
			done.Wait()
			winners := 0
			for i, err := range errs {
				switch {
				case err == nil:
					winners++
					if got := read(t, path); got != fmt.Sprintf("saver %d", i) {
						t.Errorf("saver %d won, the file says %q", i, got)
					}
				case !errors.Is(err, fs.ErrExist):
					t.Error(err)
				}
			}
			if winners != 1 || names(t, dir) != "a.txt" {
				t.Errorf("%d savers won, the folder holds %q", winners, names(t, dir))
			}
		})
	}
}
