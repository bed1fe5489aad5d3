package gui

// PageNames are the names of the pages, in the order of their switch.
func (w *Window) PageNames() []string {
	names := make([]string, len(w.pages))
	for i, p := range w.pages {
		names[i] = p.Name()
	}
	return names
}

// TurnTo turns to a page by its name.
func (w *Window) TurnTo(page string) { w.choosePage(w.pageNamed(page)) }

// Busy reports whether a judgement, a picture or a computation of a page is under
// way.
func (w *Window) Busy() bool {
	for _, job := range w.state.Jobs {
		if job.Running {
			return true
		}
	}
	return w.state.Busy || w.state.Stale || !w.easel.idle()
}
