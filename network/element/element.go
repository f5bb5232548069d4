// Package element is the contract that every kind of element meets: what its author may write, how its
// flows and slopes are computed in bulk, and how one of its flows is computed again for the audit.
package element

import (
	"math"

	"workheat/network/unit"
)

// Outside is the index of the world outside the network: the other end of work turned into heat and of
// given heat. Its temperature is not defined and nothing depends on it.
const Outside = -1

// A Section is a part of the netlist that holds named elements, each of one kind.
type Section string

// The sections whose elements are declared by kind.
const (
	Conductances Section = "conductances"
	Sources      Section = "sources"
	Bodies       Section = "bodies"
	Dissipators  Section = "dissipators"
)

// Sections lists them in the order in which they are shown.
var Sections = []Section{Conductances, Sources, Bodies, Dissipators}

// A Kind is one sort of element that a netlist may declare. A catalogue is a list of kinds; everything
// that is known of a kind (what may be written, units, ranges, source) stands here once.
type Kind struct {
	Section Section
	Name    string
	About   string  // one sentence for a designer
	Formula string  // the law in one line, symbols as in the fields
	Source  string  // where the law comes from, with its valid range
	Fields  []Field // what may be written, in the order in which it is shown

	// Check reports faults that bear on more than one field. It may be nil. It is called when no required
	// field is missing; a field that could not be read is there, with NaN as its number and nothing else,
	// so that a comparison must report only when it is true.
	Check func(d *Declaration)

	// Together reports faults that bear on all elements of the kind. It may be nil.
	Together func(all []*Declaration)

	// Batch returns an empty batch that will hold all elements of this kind. It is nil for bodies.
	Batch func() Batch

	// Vehicle makes the body that a declaration describes. It is nil for all but bodies.
	Vehicle func(d *Declaration) Vehicle
}

// A Type says what form a field's value has in the netlist.
type Type int

// The forms of a value.
const (
	Quantity   Type = iota // text with a unit, read by Field.Want
	Number                 // a pure number, or text that comes to one
	NodePair               // two node names
	Shares                 // node names, each with its share; the shares add to one
	Signal                 // a quantity, or a table in time of it
	BodyName               // the name of a declared body; the value is its speed
	MaterialOf             // the name of a material
	Text                   // free text
)

// A Field is one key of a declaration.
type Field struct {
	Key      string
	About    string
	Type     Type
	Want     unit.Want // what a Quantity, Number or Signal must be
	Required bool
	Default  string  // as it would be written; empty: none
	Min, Max float64 // SI
	Open     bool    // Min itself is outside the range
	Bounded  bool    // Min and Max hold
}

// Positive returns the field limited to values above zero.
func (f Field) Positive() Field {
	f.Bounded, f.Open, f.Min, f.Max = true, true, 0, math.MaxFloat64
	return f
}

// From returns the field limited to values from low to high [SI], both included.
func (f Field) From(low, high float64) Field {
	f.Bounded, f.Open, f.Min, f.Max = true, false, low, high
	return f
}

// Must returns the field as a required one.
func (f Field) Must() Field {
	f.Required = true
	return f
}

// A Catalogue is what may be written in a netlist: kinds and materials in the order they are shown.
type Catalogue struct {
	Kinds     []*Kind
	Materials []*Material
}

// Find returns the kind of that name in a section, or nil.
func (c *Catalogue) Find(section Section, name string) *Kind {
	for _, k := range c.Kinds {
		if k.Section == section && k.Name == name {
			return k
		}
	}
	return nil
}

// Names returns the names of the kinds of a section, in order.
func (c *Catalogue) Names(section Section) []string {
	var names []string
	for _, k := range c.Kinds {
		if k.Section == section {
			names = append(names, k.Name)
		}
	}
	return names
}

// Material returns the material of that name, or nil.
func (c *Catalogue) Material(name string) *Material {
	for _, m := range c.Materials {
		if m.Name == name {
			return m
		}
	}
	return nil
}

// MaterialNames returns the names of all materials, in order.
func (c *Catalogue) MaterialNames() []string {
	names := make([]string, len(c.Materials))
	for i, m := range c.Materials {
		names[i] = m.Name
	}
	return names
}

// Outside says in words why x is outside the field's range, or nothing if it is inside.
func (f Field) Outside(x float64) string {
	if !f.Bounded || (x > f.Min || x == f.Min && !f.Open) && x <= f.Max {
		return ""
	}
	low := "at least"
	if f.Open {
		low = "above"
	}
	text := "\"" + f.Key + "\" must be " + low + " " + f.show(f.Min)
	if f.Max < math.MaxFloat64 {
		text += " and at most " + f.show(f.Max)
	}
	return text
}

func (f Field) show(x float64) string {
	if x == 0 && !f.Want.Level {
		return "zero"
	}
	return f.Want.Format(x, 6)
}
