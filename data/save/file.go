package save

import (
	"errors"
	"io/fs"
	"os"
	"path/filepath"

	"afterbeat/data"
)

// mode lets the owner read and write, and nobody else: what is saved comes
// from confidential recordings. It is set on the open file, so that the umask
// has no say.
const mode = 0o600

// File saves content under path. Without replace it fails if there is anything
// of that name; with replace it takes the place of a regular file, whose mode
// is not kept, and fails on a folder, a symbolic link or a device.
//
// Every error is a [data.FileError] with path as given, and leaves the folder
// as it was.
func File(path string, content []byte, replace bool) error {
	return file(path, content, replace, os.Link)
}

// file is [File] with the call that gives a finished file its name.
func file(path string, content []byte, replace bool, link func(from, to string) error) error {
	if err := vacant(path, replace); err != nil {
		return err
	}
	finished, err := temporary(filepath.Dir(path), content)
	if err != nil {
		return failed(path, err)
	}
	defer os.Remove(finished)
	switch {
	case replace:
		err = os.Rename(finished, path)
	default:
		err = link(finished, path)
		if err != nil && !errors.Is(err, fs.ErrExist) {
			err = exclusive(path, content)
		}
	}
	if errors.Is(err, fs.ErrExist) {
		return exists(path)
	}
	if err != nil {
		return failed(path, err)
	}
	settle(filepath.Dir(path))
	return nil
}

// vacant reports what stands in the way of a file of the name path.
func vacant(path string, replace bool) error {
	if path == "" {
		return &data.FileError{File: path, What: "no name to save under"}
	}
	info, err := os.Lstat(path)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return noFolder(path)
	case err != nil:
		return failed(path, err)
	case info.IsDir():
		return &data.FileError{File: path, What: "is a folder", Hint: "name a file in it"}
	case info.Mode()&fs.ModeSymlink != 0:
		return &data.FileError{File: path, What: "is a symbolic link", Hint: "name the file it leads to"}
	case !info.Mode().IsRegular():
		return &data.FileError{File: path, What: "is not a regular file"}
	case !replace:
		return exists(path)
	}
	return nil
}

// noFolder reports a folder that is missing; nil where it is there.
func noFolder(path string) error {
	dir := filepath.Dir(path)
	if _, err := os.Stat(dir); errors.Is(err, fs.ErrNotExist) {
		return &data.FileError{File: path, What: "there is no folder " + data.Clean(dir).String(), Hint: "make the folder first"}
	}
	return nil
}

// temporary writes content to a new file in dir, down to the disk, and returns
// its name; after an error the file is gone.
func temporary(dir string, content []byte) (string, error) {
	f, err := os.CreateTemp(dir, ".afterbeat-*.tmp")
	if err != nil {
		return "", err
	}
	return f.Name(), fill(f, content)
}

// exclusive writes content straight to path, which must not exist.
func exclusive(path string, content []byte) error {
	f, err := os.OpenFile(path, os.O_WRONLY|os.O_CREATE|os.O_EXCL, mode)
	if err != nil {
		return err
	}
	return fill(f, content)
}

// fill writes, syncs and closes f; after an error it removes it.
func fill(f *os.File, content []byte) error {
	err := f.Chmod(mode)
	if err == nil {
		_, err = f.Write(content)
	}
	if err == nil {
		err = f.Sync()
	}
	if closing := f.Close(); err == nil {
		err = closing
	}
	if err != nil {
		os.Remove(f.Name())
	}
	return err
}

// settle brings the entry in dir to the disk. Not every system can; an error
// is passed over, because the file is whole and has its name, and only a power
// cut could still take the name away.
func settle(dir string) {
	d, err := os.Open(dir)
	if err != nil {
		return
	}
	_ = d.Sync()
	_ = d.Close()
}

func exists(path string) error {
	return &data.FileError{
		File: path, What: "not saved", Err: fs.ErrExist,
		Hint: "choose another name, or add --replace to write over it",
	}
}

// failed wraps an error of the system without the name of the temporary file.
func failed(path string, err error) error {
	var onPath *fs.PathError
	var onLink *os.LinkError
	switch {
	case errors.As(err, &onPath):
		err = onPath.Err
	case errors.As(err, &onLink):
		err = onLink.Err
	}
	return &data.FileError{File: path, What: "not saved", Err: err}
}
