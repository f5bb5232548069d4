package netlist

import (
	"fmt"
	"slices"
	"strings"
	"unicode"

	"workheat/network/diag"
)

// An object is a JSON object whose keys have been checked.
type object struct{ value *value }

// member returns the member of a key, the first one if it stands twice, or nil.
func (o object) member(key string) *member {
	if o.value == nil {
		return nil
	}
	members := o.value.members()
	for i := range members {
		if members[i].key == key {
			return &members[i]
		}
	}
	return nil
}

// get returns the value of a key, or nil.
func (o object) get(key string) *value {
	if m := o.member(key); m != nil {
		return &m.value
	}
	return nil
}

// entries calls f for each named entry of an object of free names, until the reader is full.
func (r *reader) entries(o object, f func(m *member)) {
	members := o.value.members()
	for i := range members {
		if m := &members[i]; m.key != "about" && !m.twice && !r.full() {
			f(m)
		}
	}
}

// object checks that v is an object, that no key stands twice and, unless known is nil, that every key is
// known; "about" is allowed everywhere. A key that is nearly one that is missing is reported and then taken
// for it, so that one slip is one report.
func (r *reader) object(v *value, what string, known []string) (object, bool) {
	if v.kind != '{' {
		r.list.At(r.span(v), fmt.Sprintf("%s is %s, but an object in braces { } is due", what, kindNames[v.kind]), "")
		return object{}, false
	}
	o := object{v}
	members := v.members()
	r.twice(members)
	for i := range members {
		if m := &members[i]; m.key == "about" {
			r.about(m, known == nil)
		}
	}
	if known != nil {
		r.unknownKeys(members, what, known)
	}
	return o, true
}

// unknownKeys reports the keys that are not known. One that is nearly a key that is missing is renamed.
func (r *reader) unknownKeys(members []member, what string, known []string) {
	var given []string // the known keys that are there, looked up when needed
	for i := range members {
		m := &members[i]
		if m.twice || m.key == "about" || slices.Contains(known, m.key) || r.full() {
			continue
		}
		if given == nil {
			given = among(members, known)
		}
		near, help := r.suggest(m.key, known)
		if near != "" && slices.Contains(given, near) {
			near, help = "", quote(near)+" is given already: remove this one"
		}
		r.list.At(r.keySpan(m), fmt.Sprintf("the key %s is not known in %s", quote(m.key), what), help)
		if near != "" {
			m.key = near
			given = append(given, near)
		}
	}
}

// among returns the keys of an object that are in a list.
func among(members []member, list []string) []string {
	given := make([]string, 0, len(list))
	for i := range members {
		if key := members[i].key; slices.Contains(list, key) && !slices.Contains(given, key) {
			given = append(given, key)
		}
	}
	return given
}

// manyKeys is the size from which keys are compared through a map.
const manyKeys = 24

// twice marks and reports keys that stand twice.
func (r *reader) twice(members []member) {
	report := func(m, first *member) {
		m.twice = true
		r.list.Add(diag.Problem{At: r.keySpan(m), Text: fmt.Sprintf("the key %s stands twice", quote(m.key)),
			Help: "remove one, or give it another name",
			See:  []diag.Note{{At: r.keySpan(first), Text: "the first one"}}})
	}
	if len(members) < manyKeys {
		for i := range members {
			for j := range i {
				if members[j].key == members[i].key {
					report(&members[i], &members[j])
					break
				}
			}
		}
		return
	}
	first := make(map[string]int, len(members))
	for i := range members {
		m := &members[i]
		if j, ok := first[m.key]; !ok {
			first[m.key] = i
		} else if !r.full() {
			report(m, &members[j])
		} else {
			m.twice = true
		}
	}
}

// about checks a remark. Where names are free, an entry may have been named so by mistake.
func (r *reader) about(m *member, free bool) {
	if m.value.kind == '"' {
		return
	}
	help := ""
	if free {
		help = `"about" is kept for remarks: give the entry another name`
	}
	r.list.At(r.span(&m.value), `"about" is `+kindNames[m.value.kind]+", but text is due", help)
}

// named checks the name of an entry: it will stand in tables and files.
func (r *reader) named(m *member, what string) {
	key := value{kind: '"', start: m.start, end: m.end}
	if strings.TrimSpace(m.key) == "" {
		r.list.At(r.keySpan(m), "the name of "+what+" is empty", "results show it by its name")
		return
	}
	if strings.TrimSpace(m.key) != m.key {
		r.list.At(r.keySpan(m), "the name of "+what+" begins or ends with a blank", fmt.Sprintf("write %q", strings.TrimSpace(m.key)))
	}
	for i, c := range m.key {
		if c == unicode.ReplacementChar || !unicode.IsPrint(c) {
			r.list.At(r.inside(&key, i, i+len(string(c))), fmt.Sprintf("the name of %s holds a character that cannot be printed, U+%04X", what, c), "remove it")
			return
		}
	}
}

// quote puts a name in quotes, cut if it is long.
func quote(name string) string {
	if len(name) > 60 {
		if runes := []rune(name[:min(len(name), 400)]); len(runes) > 60 {
			name = string(runes[:57]) + "..."
		}
	}
	return `"` + name + `"`
}

// Bounds of the search for near names: how often, and how many names are compared in all.
const (
	maxAsked    = 300
	maxCompared = 2_000_000
)

// maxKnown is how many known names a cure lists.
const maxKnown = 16

// suggest returns the known name that was likely meant, if any, and words the cure.
func (r *reader) suggest(name string, known []string) (near, help string) {
	if r.asked++; r.asked <= maxAsked && r.compared <= maxCompared {
		r.compared += len(known)
		near = diag.Nearest(name, known)
	}
	if near != "" {
		return near, "did you mean " + quote(near) + "?"
	}
	if len(known) == 0 {
		return "", ""
	}
	shown := known
	if len(shown) > maxKnown {
		shown = shown[:maxKnown]
	}
	help = "known here: " + list(shown)
	if len(shown) < len(known) {
		help += fmt.Sprintf(" and %d more", len(known)-len(shown))
	}
	return "", help
}

func list(names []string) string { return strings.Join(names, ", ") }

// text returns the text of a value, for a name that is due there.
func (r *reader) text(v *value, what string) (string, bool) {
	if v.kind == '"' {
		return v.text, true
	}
	r.list.At(r.span(v), fmt.Sprintf("the name of %s is due, not %s", what, kindNames[v.kind]), "")
	return "", false
}
