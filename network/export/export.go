// Package export writes the outcome of a run to files; the writer is chosen by the file's name.
package export

import (
	"fmt"
	"io"
	"path/filepath"
	"strings"

	"workheat/network/export/csv"
	"workheat/network/export/outcome"
	"workheat/network/export/plot"
	"workheat/network/export/xlsx"
)

// Outcome is everything a writer may show of a run.
type Outcome = outcome.Run

// A Writer writes an outcome in one format.
type Writer struct {
	Suffix string // of the file name, with its dot, in lower case
	Write  func(w io.Writer, o *Outcome) error
}

// Writers lists all formats.
var Writers = []Writer{
	{".csv", csv.Write},
	{".xlsx", xlsx.Write},
	{".png", plot.PNG},
	{".svg", plot.SVG},
}

// ForFile returns the writer for a file name by its suffix, capitals or not. The error lists the known ones.
func ForFile(name string) (*Writer, error) {
	suffix := strings.ToLower(filepath.Ext(name))
	for i := range Writers {
		if Writers[i].Suffix == suffix {
			return &Writers[i], nil
		}
	}
	if suffix == "" {
		return nil, fmt.Errorf("the name %q does not say what to write: end it in %s", name, Suffixes())
	}
	return nil, fmt.Errorf("no writer for %q in %q: end the name in %s", suffix, name, Suffixes())
}

// Suffixes lists the known suffixes in words: ".csv, .xlsx or .png".
func Suffixes() string {
	known := make([]string, len(Writers))
	for i, w := range Writers {
		known[i] = w.Suffix
	}
	last := len(known) - 1
	return strings.Join(known[:last], ", ") + " or " + known[last]
}
