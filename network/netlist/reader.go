// Package netlist reads the JSON text of a network into declarations, each with its place in the file, and
// reports everything that is wrong with it in one go.
package netlist

import (
	"fmt"
	"slices"
	"strconv"

	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/unit"
)

// formatVersion is the version of the format that is read: the value of the key "workheat".
const formatVersion = 1

// A Netlist is what a file declares, in SI. Nodes that carry a state come first, held nodes last; within
// each part they keep the order of the file, as everything else does.
type Netlist struct {
	Title    string
	Nodes    []element.Node
	Limits   [][]element.Limit // by node
	Material []*element.Material
	Order    []int // node indices in the order of the file
	Groups   []element.Group
	Body     string // name of the vehicle, or empty
	Duty     duty.Program
	Tables   []*element.Curve // signals from duty.FirstTable on
	Rel, Abs float64          // tolerance: relative, and in K
	Every    float64          // s, sampling interval asked for; zero: none

	elements []declared
}

// A declared element with its place.
type declared struct {
	name  string
	at    diag.Span
	value *value
	kind  *element.Kind
	d     *element.Declaration
}

// An Opener returns the content of a file that a netlist refers to by its name.
type Opener func(name string) ([]byte, error)

// Defaults of the tolerance, and the relative ones that can be used: below, round-off is larger than the
// tolerance; above, a step says nothing.
const (
	DefaultRel = 1e-5
	DefaultAbs = 1e-5 // K
	LeastRel   = 1e-12
	MostRel    = 0.1
)

// Bounds of the report. A file with more than maxFound problems is not read to its end.
const (
	maxShown = 100
	maxFound = 1000
)

type reader struct {
	src  *diag.Source
	list diag.List
	cat  *element.Catalogue
	open Opener
	net  *Netlist

	params  unit.Params
	later   map[string]bool // parameters of the file that have not been read yet
	reading string          // the parameter being read
	lost    map[string]bool // parameters that were reported, or whose name cannot be used

	nodeAt     map[string]int // index by name
	capacities map[lump]*element.Curve
	nodeSpan   []diag.Span
	noNodes    bool // the nodes could not be read
	links      [][2]int
	used       []bool // node is an end of some element
	fed        []bool // node takes heat that is not a flow from another node
	torn       bool   // some element could not be placed: what links what is not known

	kindKeys map[*element.Kind][]string // what may be written, by kind
	vehicle  *element.Vehicle
	body     map[string]bool // names of declared bodies, broken ones too
	phases   []phasePlace

	bodiless bool // a body that does not exist was reported

	tables  map[string]int // table signals by content
	signals map[string]*declaredSignal
	files   map[string]*sheet

	doubts []doubt // materials of doubtful data, as they were read

	asked, compared int // see suggest
}

// Read reads a netlist. open may be nil when no other file may be read. The netlist is not usable when the
// problems hold one that is not a warning. At most 100 problems are returned, in order of place, and then
// one that says how many more there are.
func Read(src *diag.Source, cat *element.Catalogue, open Opener) (*Netlist, []diag.Problem) {
	r := &reader{
		src: src, cat: cat, open: open,
		params: unit.Params{}, later: map[string]bool{}, lost: map[string]bool{},
		nodeAt: map[string]int{}, capacities: map[lump]*element.Curve{}, body: map[string]bool{},
		kindKeys: map[*element.Kind][]string{},
		tables:   map[string]int{}, signals: map[string]*declaredSignal{}, files: map[string]*sheet{},
		net: &Netlist{Rel: DefaultRel, Abs: DefaultAbs},
	}
	root, hush, ok := parse(src, &r.list)
	syntax := r.list.Problems()
	if ok {
		r.list = diag.List{}
		r.root(&root)
		syntax = append(syntax, hushed(r.list.Problems(), hush)...)
	}
	return r.net, r.shown(syntax)
}

// hushed leaves out the problems that lie in places where a value was guessed.
func hushed(problems []diag.Problem, hush []diag.Span) []diag.Problem {
	if len(hush) == 0 {
		return problems
	}
	var kept []diag.Problem
	for _, p := range problems {
		inside := false
		for _, h := range hush {
			inside = inside || p.At.Source == h.Source && p.At.Start >= h.Start && p.At.Start < h.End
		}
		if !inside {
			kept = append(kept, p)
		}
	}
	return kept
}

