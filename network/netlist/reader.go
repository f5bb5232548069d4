// Package netlist reads the JSON text of a network into declarations, each with its place in the file, and
// reports everything that is wrong with it in one go.
package netlist

import (
	"fmt"
	"math"
	"strings"

	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/unit"
)

// Version is the version of the format that is read: the value of the key "workheat".
const Version = 1

// A Netlist is what a file declares, in SI. Nodes that carry a state come first, held nodes last; within
// each part they keep the order of the file, as everything else does.
type Netlist struct {
	Source   *diag.Source
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
	section element.Section
	name    string
	at      diag.Span
	kind    *element.Kind
	d       *element.Declaration
	keys    map[string]diag.Span
}

// An Opener returns the content of a file that a netlist refers to by its name.
type Opener func(name string) ([]byte, error)

// Defaults of the tolerance.
const (
	DefaultRel = 1e-6
	DefaultAbs = 1e-6 // K
)

type reader struct {
	src    *diag.Source
	list   diag.List
	cat    *element.Catalogue
	open   Opener
	net    *Netlist
	params unit.Params

	nodeAt   map[string]int // index by name
	nodeSpan []diag.Span
	used     []bool // node is an end of some element
	vehicle  *element.Vehicle
	body     map[string]bool // names of declared bodies, broken ones too
	places   []diag.Span     // of duty phases
	tables   map[string]int  // table signals by content
	signals  object          // declared signals
	files    map[string]*sheet
}

// Read reads a netlist. open may be nil when no other file may be read. The netlist is not usable when the
// problems hold one that is not a warning.
func Read(src *diag.Source, cat *element.Catalogue, open Opener) (*Netlist, []diag.Problem) {
	r := &reader{
		src: src, cat: cat, open: open, params: unit.Params{}, nodeAt: map[string]int{}, body: map[string]bool{},
		tables: map[string]int{}, files: map[string]*sheet{},
		net: &Netlist{Source: src, Rel: DefaultRel, Abs: DefaultAbs},
	}
	if root, ok := parse(src, &r.list); ok {
		r.root(&root)
	}
	return r.net, r.list.Problems()
}

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
	r.net.Title = r.textOf(o, "title")
	r.parameters(o.get("parameters"))
	if signals := o.get("signals"); signals != nil {
		r.signals, _ = r.object(signals, "signals", nil)
	}
	r.nodes(o.get("nodes"), v)
	r.bodies(o.get("bodies"))
	for _, section := range []element.Section{element.Conductances, element.Sources, element.Dissipators} {
		r.section(section, o.get(string(section)))
	}
	r.accuracy(o.get("accuracy"))
	r.output(o.get("output"))
	r.duty(o.get("duty"), v)
	r.checkNetwork()
	r.group()
}

func (r *reader) version(o object) {
	v := o.get("workheat")
	if v == nil {
		r.list.At(r.src.Span(o.value.start, o.value.start+1), `the key "workheat" is missing`,
			fmt.Sprintf(`write "workheat": %d as the first key: it is the version of the format`, Version))
		return
	}
	if v.kind != '0' || v.text != fmt.Sprint(Version) {
		r.list.At(r.span(v), "this version of the netlist format is not known",
			fmt.Sprintf(`write "workheat": %d`, Version))
	}
}

