// Package assets holds the files that travel inside the program: species files,
// the JSON Schema of plans, demo plans and the icon. It imports nothing of the
// project; whoever reads a file knows its format.
package assets
