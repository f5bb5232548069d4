package unit

import (
	"fmt"
	"strings"
)

const (
	longest = 4096 // bytes in one quantity
	deepest = 50   // brackets inside one another
)

// A parser reads one text by recursive descent. The first fault is kept and
// ends the reading.
type parser struct {
	text   string
	pos    int
	depth  int
	params Params
	fault  *Fault
}

// A value is a part of the text that has been read.
type value struct {
	si         float64
	dim        Dim
	temp       Thermal
	bare       bool  // units alone, no number yet
	raised     bool  // an attached digit is its exponent
	level      *unit // degC or degF waiting for its number
	start, end int   // where it stands in the text
}

// Parse reads a quantity. A parameter of params may be used by its name; a unit
// goes before a parameter of the same name, see [NameFault]. The value returned
// is always finite, and a temperature level is never below absolute zero.
func Parse(text string, params Params) (Quantity, *Fault) {
	p := parser{text: text, params: params}
	v := p.whole()
	if p.fault != nil {
		return Quantity{}, p.fault
	}
	if !p.numbered(v) {
		return Quantity{}, p.fault
	}
	return Quantity{v.si, v.dim, v.temp}, nil
}

// whole reads the text up to its end.
func (p *parser) whole() value {
	if len(p.text) > longest {
		p.fail(0, len(p.text), fmt.Sprintf("a quantity is longer than %d bytes", longest), "use parameters for its parts")
		return value{}
	}
	if start, end := trimmed(p.text); start == end {
		p.fail(0, len(p.text), "a value is missing", "")
		return value{}
	}
	v := p.sum()
	if t, size := p.peek(); p.fault == nil && t != tokEnd {
		p.leftover(t, size)
	}
	return v
}

// fail notes a fault if there is none yet.
func (p *parser) fail(start, end int, text, help string) {
	if p.fault == nil {
		p.fault = &Fault{start, end, text, help}
	}
}

// leftover reports what stands where an operator or the end should be.
func (p *parser) leftover(t token, size int) {
	start := p.pos
	switch {
	case t == tokClose:
		p.fail(start, start+size, "a bracket is closed that was not opened", "")
	case t == tokHat || t == tokSuper:
		p.fail(start, start+size, "a power of a power can be read two ways", "use brackets")
	default:
		p.strange(size)
	}
}

// strange reports a character that has no place in a quantity.
func (p *parser) strange(size int) {
	c := p.text[p.pos : p.pos+size]
	p.fail(p.pos, p.pos+size, fmt.Sprintf("%q cannot stand here in a quantity", c), strangeCures[c])
}

var strangeCures = map[string]string{
	",": "the decimal sign is a point", ";": "", "=": "give a value, not an equation",
	".": "write a product of units with * or a blank", "[": "use round brackets", "]": "use round brackets",
	"{": "use round brackets", "}": "use round brackets", "÷": "write /", ":": "write /",
	"\"": "inches are in, seconds of arc are not known", "'": "feet are ft, minutes of arc are not known",
}

func (p *parser) sum() value {
	left := p.product()
	for p.fault == nil {
		t, size := p.peek()
		if t != tokPlus && t != tokMinus {
			break
		}
		p.pos += size
		right := p.product()
		if p.fault == nil {
			left = p.add(left, right, t == tokMinus)
		}
	}
	return left
}

// product reads factors that are joined by operators or stand side by side.
func (p *parser) product() value {
	v := p.signed()
	alone, divisor := true, -1 // divisor: where the last one starts, if the last operator was a division
	for p.fault == nil {
		t, size := p.peek()
		switch t {
		case tokName, tokOpen, tokDot:
			if divisor >= 0 {
				p.twoWays(divisor, v.end)
				return v
			}
			v = p.beside(v, t, size, alone)
		case tokTimes:
			p.pos += size
			divisor = -1
			v = p.times(v, p.signed())
		case tokOver:
			p.pos += size
			p.skipBlanks()
			divisor = p.pos
			v = p.over(v, p.signed())
		case tokNumber:
			p.twoNumbers(v)
		default:
			return v
		}
		alone = false
	}
	return v
}

