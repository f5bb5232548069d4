package netlist

import (
	"fmt"
	"math"

	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/unit"
)

// A verb is one kind of phase with its keys.
type verb struct {
	name string
	verb duty.Verb
	keys []string
}

// verbs has one row for each phase but the repeat.
var verbs = []verb{
	{"brake", duty.Brake, []string{"from", "to", "deceleration", "torque", "grade"}},
	{"speed up", duty.SpeedUp, []string{"from", "to", "acceleration", "in", "grade"}},
	{"hold", duty.Hold, []string{"speed", "for", "over", "until", "at most", "grade"}},
	{"rest", duty.Rest, []string{"for", "until", "at most"}},
	{"follow", duty.Follow, []string{"file", "time", "speed", "grade", "table"}},
}

// phaseKeys are the verbs, the repeat last.
var phaseKeys = func() []string {
	var keys []string
	for _, v := range verbs {
		keys = append(keys, v.name)
	}
	return append(keys, "repeat")
}()

// A phasePlace is where a phase stands.
type phasePlace struct {
	verb diag.Span
	body object
}

// duty reads the phases and checks that the speeds join up and that each phase ends.
func (r *reader) duty(root object) {
	v := root.get("duty")
	if v == nil {
		r.list.At(r.brace(root), `the key "duty" is missing`, `say what happens, such as "duty": [ { "rest": { "for": "10 min" } } ]`)
		return
	}
	if len(v.items()) == 0 {
		text := "the duty has no phase"
		if v.kind != '[' {
			text = "the duty is " + kindNames[v.kind] + ", but a list of phases in brackets [ ] is due"
		}
		r.list.At(r.span(v), text, "known phases: "+list(phaseKeys))
		return
	}
	r.net.Duty.Phases = r.phaseList(v, "")
	program := r.net.Duty
	if r.vehicle == nil && (r.net.Body != "" || r.bodiless) {
		// The body was reported, or that there is none: what follows from it alone must not be reported again.
		program.Vehicle = &element.Vehicle{Mass: 1, Rotating: 1, Wheel: math.NaN()}
	}
	if r.full() {
		return
	}
	program.Check(func(place int, key, text, help string) {
		p := r.phases[place]
		if v := p.body.get(key); v != nil {
			r.list.At(r.span(v), text, help)
			return
		}
		r.list.At(p.verb, text, help)
	})
}

// phaseList reads a list of phases.
func (r *reader) phaseList(v *value, label string) []duty.Phase {
	items := v.items()
	phases := make([]duty.Phase, 0, len(items))
	for i := range items {
		if r.full() {
			break
		}
		phases = append(phases, r.phase(&items[i], fmt.Sprintf("%s%d", label, i+1)))
	}
	return phases
}

// phase reads one phase. One with a fault is marked as told.
func (r *reader) phase(v *value, label string) duty.Phase {
	p := duty.Blank(duty.Repeat, label)
	p.Place, p.Told = len(r.phases), true
	r.phases = append(r.phases, phasePlace{verb: r.src.Span(int(v.start), int(v.start)+1)})
	whole := object{v}
	if whole.get("repeat") != nil {
		p.Told = !r.repeat(v, &p)
		return p
	}
	if _, ok := r.object(v, "a phase", phaseKeys); !ok {
		return p
	}
	if whole.get("repeat") != nil { // it was nearly named so
		r.repeat(v, &p)
		return p
	}
	k, m := r.verb(whole)
	if m == nil {
		return p
	}
	p.Verb, p.Label = k.verb, label+" "+k.name
	r.phases[p.Place].verb = r.keySpan(m)
	body, ok := r.object(&m.value, quote(k.name), k.keys)
	if ok {
		r.phases[p.Place].body = body
		p.Told = !r.fill(&p, body)
	}
	return p
}

// verb finds the one verb of a phase.
func (r *reader) verb(o object) (k verb, m *member) {
	for _, each := range verbs {
		other := o.member(each.name)
		switch {
		case other == nil:
		case m == nil:
			k, m = each, other
		default:
			first, second := m, other
			if first.start > second.start {
				first, second = second, first
			}
			r.list.Add(diag.Problem{At: r.keySpan(second), Text: fmt.Sprintf("a phase holds both %s and %s", quote(first.key), quote(second.key)),
				Help: "make them two phases, each in its own braces", See: []diag.Note{{At: r.keySpan(first), Text: "the first"}}})
			return k, nil
		}
	}
	if len(o.value.members()) == 0 || len(o.value.members()) == 1 && o.get("about") != nil {
		r.list.At(r.span(o.value), "the phase is empty", "known phases: "+list(phaseKeys))
	}
	return k, m
}

