package export

import (
	"errors"
	"io"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"workheat/network/export/outcome/outcometest"
	"workheat/network/record"
)

func TestForFile(t *testing.T) {
	for name, want := range map[string]string{"a.csv": ".csv", "b/c.XLSX": ".xlsx", "x.y.Png": ".png", ".svg": ".svg"} {
		if w, err := ForFile(name); err != nil || w.Suffix != want {
			t.Errorf("%s: %v, %v", name, w, err)
		}
	}
	for _, name := range []string{"a.doc", "a", "", "csv"} {
		_, err := ForFile(name)
		if err == nil {
			t.Errorf("%q has a writer", name)
			continue
		}
		for _, w := range Writers {
			if !strings.Contains(err.Error(), w.Suffix) {
				t.Errorf("%q: the error does not name %s: %v", name, w.Suffix, err)
			}
		}
	}
}

// only checks that a folder holds just that file, and returns its text.
func only(t *testing.T, path string) string {
	t.Helper()
	entries, err := os.ReadDir(filepath.Dir(path))
	if err != nil {
		t.Fatal(err)
	}
	if len(entries) != 1 || entries[0].Name() != filepath.Base(path) {
		t.Errorf("the folder holds %v", entries)
	}
	text, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	return string(text)
}

func TestEveryWriterWritesAWholeFile(t *testing.T) {
	for _, w := range Writers {
		path := filepath.Join(t.TempDir(), "run"+w.Suffix)
		if err := ToFile(path, outcometest.Run(4, 600)); err != nil {
			t.Fatal(err)
		}
		if text := only(t, path); len(text) < 5000 {
			t.Errorf("%s: %d bytes", w.Suffix, len(text))
		}
	}
}

func TestAFailingWriterLeavesTheOldFileAndNoLitter(t *testing.T) {
	path := filepath.Join(t.TempDir(), "run.csv")
	if err := os.WriteFile(path, []byte("old"), 0o600); err != nil {
		t.Fatal(err)
	}
	fault := errors.New("half way")
	half := func(w io.Writer) error {
		io.WriteString(w, strings.Repeat("x", 1<<20))
		return fault
	}
	if err := replace(path, half); !errors.Is(err, fault) {
		t.Errorf("error is %v", err)
	}
	if got := only(t, path); got != "old" {
		t.Errorf("the old file now holds %.20q", got)
	}
	func() {
		defer func() { recover() }()
		replace(path, func(io.Writer) error { panic("half way") })
	}()
	if got := only(t, path); got != "old" {
		t.Errorf("after a panic the old file holds %.20q", got)
	}
	o := outcometest.Run(2, 1e9)
	o.Interval = 1e-3
	if err := ToFile(path, o); err == nil || !strings.Contains(err.Error(), path) {
		t.Errorf("too many rows: %v", err)
	}
	if got := only(t, path); got != "old" {
		t.Errorf("after a refusal the old file holds %.20q", got)
	}
}

func TestAnExistingFileKeepsItsModeAndLinksAreFollowed(t *testing.T) {
	folder := t.TempDir()
	real := filepath.Join(folder, "real.csv")
	link := filepath.Join(t.TempDir(), "link.csv")
	if err := os.WriteFile(real, []byte("old"), 0o640); err != nil {
		t.Fatal(err)
	}
	if err := os.Symlink(real, link); err != nil {
		t.Skip("no symbolic links here")
	}
	if err := ToFile(link, outcometest.Run(2, 10)); err != nil {
		t.Fatal(err)
	}
	info, err := os.Stat(real)
	if err != nil || info.Mode().Perm() != 0o640 {
		t.Errorf("mode is %v (%v)", info.Mode(), err)
	}
	if got := only(t, real); !strings.HasPrefix(got, "time [s]") {
		t.Errorf("the file behind the link holds %.20q", got)
	}
	if info, err := os.Lstat(link); err != nil || info.Mode()&os.ModeSymlink == 0 {
		t.Error("the link was replaced by a file")
	}
}

func TestPlacesThatCannotBeWritten(t *testing.T) {
	folder := filepath.Join(t.TempDir(), "folder.csv")
	if err := os.Mkdir(folder, 0o755); err != nil {
		t.Fatal(err)
	}
	o := outcometest.Run(2, 10)
	sampled := false
	o.Series = func(float64) *record.Series { sampled = true; return nil }
	if err := ToFile(folder, o); err == nil {
		t.Error("a folder was replaced")
	}
	if err := ToFile(filepath.Join(folder, "none", "a.csv"), o); !errors.Is(err, os.ErrNotExist) {
		t.Errorf("in a folder that is not there: %v", err)
	}
	if err := ToFile("a.doc", o); err == nil || sampled {
		t.Errorf("an unknown format: %v", err)
	}
}
