// Package unit is quantities: text with units to SI and back.
//
// A quantity is a short arithmetic expression in numbers, units, declared
// parameters and pi. Its dimension is carried through, and temperature levels
// are kept apart from temperature differences.
//
//	quantity   = sum .
//	sum        = product { ( "+" | "-" ) product } .
//	product    = signed { ( "*" | "·" | "/" ) signed | beside } .
//	signed     = [ "+" | "-" ] power .
//	beside     = name [ raised ] | "(" units alone ")" [ raised ] .
//	power      = primary [ raised ] .
//	primary    = number | name | "(" sum ")" .
//	raised     = "^" exponent | superscript { superscript } .
//	exponent   = [ "+" | "-" ] number | "(" [ "+" | "-" ] number ")" .
//	number     = ( digits [ "." [ digits ] ] | "." digits )
//	             [ ( "e" | "E" ) [ "+" | "-" ] digits ] .
//	name       = unit | unit with 2, 3 or 4 attached | "pi" | parameter .
//
// Units of length, s and K may carry an attached digit as exponent (m2, s2);
// parameters have the form [A-Za-z_][A-Za-z0-9_]*.
//
//   - A number needs no blank before its unit: "6.2 kg", "6.2kg".
//   - Operators of one rank work from left to right: a/b/c is a/(b c).
//   - "a/b c" and "a/b·c" are read differently by different people, so they are
//     refused; write a/(b c), or a/b * c for the other meaning.
//   - A unit alone is no quantity: "kg" lacks its number.
//   - "²", "³" and their like are exponents; "×" is "*"; "−" is "-".
//   - The decimal sign is a point. Commas and grouped digits are refused.
//
// # Temperature
//
// "20 degC" is a level, a point on the scale. "5 K" may be either a level or a
// difference; the place where it is wanted decides. A level plus a difference
// is a level; a level less a level is a difference; "20 degC - 5 K" takes the
// kelvin as a difference. Two levels cannot be added, and a level can be
// neither multiplied, divided, raised nor negated: "-20 degC" is the level
// twenty degrees below zero, while "-(20 degC)" is refused. In compound units
// only K (or degR, 5/9 K) may stand: W/(m^2 K).
package unit

import (
	"math"
	"strconv"
	"strings"
)

// A Dim is the dimension of a quantity: the exponents of length, mass, time,
// temperature, plane angle, electric current and amount of substance, in this
// order. Angle counts as a dimension of its own, so that a speed of rotation is
// not a frequency. Dims may be compared with ==.
type Dim [7]int8

// The places of the exponents in a Dim.
const (
	inLength = iota
	inMass
	inTime
	inTemperature
	inAngle
	inCurrent
	inAmount
)

// maxExponent bounds every exponent of a dimension.
const maxExponent = 60

var baseUnits = [len(Dim{})]string{"m", "kg", "s", "K", "rad", "A", "mol"}

// String returns the dimension in SI base units in a form that can be parsed,
// such as "m^2 kg s^-3", or "1" for a plain number.
func (d Dim) String() string {
	var b strings.Builder
	for i, e := range d {
		if e == 0 {
			continue
		}
		if b.Len() > 0 {
			b.WriteByte(' ')
		}
		b.WriteString(baseUnits[i])
		if e != 1 {
			b.WriteByte('^')
			b.WriteString(strconv.Itoa(int(e)))
		}
	}
	if b.Len() == 0 {
		return "1"
	}
	return b.String()
}

var pureTemperature = Dim{inTemperature: 1}

// Thermal says what a quantity of the dimension temperature stands for.
type Thermal int8

// The meanings of a temperature.
const (
	NotTemp    Thermal = iota // the dimension is not that of temperature
	Difference                // a difference of two levels, K
	Level                     // a point on the scale, K above absolute zero
	Either                    // written in kelvin: level or difference as wanted
)

// A Quantity is a value with its dimension.
type Quantity struct {
	Value float64 // SI; a level in kelvin above absolute zero
	Dim   Dim
	Temp  Thermal // NotTemp unless Dim is that of temperature
}

// normal mends a meaning that does not go with the dimension, as a Quantity
// made by hand may have: a temperature of no stated meaning is Either.
func (q Quantity) normal() Quantity {
	switch {
	case q.Dim != pureTemperature:
		q.Temp = NotTemp
	case q.Temp == NotTemp:
		q.Temp = Either
	}
	return q
}

// Params are the declared parameters by name.
type Params map[string]Quantity

// A Fault says what is wrong with the text of a quantity. It is returned as a
// *Fault, not as an error, so that nil stays nil; it satisfies error for those
// who need one.
type Fault struct {
	Start, End int    // byte offsets into the text; 0 <= Start <= End <= len
	Text       string // what is wrong; lower case, no full stop
	Help       string // the cure, or empty
}

// Error returns the text and the cure in one line.
func (f *Fault) Error() string {
	if f.Help == "" {
		return f.Text
	}
	return f.Text + ": " + f.Help
}

func finite(x float64) bool { return !math.IsNaN(x) && !math.IsInf(x, 0) }
