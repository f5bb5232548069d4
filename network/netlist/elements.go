package netlist

import (
	"fmt"
	"math"

	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/element"
)

// bodies reads the bodies. One vehicle can be driven by a duty.
func (r *reader) bodies(v *value) {
	if v == nil {
		return
	}
	o, ok := r.object(v, "bodies", nil)
	if !ok {
		r.body = nil
		r.net.Body = "bodies" // some name: a body was meant
		return
	}
	var first *member
	r.entries(o, func(m *member) {
		r.body[m.key] = true
		if first != nil {
			r.list.Add(diag.Problem{At: r.keySpan(m), Text: "a second body: the duty can drive only one",
				Help: "leave one body, and give the braking of other axles as parts of it",
				See:  []diag.Note{{At: r.keySpan(first), Text: "the first one"}}})
			return
		}
		first = m
		r.net.Body = m.key
		if e, ok := r.declare(element.Bodies, m); ok {
			v := e.kind.Vehicle(e.d)
			r.vehicle, r.net.Duty.Vehicle = &v, &v
		}
	})
}

// section reads the elements of a section.
func (r *reader) section(section element.Section, v *value) {
	if v == nil {
		return
	}
	o, ok := r.object(v, string(section), nil)
	if !ok {
		r.torn = true
		return
	}
	r.entries(o, func(m *member) {
		if e, ok := r.declare(section, m); ok {
			r.net.elements = append(r.net.elements, e)
		}
	})
}

// group sorts the elements by kind, in the order of the catalogue, and has each kind look at all of its own.
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
	for _, g := range r.net.Groups {
		if g.Kind.Together != nil {
			g.Kind.Together(g.Elements)
		}
	}
}

// declare reads one element. It is good when nothing is wrong with it.
func (r *reader) declare(section element.Section, m *member) (e declared, good bool) {
	e = declared{name: m.key, at: r.keySpan(m), value: &m.value}
	r.named(m, "an element")
	placed := len(r.links)
	defer func() {
		r.torn = r.torn || section != element.Bodies && len(r.links) == placed
	}()
	o, ok := r.object(&m.value, "an entry of "+string(section), nil)
	if !ok {
		return e, false
	}
	if e.kind, good = r.kind(section, o, e.at); e.kind == nil {
		return e, false
	}
	r.elementKeys(o, e.kind)
	e.d = r.declaration(&e)
	whole := true
	for i := range e.kind.Fields {
		f := &e.kind.Fields[i]
		v := o.get(f.Key)
		switch {
		case v != nil:
			good = r.field(v, f, &e) && good
		case f.Default != "":
			r.standard(f, &e)
		case f.Required:
			r.list.At(e.at, fmt.Sprintf("the key %s is missing", quote(f.Key)), "it is: "+f.About)
			good, whole = false, false
		}
	}
	if whole && e.kind.Check != nil {
		report := e.d.Report
		e.d.Report = func(key, text, help string) { good = false; report(key, text, help) }
		e.kind.Check(e.d)
		e.d.Report = report
	}
	return e, good
}

// elementKeys reports the keys that a kind does not know.
func (r *reader) elementKeys(o object, k *element.Kind) {
	keys, ok := r.kindKeys[k]
	if !ok {
		keys = []string{"kind"}
		for _, f := range k.Fields {
			keys = append(keys, f.Key)
		}
		r.kindKeys[k] = keys
	}
	r.unknownKeys(o.value.members(), "the kind "+quote(k.Name), keys)
}

// declaration returns an empty declaration that can report and look up.
func (r *reader) declaration(e *declared) *element.Declaration {
	at, o := e.at, object{e.value}
	return &element.Declaration{
		Name: e.name, Values: make(map[string]element.Value, len(e.kind.Fields)),
		Brake: func(int) int { return duty.BrakeSignal },
		Vehicle: func(int) element.Vehicle {
			if r.vehicle == nil { // reported: nothing must follow from its numbers
				return element.Vehicle{Mass: math.NaN(), Rotating: math.NaN(), Wheel: math.NaN()}
			}
			return *r.vehicle
		},
		Report: func(key, text, help string) {
			if v := o.get(key); v != nil {
				r.list.At(r.span(v), text, help)
				return
			}
			r.list.At(at, text, help)
		},
	}
}

// kind finds the kind of an element. One that was nearly named is found as well, but not ok.
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
	for _, other := range element.Sections {
		if k := r.cat.Find(other, v.text); k != nil {
			r.list.At(r.span(v), fmt.Sprintf("the kind %s does not stand in %s", quote(v.text), section), "move this element to "+quote(string(other)))
			return nil, false
		}
	}
	near, help := r.suggest(v.text, names)
	r.list.At(r.span(v), fmt.Sprintf("the kind %s is not known in %s", quote(v.text), section), help)
	return r.cat.Find(section, near), false
}
