package netlist

import (
	"encoding/binary"
	"fmt"
	"math"

	"workheat/network/duty"
	"workheat/network/element"
	"workheat/network/unit"
)

// table reads a table object: {"table": [[x, y], ...]}, or columns of a CSV file:
// {"file": name, "x name": column, "value": column}.
func (r *reader) table(v *value, what, xName string, x, y unit.Want) (*element.Curve, bool) {
	o, ok := r.object(v, what, []string{"table", "file", xName, "value"})
	if !ok {
		return nil, false
	}
	rows, file := o.get("table"), o.get("file")
	switch {
	case rows != nil && file != nil:
		r.list.At(r.span(v), what+` has both a "table" and a "file"`, "keep one of them")
		return nil, false
	case file != nil:
		return r.columns(o, what, xName, "value", x, y)
	case rows == nil:
		r.list.At(r.span(v), what+` has neither a "table" nor a "file"`,
			fmt.Sprintf(`write {"table": [["0 %s", "1 %s"], ...]}`, x.Unit, y.Unit))
		return nil, false
	}
	return r.rows(rows, what, x, y)
}

// rows reads the rows of a table.
func (r *reader) rows(v *value, what string, x, y unit.Want) (*element.Curve, bool) {
	if v.kind != '[' || len(v.items) == 0 {
		r.list.At(r.span(v), what+" needs a list of rows", fmt.Sprintf(`write [["0 %s", "1 %s"], ...]`, x.Unit, y.Unit))
		return nil, false
	}
	var xs, ys []float64
	good := true
	for i := range v.items {
		row := &v.items[i]
		if row.kind != '[' || len(row.items) != 2 {
			r.list.At(r.span(row), "a row of a table needs two values", fmt.Sprintf("a %s and a %s", x.Name, y.Name))
			good = false
			continue
		}
		a, okA := r.quantity(&row.items[0], x)
		b, okB := r.quantity(&row.items[1], y)
		if !okA || !okB {
			good = false
			continue
		}
		if n := len(xs); good && n > 0 && a < xs[n-1] {
			r.list.At(r.span(&row.items[0]), fmt.Sprintf("this %s is below that of the row before", x.Name), "sort the rows so that the first column never falls")
			good = false
		}
		if n := len(xs); good && n > 1 && a == xs[n-2] {
			r.list.At(r.span(&row.items[0]), "three rows share one "+x.Name, "two rows at one place make a jump; a third has no meaning")
			good = false
		}
		xs, ys = append(xs, a), append(ys, b)
	}
	if !good {
		return nil, false
	}
	return element.MustCurve(xs, ys), true
}

// signal reads a constant, a table in time, or the name of a declared signal, and returns its index.
func (r *reader) signal(v *value, what string, want unit.Want, check func(x float64) string) (int, bool) {
	if v.kind != '{' {
		x, ok := r.quantity(v, want)
		if !ok {
			return 0, false
		}
		if text := check(x); text != "" {
			r.list.At(r.span(v), text, "")
			return 0, false
		}
		return r.constantSignal(x), true
	}
	if name := (object{v}).get("signal"); name != nil {
		if _, ok := r.object(v, what, []string{"signal"}); !ok {
			return 0, false
		}
		return r.namedSignal(name, what, want, check)
	}
	c, ok := r.table(v, what, "time", unit.Time, want)
	if !ok {
		return 0, false
	}
	for _, y := range c.Y {
		if text := check(y); text != "" {
			r.list.At(r.span(v), text, "")
			return 0, false
		}
	}
	return r.tableSignal(c), true
}

// namedSignal reads the signal that is declared under a name, in the unit that is due here.
func (r *reader) namedSignal(name *value, what string, want unit.Want, check func(x float64) string) (int, bool) {
	if name.kind != '"' {
		r.list.At(r.span(name), "the name of a signal is due, not "+kindNames[name.kind], "")
		return 0, false
	}
	v := r.signals.get(name.text)
	if v == nil {
		var known []string
		for _, m := range r.signals.members() {
			known = append(known, m.key)
		}
		r.list.At(r.span(name), fmt.Sprintf("the signal %s is not declared", quote(name.text)), r.suggest(name.text, known))
		return 0, false
	}
	if v.kind == '{' && (object{v}).get("signal") != nil {
		r.list.At(r.span(v), "a declared signal cannot stand for another one", "give it a table, a file or a constant")
		return 0, false
	}
	return r.signal(v, what, want, check)
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
