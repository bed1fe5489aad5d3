package session

import (
	"crypto/rand"
	"encoding/json"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strings"
	"time"

	"hilltop/bosehubbard/plan"
)

// work is the content of a recovery copy.
type work struct {
	Name string    `json:"name"`
	Path string    `json:"path,omitempty"` // of the document
	Time time.Time `json:"time"`
	Text string    `json:"text"` // of the plan, byte for byte
}

// copyFile is one recovery copy, ID.json, and the lock ID.lock that a running
// program holds on it. The system drops the lock when the program dies, however
// that happens, so a copy whose lock can be had is an orphan.
type copyFile struct {
	id   string
	path string
	lock *os.File
	work work
}

const (
	copySuffix = ".json"
	lockSuffix = ".lock"
)

// newCopyFile takes a new name in the folder. Nothing but the lock is written yet.
func newCopyFile(folder string) (*copyFile, error) {
	id := rand.Text()
	c := &copyFile{id: id, path: filepath.Join(folder, id)}
	lock, err := takeLock(c.path + lockSuffix)
	if err != nil {
		return nil, fmt.Errorf("session: recovery lock: %w", err)
	}
	c.lock = lock
	return c, nil
}

// adoptOrphans takes the lock of every copy that no program holds and reads it.
// Copies that hold no plan any more are left alone.
func adoptOrphans(folder string) []*copyFile {
	names, _ := filepath.Glob(filepath.Join(folder, "*"+copySuffix))
	var out []*copyFile
	for _, name := range names {
		path := strings.TrimSuffix(name, copySuffix)
		lock, err := takeLock(path + lockSuffix)
		if err != nil {
			continue
		}
		c := &copyFile{id: filepath.Base(path), path: path, lock: lock}
		if c.read() != nil {
			c.release()
			continue
		}
		out = append(out, c)
	}
	sweepLocks(folder)
	return out
}

// sweepLocks removes the locks of programs that died without unsaved work.
func sweepLocks(folder string) {
	names, _ := filepath.Glob(filepath.Join(folder, "*"+lockSuffix))
	for _, name := range names {
		if _, err := os.Stat(strings.TrimSuffix(name, lockSuffix) + copySuffix); err == nil {
			continue
		}
		if info, err := os.Stat(name); err != nil || time.Since(info.ModTime()) < time.Hour {
			continue
		}
		if lock, err := takeLock(name); err == nil {
			os.Remove(name)
			lock.Close()
		}
	}
}

func (c *copyFile) read() error {
	data, err := os.ReadFile(c.path + copySuffix)
	if err != nil {
		return err
	}
	if err := json.Unmarshal(data, &c.work); err != nil {
		return err
	}
	_, err = plan.Parse([]byte(c.work.Text))
	return err
}

// write replaces the copy, as a whole or not at all.
func (c *copyFile) write(w work) error {
	data, err := json.Marshal(w)
	if err != nil {
		return fmt.Errorf("session: recovery copy: %w", err)
	}
	return plan.Save(c.path+copySuffix, data)
}

// empty removes the copy and keeps its name.
func (c *copyFile) empty() { os.Remove(c.path + copySuffix) }

// remove deletes the copy and its lock.
func (c *copyFile) remove() {
	c.empty()
	c.lock.Close()
	os.Remove(c.path + lockSuffix)
}

// release lets another program have the copy.
func (c *copyFile) release() { c.lock.Close() }

// age words how long ago something was.
func age(d time.Duration) string {
	for _, step := range []struct {
		unit time.Duration
		name string
	}{{24 * time.Hour, "day"}, {time.Hour, "hour"}, {time.Minute, "minute"}} {
		if n := int(math.Floor(float64(d) / float64(step.unit))); n > 1 {
			return fmt.Sprintf("%d %ss ago", n, step.name)
		} else if n == 1 {
			return "1 " + step.name + " ago"
		}
	}
	return "less than a minute ago"
}
