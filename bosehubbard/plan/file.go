package plan

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
)

// Load reads and checks the plan in a file. A file that is too large is refused
// without being read.
//
// It returns an error that names the file and wraps fs.ErrNotExist, *SizeError,
// *SyntaxError or Errors.
func Load(path string) (*Document, error) {
	data, err := readFile(path)
	if err != nil {
		return nil, err
	}
	d, err := Open(data)
	if err != nil {
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	return d, nil
}

func readFile(path string) ([]byte, error) {
	file, err := os.Open(path)
	if errors.Is(err, fs.ErrNotExist) {
		return nil, fmt.Errorf("plan: there is no file %s: %w", path, fs.ErrNotExist)
	}
	if err != nil {
		return nil, fmt.Errorf("plan: %s cannot be opened: %w", path, cause(err))
	}
	defer file.Close()
	info, err := file.Stat()
	switch {
	case err != nil:
		return nil, fmt.Errorf("plan: %s cannot be opened: %w", path, cause(err))
	case info.IsDir():
		return nil, fmt.Errorf("plan: %s is a folder, want a file", path)
	case info.Size() > MaxBytes:
		return nil, fmt.Errorf("%s: %w", path, &SizeError{Bytes: info.Size(), Limit: MaxBytes})
	}
	// A pipe has no size beforehand, so the reading is bounded as well.
	data, err := io.ReadAll(io.LimitReader(file, MaxBytes+1))
	if err != nil {
		return nil, fmt.Errorf("plan: %s cannot be read: %w", path, cause(err))
	}
	return data, nil
}

// cause strips the operation and the path, which the message has already.
func cause(err error) error {
	if at, ok := errors.AsType[*fs.PathError](err); ok {
		return at.Err
	}
	if link, ok := errors.AsType[*os.LinkError](err); ok {
		return link.Err
	}
	return err
}

// Save replaces the file at path by data, or creates it. The file is always whole:
// data goes to a temporary file in the same folder, which then takes the name. The
// mode of an old file stays, and so does a symbolic link to it.
//
// It returns an error that names the file if it cannot be written; an old file is
// then as it was.
func Save(path string, data []byte) error {
	if err := save(path, data); err != nil {
		return fmt.Errorf("plan: %s cannot be written: %w", path, cause(err))
	}
	return nil
}

func save(path string, data []byte) error {
	if real, err := filepath.EvalSymlinks(path); err == nil {
		path = real
	}
	old, err := os.Stat(path)
	switch {
	case err != nil:
		old = nil
	case old.IsDir():
		return errors.New("it is a folder")
	case !old.Mode().IsRegular():
		return errors.New("it is a device, want a file")
	case old.Mode()&0o222 == 0:
		return fmt.Errorf("the file is read-only: %w", fs.ErrPermission)
	}
	temporary, err := writeBeside(path, data)
	if err != nil {
		return err
	}
	if old != nil {
		if err := os.Chmod(temporary, old.Mode().Perm()); err != nil {
			os.Remove(temporary)
			return err
		}
	}
	if err := os.Rename(temporary, path); err != nil {
		os.Remove(temporary)
		return err
	}
	syncFolder(filepath.Dir(path))
	return nil
}

// writeBeside writes data to a new file in the folder of path, down to the disk.
func writeBeside(path string, data []byte) (name string, err error) {
	file, err := createBeside(path)
	if err != nil {
		return "", err
	}
	defer func() {
		if err != nil {
			os.Remove(file.Name())
		}
	}()
	_, err = file.Write(data)
	if err == nil {
		err = file.Sync()
	}
	if closing := file.Close(); err == nil {
		err = closing
	}
	return file.Name(), err
}

// createBeside opens a new file next to path. os.CreateTemp would give it mode
// 0600, whatever the user's mask says.
func createBeside(path string) (*os.File, error) {
	const tries = 100
	for i := range tries {
		name := fmt.Sprintf("%s.%d-%d.tmp", path, os.Getpid(), i)
		file, err := os.OpenFile(name, os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o666)
		if !errors.Is(err, fs.ErrExist) {
			return file, err
		}
	}
	return nil, fmt.Errorf("%d temporary files named %s.*.tmp are in the way: %w", tries, path, fs.ErrExist)
}

// syncFolder makes the new name durable where the system can; where it cannot, the
// file itself is on the disk already.
func syncFolder(folder string) {
	if handle, err := os.Open(folder); err == nil {
		_ = handle.Sync()
		handle.Close()
	}
}
