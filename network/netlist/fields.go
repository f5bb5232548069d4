package netlist

import (
	"fmt"
	"math"

	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/unit"
)

// standard fills in the default of a field.
func (r *reader) standard(f *element.Field, e *declared) {
	x, fault := f.Want.Read(f.Default, nil)
	if fault != nil {
		panic("netlist: the default of " + e.kind.Name + ": " + fault.Error())
	}
	v := element.Value{Number: x, Signal: -1}
	if f.Type == element.Signal {
		v.Signal = r.constantSignal(x)
	}
	e.d.Values[f.Key] = v
}

// field reads one field of a declaration into its values. A field that cannot be read is there, with a
// number that is none, so that a kind's check finds it given and draws nothing from it.
func (r *reader) field(v *value, f *element.Field, e *declared) bool {
	out, ok := element.Value{}, false
	switch f.Type {
	case element.Quantity, element.Number:
		if out.Number, ok = r.quantity(v, f.Want); ok {
			ok = r.inRange(v, f, out.Number)
		}
	case element.Signal:
		out.Signal, ok = r.signal(v, quote(f.Key), f.Want, f.Outside)
	case element.NodePair:
		out.Nodes, ok = r.pair(v, f.Key)
	case element.Shares:
		out.Nodes, out.Shares, ok = r.shares(v)
	case element.BodyName:
		out.Signal, ok = duty.SpeedSignal, r.findBody(v)
	case element.MaterialOf:
		out.Material, ok = r.material(v)
	case element.Text:
		if out.Text, ok = v.text, v.kind == '"'; !ok {
			r.list.At(r.span(v), fmt.Sprintf("%s is %s, but text is due", quote(f.Key), kindNames[v.kind]), "")
		}
	}
	if !ok {
		out.Number = math.NaN()
	}
	e.d.Values[f.Key] = out
	return ok
}

// inRange reports a value outside the range of its field.
func (r *reader) inRange(v *value, f *element.Field, x float64) bool {
	text := f.Outside(x)
	if text == "" {
		return true
	}
	help := ""
	if f.Want.Unit == "" && f.Max == 1 {
		help = percent(x)
	}
	r.list.At(r.span(v), text, help)
	return false
}

// percent is the cure for a part of one that may have been meant in percent.
func percent(x float64) string {
	if x < 2 || x > 100 {
		return ""
	}
	return fmt.Sprintf("if percent is meant write \"%g %%\"", x)
}

// use marks a node as the end of an element.
func (r *reader) use(i int) {
	if i >= 0 {
		r.used[i] = true
	}
}

// pair reads the two ends of an element.
func (r *reader) pair(v *value, key string) ([]int, bool) {
	items := v.items()
	if len(items) != 2 {
		text := "two node names in a list are due"
		if v.kind == '[' {
			text = fmt.Sprintf("two node names are due, not %d", len(items))
		}
		r.list.At(r.span(v), text, fmt.Sprintf(`write %q: ["one node", "another node"]`, key))
		return nil, false
	}
	a, okA := r.findNode(&items[0])
	b, okB := r.findNode(&items[1])
	r.use(a)
	r.use(b)
	if a < 0 || b < 0 {
		return nil, false
	}
	r.links = append(r.links, [2]int{a, b})
	switch {
	case !okA || !okB:
		return nil, false
	case a == b:
		r.list.At(r.span(&items[1]), fmt.Sprintf("both ends are the node %s", quote(items[0].text)), "an element links two different nodes")
		return nil, false
	case r.net.Nodes[a].Form == element.Held && r.net.Nodes[b].Form == element.Held:
		r.list.At(r.span(v), "both ends are held at given temperatures", "the heat between them warms nothing of the network: remove the element, or free one end")
		return nil, false
	}
	return []int{a, b}, true
}

// heat marks a node that takes heat. It counts as a place of its element like a link to itself.
func (r *reader) heat(i int) {
	r.use(i)
	if i >= 0 {
		r.fed[i] = true
		r.links = append(r.links, [2]int{i, i})
	}
}

// shares reads how heat is shared between nodes.
func (r *reader) shares(v *value) ([]int, []float64, bool) {
	if v.kind == '"' { // one node takes it all
		i, ok := r.findNode(v)
		r.heat(i)
		return []int{i}, []float64{1}, ok
	}
	if v.kind != '{' {
		r.list.At(r.span(v), "a node, or several with their shares, are due, not "+kindNames[v.kind], `write "one node" or {"one node": 0.9, "another node": 0.1}`)
		return nil, nil, false
	}
	o, _ := r.object(v, "the shares", nil)
	var nodes []int
	var shares []float64
	ok := true
	r.entries(o, func(m *member) {
		name := value{kind: '"', start: m.start, end: m.end, text: m.key}
		node, okNode := r.findNode(&name)
		r.heat(node)
		x, okShare := r.quantity(&m.value, unit.Number)
		if okShare && (x < 0 || x > 1) {
			r.list.At(r.span(&m.value), "a share must lie between 0 and 1", percent(x))
			okShare = false
		}
		ok = ok && okNode && okShare
		nodes, shares = append(nodes, node), append(shares, x)
	})
	switch {
	case len(nodes) == 0:
		r.list.At(r.span(v), "no node takes the heat", `write {"one node": 0.9, "another node": 0.1}`)
		return nil, nil, false
	case r.doubled(o) || !ok:
		return nil, nil, false
	}
	return nodes, shares, r.addToOne(v, shares)
}

// doubled reports whether a key of an object stands twice, which has been reported.
func (r *reader) doubled(o object) bool {
	for _, m := range o.value.members() {
		if m.twice {
			return true
		}
	}
	return false
}

// addToOne checks that shares add to one but for the digits they were written with. Then it moves them to
// the nearest multiples of 2^-53, whose sums below one are exact in any order, and gives the rest to the
// largest: they add to one exactly.
func (r *reader) addToOne(v *value, shares []float64) bool {
	sum, most := 0.0, 0
	for i, x := range shares {
		sum += x
		if x > shares[most] {
			most = i
		}
	}
	if math.Abs(sum-1) > 1e-9 {
		r.list.At(r.span(v), fmt.Sprintf("the shares add to %.10g, not to 1", sum), "work that is lost or invented here would break the energy book")
		return false
	}
	const grid = 1 << 53
	rest := 1.0
	for i := range shares {
		shares[i] = math.Round(shares[i]*grid) / grid
		if i != most {
			rest -= shares[i]
		}
	}
	shares[most] = rest
	return true
}

// findBody finds a body by its name.
func (r *reader) findBody(v *value) bool {
	name, ok := r.text(v, "a body")
	if !ok {
		return false
	}
	if name == r.net.Body && name != "" {
		return r.vehicle != nil
	}
	if r.body == nil || r.body[name] { // reported where it is declared
		return false
	}
	help := `declare it under "bodies"`
	r.bodiless = r.net.Body == ""
	if r.net.Body != "" {
		_, help = r.suggest(name, []string{r.net.Body})
	}
	r.list.At(r.span(v), fmt.Sprintf("the body %s is not declared", quote(name)), help)
	return false
}

// noElement reports a network whose nodes nothing links or heats.
func (r *reader) noElement(root object) bool {
	if len(r.links) > 0 || r.torn {
		return false
	}
	r.list.Add(diag.Problem{At: r.keyOf(root, "nodes"), Text: "no element links the nodes or heats them", Help: `add "conductances", "sources" or "dissipators"`})
	return true
}
