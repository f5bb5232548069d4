package netlist

import (
	"fmt"
	"math"
	"slices"

	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/unit"
)

var nodeKeys = []string{"mass", "material", "heat capacity", "massless", "held", "start", "limits"}

// defaultStart is where a node starts when its netlist does not say: 20 degC, the usual reference.
const defaultStart = 293.15

// nodes reads all nodes, those with a state first.
func (r *reader) nodes(root object) {
	v := root.get("nodes")
	r.noNodes = true
	if v == nil {
		r.list.At(r.brace(root), `the key "nodes" is missing`, "declare at least one node")
		return
	}
	o, ok := r.object(v, "nodes", nil)
	if !ok {
		return
	}
	var held []nodeDraft
	var order []string
	r.entries(o, func(m *member) {
		r.named(m, "a node")
		order = append(order, m.key)
		d := r.node(m)
		if d.node.Form == element.Held {
			held = append(held, d)
			return
		}
		r.addNode(d)
	})
	for _, d := range held {
		r.addNode(d)
	}
	for _, name := range order {
		r.net.Order = append(r.net.Order, r.nodeAt[name])
	}
	if len(order) == 0 {
		r.list.At(r.span(v), "there is no node", "declare at least one node with a mass or a heat capacity")
		return
	}
	r.noNodes = false
	r.used, r.fed = make([]bool, len(r.net.Nodes)), make([]bool, len(r.net.Nodes))
}

// A nodeDraft is a node on its way into the list.
type nodeDraft struct {
	node     element.Node
	material *element.Material
	limits   []element.Limit
	at       diag.Span
}

func (r *reader) addNode(d nodeDraft) {
	r.nodeAt[d.node.Name] = len(r.net.Nodes)
	r.net.Nodes = append(r.net.Nodes, d.node)
	r.net.Material = append(r.net.Material, d.material)
	r.net.Limits = append(r.net.Limits, d.limits)
	r.nodeSpan = append(r.nodeSpan, d.at)
}

// node reads one node. After a fault it still returns a node that others can refer to.
func (r *reader) node(m *member) nodeDraft {
	d := nodeDraft{at: r.keySpan(m)}
	d.node = element.Node{Name: m.key, Form: element.Stored, Start: defaultStart, Capacity: element.Constant(1)}
	o, ok := r.object(&m.value, "a node", nodeKeys)
	if !ok {
		d.node.Start = math.NaN()
		return d
	}
	r.form(o, &d)
	if v := o.get("start"); v != nil {
		if d.node.Form == element.Held {
			r.list.At(r.keyOf(o, "start"), "a held node has no start", `its temperature is what "held" says from the beginning`)
		} else if d.node.Start, ok = r.quantity(v, unit.Temperature); !ok {
			d.node.Start = math.NaN()
		}
	}
	d.limits = r.limits(o.get("limits"), &d)
	return d
}

// ways are the keys of which a node has exactly one: what its temperature follows from.
var ways = []string{"mass", "heat capacity", "massless", "held"}

// form finds out what the node's temperature follows from.
func (r *reader) form(o object, d *nodeDraft) {
	var way *member
	members := o.value.members()
	for i := range members {
		m := &members[i]
		switch {
		case m.twice || !slices.Contains(ways, m.key):
		case m.key == "massless" && m.value.kind != 't':
			r.list.At(r.span(&m.value), `"massless" can only be true`, "remove the key if the node has a mass or is held")
			if way == nil && len(members) == 1 {
				return
			}
		case way != nil:
			r.list.Add(diag.Problem{At: r.keySpan(m), Text: fmt.Sprintf("a node cannot have both %s and %s", quote(way.key), quote(m.key)),
				Help: "keep one of them", See: []diag.Note{{At: r.keySpan(way), Text: "the other one"}}})
		default:
			way = m
		}
	}
	if way == nil {
		r.list.At(d.at, "the node has no heat capacity",
			`give it "mass" and "material", or "heat capacity", or "massless": true, or hold it at a temperature with "held"`)
		return
	}
	if o.get("material") != nil && o.get("mass") == nil {
		r.list.At(r.keyOf(o, "material"), "a material without a mass has no effect", `add "mass", or remove the material`)
	}
	r.follow(o, way, d)
}

// follow reads what the node's temperature follows from.
func (r *reader) follow(o object, way *member, d *nodeDraft) {
	v := &way.value
	switch way.key {
	case "mass":
		r.massive(o, v, d)
	case "heat capacity":
		if c, ok := r.capacity(v); ok {
			d.node.Capacity = c
		}
	case "massless":
		d.node.Form, d.node.Capacity = element.Massless, nil
	default:
		d.node.Form, d.node.Capacity = element.Held, nil
		signal, ok := r.signal(v, "the held temperature", unit.Temperature, anyValue)
		if !ok {
			signal = r.constantSignal(defaultStart)
		}
		d.node.Signal = signal
	}
}

