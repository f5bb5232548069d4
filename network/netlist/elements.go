package netlist

import (
	"fmt"
	"math"

	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/unit"
)

const firstTable = duty.FirstTable

// bodies reads the bodies. One vehicle can be driven by a duty.
func (r *reader) bodies(v *value) {
	if v == nil {
		return
	}
	o, ok := r.object(v, "bodies", nil)
	if !ok {
		return
	}
	for i := range o.value.members {
		m := &o.value.members[i]
		if m.key == "about" || r.body[m.key] {
			continue
		}
		r.body[m.key] = true
		at := r.src.Span(m.start, m.end)
		if r.net.Body != "" {
			r.list.At(at, "a second body: the duty can drive only one", "leave one body, and give the braking of other axles as parts of it")
			continue
		}
		e, ok := r.declare(element.Bodies, m)
		r.net.Body = m.key
		if ok {
			v := e.kind.Vehicle(e.d)
			r.vehicle = &v
			r.net.Duty.Vehicle = &v
		}
	}
}

// section reads the elements of a section.
func (r *reader) section(section element.Section, v *value) {
	if v == nil {
		return
	}
	o, ok := r.object(v, string(section), nil)
	if !ok {
		return
	}
	seen := map[string]bool{}
	for i := range o.value.members {
		m := &o.value.members[i]
		if m.key == "about" || seen[m.key] {
			continue
		}
		seen[m.key] = true
		if e, ok := r.declare(section, m); ok {
			r.net.elements = append(r.net.elements, e)
		}
	}
}

// group sorts the elements by kind, in the order of the catalogue.
func (r *reader) group() {
	at := make(map[*element.Kind]int, len(r.cat.Kinds))
	for _, e := range r.net.elements {
		at[e.kind] = 0
	}
	for _, k := range r.cat.Kinds {
		if _, ok := at[k]; ok {
			at[k] = len(r.net.Groups)
			r.net.Groups = append(r.net.Groups, element.Group{Kind: k})
		}
	}
	for _, e := range r.net.elements {
		g := &r.net.Groups[at[e.kind]]
		g.Elements = append(g.Elements, e.d)
	}
}

// declare reads one element.
func (r *reader) declare(section element.Section, m *member) (declared, bool) {
	e := declared{section: section, name: m.key, at: r.src.Span(m.start, m.end), keys: map[string]diag.Span{}}
	if m.key == "" {
		r.list.At(e.at, "an element needs a name", "results, sweeps and fits address it by name")
	}
	what := "an entry of " + string(section)
	o, ok := r.object(&m.value, what, nil)
	if !ok {
		return e, false
	}
	if e.kind, ok = r.kind(section, o, e.at); !ok {
		r.touch(o)
		return e, false
	}
	known := []string{"kind"}
	for _, f := range e.kind.Fields {
		known = append(known, f.Key)
	}
	for i := range m.value.members {
		k := &m.value.members[i]
		e.keys[k.key] = r.src.Span(k.value.start, k.value.end)
		if k.key != "about" && !contains(known, k.key) {
			r.list.At(r.src.Span(k.start, k.end), fmt.Sprintf("the key %s is not known in the kind %s", quote(k.key), quote(e.kind.Name)), r.suggest(k.key, known))
		}
	}
	e.d = r.declaration(e)
	good := true
	for _, f := range e.kind.Fields {
		good = r.field(o, f, e) && good
	}
	if good && e.kind.Check != nil {
		failed := false
		report := e.d.Report
		e.d.Report = func(key, text, help string) { failed = true; report(key, text, help) }
		e.kind.Check(e.d)
		e.d.Report = report
		good = !failed
	}
	return e, good
}

// declaration returns an empty declaration that can report and look up.
func (r *reader) declaration(e declared) *element.Declaration {
	return &element.Declaration{
		Name: e.name, Values: map[string]element.Value{},
		Brake:   func(int) int { return duty.BrakeSignal },
		Vehicle: func(int) element.Vehicle { return *r.vehicle },
		Report: func(key, text, help string) {
			at, ok := e.keys[key]
			if !ok {
				at = e.at
			}
			r.list.At(at, text, help)
		},
	}
}

// touch marks the nodes that an element of an unknown kind speaks of, so that one fault brings no others.
func (r *reader) touch(o object) {
	var walk func(v *value)
	walk = func(v *value) {
		if i, ok := r.nodeAt[v.text]; ok && v.kind == '"' {
			r.used[i] = true
		}
		for i := range v.items {
			walk(&v.items[i])
		}
		for i := range v.members {
			if j, ok := r.nodeAt[v.members[i].key]; ok {
				r.used[j] = true
			}
			walk(&v.members[i].value)
		}
	}
	walk(o.value)
}

// kind finds the kind of an element.
func (r *reader) kind(section element.Section, o object, at diag.Span) (*element.Kind, bool) {
	names := r.cat.Names(section)
	v := o.get("kind")
	if v == nil {
		r.list.At(at, "the kind is missing", "add \"kind\", one of: "+list(names))
		return nil, false
	}
	if v.kind != '"' {
		r.list.At(r.span(v), "the kind is "+kindNames[v.kind]+", but a name is due", "one of: "+list(names))
		return nil, false
	}
	if k := r.cat.Find(section, v.text); k != nil {
		return k, true
	}
	help := r.suggest(v.text, names)
	for _, other := range []element.Section{element.Conductances, element.Sources, element.Bodies, element.Dissipators} {
		if other != section && r.cat.Find(other, v.text) != nil {
			help = "this kind belongs under " + quote(string(other))
		}
	}
	r.list.At(r.span(v), fmt.Sprintf("the kind %s is not known in %s", quote(v.text), section), help)
	return nil, false
}

