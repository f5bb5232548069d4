package main

import (
	"fmt"
	"strconv"
	"strings"

	"github.com/goccy/go-json"
)

// A problem is a bench-net-1 file: columns, all in SI.
type problem struct {
	Format   string  `json:"format"`
	Name     string  `json:"name"`
	End      float64 `json:"t_end"`
	DtOut    float64 `json:"dt_out"`
	TRef     float64 `json:"T_ref"`
	Boundary struct {
		T []float64 `json:"T"`
	} `json:"boundary"`
	Node struct {
		C0, C1, T0 []float64
	} `json:"node"`
	Link struct {
		A []int     `json:"a"`
		B []int     `json:"b"`
		G []float64 `json:"G"`
	} `json:"link"`
	Conv struct {
		Node []int     `json:"node"`
		Bnd  []int     `json:"bnd"`
		A    []float64 `json:"A"`
		H0   []float64 `json:"h0"`
		H1   []float64 `json:"h1"`
	} `json:"conv"`
	Rad struct {
		Node []int     `json:"node"`
		Bnd  []int     `json:"bnd"`
		EA   []float64 `json:"eA"`
	} `json:"rad"`
	Heat struct {
		Node  []int     `json:"node"`
		Share []float64 `json:"share"`
	} `json:"heat"`
	Segment struct {
		T, P0, P1, V0, V1 []float64
	} `json:"segment"`
	Mech  json.RawMessage `json:"mech"`
	Probe []int           `json:"probe"`
}

// readProblem decodes a bench-net-1 file.
func readProblem(text []byte) (*problem, error) {
	p := &problem{}
	if err := json.Unmarshal(text, p); err != nil {
		return nil, fmt.Errorf("reading the problem: %w", err)
	}
	if p.Format != "bench-net-1" {
		return nil, fmt.Errorf("the format %q is not bench-net-1", p.Format)
	}
	if len(p.Mech) > 0 {
		return nil, fmt.Errorf("%s has a mechanical part, which a netlist cannot say", p.Name)
	}
	return p, p.check()
}

// check looks whether all columns of a part are of one length, refer only to what is there, and hold a run.
func (p *problem) check() error {
	seg := &p.Segment
	n := len(p.Node.C0)
	for _, c := range []struct {
		what string
		ok   bool
	}{
		{"node", same(n, len(p.Node.C1), len(p.Node.T0)) && n > 0},
		{"link", same(len(p.Link.A), len(p.Link.B), len(p.Link.G)) && within(p.Link.A, n) && within(p.Link.B, n)},
		{"conv", same(len(p.Conv.Node), len(p.Conv.Bnd), len(p.Conv.A), len(p.Conv.H0), len(p.Conv.H1)) &&
			within(p.Conv.Node, n) && within(p.Conv.Bnd, len(p.Boundary.T))},
		{"rad", same(len(p.Rad.Node), len(p.Rad.Bnd), len(p.Rad.EA)) && within(p.Rad.Node, n) && within(p.Rad.Bnd, len(p.Boundary.T))},
		{"heat", same(len(p.Heat.Node), len(p.Heat.Share)) && within(p.Heat.Node, n)},
		{"segment", same(len(seg.T), len(seg.P0)+1, len(seg.P1)+1, len(seg.V0)+1, len(seg.V1)+1) && len(seg.T) > 1},
		{"probe", within(p.Probe, n)},
		{"t_end", p.End > 0 && p.DtOut > 0 && p.End/p.DtOut < 1e9},
	} {
		if !c.ok {
			return fmt.Errorf("the part %q of the problem does not fit together", c.what)
		}
	}
	return nil
}

func same(lengths ...int) bool {
	for _, n := range lengths {
		if n != lengths[0] {
			return false
		}
	}
	return true
}

// within reports whether all indices lie in [0, n).
func within(indices []int, n int) bool {
	for _, i := range indices {
		if i < 0 || i >= n {
			return false
		}
	}
	return true
}

// A writer builds a netlist's text.
type writer struct {
	strings.Builder
	first bool
}

func (w *writer) open(section string) {
	fmt.Fprintf(w, ",\n%q: {", section)
	w.first = true
}

func (w *writer) close() { w.WriteString("\n}") }

