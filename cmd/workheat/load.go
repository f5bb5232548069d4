package main

import (
	"errors"
	"fmt"
	"os"
	"path/filepath"

	"github.com/spf13/cobra"

	"workheat/library"
	"workheat/network"
	"workheat/network/diag"
)

// oneNetlist is the argument of run and check.
func oneNetlist(c *cobra.Command, args []string) error {
	if len(args) != 1 {
		return fmt.Errorf("%s takes the name of one netlist, not %d", c.Name(), len(args))
	}
	return nil
}

// load reads a netlist file and reports its problems. It returns an error that is already reported when
// the netlist cannot be used.
func load(e env, name string) (*network.Model, error) {
	text, err := os.ReadFile(name)
	if err != nil {
		return nil, coded{exitProblem, fmt.Sprintf("%s cannot be read: %s", name, diag.Reason(err))}
	}
	folder := filepath.Dir(name)
	open := func(file string) ([]byte, error) {
		if filepath.IsAbs(file) || !filepath.IsLocal(file) {
			return nil, errors.New("only files in the folder of the netlist, or below it, are read")
		}
		return os.ReadFile(filepath.Join(folder, file))
	}
	model, problems := network.Load(&diag.Source{Name: name, Text: text}, library.Catalogue(), open)
	if model != nil {
		return model, nil
	}
	render(e, problems)
	faults := 0
	for _, p := range problems {
		if !p.Warning {
			faults++
		}
	}
	what := "problems"
	if faults == 1 {
		what = "problem"
	}
	return nil, coded{exitProblem, fmt.Sprintf("%s has %d %s; nothing was run", name, faults, what)}
}

func render(e env, problems []diag.Problem) {
	diag.Render(e.err, problems, e.colour)
}
