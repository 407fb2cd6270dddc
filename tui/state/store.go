package state

import (
	"crypto/rand"
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"sync"
	"time"

	"afterbeat/data/casefile"
	"afterbeat/data/save"
)

// Store is the recovery file of one session on one recording. It may be used
// from several goroutines at once. The nil Store keeps nothing.
//
// Every session writes a file of its own, named KEY-PROCESS-TOKEN, so that two
// on the same recording leave each other's alone.
type Store struct {
	path string // of what this session writes
	stem string // that the files of all sessions on the recording begin with

	mu    sync.Mutex
	last  int    // the order of what was written last
	done  bool   // nothing is kept any more
	found string // the file that Kept has read; empty where there is none
}

const suffix = ".afterbeat.toml"

// Folder is where recovery files lie, by the environment; the error says what
// is missing.
func Folder(env func(string) string) (string, error) {
	base := env("XDG_STATE_HOME")
	if !filepath.IsAbs(base) { // the specification has it passed over
		home := env("HOME")
		if !filepath.IsAbs(home) {
			return "", errors.New("neither XDG_STATE_HOME nor HOME names a folder")
		}
		base = filepath.Join(home, ".local", "state")
	}
	return filepath.Join(base, "afterbeat"), nil
}

// New is the store in folder of what key stands for: an absolute path, or a
// hash of the content. Nothing is made on the disk before the first Keep.
func New(folder, key string) *Store {
	sum := sha256.Sum256([]byte(key))
	stem := hex.EncodeToString(sum[:16])
	name := fmt.Sprintf("%s-%d-%s%s", stem, os.Getpid(), rand.Text()[:8], suffix)
	return &Store{path: filepath.Join(folder, name), stem: stem, last: -1}
}

// Path is the name of the file that this session writes.
func (s *Store) Path() string {
	if s == nil {
		return ""
	}
	return s.path
}

// Keep writes the choices, in place of those of a lower order; those of a
// higher one stay. It does nothing after Remove.
func (s *Store) Keep(order int, c casefile.Case) error {
	if s == nil {
		return nil
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.done || order < s.last {
		return nil
	}
	if err := private(filepath.Dir(s.path)); err != nil {
		return fmt.Errorf("choices cannot be kept for a restart: %w", err)
	}
	if err := save.File(s.path, casefile.Write(c), true); err != nil {
		return fmt.Errorf("choices cannot be kept for a restart: %w", err)
	}
	s.last = order
	return nil
}

// private makes the folder where it is missing, and keeps others out of it.
func private(folder string) error {
	if err := os.MkdirAll(folder, 0o700); err != nil {
		return err
	}
	info, err := os.Stat(folder)
	if err != nil || info.Mode().Perm() == 0o700 {
		return err
	}
	return os.Chmod(folder, 0o700)
}

// Kept returns the choices that an interrupted session has left, the latest
// where there are several, and when it wrote them; ok is false where there are
// none that can be read. Those of a session that still runs are not left.
func (s *Store) Kept() (c casefile.Case, when time.Time, ok bool) {
	if s == nil {
		return c, when, false
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	s.found = ""
	folder := filepath.Dir(s.path)
	list, _ := os.ReadDir(folder) // a folder that cannot be read offers nothing
	for _, entry := range list {
		name := entry.Name()
		if !s.left(name) {
			continue
		}
		path := filepath.Join(folder, name)
		got, at, readable := read(path)
		if readable && (!ok || at.After(when)) {
			c, when, ok, s.found = got, at, true, path
		}
	}
	return c, when, ok
}

// left tells whether a file is of this recording, and of no session that runs
// beside this one.
func (s *Store) left(name string) bool {
	rest, of := strings.CutPrefix(name, s.stem)
	rest, whole := strings.CutSuffix(rest, suffix)
	if !of || !whole {
		return false
	}
	process, _, _ := strings.Cut(strings.TrimPrefix(rest, "-"), "-")
	id, err := strconv.Atoi(process)
	return err != nil || id == os.Getpid() || !runs(id)
}

func read(path string) (c casefile.Case, when time.Time, ok bool) {
	info, err := os.Lstat(path)
	if err != nil || !info.Mode().IsRegular() {
		return c, when, false
	}
	content, err := os.ReadFile(path)
	if err != nil {
		return c, when, false
	}
	c, err = casefile.Read(path, content)
	return c, info.ModTime(), err == nil
}

// Clear removes the file of this session, of an order as that of [Store.Keep]:
// there is nothing to recover at the moment.
func (s *Store) Clear(order int) error {
	if s == nil {
		return nil
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.done || order < s.last {
		return nil
	}
	s.last = order
	return remove(s.path)
}

// Remove removes the file of this session for good: nothing is kept after an
// orderly end. What another session has left stays.
func (s *Store) Remove() error {
	if s == nil {
		return nil
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	s.done = true
	return remove(s.path)
}

// Drop removes the file that Kept has read: somebody has answered for it.
func (s *Store) Drop() error {
	if s == nil {
		return nil
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.found == "" || s.found == s.path {
		return nil
	}
	return remove(s.found)
}

func remove(path string) error {
	if err := os.Remove(path); err != nil && !errors.Is(err, fs.ErrNotExist) {
		return err
	}
	return nil
}
