package main

import (
	"context"
	"fmt"
	"io"
	"math"
	"strings"

	"github.com/spf13/cobra"

	"workheat/network"
	"workheat/network/element"
	"workheat/network/unit"
)

type checkOptions struct{ strict bool }

func newCheck(e env) *cobra.Command {
	var opt checkOptions
	c := &cobra.Command{
		Use:   "check NETLIST",
		Short: "read a netlist and show what it resolves to, without running it",
		Long: `check reads a netlist, reports all its problems, and shows the resolved network at the
start of its duty: nodes with their heat capacities, elements with their conductances
and flows, time constants of the linearised network, the pattern of the equations, and
the phases.

Exit codes: 0 fine; 1 with --strict: there are warnings; 2 the netlist or the command
line has problems.`,
		Example: "  workheat check examples/car-front-corner/netlist.json",
		Args:    oneNetlist,
	}
	c.Flags().BoolVar(&opt.strict, "strict", false, "exit with 1 if there are warnings")
	c.RunE = func(c *cobra.Command, args []string) error { return check(c.Context(), e, args[0], opt) }
	return c
}

func check(ctx context.Context, e env, name string, opt checkOptions) error {
	model, _, err := load(ctx, e, name)
	if err != nil {
		return err
	}
	printDescription(e.out, name, model)
	render(e, model.Warnings)
	if opt.strict && len(model.Warnings) > 0 {
		return coded{exitLimit, fmt.Sprintf("%s has %d warnings", name, len(model.Warnings))}
	}
	return nil
}

var formText = map[element.Form]string{element.Stored: "", element.Massless: "massless", element.Held: "held"}

// printDescription prints the resolved network.
func printDescription(w io.Writer, name string, model *network.Model) {
	d, name := model.Describe(), printable(name)
	if t := model.Net.Title; t != "" {
		name = t
	}
	fmt.Fprintf(w, "%s\n\nNodes\n", name)
	rows := [][]string{{"node", "J/K at start", "start degC", "material", "limits degC"}}
	for i, n := range d.Nodes {
		if i == mostNodes {
			rows = append(rows, []string{fmt.Sprintf("... and %d more", len(d.Nodes)-i)})
			break
		}
		capacity := formText[n.Form]
		if n.Form == element.Stored {
			capacity = fmt.Sprintf("%.5g", n.Capacity)
		}
		var limits []string
		for _, l := range n.Limits {
			limits = append(limits, fmt.Sprintf("%s %s", celsius(l.Temperature), clip(l.Name)))
		}
		rows = append(rows, []string{clip(n.Name), capacity, celsius(n.Start), n.Material, strings.Join(limits, ", ")})
	}
	columns(w, rows, map[int]bool{0: true, 3: true, 4: true})
	printElements(w, d)
	printPhases(w, d)
	fmt.Fprintln(w)
	if d.HasModes {
		slow := "none: a part of the network can lose heat to nowhere"
		if !math.IsInf(d.Slowest, 0) {
			slow = clock(d.Slowest)
		}
		fmt.Fprintf(w, "Slowest time constant at the start: %s; fastest: %s\n", slow, unit.Time.Format(d.Fastest, 4))
	}
	fmt.Fprintf(w, "%d states, %d entries in the sparse matrix\n", d.States, d.Entries)
	fmt.Fprintf(w, "Relative tolerance %s, absolute %s\n", plain(model.Net.Rel), unit.TemperatureDifference.Format(model.Net.Abs, 3))
}

// printElements prints the paths.
func printElements(w io.Writer, d *network.Description) {
	fmt.Fprintln(w, "\nElements at the start of the duty")
	rows := [][]string{{"element", "kind", "from", "to", "W/K", "W"}}
	for i, p := range d.Paths {
		if i == mostNodes {
			rows = append(rows, []string{fmt.Sprintf("... and %d more", len(d.Paths)-i)})
			break
		}
		conductance := ""
		if p.Conductance != 0 {
			conductance = fmt.Sprintf("%.4g", p.Conductance)
		}
		rows = append(rows, []string{clip(p.Name), p.Kind, end(p.From, p.Work), end(p.To, false), conductance, watts(p.Flow)})
	}
	columns(w, rows, map[int]bool{0: true, 1: true, 2: true, 3: true})
}

// watts shows a power with four figures, and rounding below a billionth of a watt as none.
func watts(x float64) string {
	switch a := math.Abs(x); {
	case a < 1e-9:
		return "0"
	case a >= 1000 && a < 1e9:
		return fmt.Sprintf("%.0f", x)
	}
	return fmt.Sprintf("%.4g", x)
}

// printPhases prints the duty.
func printPhases(w io.Writer, d *network.Description) {
	fmt.Fprintln(w, "\nDuty")
	var rows [][]string
	for _, p := range d.Phases {
		rows = append(rows, []string{strings.Repeat("  ", p.Depth) + p.Label, p.Words})
	}
	columns(w, rows, map[int]bool{0: true, 1: true})
}
