package gui

import (
	"errors"
	"path/filepath"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/dialog"
	"fyne.io/fyne/v2/storage"

	"hilltop/gui/session"
)

// openFirst opens the plan that the window begins with: the demo where there is no
// path, or where its plan cannot be opened, which is then said.
func (w *Window) openFirst(path string) {
	if path != "" && w.desk.OpenFile(path) == nil {
		return
	}
	broken := w.desk.State().Broken
	w.say(w.desk.NewFrom(DemoPlan))
	if broken != nil {
		w.tellBroken(broken)
	}
}

// open opens a plan. One that cannot be opened leaves the present one, and the
// state that follows says why.
func (w *Window) open(path string) {
	_ = w.desk.OpenFile(path)
	w.did(nil)
}

func (w *Window) newFrom(template string) {
	w.ifSaved("starting a new plan", func() {
		w.did(w.desk.NewFrom(template))
	})
}

func (w *Window) askToOpen() {
	w.ifSaved("opening another plan", func() {
		d := dialog.NewFileOpen(func(file fyne.URIReadCloser, err error) {
			w.say(err)
			if file != nil {
				_ = file.Close()
				w.open(file.URI().Path())
			}
		}, w.window)
		d.SetFilter(storage.NewExtensionFileFilter([]string{".json"}))
		w.showFileDialog(d)
	})
}

// showFileDialog shows a file dialog at the folder of the present plan, with room
// around it.
func (w *Window) showFileDialog(d *dialog.FileDialog) {
	if w.state.Path != "" {
		if folder, err := storage.ListerForURI(storage.NewFileURI(filepath.Dir(w.state.Path))); err == nil {
			d.SetLocation(folder)
		}
	}
	d.Show() // only a dialog that is shown can be resized
	size := w.window.Canvas().Size()
	d.Resize(fyne.NewSize(size.Width*0.8, size.Height*0.8))
}

// save writes the plan to its file, and then goes on.
func (w *Window) save(then func()) {
	w.window.Canvas().Unfocus() // commits what is being typed
	err := w.desk.Save()
	var changed *session.ChangedError
	switch {
	case errors.Is(err, session.ErrNoPath):
		w.saveAs(then)
		return
	case errors.As(err, &changed):
		w.ask("The file was changed by someone else", "Your plan and the file differ. "+err.Error()+".",
			answer{"Overwrite the file", func() { w.desk.KeepMine(); w.save(then) }},
			answer{"Save under another name", func() { w.saveAs(then) }})
		return
	case err != nil:
		w.tell("The plan was not saved", err.Error())
		return
	}
	w.Echo()
	then()
}

// saveAs asks for a file, writes the plan to it, and then goes on.
func (w *Window) saveAs(then func()) {
	d := dialog.NewFileSave(func(file fyne.URIWriteCloser, err error) {
		w.say(err)
		if file == nil {
			return
		}
		_ = file.Close()
		if err := w.desk.SaveAs(file.URI().Path()); err != nil {
			w.tell("The plan was not saved", err.Error())
			return
		}
		w.Echo()
		then()
	}, w.window)
	d.SetFileName(w.desk.SuggestedName())
	d.SetFilter(storage.NewExtensionFileFilter([]string{".json"}))
	w.showFileDialog(d)
}

// ifSaved goes on at once where nothing would be lost, else asks first.
func (w *Window) ifSaved(purpose string, then func()) {
	if !w.desk.NeedsSaving() {
		then()
		return
	}
	w.ask("Save the changes?", "'"+w.state.Name+"' has changes that are not saved. Save them before "+purpose+"?",
		answer{"Save", func() { w.save(then) }},
		answer{"Do not save", then})
}

// askToClose closes the window, after a question where work would be lost.
func (w *Window) askToClose() {
	w.ifSaved("closing", func() {
		w.desk.Close()
		w.window.Close()
	})
}

// dropped opens the first file that was dropped onto the window.
func (w *Window) dropped(_ fyne.Position, files []fyne.URI) {
	if len(files) > 0 {
		w.ifSaved("opening another plan", func() { w.open(files[0].Path()) })
	}
}