// repeat reads a repeated list of phases.
func (r *reader) repeat(v *value, p *duty.Phase) bool {
	o, _ := r.object(v, "a repeat", []string{"repeat", "every", "phases"})
	p.Verb = duty.Repeat
	r.phases[p.Place] = phasePlace{r.keyOf(o, "repeat"), o}
	count := o.get("repeat")
	n, ok := r.quantity(count, unit.Number)
	if ok && (n < 1 || n != math.Floor(n) || n > 1e6) {
		r.list.At(r.span(count), "a repeat needs a whole number of rounds, from 1 to 1000000", "")
		ok = false
	}
	p.Count = 1
	if ok {
		p.Count = int(n)
	}
	if every := o.get("every"); every != nil {
		x, okEvery := r.quantity(every, unit.Time)
		ok = okEvery && r.positive(every, x, "the interval") && ok
		p.Every = x
	}
	phases := o.get("phases")
	if phases == nil || len(phases.items()) == 0 {
		at := r.keyOf(o, "repeat")
		if phases != nil {
			at = r.span(phases)
		}
		r.list.At(at, `a repeat needs "phases", a list with at least one entry`, "")
		return false
	}
	label := p.Label
	p.Label = label + " repeat"
	p.Phases = r.phaseList(phases, label+".")
	return ok
}

// A slot is one number of a phase: its key, what it is, where it goes, and whether it must be above zero.
type slot struct {
	key      string
	want     unit.Want
	to       *float64
	positive bool
}

// fill reads the numbers of a phase.
func (r *reader) fill(p *duty.Phase, o object) bool {
	slots := []slot{
		{"from", unit.Speed, &p.From, false}, {"to", unit.Speed, &p.To, false},
		{"deceleration", unit.Acceleration, &p.Deceleration, true}, {"torque", unit.Torque, &p.Torque, true},
		{"acceleration", unit.Acceleration, &p.Acceleration, true}, {"in", unit.Time, &p.In, true},
		{"for", unit.Time, &p.For, true}, {"over", unit.Length, &p.Over, true}, {"at most", unit.Time, &p.AtMost, true},
		{"speed", unit.Speed, &p.Speed, false},
	}
	if p.Verb == duty.Follow {
		slots = nil // there "speed" and "time" name columns
	}
	good := true
	for _, s := range slots {
		v := o.get(s.key)
		if v == nil {
			continue
		}
		x, ok := r.quantity(v, s.want)
		switch {
		case !ok:
		case s.positive:
			ok = r.positive(v, x, quote(s.key))
		case x < 0:
			r.list.At(r.span(v), quote(s.key)+" must not be below zero", "the vehicle only goes forward")
			ok = false
		}
		if ok {
			*s.to = x
		}
		good = good && ok
	}
	good = r.grade(p, o.get("grade")) && good
	good = r.until(p, o) && good
	if p.Verb == duty.Follow {
		good = r.trace(p, o) && good
	}
	return good
}

// grade reads the slope of the road: a pure number (rise over run, percent) or an angle.
func (r *reader) grade(p *duty.Phase, v *value) bool {
	if v == nil {
		return true
	}
	x, angle := 0.0, false
	if v.kind == '"' {
		q, fault := unit.Parse(v.text, r.params)
		angle = fault == nil && q.Dim == unit.Angle.Dim()
		x = math.Tan(q.Value)
		if math.Abs(q.Value) >= math.Pi/2 {
			x = math.Inf(1)
		}
	}
	if !angle {
		var ok bool
		if x, ok = r.quantity(v, unit.Number); !ok {
			return false
		}
	}
	if math.Abs(x) <= 1 {
		p.Grade = x
		return true
	}
	r.list.At(r.span(v), "a grade beyond 100 % is no road", `write it as rise over run: "6 %" uphill, "-6 %" downhill, or as an angle: "-3.4 deg"`)
	return false
}

// until reads the temperature that ends a phase.
func (r *reader) until(p *duty.Phase, phase object) bool {
	v := phase.get("until")
	if v == nil {
		return true
	}
	o, ok := r.object(v, quote("until"), []string{"node", "falls to", "rises to"})
	if !ok {
		return false
	}
	node, falls, rises := o.get("node"), o.get("falls to"), o.get("rises to")
	i := -1
	if node == nil {
		r.list.At(r.keyOf(phase, "until"), `"until" names no node`, `add "node", whose temperature ends the phase`)
	} else {
		i, ok = r.findNode(node)
	}
	mark := falls
	if mark == nil {
		mark = rises
	}
	if (falls == nil) == (rises == nil) {
		r.list.At(r.keyOf(phase, "until"), `"until" needs either "falls to" or "rises to"`, "exactly one of them")
		return false
	}
	t, okT := r.quantity(mark, unit.Temperature)
	if i < 0 || !ok || !okT {
		return false
	}
	if n := r.net.Nodes[i]; n.Form == element.Held && r.net.Tables[n.Signal-duty.FirstTable].IsConstant() {
		r.list.At(r.span(node), fmt.Sprintf("the node %s is held at one temperature: it neither falls nor rises", quote(n.Name)), `give "for", a time`)
		return false
	}
	p.Until = &duty.Until{Node: i, Falls: falls != nil, Temperature: t}
	return true
}
