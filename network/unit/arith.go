package unit

import (
	"fmt"
	"math"
)

const (
	noProduct   = "a temperature level cannot be multiplied, divided or raised"
	useDiff     = "take a difference first, such as (80 degC - 20 degC)"
	exponentBig = "the power of a unit is too high"
)

var levelCures = map[string]string{
	"degC": "write K for a difference; a level is a number and degC alone",
	"degF": "write degR for a difference of 5/9 K; a level is a number and degF alone",
}

// checked fails if v is not finite or lies below absolute zero.
func (p *parser) checked(v value) value {
	switch {
	case !finite(v.si):
		p.fail(v.start, v.end, "the value is too large", "")
	case v.temp == Level && v.si < 0:
		p.fail(v.start, v.end, belowZero, "")
	}
	return v
}

// onScale puts a plain number on a scale of levels.
func (p *parser) onScale(v, scale value) value {
	u := scale.level
	return p.checked(value{
		si: (v.si + u.zero) * u.factor, dim: u.dim, temp: Level,
		start: v.start, end: scale.end,
	})
}

// mayMultiply fails if v is a level or the unit of one.
func (p *parser) mayMultiply(v value) bool {
	switch {
	case p.fault != nil:
	case v.temp == Level:
		p.fail(v.start, v.end, noProduct, useDiff)
	case v.level != nil:
		p.fail(v.start, v.end, v.level.name+" is a scale of levels and cannot stand in a product", levelCures[v.level.name])
	}
	return p.fault == nil
}

func (p *parser) times(a, b value) value {
	return p.combine(a, b, a.si*b.si, 1)
}

func (p *parser) over(a, b value) value {
	if p.fault == nil && b.si == 0 {
		p.fail(b.start, b.end, "division by zero", "")
	}
	return p.combine(a, b, a.si/b.si, -1)
}

// combine finishes a product (sign 1) or a quotient (sign -1).
func (p *parser) combine(a, b value, si float64, sign int) value {
	if !p.mayMultiply(a) || !p.mayMultiply(b) {
		return a
	}
	v := value{si: si, bare: a.bare && b.bare, start: a.start, end: b.end}
	for i := range v.dim {
		e := int(a.dim[i]) + sign*int(b.dim[i])
		if e > maxExponent || e < -maxExponent {
			p.fail(v.start, v.end, exponentBig, "")
		}
		v.dim[i] = int8(e)
	}
	if v.dim == pureTemperature {
		v.temp = productOf(a, b)
	}
	return p.checked(v)
}

// productOf says what a temperature is that came out of a product: a number of
// kelvins is what the kelvins were, anything else is a difference.
func productOf(a, b value) Thermal {
	switch plain := (Dim{}); {
	case b.dim == plain:
		return a.temp
	case a.dim == plain && b.dim == pureTemperature:
		return b.temp
	}
	return Difference
}

// raise returns base to the power e. The exponents of the result must be whole.
func (p *parser) raise(base value, e float64) value {
	if !p.mayMultiply(base) {
		return base
	}
	v := value{si: math.Pow(base.si, e), bare: base.bare, start: base.start, end: p.pos}
	switch {
	case base.si == 0 && e < 0:
		p.fail(base.start, base.end, "division by zero", "")
	case base.si < 0 && e != math.Trunc(e):
		p.fail(v.start, v.end, "a negative value has no such root", "")
	}
	for i, d := range base.dim {
		x := e * float64(d)
		if x != math.Trunc(x) {
			p.fail(v.start, v.end, fmt.Sprintf("the root of %s is no unit", base.dim), "the exponents of units must stay whole")
			return v
		}
		if math.Abs(x) > maxExponent {
			p.fail(v.start, v.end, exponentBig, "")
			return v
		}
		v.dim[i] = int8(x)
	}
	if v.dim == pureTemperature {
		v.temp = Difference
		if base.dim == pureTemperature {
			v.temp = base.temp
		}
	}
	return p.checked(v)
}

// add returns a + b, or a - b if minus.
func (p *parser) add(a, b value, minus bool) value {
	if !p.numbered(a) || !p.numbered(b) {
		return a
	}
	v := value{si: a.si + b.si, dim: a.dim, start: a.start, end: b.end}
	if minus {
		v.si = a.si - b.si
	}
	if a.dim != b.dim {
		p.unlike(a, b)
		return v
	}
	if a.dim == pureTemperature {
		v.temp = p.addTemps(a, b, minus)
	}
	return p.checked(v)
}

// unlike reports two parts of different dimension in a sum.
func (p *parser) unlike(a, b value) {
	da := describe(Quantity{Dim: a.dim, Temp: a.temp})
	db := describe(Quantity{Dim: b.dim, Temp: b.temp})
	p.fail(a.start, b.end, fmt.Sprintf("%s is %s, but %s is %s", p.quote(a), da, p.quote(b), db),
		"only quantities of one kind can be added")
}

func (p *parser) quote(v value) string { return short(p.text[v.start:v.end]) }

// addTemps says what the sum or the difference of two temperatures is.
func (p *parser) addTemps(a, b value, minus bool) Thermal {
	switch {
	case minus && b.temp == Level && a.temp == Difference:
		p.fail(a.start, b.end, "a temperature level cannot be taken from a difference", "")
	case minus && b.temp == Level:
		return Difference
	case a.temp == Level && b.temp == Level:
		p.fail(a.start, b.end, "two temperature levels cannot be added", "give the second as a difference, in K")
	case a.temp == Level || b.temp == Level:
		return Level
	case a.temp == Either || b.temp == Either && !minus:
		return Either
	}
	return Difference
}
