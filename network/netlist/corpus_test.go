package netlist_test

import (
	"bytes"
	"errors"
	"flag"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"workheat/library"
	"workheat/network/diag"
	"workheat/network/netlist"
)

var (
	update = flag.Bool("update", false, "rewrite the stored reports")
	long   = flag.Bool("long", false, "run the tests that take long")
)

// in returns an opener of the files of a folder.
func in(folder string) netlist.Opener {
	return func(name string) ([]byte, error) {
		text, err := os.ReadFile(filepath.Join(folder, name))
		if err != nil {
			return nil, errors.New("there is no such file") // the same words on every system
		}
		return text, nil
	}
}

// read reads a netlist of a folder.
func read(t testing.TB, folder, name string) (*netlist.Netlist, []diag.Problem) {
	t.Helper()
	text, err := os.ReadFile(filepath.Join(folder, name))
	if err != nil {
		t.Fatal(err)
	}
	return netlist.Read(&diag.Source{Name: name, Text: text}, library.Catalogue(), in(folder))
}

// names returns the netlists of a folder.
func names(t testing.TB, folder string) []string {
	t.Helper()
	paths, err := filepath.Glob(filepath.Join(folder, "*.json"))
	if err != nil || len(paths) == 0 {
		t.Fatalf("no netlists in %s: %v", folder, err)
	}
	for i, p := range paths {
		paths[i] = filepath.Base(p)
	}
	return paths
}

// Every broken netlist gives the report that is stored beside it.
func TestBad(t *testing.T) {
	const folder = "testdata/bad"
	for _, name := range names(t, folder) {
		t.Run(strings.TrimSuffix(name, ".json"), func(t *testing.T) {
			_, problems := read(t, folder, name)
			if len(problems) == 0 {
				t.Fatal("no problem was found")
			}
			var got bytes.Buffer
			if err := diag.Render(&got, problems, false); err != nil {
				t.Fatal(err)
			}
			wellWorded(t, problems)
			stored := filepath.Join(folder, strings.TrimSuffix(name, ".json")+".txt")
			if *update {
				if err := os.WriteFile(stored, got.Bytes(), 0o644); err != nil {
					t.Fatal(err)
				}
				return
			}
			want, err := os.ReadFile(stored)
			if err != nil {
				t.Fatalf("%v; write it with -update", err)
			}
			if !bytes.Equal(got.Bytes(), want) {
				t.Errorf("the report changed\ngot:\n%swant:\n%s", got.Bytes(), want)
			}
		})
	}
}

// wellWorded checks what all reports have in common: a place, no full stop, no capital.
func wellWorded(t *testing.T, problems []diag.Problem) {
	t.Helper()
	for _, p := range problems {
		if p.At.Source == nil || p.At.Start > p.At.End || p.At.End > len(p.At.Source.Text) {
			t.Errorf("%q has no place", p.Text)
		}
		for _, text := range []string{p.Text, p.Help} {
			first, _, _ := strings.Cut(text, " ")
			if strings.HasSuffix(text, ".") || len(first) > 1 && first != "JSON" && first[0] >= 'A' && first[0] <= 'Z' {
				t.Errorf("the wording of %q", text)
			}
		}
	}
}