func anyValue(float64) string { return "" }

// massive reads a node of a mass and a material.
func (r *reader) massive(o object, mass *value, d *nodeDraft) {
	m, okMass := r.quantity(mass, unit.Mass)
	okMass = okMass && r.positive(mass, m, "the mass")
	v := o.get("material")
	if v == nil {
		r.list.At(d.at, "the node has a mass but no material", "add one of: "+list(r.cat.MaterialNames())+`; or give "heat capacity" instead`)
		return
	}
	mat, ok := r.material(v)
	if ok && okMass {
		d.material, d.node.Capacity = mat, r.capacityOf(mat, m)
	}
}

// A lump is a mass of a material.
type lump struct {
	of   *element.Material
	mass float64
}

// capacityOf returns the heat capacity of a lump; equal lumps share it.
func (r *reader) capacityOf(of *element.Material, mass float64) *element.Curve {
	key := lump{of, mass}
	c, ok := r.capacities[key]
	if !ok {
		c = of.Capacity.Scaled(mass)
		r.capacities[key] = c
	}
	return c
}

// material finds a material by its name.
func (r *reader) material(v *value) (*element.Material, bool) {
	names := r.cat.MaterialNames()
	if v.kind != '"' {
		r.list.At(r.span(v), "the name of a material is due, not "+kindNames[v.kind], "one of: "+list(names))
		return nil, false
	}
	name := v.text
	if m := r.cat.Material(name); m != nil {
		if m.Doubtful != "" {
			r.doubts = append(r.doubts, doubt{r.span(v), m})
		}
		return m, true
	}
	_, help := r.suggest(name, names)
	r.list.At(r.span(v), fmt.Sprintf("the material %s is not known", quote(name)), help)
	return nil, false
}

// capacity reads a heat capacity: constant, or a table over temperature.
func (r *reader) capacity(v *value) (*element.Curve, bool) {
	if v.kind != '{' {
		x, ok := r.quantity(v, unit.HeatCapacity)
		if !ok || !r.positive(v, x, "the heat capacity") {
			return nil, false
		}
		return element.Constant(x), true
	}
	t, ok := r.table(v, "the heat capacity", "temperature", unit.Temperature, unit.HeatCapacity)
	if !ok {
		return nil, false
	}
	ok = t.every(r, func(y float64) string {
		if y > 0 {
			return ""
		}
		return "the heat capacity must be above zero at every temperature"
	})
	return t.curve, ok
}

// limits reads the temperatures that a node must not pass.
func (r *reader) limits(v *value, d *nodeDraft) []element.Limit {
	if v == nil {
		return nil
	}
	o, ok := r.object(v, "limits", nil)
	if !ok {
		return nil
	}
	var limits []element.Limit
	r.entries(o, func(m *member) {
		r.named(m, "a limit")
		t, ok := r.quantity(&m.value, unit.Temperature)
		switch {
		case !ok:
		case d.node.Form == element.Held:
			r.list.Warn(r.keySpan(m), "a limit of a held node tests only what is given", "put it on a node whose temperature is computed")
		case d.node.Form == element.Stored && t < d.node.Start:
			r.list.At(r.span(&m.value), "the limit is below the start temperature of the node, "+unit.Temperature.Format(d.node.Start, 4),
				"a node that starts above its limit has no margin to report: check both")
		}
		if ok {
			limits = append(limits, element.Limit{Name: m.key, Temperature: t})
		}
	})
	return limits
}

// findNode finds a node by its name. One that was nearly named is found as well, but not ok; when none is,
// the index is -1.
func (r *reader) findNode(v *value) (i int, ok bool) {
	name, ok := r.text(v, "a node")
	if !ok {
		r.torn = true
		return -1, false
	}
	if i, ok := r.nodeAt[name]; ok {
		return i, true
	}
	if r.noNodes || r.full() {
		return -1, false
	}
	near, help := r.suggest(name, r.nodeNames())
	r.list.At(r.span(v), fmt.Sprintf("the node %s is not declared", quote(name)), help)
	if near == "" {
		r.torn = true
		return -1, false
	}
	return r.nodeAt[near], false
}

func (r *reader) nodeNames() []string {
	names := make([]string, 0, len(r.net.Order))
	for _, i := range r.net.Order {
		names = append(names, r.net.Nodes[i].Name)
	}
	return names
}

// start returns the temperature at which a node begins, or NaN for one whose start follows from others.
func (r *reader) start(i int) float64 {
	n := r.net.Nodes[i]
	switch n.Form {
	case element.Held:
		return r.net.Tables[n.Signal-duty.FirstTable].At(0)
	case element.Stored:
		return n.Start
	}
	return math.NaN()
}
