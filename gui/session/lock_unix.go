//go:build !windows

package session

import (
	"os"
	"syscall"
)

// takeLock opens a file and locks it until it is closed or the program ends. It
// returns an error if another opening holds the lock.
func takeLock(path string) (*os.File, error) {
	file, err := os.OpenFile(path, os.O_RDWR|os.O_CREATE, 0o600)
	if err != nil {
		return nil, err
	}
	if err := syscall.Flock(int(file.Fd()), syscall.LOCK_EX|syscall.LOCK_NB); err != nil {
		file.Close()
		return nil, err
	}
	return file, nil
}
