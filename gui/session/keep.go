package session

import (
	"os"
	"path/filepath"
	"runtime"
	"time"

	"hilltop/bosehubbard/plan"
)

// keepState is what protects the work: the copy of unsaved edits on the disk, the
// copies that earlier runs left, and the watch over the file. It is guarded by
// Session.mu.
type keepState struct {
	own     *copyFile // nil where there is no folder
	due     time.Time // when the copy must be written; zero where it is up to date
	orphans []*copyFile
	retired []*copyFile // orphans whose work was taken over and is not yet in the own copy
}

// DefaultFolder returns the folder for recovery and recent files: under
// XDG_STATE_HOME or ~/.local/state, on macOS and Windows where programs keep such
// files there.
func DefaultFolder() (string, error) {
	if home := os.Getenv("XDG_STATE_HOME"); filepath.IsAbs(home) {
		return filepath.Join(home, "hilltop"), nil
	}
	switch runtime.GOOS {
	case "windows":
		folder, err := os.UserCacheDir()
		return filepath.Join(folder, "Hilltop"), err
	case "darwin", "ios":
		folder, err := os.UserConfigDir()
		return filepath.Join(folder, "Hilltop"), err
	}
	home, err := os.UserHomeDir()
	return filepath.Join(home, ".local", "state", "hilltop"), err
}

// beginKeeping looks for copies of earlier runs and opens an own one. Without a
// folder, or where it cannot be used, nothing is kept and the notice says so.
func (s *Session) beginKeeping() {
	if s.opt.Folder == "" {
		return
	}
	s.recent = readRecent(s.opt.Folder)
	folder := filepath.Join(s.opt.Folder, "recovery")
	if err := os.MkdirAll(folder, 0o700); err != nil {
		s.notice = "No recovery after a crash: " + err.Error()
		return
	}
	s.keep.orphans = adoptOrphans(folder)
	own, err := newCopyFile(folder)
	if err != nil {
		s.notice = "No recovery after a crash: " + err.Error()
		return
	}
	s.keep.own = own
}

// endKeeping removes the own copy and lets go of the others, which the next start
// offers again.
func (s *Session) endKeeping() {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.keep.own != nil {
		s.keep.own.remove()
		s.keep.own = nil
	}
	for _, orphan := range s.keep.orphans {
		orphan.release()
	}
	for _, orphan := range s.keep.retired {
		orphan.remove()
	}
	s.keep.orphans, s.keep.retired = nil, nil
}

// keepSoon notes that the copy on the disk is old. The caller holds mu.
func (s *Session) keepSoon() {
	if s.keep.own == nil {
		return
	}
	if s.keep.due.IsZero() {
		s.keep.due = time.Now().Add(s.opt.Autosave)
	}
	wake(s.wakes.keep)
}

// keepAll writes the copy when it is due and looks at the file now and then.
func (s *Session) keepAll() {
	defer s.wait.Done()
	watch := time.NewTicker(s.opt.Watch)
	defer watch.Stop()
	timer := time.NewTimer(time.Hour)
	defer timer.Stop()
	for {
		select {
		case <-s.ctx.Done():
			return
		case <-watch.C:
			s.watchFile()
		case <-timer.C:
			s.writeCopy()
		case <-s.wakes.keep:
			s.mu.Lock()
			if !s.keep.due.IsZero() {
				timer.Reset(time.Until(s.keep.due))
			}
			s.mu.Unlock()
		}
	}
}

// writeCopy brings the copy up to date: written where there are unsaved edits,
// removed where there are none. Orphans that were taken over go only then, so
// that their work is on the disk at every moment.
func (s *Session) writeCopy() {
	s.mu.Lock()
	s.keep.due = time.Time{}
	own, doc, retired := s.keep.own, s.doc, s.keep.retired
	if own == nil || doc == nil {
		s.mu.Unlock()
		return
	}
	s.keep.retired = nil
	dirty := doc.dirty()
	saved := work{Name: doc.name, Path: doc.path, Time: time.Now(), Text: string(doc.now.Bytes())}
	s.mu.Unlock()
	if !dirty {
		own.empty()
	} else if err := own.write(saved); err != nil {
		s.mu.Lock()
		s.keep.retired = append(s.keep.retired, retired...)
		s.notice = "No recovery copy: " + err.Error()
		s.changed(urgent)
		s.mu.Unlock()
		return
	}
	for _, orphan := range retired {
		orphan.remove()
	}
}

// watchFile notices when another program changes the file.
func (s *Session) watchFile() {
	s.mu.Lock()
	defer s.mu.Unlock()
	if s.doc != nil && s.doc.path != "" && s.doc.disk.look(s.doc.path) {
		s.changed(urgent)
	}
}

// Recover opens the work that an earlier run left. Undo leads back to the file it
// was made from, where that is still there.
//
// It returns an error if there is no such work or it cannot be read; the present
// plan then stays.
func (s *Session) Recover(id string) error {
	s.mu.Lock()
	defer s.mu.Unlock()
	i := s.keep.find(id)
	if i < 0 {
		return os.ErrNotExist
	}
	orphan := s.keep.orphans[i]
	left := orphan.work
	recovered, err := plan.Open([]byte(left.Text))
	if err != nil {
		return err
	}
	doc := &document{name: left.Name, path: left.Path, now: recovered}
	if left.Path != "" {
		if file, err := plan.Load(left.Path); err == nil {
			doc.now, doc.saved = file, file.Bytes()
			doc.disk = stampOf(left.Path, doc.saved)
		}
	}
	s.open(doc)
	s.record("recovered work", "", doc.now, recovered)
	s.keep.orphans = append(s.keep.orphans[:i:i], s.keep.orphans[i+1:]...)
	s.keep.retired = append(s.keep.retired, orphan)
	s.keep.due = time.Now()
	wake(s.wakes.keep)
	s.changed(urgent)
	return nil
}

// DropRecovery deletes the work that an earlier run left.
func (s *Session) DropRecovery(id string) {
	s.mu.Lock()
	defer s.mu.Unlock()
	i := s.keep.find(id)
	if i < 0 {
		return
	}
	s.keep.orphans[i].remove()
	s.keep.orphans = append(s.keep.orphans[:i:i], s.keep.orphans[i+1:]...)
	s.changed(urgent)
}

func (k *keepState) find(id string) int {
	for i, orphan := range k.orphans {
		if orphan.id == id {
			return i
		}
	}
	return -1
}

// offers returns what the view shows of the orphans.
func (k *keepState) offers() []Recovery {
	var out []Recovery
	for _, orphan := range k.orphans {
		out = append(out, Recovery{
			ID: orphan.id, Name: orphan.work.Name, Path: orphan.work.Path, Age: age(time.Since(orphan.work.Time)),
		})
	}
	return out
}