// beside reads a factor that stands beside v without an operator, or after a
// centred dot. Only a plain number that is alone may take a scale of levels.
func (p *parser) beside(v value, t token, size int, alone bool) value {
	if t == tokDot {
		p.pos += size
		return p.times(v, p.signed())
	}
	f := p.power()
	switch {
	case p.fault != nil:
		return v
	case t == tokOpen && !f.bare:
		p.fail(f.start, f.end, "an operator is missing before the bracket", "write * before it")
		return v
	case f.level != nil && alone && !v.bare && v.dim == Dim{}:
		return p.onScale(v, f)
	}
	return p.times(v, f)
}

// signed reads a factor with at most one sign. The sign belongs to the factor
// alone, so that -20 degC is a level below the zero of its scale.
func (p *parser) signed() value {
	t, size := p.peek()
	if t != tokPlus && t != tokMinus {
		return p.power()
	}
	start := p.pos
	p.pos += size
	v := p.power()
	switch {
	case p.fault != nil:
	case v.bare:
		p.numbered(v)
	case v.temp == Level:
		p.fail(start, v.end, "a temperature level cannot be given a sign", "write the sign before the number, as in -20 degC")
	case t == tokMinus:
		v.si = -v.si
	}
	v.start = start
	return v
}

func (p *parser) power() value {
	base := p.primary()
	if p.fault != nil {
		return base
	}
	switch t, size := p.peek(); {
	case base.raised:
	case t == tokHat:
		p.pos += size
		base = p.raise(base, p.exponent())
	case t == tokSuper:
		base = p.raise(base, p.superscripts())
	}
	if t, size := p.peek(); p.fault == nil && (t == tokHat || t == tokSuper) {
		p.leftover(t, size)
	}
	return base
}

func (p *parser) primary() value {
	t, size := p.peek()
	start := p.pos
	switch t {
	case tokNumber:
		x := p.literal()
		return value{si: x, start: start, end: p.pos}
	case tokName:
		return p.named(p.name(), start)
	case tokOpen:
		return p.bracket(start)
	case tokEnd:
		p.skipBack()
		p.fail(p.pos, len(p.text), "the quantity ends too early", "")
	case tokClose:
		p.fail(start, start+size, "a value is missing before the bracket", "")
	case tokOther:
		p.strange(size)
	default:
		p.fail(start, start+size, "a value is missing before "+p.text[start:start+size], "")
	}
	return value{}
}

// skipBack moves to the last character that is not blank.
func (p *parser) skipBack() {
	_, end := trimmed(p.text)
	if r := strings.LastIndexFunc(p.text[:end], func(rune) bool { return true }); r >= 0 {
		p.pos = r
	}
}

func (p *parser) bracket(start int) value {
	if p.depth++; p.depth > deepest {
		p.fail(start, start+1, fmt.Sprintf("brackets are more than %d deep", deepest), "use parameters for the parts")
		return value{}
	}
	p.pos++
	v := p.sum()
	if p.fault != nil {
		return v
	}
	switch t, size := p.peek(); t {
	case tokClose:
		p.pos += size
	case tokEnd:
		p.fail(start, start+1, "the bracket is not closed", "")
	default:
		p.leftover(t, size)
	}
	p.depth--
	v.start, v.end, v.raised = start, p.pos, false
	return v
}

// numbered reports a fault if v consists of units alone.
func (p *parser) numbered(v value) bool {
	if v.bare {
		unit := p.text[v.start:v.end]
		p.fail(v.start, v.end, "the number is missing before "+short(unit), fmt.Sprintf("write 1 %s if one is meant", short(unit)))
	}
	return p.fault == nil
}

// twoWays reports a factor that follows a quotient.
func (p *parser) twoWays(divisor, end int) {
	below := p.text[divisor:end]
	if t, size := p.peek(); t == tokDot {
		p.pos += size
	}
	p.skipBlanks()
	start := p.pos
	p.power() // for its extent
	if p.fault != nil {
		return
	}
	_, stop := trimmed(p.text[:p.pos])
	next := p.text[start:stop]
	p.fail(divisor, stop, "a factor after a quotient can be read two ways",
		fmt.Sprintf("write /(%s %s), or * before %s", short(below), short(next), short(next)))
}
