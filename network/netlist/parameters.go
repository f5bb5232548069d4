package netlist

import (
	"fmt"

	"workheat/network/unit"
)

// parameters reads named quantities, each of which may use those before it.
func (r *reader) parameters(v *value) {
	if v == nil {
		return
	}
	o, ok := r.object(v, "parameters", nil)
	if !ok {
		r.lost[""] = true
		return
	}
	r.entries(o, func(m *member) { r.later[m.key] = true })
	r.entries(o, func(m *member) {
		r.reading = m.key
		if r.parameterName(m) {
			r.parameter(m)
		} else {
			r.lost[m.key] = true
		}
		delete(r.later, m.key)
	})
}

// parameterName checks that a parameter can be used by its name.
func (r *reader) parameterName(m *member) bool {
	if fault := unit.NameFault(m.key); fault != nil {
		r.list.At(r.keySpan(m), fault.Text, fault.Help)
		return false
	}
	if unit.IsName(m.key) {
		return true
	}
	help := "use letters, digits and _"
	if usable := usableName(m.key); unit.IsName(usable) && unit.NameFault(usable) == nil {
		help += ", such as " + quote(usable)
	}
	r.list.At(r.keySpan(m), fmt.Sprintf("the name %s cannot be used in a quantity", quote(m.key)), help)
	return false
}

// usableName turns all that cannot stand in a name into "_".
func usableName(name string) string {
	out := []rune(name)
	for i, c := range out {
		if !unit.IsName("x" + string(c)) {
			out[i] = '_'
		}
	}
	return string(out)
}

// parameter reads one parameter.
func (r *reader) parameter(m *member) {
	v := &m.value
	switch v.kind {
	case '"':
		q, fault := unit.Parse(v.text, r.params)
		if fault == nil {
			fault = bounded(q.Value, len(v.text))
		}
		if fault == nil {
			r.params[m.key] = q
			return
		}
		r.fault(v, fault)
	case '0':
		if x, ok := r.plain(v); ok {
			r.params[m.key] = unit.Quantity{Value: x}
			return
		}
	default:
		r.list.At(r.span(v), "a parameter is "+kindNames[v.kind]+", but a quantity is due",
			`write text with a unit, such as "12 kg", or a plain number`)
	}
	r.lost[m.key] = true
}

// words calls f for each word of a quantity's text, with its place, until it returns true.
func words(text string, f func(word string, start int) bool) bool {
	for i := 0; i < len(text); {
		n := 0
		for i+n < len(text) && unit.IsName("x"+text[i+n:i+n+1]) {
			n++
		}
		if n > 0 && f(text[i:i+n], i) {
			return true
		}
		i += n + 1
	}
	return false
}

// mentionsLost reports whether a quantity uses a parameter that was reported already.
func (r *reader) mentionsLost(text string) bool {
	if len(r.lost) == 0 || len(text) > 4096 {
		return false
	}
	return words(text, func(word string, _ int) bool { return r.lost[word] || r.lost[""] && !number(word) && !isUnit(word) })
}

func number(word string) bool { return '0' <= word[0] && word[0] <= '9' }

func isUnit(word string) bool {
	_, fault := unit.ParseUnit(word)
	return fault == nil
}

// ahead returns the fault of a parameter that uses itself or one that is declared further down, or nil.
func (r *reader) ahead(text string) *unit.Fault {
	var found *unit.Fault
	words(text, func(word string, start int) bool {
		if !r.later[word] || unit.NameFault(word) != nil {
			return false
		}
		found = &unit.Fault{Start: start, End: start + len(word),
			Text: fmt.Sprintf("the parameter %s is declared further down", quote(word)),
			Help: "a parameter can use those above it: put that one first"}
		if word == r.reading {
			found.Text, found.Help = fmt.Sprintf("the parameter %s uses itself", quote(word)), "give it a value of its own"
		}
		return true
	})
	return found
}
