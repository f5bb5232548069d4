package unit

import (
	"fmt"
	"strings"
)

// A Want is a kind of quantity that some place in a netlist calls for: its name, the
// unit it is shown in, and whether it is a temperature level. The wants of this
// room are ready made; others come from [NewWant]. The zero Want is not usable.
type Want struct {
	Name  string // "conductance"
	Unit  string // unit for display, "W/K"; empty for a plain number
	Level bool   // a temperature level, not a difference

	scale Scale
}

// NewWant returns a want of the given name, shown in the given unit; a unit
// such as degC makes it a temperature level. It panics if the unit cannot be
// read.
func NewWant(name, unit string) Want {
	s, fault := ParseUnit(unit)
	if fault != nil {
		panic("unit: the unit of " + name + ": " + fault.Error())
	}
	return Want{Name: name, Unit: unit, Level: s.Level, scale: s}
}

// Dim returns the dimension that is wanted.
func (w Want) Dim() Dim { return w.scale.Dim }

// Read parses text and returns its value in SI, a level in kelvin above
// absolute zero. The fault points at the characters in question and its help
// names the unit that is due.
func (w Want) Read(text string, params Params) (float64, *Fault) {
	q, fault := Parse(text, params)
	if fault != nil {
		fault.Help = join(fault.Help, w.due())
		return 0, fault
	}
	if w.fits(q) {
		return q.Value, w.tooCold(q.Value, text)
	}
	start, end := trimmed(text)
	return 0, &Fault{start, end, w.mismatch(q, text[start:end]), w.cure(q, text[start:end])}
}

// fits reports whether q has the dimension and the meaning that is wanted.
func (w Want) fits(q Quantity) bool {
	switch {
	case q.Dim != w.scale.Dim:
		return false
	case q.Dim != pureTemperature, q.Temp == Either:
		return true
	}
	return (q.Temp == Level) == w.Level
}

func (w Want) tooCold(si float64, text string) *Fault {
	if !w.Level || si >= 0 {
		return nil
	}
	start, end := trimmed(text)
	return &Fault{start, end, belowZero, ""}
}

const belowZero = "a temperature level lies below absolute zero"

// mismatch is the text of a fault of dimension.
func (w Want) mismatch(q Quantity, text string) string {
	if q.Dim == (Dim{}) {
		return fmt.Sprintf("%s has no unit, but %s is due", short(text), w.Phrase())
	}
	return fmt.Sprintf("%s is %s, but %s is due", short(text), describe(q), w.Phrase())
}

// cure is the help of a fault of dimension.
func (w Want) cure(q Quantity, text string) string {
	if q.Dim == pureTemperature && w.scale.Dim == pureTemperature {
		if w.Level {
			return "give it in degC, or in K above absolute zero"
		}
		return "give it in K"
	}
	if q.Dim == (Dim{}) && w.Unit != "" && plainNumber(text) {
		return fmt.Sprintf("give it in %s, for example \"%s %s\"", w.Unit, text, w.Unit)
	}
	return join(angleCure(int(w.scale.Dim[inAngle])-int(q.Dim[inAngle]), q.Dim, w.scale.Dim), w.due())
}

// angleCure says by what to multiply when two dimensions differ by angle only.
func angleCure(power int, got, want Dim) string {
	got[inAngle], want[inAngle] = 0, 0
	switch {
	case got != want || power == 0:
		return ""
	case power == 1:
		return "multiply by rad"
	case power == -1:
		return "divide by rad"
	}
	return fmt.Sprintf("multiply by rad^%d", power)
}

// due is the short cure: the unit to use.
func (w Want) due() string {
	switch {
	case w.scale.Dim == Dim{}:
		return "give it as a number without unit"
	case w.Level:
		return "give it in degC, K or degF"
	}
	return "give it in " + w.Unit
}

// Show returns an SI value in the unit for display.
func (w Want) Show(si float64) float64 { return w.scale.Show(si) }

// Shown returns the scale of the unit for display.
func (w Want) Shown() Scale { return w.scale }

// Format returns an SI value as text in the unit for display, such as
// "20 degC", with that many significant digits; digits below 1 or above 17
// mean 15. The text can be read back.
func (w Want) Format(si float64, digits int) string {
	text := number(w.Show(si), digits)
	if w.Unit == "" {
		return text
	}
	return text + " " + w.Unit
}

// Scale reads a unit alone, such as the head of a column in a table of values,
// and checks that values in it are what is wanted.
func (w Want) Scale(text string) (Scale, *Fault) {
	s, fault := ParseUnit(text)
	if fault != nil {
		fault.Help = join(fault.Help, w.due())
		return Scale{}, fault
	}
	q := Quantity{Value: s.Factor, Dim: s.Dim, Temp: s.thermal()}
	if !w.fits(q) {
		start, end := trimmed(text)
		return Scale{}, &Fault{start, end, w.mismatch(q, text[start:end]), w.cure(q, "")}
	}
	return s, nil
}

// join puts two halves of a cure together.
func join(a, b string) string {
	if a == "" || b == "" {
		return a + b
	}
	return a + "; " + b
}

// Phrase returns the name with its article: "a conductance", "an area".
func (w Want) Phrase() string {
	if w.Name != "" && strings.ContainsRune("aeiou", rune(w.Name[0])) {
		return "an " + w.Name
	}
	return "a " + w.Name
}

// short returns text for quoting in a fault, cut when it is long.
func short(text string) string {
	const most = 40
	if len(text) <= most {
		return text
	}
	return strings.ToValidUTF8(text[:most], "") + "..."
}

// describe names a quantity by its dimension: "a mass", "an energy or a
// torque", or its SI unit where it has no name.
func describe(q Quantity) string {
	if q.Dim == pureTemperature {
		switch q.Temp {
		case Level:
			return "a temperature level"
		case Difference:
			return "a temperature difference"
		}
		return "a temperature"
	}
	var names []string
	for _, w := range wants {
		if w.scale.Dim == q.Dim && len(names) < 2 {
			names = append(names, w.Phrase())
		}
	}
	if len(names) == 0 {
		return "in " + q.Dim.String()
	}
	return strings.Join(names, " or ")
}
