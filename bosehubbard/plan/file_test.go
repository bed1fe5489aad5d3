package plan

import (
	"errors"
	"io/fs"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"
)

func TestSaveAndLoad(t *testing.T) {
	path := filepath.Join(t.TempDir(), "plan.json")
	for _, title := range []string{"first", "second"} {
		text := strings.Replace(good, `"t"`, `"`+title+`"`, 1)
		if err := Save(path, []byte(text)); err != nil {
			t.Fatal(err)
		}
		d, err := Load(path)
		if err != nil || d.Plan().Title != title || string(d.Bytes()) != text {
			t.Fatalf("%s: %v", title, err)
		}
	}
	onlyOneFile(t, filepath.Dir(path))
}

// onlyOneFile checks that no temporary file was left behind.
func onlyOneFile(t *testing.T, folder string) {
	t.Helper()
	entries, err := os.ReadDir(folder)
	if err != nil || len(entries) != 1 {
		t.Errorf("%s holds %v, %v, want one file", folder, entries, err)
	}
}

func TestSaveKeepsModeAndLinks(t *testing.T) {
	if runtime.GOOS == "windows" {
		t.Skip("modes and links of Unix")
	}
	folder := t.TempDir()
	path, link := filepath.Join(folder, "plan.json"), filepath.Join(folder, "link.json")
	if err := os.WriteFile(path, []byte("old"), 0o600); err != nil {
		t.Fatal(err)
	}
	if err := os.Chmod(path, 0o662); err != nil {
		t.Fatal(err)
	}
	if err := os.Symlink("plan.json", link); err != nil {
		t.Fatal(err)
	}
	if err := Save(link, []byte("new")); err != nil {
		t.Fatal(err)
	}
	info, err := os.Lstat(link)
	if err != nil || info.Mode()&fs.ModeSymlink == 0 {
		t.Errorf("the link became %v, %v", info.Mode(), err)
	}
	data, _ := os.ReadFile(path)
	info, err = os.Stat(path)
	if err != nil || info.Mode().Perm() != 0o662 || string(data) != "new" {
		t.Errorf("mode %v with %q, %v, want 0662 with \"new\"", info.Mode(), data, err)
	}
}

func TestUnwritableTargets(t *testing.T) {
	folder := t.TempDir()
	old := filepath.Join(folder, "old.json")
	if err := os.WriteFile(old, []byte("old"), 0o444); err != nil {
		t.Fatal(err)
	}
	for _, tc := range []struct{ path, want string }{
		{old, "the file is read-only: permission denied"},
		{folder, "it is a folder"},
		{filepath.Join(folder, "none", "plan.json"), "no such file or directory"},
		{filepath.Join(old, "plan.json"), "not a directory"},
		{os.DevNull, "it is a device, want a file"},
	} {
		err := Save(tc.path, []byte("new"))
		if want := "plan: " + tc.path + " cannot be written: " + tc.want; err == nil || err.Error() != want {
			t.Errorf("got %v\nwant %s", err, want)
		}
	}
	if data, err := os.ReadFile(old); err != nil || string(data) != "old" {
		t.Errorf("the old file holds %q, %v", data, err)
	}
	onlyOneFile(t, folder)
}

func TestUnreadableFiles(t *testing.T) {
	folder := t.TempDir()
	write := func(name, text string) string {
		path := filepath.Join(folder, name)
		if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
		return path
	}
	missing := filepath.Join(folder, "none.json")
	empty, truncated := write("empty.json", ""), write("truncated.json", good[:60])
	bad := write("bad.json", strings.Replace(good, "80000", "-1", 1))
	large := write("large.json", "")
	if err := os.Truncate(large, 50_000_000); err != nil {
		t.Fatal(err)
	}
	for _, tc := range []struct{ path, want string }{
		{missing, "plan: there is no file " + missing + ": file does not exist"},
		{folder, "plan: " + folder + " is a folder, want a file"},
		{empty, empty + ": plan: line 1, column 1: the text is empty, want a JSON object"},
		{truncated, truncated + ": plan: line 3, column 4: the text ends inside a string that begins at line 3, column 2"},
		{bad, bad + ": plan: /cloud/atoms: -1: want a whole number of atoms from 1 to 1e10"},
		{large, large + ": plan: 50 MB (50000000 bytes), want at most 16 MB (16000000 bytes)"},
	} {
		if d, err := Load(tc.path); d != nil || err == nil || err.Error() != tc.want {
			t.Errorf("got %v\nwant %s", err, tc.want)
		}
	}
	var size *SizeError
	var syntax *SyntaxError
	var field *FieldError
	_, errMissing := Load(missing)
	_, errLarge := Load(large)
	_, errEmpty := Load(empty)
	_, errBad := Load(bad)
	if !errors.Is(errMissing, fs.ErrNotExist) || !errors.As(errLarge, &size) || !errors.As(errEmpty, &syntax) || !errors.As(errBad, &field) {
		t.Errorf("the kinds of errors are lost: %v, %v, %v, %v", errMissing, errLarge, errEmpty, errBad)
	}
	if size.Bytes != 50_000_000 || field.Path != "/cloud/atoms" || syntax.Line != 1 {
		t.Errorf("got %+v, %+v, %+v", size, field, syntax)
	}
}

// TestLargeFileIsNotRead loads a sparse file far larger than the memory.
func TestLargeFileIsNotRead(t *testing.T) {
	path := filepath.Join(t.TempDir(), "huge.json")
	if err := os.WriteFile(path, nil, 0o644); err != nil {
		t.Fatal(err)
	}
	if err := os.Truncate(path, 1<<40); err != nil {
		t.Skipf("no sparse files here: %v", err)
	}
	var size *SizeError
	if _, err := Load(path); !errors.As(err, &size) {
		t.Errorf("got %v, want a *SizeError", err)
	}
}
