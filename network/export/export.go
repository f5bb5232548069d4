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
	About  string // what is in such a file, one line
	Write  func(w io.Writer, o *Outcome) error
}

// Writers lists all formats.
var Writers = []Writer{
	{".csv", "samples of all temperatures, heat flows and the vehicle, units in the first row", csv.Write},
	{".xlsx", "summary, native chart, samples, energy book and inputs as a spreadsheet", xlsx.Write},
	{".png", "temperatures against time with limits and phases, as a picture", plot.PNG},
	{".svg", "the same picture as a drawing that scales", plot.SVG},
}

// ForFile returns the writer for a file name by its suffix, capitals or not. The error lists the known ones.
func ForFile(name string) (*Writer, error) {
	suffix := strings.ToLower(filepath.Ext(name))
	known := make([]string, len(Writers))
	for i := range Writers {
		if Writers[i].Suffix == suffix {
			return &Writers[i], nil
		}
		known[i] = Writers[i].Suffix
	}
	list := strings.Join(known[:len(known)-1], ", ") + " or " + known[len(known)-1]
	if suffix == "" {
		return nil, fmt.Errorf("the name %q does not say what to write: end it in %s", name, list)
	}
	return nil, fmt.Errorf("no writer for %q in %q: end the name in %s", suffix, name, list)
}
