package main

import (
	"fmt"
	"io"
	"math"
	"sort"
	"strings"

	"workheat/network"
	"workheat/network/energy"
	"workheat/network/record"
	"workheat/network/unit"
)

// Bounds of what is shown of a large network.
const (
	mostNodes = 60
	mostPaths = 8
)

// printRun prints the tables of a run.
func printRun(w io.Writer, name string, res *network.Result, whole bool) {
	fmt.Fprintf(w, "%s\n", title(res, name))
	fmt.Fprintf(w, "%s of duty\n\n", clock(res.End))
	printNodes(w, res.Summary)
	if res.Book != nil {
		printPaths(w, res.Book)
		printBook(w, res.Book, whole)
	}
	if all := allWarnings(res); len(all) > 0 {
		fmt.Fprintln(w, "\nWarnings")
		for _, text := range all {
			fmt.Fprintf(w, "  %s\n", text)
		}
	}
	if res.Interrupted {
		fmt.Fprintf(w, "\nInterrupted at %s: the tables hold what was reached.\n", clock(res.End))
	}
	s := res.Stats
	fmt.Fprintf(w, "\n%s, relative tolerance %g: %d steps, %d rejected\n", res.Method, res.Rel, s.Steps, s.Rejected)
	fmt.Fprintf(w, "%s\n", network.Caution)
}

// columns aligns tab-separated cells: the first to the left, the others to the right.
func columns(w io.Writer, rows [][]string, left map[int]bool) {
	var width []int
	for _, row := range rows {
		for c, cell := range row {
			if c == len(width) {
				width = append(width, 0)
			}
			width[c] = max(width[c], len([]rune(cell)))
		}
	}
	for _, row := range rows {
		var line strings.Builder
		for c, cell := range row {
			gap := strings.Repeat(" ", width[c]-len([]rune(cell)))
			if c > 0 {
				line.WriteString("  ")
			}
			if left[c] {
				line.WriteString(cell + gap)
			} else {
				line.WriteString(gap + cell)
			}
		}
		fmt.Fprintln(w, "  "+strings.TrimRight(line.String(), " "))
	}
}

// printNodes prints the table of nodes, one more line for each further limit.
func printNodes(w io.Writer, list []record.Summary) {
	fmt.Fprintln(w, "Temperatures in degC")
	rows := [][]string{{"node", "start", "highest", "at", "low after", "end", "limit", "", "margin K", "time above"}}
	for i, s := range list {
		if i == mostNodes {
			rows = append(rows, []string{fmt.Sprintf("... and %d more nodes", len(list)-i)})
			break
		}
		row := []string{clip(s.Name), celsius(s.Start), celsius(s.Highest), clock(s.When), celsius(s.Lowest), celsius(s.End)}
		if s.Held {
			row[0] += " (held)"
		}
		if len(s.Limits) == 0 {
			rows = append(rows, row)
		}
		for j, l := range s.Limits {
			if j > 0 {
				row = []string{"", "", "", "", "", ""}
			}
			above := ""
			margin := fmt.Sprintf("%.1f", l.Margin)
			if l.Margin < 0 {
				above = clock(l.Above)
				margin += " !"
			}
			rows = append(rows, append(row, celsius(l.Temperature), clip(l.Name), margin, above))
		}
	}
	columns(w, rows, map[int]bool{0: true, 7: true})
}

func celsius(kelvin float64) string {
	if math.IsNaN(kelvin) {
		return "-"
	}
	return fmt.Sprintf("%.1f", unit.Temperature.Show(kelvin))
}

// clock shows a time in the unit that suits its length.
func clock(t float64) string {
	switch {
	case t < 600:
		return fmt.Sprintf("%.1f s", t)
	case t < 6*3600:
		return fmt.Sprintf("%.1f min", t/60)
	}
	return fmt.Sprintf("%.2f h", t/3600)
}

// clip cuts a long name.
func clip(name string) string {
	if r := []rune(name); len(r) > 36 {
		return string(r[:33]) + "..."
	}
	return name
}

// printPaths prints the paths that carried most on balance.
func printPaths(w io.Writer, b *energy.Book) {
	paths := append([]energy.PathLine(nil), b.Paths...)
	sort.SliceStable(paths, func(i, j int) bool { return math.Abs(paths[i].Net) > math.Abs(paths[j].Net) })
	var rows [][]string
	for _, p := range paths {
		if len(rows) == mostPaths || p.Net == 0 {
			break
		}
		from, to, net := p.From, p.To, p.Net
		if net < 0 {
			from, to, net = to, from, -net
		}
		rows = append(rows, []string{clip(p.Element), clip(end(from)) + " to " + clip(end(to)), kilojoule(net), share(net, b.WorkIn+b.HeatIn)})
	}
	if len(rows) == 0 {
		return
	}
	fmt.Fprintln(w, "\nTop heat paths, on balance of the run, in kJ and as a share of what came in")
	columns(w, rows, map[int]bool{0: true, 1: true})
}

func end(name string) string {
	if name == "" {
		return "outside"
	}
	return name
}

func kilojoule(j float64) string {
	k := j / 1000
	switch a := math.Abs(k); {
	case a == 0:
		return "0"
	case a >= 1e7 || a < 1e-3:
		return fmt.Sprintf("%.4g", k)
	case a >= 1000:
		return fmt.Sprintf("%.0f", k)
	}
	return fmt.Sprintf("%.4g", k)
}

func share(x, of float64) string {
	if of == 0 {
		return "-"
	}
	return fmt.Sprintf("%.1f %%", 100*x/of)
}
