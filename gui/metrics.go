package gui

import "fyne.io/fyne/v2"

// fold is one of the three arrangements of the window.
type fold int

// The folds, by the width of the window in text sizes.
const (
	fullFold    fold = iota // from 86
	compactFold             // 64 to 86
	drawerFold              // below 64: the knobs are a drawer, the verdict bar has two rows
)

const (
	fullFrom    = 86 // text sizes
	compactFrom = 64
)

// foldFor returns the arrangement for a width in pixels at a text scale.
func foldFor(width, scale float32) fold {
	switch em := width / (textBody * scale); {
	case em >= fullFrom:
		return fullFold
	case em >= compactFrom:
		return compactFold
	}
	return drawerFold
}

// Metrics are the sizes of the parts of the window at 100 % text.
type Metrics struct {
	Fold fold

	Verdict     float32 // height of the verdict bar
	Badge       float32
	VerdictText float32
	Advice      float32 // width of the button
	Temperature float32 // width of the place for it
	Knobs       float32 // width of the column
	Field       float32 // width of a value field
	Switch      float32 // height of the page switch
	Cell        float32 // width of one of its cells
	Padding     float32 // of a page
	Status      float32 // height
}

// metrics holds the sizes for each fold.
var metrics = [...]Metrics{
	fullFold: {
		Verdict: 72, Badge: 48, VerdictText: textVerdict, Advice: 230, Temperature: 250,
		Knobs: 304, Field: 136, Switch: 44, Cell: 122, Padding: space16, Status: 24,
	},
	compactFold: {
		Fold: compactFold, Verdict: 60, Badge: 36, VerdictText: textVerdictC, Advice: 230, Temperature: 200,
		Knobs: 256, Field: 120, Switch: 40, Cell: 96, Padding: space12, Status: 24,
	},
	drawerFold: {
		Fold: drawerFold, Verdict: 60 + 52, Badge: 36, VerdictText: textVerdictC, Advice: 230, Temperature: 200,
		Knobs: 304, Field: 136, Switch: 40, Cell: 96, Padding: space12, Status: 24,
	},
}

// metricsFor returns the sizes for a window, scaled with the text.
func metricsFor(window fyne.Size, scale float32) Metrics {
	m := metrics[foldFor(window.Width, scale)]
	for _, v := range []*float32{
		&m.Verdict, &m.Advice, &m.Temperature, &m.Knobs, &m.Field, &m.Switch, &m.Cell, &m.Padding, &m.Status,
	} {
		*v *= scale
	}
	return m
}
