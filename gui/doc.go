// Package gui is the desktop window: a verdict bar on top, the knobs on the left
// with a rail that says which stage they edit, a page switch, and one page at a
// time.
//
// It shows [session.State] values and hands every action to a [session.Session];
// it computes no physics and knows no unit factors. All of it runs on the
// toolkit's goroutine. Sizes are pixels at 100 % text; [Metrics] scales them.
//
// Words stand in the built-in sans, numbers and the signs the sans lacks in the
// built-in mono. Hue is never alone: every colour of a verdict has its shape and
// its word. Nothing depends on hovering.
package gui
