// Package session is the view-model of the window: the plan that is open, what
// has been typed, the way back and forth through the edits, and the judgement
// that runs behind them. It knows no widgets.
//
// A view calls the methods of a [Session] and shows the [State] values it gets.
// States are immutable and complete: a view never asks what changed. They come
// through Options.Post, from a goroutine of the session, at most about 20 a
// second; the last one always comes. Methods return at once, may be called from
// any goroutine and never call back, so a view that wants its own edit on the
// screen in the same frame shows [Session.State] after the call.
//
// The plan is judged on one background goroutine. A newer plan replaces one that
// waits, and stops one that has run for long; there is no queue. Until the newer
// report is there the old one is shown as stale.
//
// Numbers in fields are texts with a unit, see [Measure]; the document keeps its
// own units (W, G, Er, Hz, ms, um, nm).
package session
