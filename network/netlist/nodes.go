package netlist

import (
	"fmt"
	"math"

	"workheat/network/diag"
	"workheat/network/element"
	"workheat/network/unit"
)

var nodeKeys = []string{"mass", "material", "heat capacity", "massless", "held", "start", "limits"}

// defaultStart is where a node starts when its netlist does not say: 20 degC, the usual reference.
const defaultStart = 293.15

// nodes reads all nodes, those with a state first.
func (r *reader) nodes(v, root *value) {
	if v == nil {
		r.list.At(r.src.Span(root.start, root.start+1), `the key "nodes" is missing`, "declare at least one node")
		return
	}
	o, ok := r.object(v, "nodes", nil)
	if !ok {
		return
	}
	var held []nodeDraft
	order := []string{}
	seen := map[string]bool{}
	for i := range o.value.members {
		m := &o.value.members[i]
		if m.key == "about" || seen[m.key] {
			continue
		}
		seen[m.key] = true
		if m.key == "" {
			r.list.At(r.src.Span(m.start, m.end), "a node needs a name", "")
			continue
		}
		order = append(order, m.key)
		d := r.node(m)
		if d.node.Form == element.Held {
			held = append(held, d)
			continue
		}
		r.addNode(d)
	}
	for _, d := range held {
		r.addNode(d)
	}
	for _, name := range order {
		r.net.Order = append(r.net.Order, r.nodeAt[name])
	}
	if len(order) == 0 {
		r.list.At(r.span(v), "there is no node", "declare at least one node with a mass or a heat capacity")
	}
	r.used = make([]bool, len(r.net.Nodes))
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
	d := nodeDraft{at: r.src.Span(m.start, m.end)}
	d.node = element.Node{Name: m.key, Form: element.Stored, Start: defaultStart, Capacity: element.Constant(1)}
	o, ok := r.object(&m.value, "a node", nodeKeys)
	if !ok {
		return d
	}
	r.form(o, m, &d)
	if v := o.get("start"); v != nil {
		if d.node.Form == element.Held {
			r.list.At(r.span(v), "a held node has no start", `its temperature is what "held" says from the beginning`)
		} else if t, ok := r.quantity(v, unit.Temperature); ok {
			d.node.Start = t
		}
	}
	d.limits = r.limits(o.get("limits"), &d)
	return d
}

// form finds out what the node's temperature follows from: exactly one way must be given.
func (r *reader) form(o object, m *member, d *nodeDraft) {
	mass, capacity := o.get("mass"), o.get("heat capacity")
	massless, held := o.get("massless"), o.get("held")
	var ways []*value
	for _, v := range []*value{mass, capacity, massless, held} {
		if v != nil {
			ways = append(ways, v)
		}
	}
	switch {
	case len(ways) == 0:
		r.list.At(d.at, "the node has no heat capacity",
			`give it "mass" and "material", or "heat capacity", or "massless": true, or hold it at a temperature with "held"`)
		return
	case len(ways) > 1:
		r.list.At(r.span(ways[1]), "the node has more than one of mass, heat capacity, massless and held", "keep one of them")
		if held != nil {
			d.node.Form = element.Held
		}
		return
	}
	if material := o.get("material"); material != nil && mass == nil {
		r.list.At(r.span(material), "a material without a mass has no effect", `add "mass", or remove the material`)
	}
	switch {
	case mass != nil:
		r.massive(o, mass, d)
	case capacity != nil:
		if c, ok := r.capacity(capacity); ok {
			d.node.Capacity = c
		}
	case massless != nil:
		d.node.Form, d.node.Capacity = element.Massless, nil
		if massless.kind != 't' {
			r.list.At(r.span(massless), `"massless" can only be true`, "remove the key if the node has a mass")
		}
	default:
		d.node.Form, d.node.Capacity = element.Held, nil
		d.node.Signal, _ = r.signal(held, "the held temperature", unit.Temperature, anyValue)
		if d.node.Signal == 0 {
			d.node.Signal = r.constantSignal(defaultStart)
		}
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
		d.material = mat
		d.node.Capacity = mat.Capacity.Scaled(m)
	}
}

func list(names []string) string {
	text := ""
	for i, n := range names {
		if i > 0 {
			text += ", "
		}
		text += n
	}
	return text
}

// material finds a material by its name.
func (r *reader) material(v *value) (*element.Material, bool) {
	if v.kind != '"' {
		r.list.At(r.span(v), "the name of a material is due, not "+kindNames[v.kind], "")
		return nil, false
	}
	if m := r.cat.Material(v.text); m != nil {
		return m, true
	}
	r.list.At(r.span(v), fmt.Sprintf("the material %s is not known", quote(v.text)), r.suggest(v.text, r.cat.MaterialNames()))
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
	c, ok := r.table(v, "the heat capacity", "temperature", unit.Temperature, unit.HeatCapacity)
	if ok && !(c.Least() > 0) {
		r.list.At(r.span(v), "the heat capacity must be above zero at every temperature", "")
		return nil, false
	}
	return c, ok
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
	for i := range o.value.members {
		m := &o.value.members[i]
		if m.key == "about" {
			continue
		}
		t, ok := r.quantity(&m.value, unit.Temperature)
		if !ok {
			continue
		}
		if d.node.Form == element.Stored && t < d.node.Start {
			r.list.At(r.span(&m.value), fmt.Sprintf("the limit is below the start temperature of the node, %s", unit.Temperature.Format(d.node.Start, 4)),
				"a node that starts above its limit has no margin to report")
			continue
		}
		limits = append(limits, element.Limit{Name: m.key, Temperature: t})
	}
	return limits
}

// findNode finds a node by its name.
func (r *reader) findNode(v *value, what string) (int, bool) {
	if v.kind != '"' {
		r.list.At(r.span(v), fmt.Sprintf("%s: the name of a node is due, not %s", what, kindNames[v.kind]), "")
		return 0, false
	}
	if i, ok := r.nodeAt[v.text]; ok {
		return i, true
	}
	r.list.At(r.span(v), fmt.Sprintf("the node %s is not declared", quote(v.text)), r.suggest(v.text, r.nodeNames()))
	return 0, false
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
		return r.net.Tables[n.Signal-firstTable].At(0)
	case element.Stored:
		return n.Start
	}
	return math.NaN()
}