func (w *writer) entry(format string, args ...any) {
	if !w.first {
		w.WriteByte(',')
	}
	w.first = false
	w.WriteString("\n")
	fmt.Fprintf(w, format, args...)
}

func num(x float64) string { return strconv.FormatFloat(x, 'g', -1, 64) }

// netlist writes the problem as a netlist.
func (p *problem) netlist() []byte {
	w := &writer{}
	fmt.Fprintf(w, "{\"workheat\": 1, \"title\": %q", p.Name)
	w.open("signals")
	w.entry(`"speed": %s`, p.table(p.Segment.V0, p.Segment.V1, "m/s"))
	w.entry(`"power": %s`, p.table(p.Segment.P0, p.Segment.P1, "W"))
	w.close()
	w.open("nodes")
	for i := range p.Node.C0 {
		w.entry(`"n%d": {"heat capacity": %s, "start": "%s K"}`, i, p.capacity(i), num(p.Node.T0[i]))
	}
	for i, t := range p.Boundary.T {
		w.entry(`"b%d": {"held": "%s K"}`, i, num(t))
	}
	w.close()
	w.open("conductances")
	for k := range p.Link.G {
		w.entry(`"l%d": {"kind": "conduction", "between": ["n%d", "n%d"], "value": "%s W/K"}`, k, p.Link.A[k], p.Link.B[k], num(p.Link.G[k]))
	}
	for k := range p.Conv.A {
		moving := ""
		if p.Conv.H1[k] != 0 {
			moving = fmt.Sprintf(`, "speed coefficient": "%s W/(m^2 K)", "speed exponent": 0.8, "speed": {"signal": "speed"}`, num(p.Conv.H1[k]))
		}
		w.entry(`"c%d": {"kind": "convection", "between": ["n%d", "b%d"], "area": "%s m^2", "coefficient": "%s W/(m^2 K)"%s}`,
			k, p.Conv.Node[k], p.Conv.Bnd[k], num(p.Conv.A[k]), num(p.Conv.H0[k]), moving)
	}
	for k := range p.Rad.EA {
		w.entry(`"r%d": {"kind": "radiation", "between": ["n%d", "b%d"], "emissivity": 1, "area": "%s m^2"}`, k, p.Rad.Node[k], p.Rad.Bnd[k], num(p.Rad.EA[k]))
	}
	w.close()
	p.sources(w)
	fmt.Fprintf(w, ",\n\"duty\": [{\"rest\": {\"for\": \"%s s\"}}]}\n", num(p.End))
	return []byte(w.String())
}

// sources writes the heat that goes into the nodes: shares of one power.
func (p *problem) sources(w *writer) {
	if len(p.Heat.Node) == 0 {
		return
	}
	w.open("sources")
	for k := range p.Heat.Node {
		w.entry(`"h%d": {"kind": "given heat", "into": "n%d", "factor": %s, "power": {"signal": "power"}}`, k, p.Heat.Node[k], num(p.Heat.Share[k]))
	}
	w.close()
}

// capacity writes C0 (1 + c1 (T - Tref)) as a table wide enough for any of the problems.
func (p *problem) capacity(i int) string {
	c0, c1 := p.Node.C0[i], p.Node.C1[i]
	if c1 == 0 {
		return fmt.Sprintf(`"%s J/K"`, num(c0))
	}
	const width = 4000 // K
	return fmt.Sprintf(`{"table": [["%s K", "%s J/K"], ["%s K", "%s J/K"]]}`, num(p.TRef), num(c0), num(p.TRef+width), num(c0*(1+c1*width)))
}

// table writes a drive that is linear within each segment and may jump between them.
func (p *problem) table(start, end []float64, unit string) string {
	var b strings.Builder
	b.WriteString(`{"table": [`)
	for k := range start {
		if k == 0 || start[k] != end[k-1] {
			fmt.Fprintf(&b, `["%s s", "%s %s"], `, num(p.Segment.T[k]), num(start[k]), unit)
		}
		fmt.Fprintf(&b, `["%s s", "%s %s"]`, num(p.Segment.T[k+1]), num(end[k]), unit)
		if k+1 < len(start) {
			b.WriteString(", ")
		}
	}
	b.WriteString("]}")
	return b.String()
}
