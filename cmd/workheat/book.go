package main

import (
	"fmt"
	"io"
	"math"

	"workheat/network/energy"
)

// mostLines bounds each part of the book unless the whole of it is asked for.
const mostLines = 8

// printBook prints the energy book as an account.
func printBook(w io.Writer, b *energy.Book, whole bool) {
	if v := b.Vehicle; v != nil {
		printVehicle(w, v)
	}
	fmt.Fprintln(w, "\nEnergy book in kJ")
	a := account{most: mostLines}
	if whole {
		a.most = math.MaxInt
	}
	a.head("work in", b.WorkIn)
	for _, d := range b.Dissipators {
		a.line(d.Name, d.Heat)
	}
	a.head("heat in", b.HeatIn)
	a.border(b, func(p energy.PathLine, in float64) (float64, bool) { return in, in > 0 && !isDissipator(b, p.Element) })
	a.head("heat out", -b.HeatOut)
	a.border(b, func(p energy.PathLine, in float64) (float64, bool) { return in, in < 0 && !isDissipator(b, p.Element) })
	a.head("stored", -b.Stored)
	for _, n := range b.Nodes {
		if !n.Held && n.Stored != 0 {
			a.line(n.Name, -n.Stored)
		}
	}
	a.head("missing", b.WorkIn+b.HeatIn-b.HeatOut-b.Stored)
	a.flush(w)
	if whole {
		printInside(w, b)
	}
	printChecks(w, b, whole)
}

// An account is a list of amounts with headings.
type account struct {
	rows    [][]string
	most    int
	inPart  int
	left    int
	leftSum float64
}

// head begins a part with its total.
func (a *account) head(name string, total float64) {
	a.close()
	a.inPart = 0
	a.rows = append(a.rows, []string{name, "", kilojoule(total)})
}

// line adds an entry of the part.
func (a *account) line(name string, x float64) {
	if a.inPart++; a.inPart > a.most {
		a.left++
		a.leftSum += x
		return
	}
	a.rows = append(a.rows, []string{"  " + clip(name), kilojoule(x), ""})
}

// close sums up the entries of a part that were too many to show.
func (a *account) close() {
	if a.left > 0 {
		a.rows = append(a.rows, []string{fmt.Sprintf("  and %d more", a.left), kilojoule(a.leftSum), ""})
	}
	a.left, a.leftSum = 0, 0
}

func (a *account) flush(w io.Writer) {
	a.close()
	columns(w, a.rows, map[int]bool{0: true})
}

// border adds the paths across the border that want keeps, with what they brought in.
func (a *account) border(b *energy.Book, want func(p energy.PathLine, in float64) (float64, bool)) {
	for _, p := range b.Paths {
		if !p.Border {
			continue
		}
		in := p.Net
		if isBorder(b, p.To) {
			in = -in
		}
		if x, ok := want(p, in); ok {
			a.line(p.Element, x)
		}
	}
}

// isBorder reports whether a name is outside or held.
func isBorder(b *energy.Book, name string) bool {
	if name == "" {
		return true
	}
	for i := range b.Nodes {
		if b.Nodes[i].Name == name {
			return b.Nodes[i].Held
		}
	}
	return false
}

func isDissipator(b *energy.Book, name string) bool {
	for i := range b.Dissipators {
		if b.Dissipators[i].Name == name {
			return true
		}
	}
	return false
}

// printVehicle prints the mechanical account.
func printVehicle(w io.Writer, v *energy.VehicleLine) {
	fmt.Fprintf(w, "\nVehicle %s over %.4g km, in kJ\n", v.Name, v.Distance/1000)
	part := ""
	if v.Brake != 0 {
		part = fmt.Sprintf("%s of it by the dissipators of this netlist", share(v.Modelled, v.Brake))
	}
	columns(w, [][]string{
		{"the drive gave", kilojoule(v.Drive), ""},
		{"brakes took", kilojoule(v.Brake), part},
		{"air drag took", kilojoule(v.Air), ""},
		{"rolling took", kilojoule(v.Rolling), ""},
		{"climbing took", kilojoule(v.Climb), ""},
		{"gain of kinetic energy", kilojoule(v.Kinetic), ""},
	}, map[int]bool{0: true, 2: true})
}

// printInside prints the heat that passed between the nodes inside.
func printInside(w io.Writer, b *energy.Book) {
	var rows [][]string
	for _, p := range b.Paths {
		if p.Inside {
			rows = append(rows, []string{clip(p.Element), clip(p.From) + " to " + clip(p.To), kilojoule(p.Net)})
		}
	}
	if len(rows) == 0 {
		return
	}
	fmt.Fprintln(w, "\nHeat between nodes, on balance, in kJ")
	columns(w, rows, map[int]bool{0: true, 1: true})
}

// printChecks prints the verdict, and every check when asked or when one has failed.
func printChecks(w io.Writer, b *energy.Book, whole bool) {
	verdict := "The book is closed"
	if !b.Closed {
		verdict = "THE BOOK IS NOT CLOSED"
	}
	fmt.Fprintf(w, "\n%s: %s missing by the ledger (%s of the throughput), %s by the recount (%s).\n",
		verdict, joule(b.LedgerGap), part(b.LedgerGap, b.Throughput), joule(b.IndependentGap), part(b.IndependentGap, b.Throughput))
	if !whole && b.Closed {
		return
	}
	rows := [][]string{{"layer", "check", "gap", "allowed", "", "worst at", "what is compared"}}
	for _, c := range b.Checks {
		state := "passed"
		if !c.Passed {
			state = "FAILED"
		}
		rows = append(rows, []string{fmt.Sprint(c.Layer), c.Name, fmt.Sprintf("%.3g %s", c.Gap, c.Unit),
			fmt.Sprintf("%.3g %s", c.Allowed, c.Unit), state, clip(c.Where), c.About})
	}
	columns(w, rows, map[int]bool{0: true, 1: true, 4: true, 5: true, 6: true})
}

func joule(x float64) string { return fmt.Sprintf("%.2g J", x) }

func part(x, of float64) string {
	if of == 0 {
		return "no energy passed the border"
	}
	return fmt.Sprintf("%.1g", x/of)
}
