package main

import (
	"fmt"
	"io"
	"math"
	"strings"

	"workheat/network/energy"
)

// mostLines bounds each part of the book unless the whole of it is asked for.
const mostLines = 8

// printBook prints the energy book as an account.
func printBook(w io.Writer, b *energy.Book, whole bool) {
	if v := b.Vehicle; v != nil {
		printVehicle(w, v)
	}
	fmt.Fprintln(w, "\nEnergy book in kJ: work in + heat in = heat out + stored + missing")
	a := account{most: mostLines, show: kilojoules(largest(b))}
	if whole {
		a.most = math.MaxInt
	}
	a.head("work in", b.WorkIn)
	for _, d := range b.Dissipators {
		a.line(d.Name, d.Heat)
	}
	a.head("heat in", b.HeatIn)
	a.border(b, 1)
	a.head("heat out", b.HeatOut)
	a.border(b, -1)
	a.head("stored", b.Stored)
	for _, n := range b.Nodes {
		if !n.Held && n.Stored != 0 {
			a.line(n.Name, n.Stored)
		}
	}
	a.head("missing", b.WorkIn+b.HeatIn-b.HeatOut-b.Stored)
	a.flush(w)
	if whole {
		printInside(w, b)
	}
	printChecks(w, b, whole)
}

// largest returns the largest amount of the book [J].
func largest(b *energy.Book) float64 {
	x := math.Max(math.Max(math.Abs(b.WorkIn), math.Abs(b.HeatIn)), math.Max(math.Abs(b.HeatOut), math.Abs(b.Stored)))
	for _, n := range b.Nodes {
		if !n.Held {
			x = math.Max(x, math.Abs(n.Stored))
		}
	}
	return x
}

// An account is a list of amounts with headings.
type account struct {
	show    func(j float64) string
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
	a.rows = append(a.rows, []string{name, "", a.show(total)})
}

// line adds an entry of the part.
func (a *account) line(name string, x float64) {
	if a.inPart++; a.inPart > a.most {
		a.left++
		a.leftSum += x
		return
	}
	a.rows = append(a.rows, []string{"  " + clip(name), a.show(x), ""})
}

// close sums up the entries of a part that were too many to show.
func (a *account) close() {
	if a.left > 0 {
		a.rows = append(a.rows, []string{fmt.Sprintf("  and %d more", a.left), a.show(a.leftSum), ""})
	}
	a.left, a.leftSum = 0, 0
}

func (a *account) flush(w io.Writer) {
	a.close()
	columns(w, a.rows, map[int]bool{0: true})
}

// border adds the paths across the border, dissipators aside, that brought heat in (sign 1) or took it out (-1).
func (a *account) border(b *energy.Book, sign float64) {
	for _, p := range b.Paths {
		if x := sign * p.In; x > 0 && !p.Work {
			a.line(p.Element, x)
		}
	}
}

// printVehicle prints the mechanical account.
func printVehicle(w io.Writer, v *energy.VehicleLine) {
	fmt.Fprintf(w, "\nVehicle %s over %.4g km, in kJ\n", v.Name, v.Distance/1000)
	part := ""
	if v.Brake != 0 {
		part = fmt.Sprintf("%s of it by the dissipators of this netlist", share(v.Modelled, v.Brake))
	}
	most := 0.0
	for _, x := range []float64{v.Drive, v.Brake, v.Air, v.Rolling, v.Climb, v.Kinetic} {
		most = math.Max(most, math.Abs(x))
	}
	show := kilojoules(most)
	slope, climb := "climbing took", v.Climb
	if climb < 0 {
		slope, climb = "descending gave", -climb
	}
	columns(w, [][]string{
		{"the drive gave", show(v.Drive), ""},
		{slope, show(climb), ""},
		{"brakes took", show(v.Brake), part},
		{"air drag took", show(v.Air), ""},
		{"rolling took", show(v.Rolling), ""},
		{"gain of kinetic energy", show(v.Kinetic), ""},
	}, map[int]bool{0: true, 2: true})
}

// printInside prints the heat that passed between the nodes inside.
func printInside(w io.Writer, b *energy.Book) {
	most := 0.0
	for _, p := range b.Paths {
		if p.Inside {
			most = math.Max(most, math.Abs(p.Net))
		}
	}
	show := kilojoules(most)
	var rows [][]string
	for _, p := range b.Paths {
		if p.Inside {
			rows = append(rows, []string{clip(p.Element), clip(p.From) + " to " + clip(p.To), show(p.Net)})
		}
	}
	if len(rows) == 0 {
		return
	}
	fmt.Fprintln(w, "\nNet heat between nodes of the run, in kJ")
	columns(w, rows, map[int]bool{0: true, 1: true})
}

// printChecks prints the verdict, and every check when asked or when one has failed.
func printChecks(w io.Writer, b *energy.Book, whole bool) {
	verdict := "The book is closed"
	if !b.Closed {
		verdict = "THE BOOK IS NOT CLOSED"
	}
	fmt.Fprintf(w, "\n%s: %s missing by the ledger%s, %s by the recount%s.\n", verdict, joule(b.LedgerGap),
		part(b.LedgerGap, b.Throughput, " of the throughput"), joule(b.IndependentGap), part(b.IndependentGap, b.Throughput, ""))
	if b.Closed && b.IndependentGap > coarse*b.Throughput {
		fmt.Fprintln(w, wrap("The recount tells little here: what the tolerance and the roundings of the temperatures carry along the "+
			"conductances is not small beside the energy that passed the border.", 0))
	}
	for _, c := range b.Checks {
		if c.Layer == 3 {
			fmt.Fprintf(w, "A second run at a tenth of the tolerance moved the highest temperatures by %s K at most (%s K allowed).\n",
				plain(c.Gap), plain(c.Allowed))
		}
	}
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

func joule(x float64) string { return plain(x) + " J" }

// coarse is the share of the throughput from which on a gap of the recount proves little.
const coarse = 0.01

// part shows x as a share in brackets, or nothing when there is nothing to share.
func part(x, of float64, what string) string {
	if of == 0 {
		return ""
	}
	return " (" + strings.NewReplacer("e-0", "e-").Replace(fmt.Sprintf("%.1g", x/of)) + what + ")"
}
