package netlist

import (
	"fmt"

	"workheat/network/diag"
	"workheat/network/element"
	"workheat/network/unit"
)

// A table is a curve with the places of its corners.
type table struct {
	curve *element.Curve
	place func(i int) diag.Span // of the second value of a row
	see   []diag.Note
}

// every checks all second values of a table and reports the first bad one.
func (t *table) every(r *reader, check func(y float64) string) bool {
	for i, y := range t.curve.Y {
		if text := check(y); text != "" {
			r.list.Add(diag.Problem{At: t.place(i), Text: text, See: t.see})
			return false
		}
	}
	return true
}

// table reads a table object: {"table": [[x, y], ...]}, or columns of a CSV file:
// {"file": name, "x name": column, "value": column}.
func (r *reader) table(v *value, what, xName string, x, y unit.Want) (table, bool) {
	o, ok := r.object(v, what, []string{"table", "file", xName, "value"})
	if !ok {
		return table{}, false
	}
	return r.tableOf(o, r.brace(o), what, column{xName, x}, column{"value", y})
}

// tableOf reads the table or the file of an object whose keys have been checked. Either is reported at a
// place when it is missing.
func (r *reader) tableOf(o object, at diag.Span, what string, x, y column) (table, bool) {
	rows, file := o.get("table"), o.get("file")
	switch {
	case rows != nil && file != nil:
		r.list.Add(diag.Problem{At: r.keyOf(o, "file"), Text: what + ` has both a "table" and a "file"`, Help: "keep one of them",
			See: []diag.Note{{At: r.keyOf(o, "table"), Text: "the table"}}})
		return table{}, false
	case file != nil:
		return r.columns(o, what, x, y)
	case rows == nil:
		r.list.At(at, what+` has neither a "table" nor a "file"`,
			fmt.Sprintf(`write "table": [["0 %s", "1 %s"], ...] or "file": "name.csv"`, x.want.Unit, y.want.Unit))
		return table{}, false
	}
	for _, key := range []string{x.key, y.key} {
		if o.get(key) != nil {
			r.list.At(r.keyOf(o, key), fmt.Sprintf("%s names a column of a file, but no file is given", quote(key)), "remove it")
		}
	}
	return r.rows(rows, what, x.want, y.want)
}

// rows reads the rows of a table.
func (r *reader) rows(v *value, what string, x, y unit.Want) (table, bool) {
	items := v.items()
	if len(items) == 0 {
		r.list.At(r.span(v), what+" needs a list of rows", fmt.Sprintf(`write [["0 %s", "1 %s"], ...]`, x.Unit, y.Unit))
		return table{}, false
	}
	xs, ys := make([]float64, 0, len(items)), make([]float64, 0, len(items))
	good, sorted := true, true
	for i := range items {
		if r.full() {
			return table{}, false
		}
		a, b, ok := r.row(&items[i], x, y)
		if !ok {
			good = false
			continue
		}
		n := len(xs)
		switch {
		case !sorted:
		case n > 0 && a < xs[n-1]:
			r.list.At(r.span(&items[i].items()[0]), fmt.Sprintf("this %s is below that of the row before", x.Name), "sort the rows so that the first column never falls")
			sorted = false
		case n > 1 && a == xs[n-2]:
			r.list.At(r.span(&items[i].items()[0]), "three rows share one "+x.Name, "two rows at one place make a jump; a third has no meaning")
			sorted = false
		}
		xs, ys = append(xs, a), append(ys, b)
	}
	if !good || !sorted {
		return table{}, false
	}
	place := func(i int) diag.Span { return r.span(&items[i].items()[1]) }
	return table{curve: element.MustCurve(xs, ys), place: place}, true
}

// row reads the two values of a row.
func (r *reader) row(v *value, x, y unit.Want) (a, b float64, ok bool) {
	items := v.items()
	if len(items) != 2 {
		r.list.At(r.span(v), "a row of a table needs two values", fmt.Sprintf("a %s and a %s", x.Name, y.Name))
		return 0, 0, false
	}
	a, okA := r.quantity(&items[0], x)
	b, okB := r.quantity(&items[1], y)
	return a, b, okA && okB
}