// shown sorts the problems and cuts a long list.
func (r *reader) shown(problems []diag.Problem) []diag.Problem {
	var all diag.List
	for _, p := range problems {
		all.Add(p)
	}
	sorted := all.Problems()
	if len(sorted) <= maxShown {
		return sorted
	}
	rest := sorted[maxShown:]
	last := diag.Problem{At: r.src.Whole(), Text: fmt.Sprintf("… and %d more", len(rest)), Warning: true}
	if r.full() {
		last.Text = fmt.Sprintf("… and more than %d more", maxFound-maxShown-1)
		last.Help = "the rest of the file was not read"
	}
	for _, p := range rest {
		last.Warning = last.Warning && p.Warning
	}
	return append(sorted[:maxShown:maxShown], last)
}

// full reports whether so much is wrong that reading on helps nobody.
func (r *reader) full() bool { return r.list.Len() >= maxFound }

// topKeys are the keys of a netlist, in the order in which they are usually written.
var topKeys = []string{
	"workheat", "title", "about", "parameters", "signals", "nodes", "conductances", "sources", "bodies", "dissipators", "duty",
	"accuracy", "output",
}

// root reads the outermost object.
func (r *reader) root(v *value) {
	o, ok := r.object(v, "a netlist", topKeys)
	if !ok {
		return
	}
	r.version(o)
	for _, m := range o.value.members() {
		r.torn = r.torn || !slices.Contains(topKeys, m.key) // it may have held elements
	}
	if title := o.get("title"); title != nil {
		if title.kind != '"' {
			r.list.At(r.span(title), `"title" is `+kindNames[title.kind]+", but text is due", "")
		}
		r.net.Title = title.text
	}
	r.parameters(o.get("parameters"))
	r.declareSignals(o.get("signals"))
	r.nodes(o)
	r.bodies(o.get("bodies"))
	for _, section := range element.Sections {
		if section != element.Bodies { // they come first: others refer to them
			r.section(section, o.get(string(section)))
		}
	}
	r.accuracy(o.get("accuracy"))
	r.output(o.get("output"))
	r.duty(o)
	r.checkNetwork(o)
	r.unusedSignals()
	r.group()
	r.doubtful()
}

func (r *reader) version(o object) {
	v := o.get("workheat")
	help := fmt.Sprintf(`write "workheat": %d`, formatVersion)
	switch {
	case v == nil:
		r.list.At(r.brace(o), `the key "workheat" is missing`, help+" as the first key: it is the version of the format")
	case v.kind != '0':
		r.list.At(r.span(v), "the version of the format is "+kindNames[v.kind]+", but a number is due", help)
	default:
		if x, err := strconv.ParseFloat(v.text, 64); err != nil || x != formatVersion {
			r.list.At(r.span(v), fmt.Sprintf("version %s of the netlist format is not known here", v.text), help)
		}
	}
}

// accuracy reads the tolerance.
func (r *reader) accuracy(v *value) {
	if v == nil {
		return
	}
	o, ok := r.object(v, "accuracy", []string{"relative", "absolute"})
	if !ok {
		return
	}
	if x := o.get("relative"); x != nil {
		if f, ok := r.quantity(x, unit.Number); ok {
			if f < LeastRel || f > MostRel {
				r.list.At(r.span(x), fmt.Sprintf("a relative tolerance of %g cannot be used", f), fmt.Sprintf("give it between %g and %g; %g is usual", LeastRel, MostRel, DefaultRel))
			} else {
				r.net.Rel, r.net.Abs = f, f
			}
		}
	}
	if x := o.get("absolute"); x != nil {
		if f, ok := r.quantity(x, unit.TemperatureDifference); ok {
			if !(f >= 1e-12) || f > 10 {
				r.list.At(r.span(x), "an absolute tolerance of "+unit.TemperatureDifference.Format(f, 3)+" cannot be used", "give it between 1e-12 K and 10 K")
			} else {
				r.net.Abs = f
			}
		}
	}
}

// output reads what the files are to hold.
func (r *reader) output(v *value) {
	if v == nil {
		return
	}
	o, ok := r.object(v, "output", []string{"every"})
	if !ok {
		return
	}
	if x := o.get("every"); x != nil {
		if f, ok := r.quantity(x, unit.Time); ok && r.positive(x, f, "the interval") {
			r.net.Every = f
		}
	}
}
