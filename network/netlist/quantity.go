package netlist

import (
	"fmt"
	"math"
	"strconv"

	"workheat/network/unit"
)

// Sizes beyond these, in SI, are no quantities of a brake; products of a few that are within cannot
// overflow.
const (
	largest  = 1e30
	smallest = 1e-30
)

// fault reports a fault in a quantity's text at its characters. What follows from a parameter that was
// reported is passed over.
func (r *reader) fault(v *value, f *unit.Fault) {
	if r.mentionsLost(v.text) {
		return
	}
	if ahead := r.ahead(v.text); ahead != nil {
		f = ahead
	}
	r.list.At(r.inside(v, f.Start, f.End), f.Text, f.Help)
}

// bounded returns the fault of a size that cannot be computed with, or nil.
func bounded(x float64, length int) *unit.Fault {
	switch size := math.Abs(x); {
	case size > largest:
		return &unit.Fault{End: length, Text: "the value is too large to compute with", Help: "check its exponent and its unit"}
	case size < smallest && size > 0:
		return &unit.Fault{End: length, Text: "the value is too small to tell from zero", Help: "check its exponent and its unit, or write 0"}
	}
	return nil
}

// quantity reads a value of the wanted kind. A plain number is taken only where a pure number is due.
func (r *reader) quantity(v *value, want unit.Want) (float64, bool) {
	switch v.kind {
	case '"':
		x, fault := want.Read(v.text, r.params)
		if fault == nil {
			fault = bounded(x, len(v.text))
		}
		if fault != nil {
			r.fault(v, fault)
		}
		return x, fault == nil
	case '0':
		if want.Unit == "" {
			return r.plain(v)
		}
		r.list.At(r.span(v), "a plain number stands where "+want.Phrase()+" is due",
			fmt.Sprintf("write it as text with its unit: %q", v.text+" "+want.Unit))
		return 0, false
	}
	help := "write a plain number, or text that comes to one"
	if want.Unit != "" {
		help = fmt.Sprintf("write text with a unit, such as %q", "1 "+want.Unit)
	}
	r.list.At(r.span(v), kindNames[v.kind]+" stands where "+want.Phrase()+" is due", help)
	return 0, false
}

// plain reads a JSON number.
func (r *reader) plain(v *value) (float64, bool) {
	x, err := strconv.ParseFloat(v.text, 64)
	if err != nil {
		x = math.Inf(1)
	}
	if fault := bounded(x, 0); fault != nil {
		r.list.At(r.span(v), fault.Text, "check its exponent")
		return 0, false
	}
	return x, true
}

// positive reports a value that is not above zero.
func (r *reader) positive(v *value, x float64, what string) bool {
	if x > 0 {
		return true
	}
	r.list.At(r.span(v), what+" must be above zero", "")
	return false
}
