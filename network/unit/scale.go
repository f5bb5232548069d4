package unit

import (
	"math"
	"strconv"
)

// A Scale turns values in some unit to SI and back. The zero Scale is not
// usable.
type Scale struct {
	Factor float64 // SI units in one of this unit
	Zero   float64 // of a level: the scale's zero above absolute zero, in this unit
	Dim    Dim
	Level  bool // values are temperature levels
}

// SI returns a value on the scale in SI, a level in kelvin above absolute zero.
func (s Scale) SI(shown float64) float64 { return (shown + s.Zero) * s.Factor }

// Show returns an SI value on the scale.
func (s Scale) Show(si float64) float64 { return si/s.Factor - s.Zero }

func (s Scale) thermal() Thermal {
	switch {
	case s.Dim != pureTemperature:
		return NotTemp
	case s.Level:
		return Level
	}
	return Either
}

// ParseUnit reads a unit without a number, such as "km/h", "W/(m^2 K)" or
// "degC". An empty text and "1" are the unit of plain numbers.
func ParseUnit(text string) (Scale, *Fault) {
	start, end := trimmed(text)
	if body := text[start:end]; body == "" || body == "1" {
		return Scale{Factor: 1}, nil
	}
	p := parser{text: text}
	v := p.whole()
	switch {
	case p.fault != nil:
		return Scale{}, p.fault
	case !v.bare:
		return Scale{}, &Fault{start, end, "a unit must stand alone, without numbers", ""}
	case v.level != nil:
		return Scale{v.level.factor, v.level.zero, pureTemperature, true}, nil
	}
	return Scale{Factor: v.si, Dim: v.dim}, nil
}

// number returns x with that many significant digits, trailing zeros left out,
// with an exponent only when it is very large or very small.
func number(x float64, digits int) string {
	if digits < 1 || digits > 17 {
		digits = 15
	}
	short := strconv.FormatFloat(x, 'g', digits, 64)
	r, err := strconv.ParseFloat(short, 64)
	if size := math.Abs(r); err == nil && (size == 0 || 1e-4 <= size && size < 1e9) {
		return strconv.FormatFloat(r, 'f', -1, 64)
	}
	return strconv.FormatFloat(r, 'g', -1, 64)
}
