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
			fmt.Fprintln(w, wrap("  "+text, 4))
		}
	}
	if res.Interrupted {
		fmt.Fprintf(w, "\nInterrupted at %s: the tables hold what was reached.\n", clock(res.End))
	}
	if res.Failure != nil {
		fmt.Fprintf(w, "\nTHE NUMBERS FAILED at %s: the tables hold what was reached.\n", clock(res.End))
	}
	s := res.Stats
	fmt.Fprintf(w, "\n%s, relative tolerance %s: %d steps, %d rejected\n", res.Method, plain(res.Rel), s.Steps, s.Rejected)
	fmt.Fprintln(w, wrap(network.Caution, 0))
}

// columns aligns the cells of rows: the columns in left to the left, the others to the right.
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
	fmt.Fprintln(w, "Temperatures in degC (low after: the lowest after the first peak)")
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
	if len(paths) == 0 || paths[0].Net == 0 {
		return
	}
	show := kilojoules(paths[0].Net)
	var rows [][]string
	for _, p := range paths {
		if len(rows) == mostPaths || p.Net == 0 {
			break
		}
		from, to, net := end(p.From, p.Work), end(p.To, false), p.Net
		if net < 0 {
			from, to, net = to, from, -net
		}
		rows = append(rows, []string{clip(p.Element), from + " to " + to, show(net), share(net, b.WorkIn+b.HeatIn)})
	}
	fmt.Fprintln(w, "\nLargest heat paths: net heat of the run in kJ, and as a share of all that came in")
	columns(w, rows, map[int]bool{0: true, 1: true})
}

// end names one end of a path; what a dissipator turns into heat comes from work.
func end(name string, dissipator bool) string {
	switch {
	case name != "":
		return clip(name)
	case dissipator:
		return "work"
	}
	return "outside"
}

// kilojoules returns how the energies of one table are shown, all with the same decimals: five figures of the
// largest [J].
func kilojoules(largest float64) func(j float64) string {
	largest = math.Abs(largest) / 1000
	if largest != 0 && (largest >= 1e9 || largest < 1e-3) {
		return func(j float64) string { return fmt.Sprintf("%.4g", j/1000) }
	}
	decimals := 1
	if largest != 0 {
		decimals = max(0, 4-int(math.Floor(math.Log10(largest))))
	}
	zero := fmt.Sprintf("%.*f", decimals, 0.0)
	return func(j float64) string {
		text := fmt.Sprintf("%.*f", decimals, j/1000)
		if text == "-"+zero {
			return zero
		}
		return text
	}
}

// plain shows a number with few figures, without the zeros of a machine's exponent.
func plain(x float64) string {
	text := fmt.Sprintf("%.2g", x)
	if a := math.Abs(x); a >= 10 && a < 1e6 {
		text = fmt.Sprintf("%.0f", x)
	}
	return strings.NewReplacer("e-0", "e-", "e+0", "e", "e+", "e").Replace(text)
}

func share(x, of float64) string {
	if of == 0 {
		return "-"
	}
	return fmt.Sprintf("%.1f %%", 100*x/of)
}
