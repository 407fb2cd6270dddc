//go:build unix

package save

import (
	"errors"
	"io/fs"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"syscall"
	"testing"
)

func ownerOnly(t *testing.T, path string) {
	t.Helper()
	info, err := os.Stat(path)
	if err != nil {
		t.Fatal(err)
	}
	if info.Mode() != 0o600 {
		t.Errorf("%s has mode %v, want 0600", path, info.Mode())
	}
}

func TestModeDoesNotDependOnTheUmask(t *testing.T) {
	for _, umask := range []int{0, 0o777} {
		for way, link := range ways {
			path := filepath.Join(t.TempDir(), "a.txt")
			old := syscall.Umask(umask)
			err := file(path, []byte("new"), false, link)
			syscall.Umask(old)
			if err != nil {
				t.Fatalf("umask %o, %s: %v", umask, way, err)
			}
			ownerOnly(t, path)
		}
	}
}

func TestFolderThatMayNotBeWrittenTo(t *testing.T) {
	if os.Geteuid() == 0 {
		t.Skip("root may write everywhere")
	}
	dir := t.TempDir()
	if err := os.Chmod(dir, 0o500); err != nil {
		t.Fatal(err)
	}
	for _, replace := range []bool{false, true} {
		if err := File(filepath.Join(dir, "a.txt"), []byte("new"), replace); !errors.Is(err, fs.ErrPermission) {
			t.Errorf("replace %v: error %v", replace, err)
		}
	}
}

// A disk that fills up is played by a limit on the size of files, which a
// shell sets before it runs this test binary again.
func TestFullDiskLeavesNothingBehind(t *testing.T) {
	if dir := os.Getenv("AFTERBEAT_FULL_DISK"); dir != "" {
		saveOnFullDisk(t, dir)
		return
	}
	self, err := os.Executable()
	if err != nil {
		t.Fatal(err)
	}
	dir := t.TempDir()
	write(t, filepath.Join(dir, "old.txt"), "old")
	cmd := exec.Command("sh", "-c", `ulimit -f 8 && exec "$0" -test.run '^TestFullDiskLeavesNothingBehind$' -test.v`, self)
	cmd.Env = append(os.Environ(), "AFTERBEAT_FULL_DISK="+dir)
	out, err := cmd.CombinedOutput()
	if err != nil || !strings.Contains(string(out), "three saves failed") {
		t.Errorf("%v\n%s", err, out)
	}
	if got := names(t, dir); got != "old.txt" || read(t, filepath.Join(dir, "old.txt")) != "old" {
		t.Errorf("the folder holds %q", got)
	}
}

func saveOnFullDisk(t *testing.T, dir string) {
	big := make([]byte, 1<<20)
	for _, c := range []struct {
		name    string
		replace bool
		link    func(from, to string) error
	}{{"new.txt", false, os.Link}, {"new.txt", false, noLinks}, {"old.txt", true, os.Link}} {
		err := file(filepath.Join(dir, c.name), big, c.replace, c.link)
		if err == nil || !strings.Contains(err.Error(), "not saved") {
			t.Fatalf("%s, replace %v: error %v", c.name, c.replace, err)
		}
	}
	// Straight to the name, without the temporary file failing first.
	if err := exclusive(filepath.Join(dir, "new.txt"), big); err == nil {
		t.Fatal("a file larger than the disk was written")
	}
	t.Log("three saves failed, as they should")
}
