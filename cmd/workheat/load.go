package main

import (
	"context"
	"fmt"

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
func load(ctx context.Context, e env, name string) (*network.Model, *source, error) {
	src, err := readSource(ctx, name)
	if err != nil {
		return nil, nil, err
	}
	model, problems := network.Load(&diag.Source{Name: name, Text: src.text}, library.Catalogue(), src.open)
	if model != nil {
		return model, src, nil
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
	return nil, nil, coded{exitProblem, fmt.Sprintf("%s has %d %s; nothing was run", name, faults, what)}
}

func render(e env, problems []diag.Problem) {
	diag.Render(e.err, problems, e.colour)
}