// parameters reads named quantities, each of which may use those before it.
func (r *reader) parameters(v *value) {
	if v == nil {
		return
	}
	o, ok := r.object(v, "parameters", nil)
	if !ok {
		return
	}
	for i := range o.value.members {
		m := &o.value.members[i]
		if m.key == "about" {
			continue
		}
		if fault := unit.NameFault(m.key); fault != nil {
			r.list.At(r.src.Span(m.start, m.end), fault.Text, fault.Help)
			continue
		}
		switch m.value.kind {
		case '"':
			q, fault := unit.Parse(m.value.text, r.params)
			if fault != nil {
				r.fault(&m.value, fault)
				q = unit.Quantity{Value: math.NaN()}
			}
			r.params[m.key] = q
		case '0':
			if x, ok := r.plain(&m.value); ok {
				r.params[m.key] = unit.Quantity{Value: x}
			}
		default:
			r.list.At(r.span(&m.value), "a parameter is "+kindNames[m.value.kind]+", but a quantity is due",
				`write text with a unit, such as "12 kg", or a plain number`)
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
			if f < 1e-12 || f > 0.1 {
				r.list.At(r.span(x), fmt.Sprintf("a relative tolerance of %g cannot be used", f), "give it between 1e-12 and 0.1; 1e-6 is usual")
			} else {
				r.net.Rel = f
				r.net.Abs = f
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

// positive reports a value that is not above zero.
func (r *reader) positive(v *value, x float64, what string) bool {
	if x > 0 {
		return true
	}
	r.list.At(r.span(v), what+" must be above zero", "")
	return false
}

// An object is a JSON object whose keys have been checked.
type object struct{ value *value }

// get returns the value of a key, the last one if it stands twice, or nil.
func (o object) get(key string) *value {
	if o.value == nil {
		return nil
	}
	for i := len(o.value.members) - 1; i >= 0; i-- {
		if o.value.members[i].key == key {
			return &o.value.members[i].value
		}
	}
	return nil
}

// members returns the members of the object.
func (o object) members() []member {
	if o.value == nil {
		return nil
	}
	return o.value.members
}

// object checks that v is an object, that no key stands twice and, unless known is nil, that every key is
// known; "about" is allowed everywhere.
func (r *reader) object(v *value, what string, known []string) (object, bool) {
	if v.kind != '{' {
		r.list.At(r.span(v), fmt.Sprintf("%s is %s, but an object in braces { } is due", what, kindNames[v.kind]), "")
		return object{}, false
	}
	first := make(map[string]int, len(v.members))
	for i := range v.members {
		m := &v.members[i]
		at := r.src.Span(m.start, m.end)
		if j, ok := first[m.key]; ok {
			r.list.Add(diag.Problem{At: at, Text: fmt.Sprintf("the key %s stands twice", quote(m.key)),
				Help: "remove one, or give it another name",
				See:  []diag.Note{{At: r.src.Span(v.members[j].start, v.members[j].end), Text: "the first one"}}})
			continue
		}
		first[m.key] = i
		if known != nil && m.key != "about" && !contains(known, m.key) {
			r.list.At(at, fmt.Sprintf("the key %s is not known in %s", quote(m.key), what), r.suggest(m.key, known))
		}
		if m.key == "about" && known != nil && m.value.kind != '"' {
			r.list.At(r.span(&m.value), `"about" is `+kindNames[m.value.kind]+", but text is due", "")
		}
	}
	return object{v}, true
}

func contains(list []string, s string) bool {
	for _, x := range list {
		if x == s {
			return true
		}
	}
	return false
}

// quote puts a name in quotes, cut if it is long.
func quote(name string) string {
	if runes := []rune(name); len(runes) > 60 {
		name = string(runes[:57]) + "..."
	}
	return `"` + name + `"`
}

// suggest words the cure for an unknown name.
func (r *reader) suggest(name string, known []string) string {
	if near := diag.Nearest(name, known); near != "" {
		return "did you mean " + quote(near) + "?"
	}
	if len(known) == 0 {
		return ""
	}
	shown := known
	if len(shown) > 12 {
		shown = shown[:12]
	}
	text := "known here: " + strings.Join(shown, ", ")
	if len(shown) < len(known) {
		text += fmt.Sprintf(" and %d more", len(known)-len(shown))
	}
	return text
}

// textOf returns the text of a key, or nothing.
func (r *reader) textOf(o object, key string) string {
	v := o.get(key)
	if v == nil {
		return ""
	}
	if v.kind != '"' {
		r.list.At(r.span(v), fmt.Sprintf("%s is %s, but text is due", quote(key), kindNames[v.kind]), "")
		return ""
	}
	return v.text
}
