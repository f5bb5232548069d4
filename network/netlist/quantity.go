package netlist

import (
	"fmt"
	"math"
	"strconv"

	"workheat/network/unit"
)

// fault reports a fault in a quantity's text at its characters.
func (r *reader) fault(v *value, f *unit.Fault) {
	r.list.At(r.inside(v, f.Start, f.End), f.Text, f.Help)
}

// quantity reads a value of the wanted kind. A plain number is taken only where a pure number is due.
func (r *reader) quantity(v *value, want unit.Want) (float64, bool) {
	switch v.kind {
	case '"':
		x, fault := want.Read(v.text, r.params)
		if fault != nil {
			r.fault(v, fault)
			return 0, false
		}
		return x, !math.IsNaN(x) // NaN: a parameter that was reported where it is declared
	case '0':
		if want.Unit == "" {
			return r.plain(v)
		}
		r.list.At(r.span(v), fmt.Sprintf("a plain number stands where a %s is due", want.Name),
			fmt.Sprintf("write it as text with its unit: %q", v.text+" "+want.Unit))
		return 0, false
	}
	help := "write a plain number, or text that comes to one"
	if want.Unit != "" {
		help = fmt.Sprintf("write text with a unit, such as %q", "1 "+want.Unit)
	}
	r.list.At(r.span(v), fmt.Sprintf("%s stands where a %s is due", kindNames[v.kind], want.Name), help)
	return 0, false
}

// plain reads a JSON number.
func (r *reader) plain(v *value) (float64, bool) {
	x, err := strconv.ParseFloat(v.text, 64)
	if err != nil || math.IsInf(x, 0) {
		r.list.At(r.span(v), "the number is too large to be used", "")
		return 0, false
	}
	return x, true
}
