// Package cmd_test checks the rooms of the whole tree: which may import which, what the root may hold, and
// that every package says what it is.
package cmd_test

import (
	"go/ast"
	"go/parser"
	"go/token"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"sort"
	"strings"
	"testing"
)

// arrows says, for each package, what it imports beyond the standard library: no more, and no less. A new
// package needs a row; a new arrow needs a reason. "..." at the end of a name stands for it and everything below.
var arrows = map[string][]string{
	"cmd/cpu":       {},
	"cmd/workheat":  {"cmd/cpu", "library", "network", "network/diag", "network/element", "network/energy", "network/export", "network/record", "network/unit", "github.com/spf13/cobra", "github.com/goccy/go-json"},
	"cmd/yardstick": {"cmd/cpu", "library", "network", "network/diag", "github.com/goccy/go-json"},

	"integrators":            {"integrators/ode", "integrators/rosenbrock"},
	"integrators/ode":        {"integrators/sparse"},
	"integrators/problems":   {"integrators/ode", "integrators/sparse"},
	"integrators/rosenbrock": {"integrators/ode", "integrators/sparse"},
	"integrators/sparse":     {"gonum.org/v1/gonum/mat"},

	"library":             {"library/friction", "library/heat", "library/material", "library/motion", "network/element"},
	"library/correlation": {},
	"library/friction":    {"network/element", "network/unit"},
	"library/heat":        {"library/correlation", "network/element", "network/unit"},
	"library/material":    {"network/element"},
	"library/motion":      {"network/element", "network/unit"},

	"network":                            {"network/assembly", "network/diag", "network/duty", "network/element", "network/energy", "network/modes", "network/netlist", "network/record", "network/unit", "integrators", "integrators/ode"},
	"network/assembly":                   {"network/element", "integrators/ode", "integrators/sparse"},
	"network/diag":                       {},
	"network/duty":                       {"network/element", "network/unit"},
	"network/element":                    {"network/unit"},
	"network/energy":                     {"network/element", "network/record"},
	"network/export":                     {"network/export/csv", "network/export/outcome", "network/export/plot", "network/export/xlsx"},
	"network/export/csv":                 {"network/export/outcome", "network/record", "network/unit"},
	"network/export/outcome":             {"network/element", "network/energy", "network/record", "network/unit"},
	"network/export/outcome/outcometest": {"network/element", "network/energy", "network/export/outcome", "network/record", "network/unit"}, // for tests of writers
	"network/export/plot":                {"network/export/outcome", "network/record", "network/unit", "gonum.org/v1/plot..."},
	"network/export/xlsx":                {"network/export/outcome", "network/energy", "network/record", "network/unit", "github.com/xuri/excelize/v2"},
	"network/modes":                      {"gonum.org/v1/gonum/mat"},
	"network/netlist":                    {"network/diag", "network/duty", "network/element", "network/unit", "github.com/goccy/go-json/jsontext"},
	"network/record":                     {"network/element", "network/unit"},
	"network/unit":                       {"network/diag"},
}

// root is what the root folder may hold, hidden files aside.
var root = []string{"DEVELOPERS.md", "README.md", "cmd", "examples", "go.mod", "go.sum", "integrators", "library", "network"}

const module = "workheat/"

func TestRootHoldsOnlyRooms(t *testing.T) {
	entries, err := os.ReadDir("..")
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, e := range entries {
		if !strings.HasPrefix(e.Name(), ".") {
			got = append(got, e.Name())
		}
	}
	sort.Strings(got)
	if !slices.Equal(got, root) {
		t.Errorf("the root holds %v, want %v", got, root)
	}
}

// A room is one package as it stands in the tree.
type room struct {
	imports map[string]bool
	docs    int
	doc     string
}

// rooms parses every package that is not only tests.
func rooms(t *testing.T) map[string]*room {
	list := map[string]*room{}
	err := filepath.WalkDir("..", func(path string, d fs.DirEntry, err error) error {
		if err != nil {
			return err
		}
		if d.IsDir() && path != ".." && (strings.HasPrefix(d.Name(), ".") || d.Name() == "testdata") {
			return filepath.SkipDir
		}
		if d.IsDir() || !strings.HasSuffix(path, ".go") || strings.HasSuffix(path, "_test.go") {
			return nil
		}
		file, err := parser.ParseFile(token.NewFileSet(), path, nil, parser.ParseComments|parser.ImportsOnly)
		if err != nil {
			return err
		}
		name := filepath.ToSlash(strings.TrimPrefix(filepath.Dir(path), ".."+string(filepath.Separator)))
		r := list[name]
		if r == nil {
			r = &room{imports: map[string]bool{}}
			list[name] = r
		}
		r.take(file)
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	return list
}

func (r *room) take(file *ast.File) {
	if file.Doc != nil {
		r.docs++
		r.doc = file.Doc.Text()
	}
	for _, i := range file.Imports {
		r.imports[strings.Trim(i.Path.Value, `"`)] = true
	}
}

func TestArrows(t *testing.T) {
	list := rooms(t)
	arrowsAreUsed(t, list)
	for name, r := range list {
		allowed, ok := arrows[name]
		if !ok {
			t.Errorf("the package %s is not in the table of arrows", name)
			continue
		}
		for path := range r.imports {
			own := strings.TrimPrefix(path, module)
			if standard(path) || allows(allowed, own) && own != name {
				continue
			}
			t.Errorf("%s must not import %s", name, path)
		}
		if r.docs != 1 {
			t.Errorf("%s has %d package comments, want one", name, r.docs)
		}
		if want := "Package " + filepath.Base(name) + " "; !strings.HasPrefix(r.doc, want) && !strings.HasPrefix(r.doc, "Command ") {
			t.Errorf("the comment of %s begins %.30q, want %q", name, r.doc, want)
		}
	}
}

// arrowsAreUsed checks that the table allows nothing that is not there.
func arrowsAreUsed(t *testing.T, list map[string]*room) {
	for name, allowed := range arrows {
		r := list[name]
		if r == nil {
			t.Errorf("the table of arrows has a row for %s, which does not exist", name)
			continue
		}
		for _, a := range allowed {
			used := false
			for path := range r.imports {
				used = used || allows([]string{a}, strings.TrimPrefix(path, module))
			}
			if !used {
				t.Errorf("the table of arrows lets %s import %s, which it does not", name, a)
			}
		}
	}
}

func standard(path string) bool {
	first, _, _ := strings.Cut(path, "/")
	return !strings.HasPrefix(path, module) && !strings.Contains(first, ".")
}

func allows(allowed []string, path string) bool {
	for _, a := range allowed {
		if below, ok := strings.CutSuffix(a, "..."); ok && (path == below || strings.HasPrefix(path, below+"/")) || path == a {
			return true
		}
	}
	return false
}