// field reads one field of a declaration into its values.
func (r *reader) field(o object, f element.Field, e declared) bool {
	v := o.get(f.Key)
	if v == nil {
		if f.Default != "" {
			x, fault := f.Want.Read(f.Default, nil)
			if fault != nil {
				panic("netlist: the default of " + e.kind.Name + ": " + fault.Error())
			}
			e.d.Values[f.Key] = element.Value{Number: x, Signal: -1}
			if f.Type == element.Signal {
				e.d.Values[f.Key] = element.Value{Number: x, Signal: r.constantSignal(x)}
			}
			return true
		}
		if f.Required {
			r.list.At(e.at, fmt.Sprintf("the key %s is missing", quote(f.Key)), "it is: "+f.About)
		}
		return !f.Required
	}
	var out element.Value
	ok := false
	switch f.Type {
	case element.Quantity, element.Number:
		if out.Number, ok = r.quantity(v, f.Want); ok {
			ok = r.inRange(v, f, out.Number)
		}
	case element.Signal:
		out.Signal, ok = r.signal(v, quote(f.Key), f.Want, f.Outside)
	case element.NodeName:
		var i int
		if i, ok = r.findNode(v, quote(f.Key)); ok {
			out.Nodes = []int{i}
			r.used[i] = true
		}
	case element.NodePair:
		out.Nodes, ok = r.pair(v)
	case element.Shares:
		out.Nodes, out.Shares, ok = r.shares(v)
	case element.BodyName:
		out.Signal, ok = duty.SpeedSignal, r.findBody(v)
	case element.MaterialOf:
		out.Material, ok = r.material(v)
	case element.Text:
		if ok = v.kind == '"'; ok {
			out.Text = v.text
		} else {
			r.list.At(r.span(v), fmt.Sprintf("%s is %s, but text is due", quote(f.Key), kindNames[v.kind]), "")
		}
	}
	if ok {
		e.d.Values[f.Key] = out
	}
	return ok
}

// inRange reports a value outside the range of its field.
func (r *reader) inRange(v *value, f element.Field, x float64) bool {
	text := f.Outside(x)
	if text == "" {
		return true
	}
	r.list.At(r.span(v), text, "")
	return false
}

// pair reads the two ends of an element.
func (r *reader) pair(v *value) ([]int, bool) {
	if v.kind != '[' || len(v.items) != 2 {
		r.list.At(r.span(v), "two node names in a list are due", `write "between": ["one node", "another node"]`)
		return nil, false
	}
	a, okA := r.findNode(&v.items[0], "between")
	b, okB := r.findNode(&v.items[1], "between")
	if okA {
		r.used[a] = true
	}
	if okB {
		r.used[b] = true
	}
	if !okA || !okB {
		return nil, false
	}
	if a == b {
		r.list.At(r.span(v), fmt.Sprintf("both ends are the node %s", quote(v.items[0].text)), "an element links two different nodes")
		return nil, false
	}
	if r.net.Nodes[a].Form == element.Held && r.net.Nodes[b].Form == element.Held {
		r.list.At(r.span(v), "both ends are held at given temperatures", "the heat between them warms nothing of the network: remove the element, or free one end")
		return nil, false
	}
	return []int{a, b}, true
}

// shares reads how heat is shared between nodes.
func (r *reader) shares(v *value) ([]int, []float64, bool) {
	if v.kind == '"' { // one node takes it all
		i, ok := r.findNode(v, "shares")
		if ok {
			r.used[i] = true
		}
		return []int{i}, []float64{1}, ok
	}
	o, ok := r.object(v, "the shares", nil)
	if !ok {
		return nil, nil, false
	}
	var nodes []int
	var shares []float64
	sum := 0.0
	for i := range o.value.members {
		m := &o.value.members[i]
		if m.key == "about" {
			continue
		}
		name := value{kind: '"', start: m.start, end: m.end, text: m.key}
		node, okNode := r.findNode(&name, "shares")
		if okNode {
			r.used[node] = true
		}
		x, okShare := r.quantity(&m.value, unit.Number)
		if okShare && (x < 0 || x > 1) {
			r.list.At(r.span(&m.value), "a share must lie between 0 and 1", "")
			okShare = false
		}
		ok = ok && okNode && okShare
		sum += x
		nodes, shares = append(nodes, node), append(shares, x)
	}
	if ok && math.Abs(sum-1) > 1e-9 {
		r.list.At(r.span(v), fmt.Sprintf("the shares add to %.6g, not to 1", sum), "work that is lost or invented here would break the energy book")
		ok = false
	}
	return nodes, shares, ok
}

// findBody finds a body by its name.
func (r *reader) findBody(v *value) bool {
	if v.kind != '"' {
		r.list.At(r.span(v), "the name of a body is due, not "+kindNames[v.kind], "")
		return false
	}
	if v.text == r.net.Body && r.net.Body != "" {
		return r.vehicle != nil
	}
	if r.body[v.text] {
		return false
	}
	var known []string
	if r.net.Body != "" {
		known = append(known, r.net.Body)
	}
	help := r.suggest(v.text, known)
	if len(known) == 0 {
		help = `declare it under "bodies"`
	}
	r.list.At(r.span(v), fmt.Sprintf("the body %s is not declared", quote(v.text)), help)
	return false
}
