package unit

import (
	"fmt"
	"strconv"
	"strings"
	"unicode/utf8"
)

// literal takes the number that stands next.
func (p *parser) literal() float64 {
	start := p.pos
	p.digits()
	if p.at(0) == '.' {
		p.pos++
		p.digits()
	}
	mantissa := p.text[start:p.pos]
	if c := p.at(0); c == 'e' || c == 'E' {
		sign := 0
		if c := p.at(1); c == '+' || c == '-' {
			sign = 1
		}
		if digit(p.at(1 + sign)) {
			p.pos += 1 + sign
			p.digits()
		}
	}
	if p.broken(start) {
		return 0
	}
	x, err := strconv.ParseFloat(p.text[start:p.pos], 64)
	switch {
	case err != nil:
		p.fail(start, p.pos, "the number is too large", "")
	case x == 0 && strings.Trim(mantissa, "0.") != "":
		p.fail(start, p.pos, "the number is too small", "")
	}
	return x
}

// broken reports a comma, a grouping sign or a second point after the number
// that began at start.
func (p *parser) broken(start int) bool {
	c := p.at(0)
	if c != ',' && c != '\'' && c != '_' && c != '.' || !digit(p.at(1)) && c != '.' {
		return false
	}
	head := p.text[start:p.pos]
	p.pos++
	tail := p.digits()
	all := head + p.text[p.pos-tail:p.pos]
	switch {
	case c == '.' && strings.Contains(head, "."):
		p.fail(start, p.pos, "a number has one decimal point", "")
	case c == '.':
		p.fail(start, p.pos, "an exponent has no decimal point", "")
	case c == ',' && tail == 3:
		p.fail(start, p.pos, "a number cannot have a comma", fmt.Sprintf("write %s.%s or %s, whichever is meant", short(head), p.text[p.pos-tail:p.pos], short(all)))
	case c == ',':
		p.fail(start, p.pos, "a number cannot have a comma", fmt.Sprintf("write %s.%s", short(head), short(p.text[p.pos-tail:p.pos])))
	default:
		p.fail(start, p.pos, "digits cannot be grouped", "write "+short(all))
	}
	return true
}

// exponent takes what follows "^".
func (p *parser) exponent() float64 {
	t, size := p.peek()
	start := p.pos
	open := t == tokOpen
	if open {
		p.pos += size
		t, size = p.peek()
	}
	minus := t == tokMinus
	if minus || t == tokPlus {
		p.pos += size
		t, _ = p.peek()
	}
	if t != tokNumber {
		p.fail(start, max(start, p.pos), "an exponent must be a number", "")
		return 0
	}
	x := p.literal()
	if open {
		if t, size = p.peek(); t == tokClose {
			p.pos += size
		} else {
			p.fail(start, p.pos, "an exponent must be a single number", "")
		}
	}
	if minus {
		return -x
	}
	return x
}

// superscripts takes a row of superscript characters as an exponent.
func (p *parser) superscripts() float64 {
	start := p.pos
	var row [8]byte
	n := 0
	for {
		t, size := tokOther, 0
		if p.pos < len(p.text) && p.text[p.pos] >= utf8.RuneSelf {
			t, size = p.peekWide()
		}
		if t != tokSuper {
			break
		}
		r, _ := utf8.DecodeRuneInString(p.text[p.pos:])
		if p.pos += size; n < len(row) {
			row[n] = superscript(r)
			n++
		}
	}
	x, err := strconv.Atoi(string(row[:n]))
	if err != nil {
		p.fail(start, p.pos, "an exponent must be a number", "")
	}
	return float64(x)
}

// twoNumbers reports two numbers side by side.
func (p *parser) twoNumbers(v value) {
	gap := p.pos
	p.literal()
	if p.fault != nil {
		return
	}
	next := p.text[gap:p.pos]
	_, end := trimmed(p.text[:gap])
	if end > 0 && digit(p.text[end-1]) && len(next) == 3 && v.dim == (Dim{}) {
		p.fail(v.start, p.pos, "digits cannot be grouped", "write "+short(p.text[v.start:end]+next))
		return
	}
	p.fail(gap, p.pos, "an operator is missing before "+short(next), "write * for a product or ^ for a power")
}
