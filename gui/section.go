package gui

import (
	"slices"

	"fyne.io/fyne/v2"

	"hilltop/gui/session"
)

// section is a group of values in the column: a heading, and while it is open the
// fields below the headings of their parts, and the buttons for what comes and goes.
type section struct {
	head    *GroupHead
	open    bool
	parts   []*partHead
	buttons []*Button
	flow    *Flow
	ids     []string // of the actions of the buttons
}

func (k *KnobColumn) section(name string) *section {
	if c := k.sections[name]; c != nil {
		return c
	}
	c := &section{flow: NewFlow(space8)}
	c.head = NewGroupHead(func() { k.toggle(c) }, func() { k.scroller.Reveal(c.head) }, k.On.Key)
	k.sections[name] = c
	return c
}

// assembleGroup shows a group and returns its objects.
func (k *KnobColumn) assembleGroup(g session.Group) []fyne.CanvasObject {
	c := k.section(g.Name)
	c.head.set(g, c.open)
	objects := []fyne.CanvasObject{c.head}
	if !c.open {
		return objects
	}
	part := ""
	for _, f := range g.Fields {
		if f.ID == aimField {
			continue
		}
		if f.Part != part {
			part = f.Part
			if i := slices.IndexFunc(g.Parts, func(p session.Part) bool { return p.Name == part }); i >= 0 {
				objects = append(objects, k.partHead(c, i, g.Parts[i]))
			}
		}
		objects = append(objects, k.show(f))
	}
	if len(g.Actions) > 0 {
		k.setButtons(c, g.Actions)
		objects = append(objects, c.flow)
	}
	return objects
}

// partHead shows the heading of a part.
func (k *KnobColumn) partHead(c *section, i int, p session.Part) *partHead {
	for len(c.parts) <= i {
		c.parts = append(c.parts, newPartHead(
			func(action string) { k.act(c, action) }, func(h *partHead) { k.scroller.Reveal(h) }, k.On.Key))
	}
	c.parts[i].set(p)
	return c.parts[i]
}

// setButtons shows the actions of a group.
func (k *KnobColumn) setButtons(c *section, actions []session.Action) {
	c.ids = c.ids[:0]
	for i, a := range actions {
		if i == len(c.buttons) {
			button := NewButton("", func() { k.act(c, c.ids[i]) })
			button.OnKey, button.OnFocus = k.On.Key, func() { k.scroller.Reveal(button) }
			c.buttons = append(c.buttons, button)
			c.flow.Objects = append(c.flow.Objects, button)
		}
		c.ids = append(c.ids, a.ID)
		c.buttons[i].SetText(a.Label)
		c.buttons[i].Show()
	}
	for _, spare := range c.buttons[len(actions):] {
		spare.Hide()
	}
	c.flow.Refresh()
}

// act carries out an action of a group and leads to what it made, or back to the
// heading where it took something out.
func (k *KnobColumn) act(c *section, id string) {
	err := k.desk.Do(id)
	k.did(err)
	if err != nil {
		return
	}
	if id := k.state.Touched; id != "" {
		k.Reveal(id)
		return
	}
	takeFocus(c.head)
}

// toggle opens or shuts a group, and brings as much of it into sight as there is
// room for.
func (k *KnobColumn) toggle(c *section) {
	c.open = !c.open
	k.assemble()
	k.scroller.Fit()
	if c.open {
		k.scroller.Reveal(k.last(c))
	}
	k.scroller.Reveal(c.head)
}

// last is the last object of a section.
func (k *KnobColumn) last(c *section) fyne.CanvasObject {
	objects := k.column.Objects
	at := slices.Index(objects, fyne.CanvasObject(c.head))
	for at+1 < len(objects) {
		if _, next := objects[at+1].(*GroupHead); next {
			break
		}
		at++
	}
	return objects[at]
}

// ToggleAll opens every group, or shuts them where all are open.
func (k *KnobColumn) ToggleAll() {
	shut := slices.ContainsFunc(k.state.Groups, func(g session.Group) bool { return !k.section(g.Name).open })
	for _, g := range k.state.Groups {
		k.section(g.Name).open = shut
	}
	k.assemble()
	k.scroller.Fit()
}

// openFor opens the group of a field.
func (k *KnobColumn) openFor(id string) {
	for _, g := range k.state.Groups {
		if slices.ContainsFunc(g.Fields, func(f session.Field) bool { return f.ID == id && id != aimField }) && !k.section(g.Name).open {
			k.toggle(k.section(g.Name))
		}
	}
}

// letGo takes the focus from what is no longer in the column: before is what was.
func (k *KnobColumn) letGo(before []fyne.CanvasObject) {
	c := fyne.CurrentApp().Driver().CanvasForObject(k)
	if c == nil || c.Focused() == nil {
		return
	}
	for _, o := range before {
		if slices.Contains(k.column.Objects, o) || !slices.Contains(focusables(o), c.Focused()) {
			continue
		}
		if row, ok := o.(*KnobRow); ok {
			row.field.Drop()
		}
		c.Unfocus()
	}
}

// focusables are what can have the focus in an object of the column.
func focusables(o fyne.CanvasObject) []fyne.Focusable {
	switch o := o.(type) {
	case *KnobRow:
		return []fyne.Focusable{o.field}
	case *choiceRow:
		return []fyne.Focusable{o.words}
	case *GroupHead:
		return []fyne.Focusable{o}
	case *partHead:
		return []fyne.Focusable{o.remove}
	case *Flow:
		var list []fyne.Focusable
		for _, inner := range o.Objects {
			if f, ok := inner.(fyne.Focusable); ok {
				list = append(list, f)
			}
		}
		return list
	}
	return nil
}
