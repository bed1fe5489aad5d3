package assets

import _ "embed"

//go:embed icon.png
var icon []byte

// Icon returns the program's icon, a PNG of 512 x 512 pixels that is drawn from
// icon.svg: a hill under a lid, and the state at its top.
func Icon() []byte { return icon }
