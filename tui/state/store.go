package state

import (
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"sync"
	"time"

	"afterbeat/data/casefile"
	"afterbeat/data/save"
)

// Store is the recovery file of one recording. It may be used from several
// goroutines at once. The nil Store keeps nothing.
type Store struct {
	path string

	mu   sync.Mutex
	last int  // the order of what was written last
	done bool // nothing is kept any more
}

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
	return &Store{path: filepath.Join(folder, hex.EncodeToString(sum[:16])+".afterbeat.toml"), last: -1}
}

// Path is the name of the file.
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

// Kept returns the choices that an interrupted run has left, and when it wrote
// them; ok is false where there are none that can be read.
func (s *Store) Kept() (c casefile.Case, when time.Time, ok bool) {
	if s == nil {
		return c, when, false
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	info, err := os.Lstat(s.path)
	if err != nil || !info.Mode().IsRegular() {
		return c, when, false
	}
	content, err := os.ReadFile(s.path)
	if err != nil {
		return c, when, false
	}
	c, err = casefile.Read(s.path, content)
	return c, info.ModTime(), err == nil
}

// Clear removes the file, of an order as that of [Store.Keep]: there is nothing
// to recover at the moment.
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
	return s.remove()
}

// Remove removes the file for good: nothing is kept after an orderly end.
func (s *Store) Remove() error {
	if s == nil {
		return nil
	}
	s.mu.Lock()
	defer s.mu.Unlock()
	s.done = true
	return s.remove()
}

func (s *Store) remove() error {
	if err := os.Remove(s.path); err != nil && !errors.Is(err, fs.ErrNotExist) {
		return err
	}
	return nil
}
