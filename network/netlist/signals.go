package netlist

import (
	"encoding/binary"
	"fmt"
	"math"
	"slices"
	"sort"

	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/unit"
)

// A declaredSignal is an entry of "signals". It is read where it is used, in the unit that is due there.
type declaredSignal struct {
	value *value
	at    diag.Span
	used  bool
	as    map[string]reading // by the name of what it was wanted as
}

// A reading is what a signal came to.
type reading struct {
	table     table
	ok        bool
	low, high float64 // of its values
	index     int     // of the signal, from duty.FirstTable on
}

// declareSignals takes in the declared signals.
func (r *reader) declareSignals(v *value) {
	if v == nil {
		return
	}
	o, ok := r.object(v, "signals", nil)
	if !ok {
		r.signals = nil
		return
	}
	r.entries(o, func(m *member) {
		r.named(m, "a signal")
		r.signals[m.key] = &declaredSignal{value: &m.value, at: r.keySpan(m), as: map[string]reading{}}
	})
}

// unusedSignals warns about declared signals that nothing uses. They were not read either.
func (r *reader) unusedSignals() {
	if r.torn || r.full() {
		return
	}
	for _, name := range r.signalNames() {
		if s := r.signals[name]; !s.used {
			r.list.Warn(s.at, fmt.Sprintf("the signal %s is used by nothing", quote(name)), `use it with {"signal": `+quote(name)+"}, or remove it")
		}
	}
}

func (r *reader) signalNames() []string {
	names := make([]string, 0, len(r.signals))
	for name := range r.signals {
		names = append(names, name)
	}
	sort.Strings(names)
	return names
}

// signal reads a constant, a table in time, or the name of a declared signal, and returns its index.
func (r *reader) signal(v *value, what string, want unit.Want, check func(x float64) string) (int, bool) {
	if m := (object{v}).member("signal"); m != nil {
		if _, ok := r.object(v, what, []string{"signal"}); !ok {
			return 0, false
		}
		return r.namedSignal(&m.value, what, want, check)
	}
	got := r.timeTable(v, what, want)
	return got.index, got.within(r, check)
}

// within checks the values of a reading, the two outermost first.
func (g *reading) within(r *reader, check func(x float64) string) bool {
	return g.ok && (check(g.low) == "" && check(g.high) == "" || g.table.every(r, check))
}

// timeTable reads a constant or a table in time.
func (r *reader) timeTable(v *value, what string, want unit.Want) reading {
	var got reading
	if v.kind == '{' {
		got.table, got.ok = r.table(v, what, "time", unit.Time, want)
	} else if x, ok := r.quantity(v, want); ok {
		got.table, got.ok = table{curve: element.Constant(x), place: func(int) diag.Span { return r.span(v) }}, true
	}
	if got.ok {
		got.low, got.high = slices.Min(got.table.curve.Y), slices.Max(got.table.curve.Y)
		got.index = r.tableSignal(got.table.curve)
	}
	return got
}

// namedSignal reads the signal that is declared under a name, in the unit that is due here.
func (r *reader) namedSignal(v *value, what string, want unit.Want, check func(x float64) string) (int, bool) {
	name, ok := r.text(v, "a signal")
	if !ok || r.signals == nil {
		return 0, false
	}
	s := r.signals[name]
	if s == nil {
		near, help := r.suggest(name, r.signalNames())
		if len(r.signals) == 0 {
			help = `declare it under "signals"`
		}
		r.list.At(r.span(v), fmt.Sprintf("the signal %s is not declared", quote(name)), help)
		if near != "" {
			r.signals[near].used = true
		}
		return 0, false
	}
	s.used = true
	got, known := s.as[want.Name]
	if !known {
		got = r.readDeclared(s, what, want)
		s.as[want.Name] = got
	}
	got.table.see = append([]diag.Note{{At: r.span(v), Text: "the signal is used here"}}, got.table.see...)
	return got.index, got.within(r, check)
}

// readDeclared reads a declared signal for a use.
func (r *reader) readDeclared(s *declaredSignal, what string, want unit.Want) reading {
	if m := (object{s.value}).member("signal"); m != nil {
		r.list.At(r.keySpan(m), "a declared signal cannot stand for another one", "give it a table, a file or a constant")
		if other := r.signals[m.value.text]; other != nil {
			other.used = true
		}
		return reading{}
	}
	return r.timeTable(s.value, what, want)
}

// tableSignal returns the signal of a table; equal tables are one signal, so that what hangs on it is
// computed once.
func (r *reader) tableSignal(c *element.Curve) int {
	key := make([]byte, 0, 16*len(c.X))
	for i := range c.X {
		key = binary.LittleEndian.AppendUint64(key, math.Float64bits(c.X[i]))
		key = binary.LittleEndian.AppendUint64(key, math.Float64bits(c.Y[i]))
	}
	if i, ok := r.tables[string(key)]; ok {
		return i
	}
	r.net.Tables = append(r.net.Tables, c)
	i := duty.FirstTable + len(r.net.Tables) - 1
	r.tables[string(key)] = i
	return i
}

// constantSignal returns the signal that is x all the time.
func (r *reader) constantSignal(x float64) int { return r.tableSignal(element.Constant(x)) }
