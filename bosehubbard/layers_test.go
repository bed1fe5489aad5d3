package bosehubbard_test

import (
	"go/parser"
	"go/token"
	"io/fs"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// layers lists the packages from top to bottom: a package imports only packages
// that stand below it. A name that ends in "/..." stands for a whole folder, but for
// what has a line of its own.
var layers = []string{
	"gui",
	"gui/session",
	"bosehubbard/handover",
	"bosehubbard/figure",
	"bosehubbard/margins",
	"bosehubbard/report",
	"bosehubbard/fit",
	"bosehubbard/plan",
	"bosehubbard/aim",
	"bosehubbard/passage",
	"bosehubbard/lifetime",
	"bosehubbard/ceiling",
	"bosehubbard/image",
	"bosehubbard/cloud",
	"bosehubbard/eos",
	"bosehubbard/sequence",
	"bosehubbard/apparatus",
	"bosehubbard/thermo",
	"bosehubbard/exact",
	"bosehubbard/gutzwiller",
	"bosehubbard/fock",
	"bosehubbard",
	"bosehubbard/lattice",
	"bosehubbard/band",
	"bosehubbard/optics",
	"bosehubbard/atom",
	"bosehubbard/si",
	"bosehubbard/num/...",
	"bosehubbard/num/blocks",
	"assets",
	"testdata",
}

// rank returns the place of a package in the list, 0 at the top; cmd/... stands
// above everything. It is -1 for a package that the list does not know.
func rank(pkg string) int {
	if strings.HasPrefix(pkg, "cmd/") {
		return 0
	}
	if i := slices.Index(layers, pkg); i >= 0 {
		return i + 1
	}
	for i, name := range layers {
		folder, wild := strings.CutSuffix(name, "/...")
		if wild && (pkg == folder || strings.HasPrefix(pkg, folder+"/")) {
			return i + 1
		}
	}
	return -1
}

// complaint says what is wrong with an import, or nothing.
func complaint(pkg, imported string, test bool) string {
	const fyne = "fyne.io/fyne/v2"
	if imported == fyne || strings.HasPrefix(imported, fyne+"/") {
		return fyneComplaint(pkg, imported, test)
	}
	target, ours := strings.CutPrefix(imported, "hilltop/")
	if !ours {
		if pkg == "bosehubbard/si" && imported != "math" && !test {
			return "si imports only math"
		}
		return ""
	}
	switch from, to := rank(pkg), rank(target); {
	case from < 0:
		return "package " + pkg + " is not in the list of layers"
	case to < 0:
		return "package " + target + " is not in the list of layers"
	case target == "testdata" && !test:
		return "only tests read testdata"
	case pkg == "assets":
		return "assets imports nothing of ours"
	case pkg == "gui" && !test && target != "gui/session" && target != "assets" && target != "bosehubbard/figure":
		return "gui reaches the library through gui/session"
	case to <= from && !(test && target == pkg):
		return "imports upwards or sideways"
	}
	return ""
}

func fyneComplaint(pkg, imported string, test bool) string {
	// driver/desktop holds only interfaces of events, driver/software draws into
	// memory for tests; the other drivers need C.
	harmless := imported == "fyne.io/fyne/v2/driver/desktop" || test && imported == "fyne.io/fyne/v2/driver/software"
	onlyApp := imported == "fyne.io/fyne/v2/app" || strings.HasPrefix(imported, "fyne.io/fyne/v2/driver/") && !harmless
	switch {
	case pkg == "cmd/hilltop":
		return ""
	case pkg != "gui":
		return "only gui and cmd/hilltop import Fyne"
	case onlyApp:
		return "only cmd/hilltop imports Fyne's app"
	}
	return ""
}

func TestImportsGoDown(t *testing.T) {
	root := ".."
	files := 0
	err := filepath.WalkDir(root, func(path string, entry fs.DirEntry, err error) error {
		if err != nil || entry.IsDir() || !strings.HasSuffix(path, ".go") {
			return err
		}
		files++
		folder, err := filepath.Rel(root, filepath.Dir(path))
		if err != nil {
			return err
		}
		pkg := filepath.ToSlash(folder)
		tree, err := parser.ParseFile(token.NewFileSet(), path, nil, parser.ImportsOnly)
		if err != nil {
			return err
		}
		for _, spec := range tree.Imports {
			imported, err := strconv.Unquote(spec.Path.Value)
			if err != nil {
				return err
			}
			if why := complaint(pkg, imported, strings.HasSuffix(path, "_test.go")); why != "" {
				t.Errorf("%s imports %s: %s", path, imported, why)
			}
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	if files < 10 {
		t.Fatalf("found %d Go files under %s, want the whole project", files, root)
	}
}

func TestComplaintFindsBadImports(t *testing.T) {
	for _, tc := range []struct {
		pkg, imported string
		bad           bool
	}{
		{"bosehubbard/band", "hilltop/bosehubbard/si", false},
		{"bosehubbard/band", "hilltop/bosehubbard/report", true},
		{"bosehubbard/si", "fmt", true},
		{"bosehubbard/si", "math", false},
		{"bosehubbard/report", "fyne.io/fyne/v2", true},
		{"gui", "fyne.io/fyne/v2/widget", false},
		{"gui", "fyne.io/fyne/v2/driver/desktop", false},
		{"gui", "fyne.io/fyne/v2/driver/software", true},
		{"gui", "fyne.io/fyne/v2/app", true},
		{"gui", "hilltop/bosehubbard/report", true},
		{"gui/session", "fyne.io/fyne/v2", true},
		{"gui/session", "hilltop/bosehubbard/report", false},
		{"cmd/hilltop", "fyne.io/fyne/v2/app", false},
		{"cmd/hilltop-batch", "fyne.io/fyne/v2/app", true},
		{"assets", "hilltop/bosehubbard/si", true},
		{"bosehubbard/elsewhere", "hilltop/bosehubbard/si", true},
		{"bosehubbard/plan", "hilltop/testdata", true},
	} {
		if got := complaint(tc.pkg, tc.imported, false); (got != "") != tc.bad {
			t.Errorf("%s imports %s: got %q, want a complaint: %v", tc.pkg, tc.imported, got, tc.bad)
		}
	}
	if !slices.Contains(layers, "bosehubbard/si") {
		t.Error("the list of layers lost si")
	}
}
