package unit

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// token is what stands next in the text.
type token int8

const (
	tokEnd token = iota
	tokNumber
	tokName
	tokPlus
	tokMinus
	tokTimes
	tokDot // the centred dot of unit products
	tokOver
	tokHat
	tokSuper // a superscript digit or sign
	tokOpen
	tokClose
	tokOther
)

func digit(c byte) bool { return '0' <= c && c <= '9' }

func letter(c byte) bool {
	return 'a' <= c && c <= 'z' || 'A' <= c && c <= 'Z' || c == '_'
}

// peek skips blanks and returns what comes next, and its size in bytes where
// that is fixed.
func (p *parser) peek() (token, int) {
	p.skipBlanks()
	if p.pos == len(p.text) {
		return tokEnd, 0
	}
	c := p.text[p.pos]
	switch {
	case digit(c), c == '.' && p.pos+1 < len(p.text) && digit(p.text[p.pos+1]):
		return tokNumber, 0
	case letter(c), c == '%':
		return tokName, 0
	case c >= utf8.RuneSelf:
		return p.peekWide()
	}
	switch c {
	case '+':
		return tokPlus, 1
	case '-':
		return tokMinus, 1
	case '*':
		return tokTimes, 1
	case '/':
		return tokOver, 1
	case '^':
		return tokHat, 1
	case '(':
		return tokOpen, 1
	case ')':
		return tokClose, 1
	}
	return tokOther, 1
}

// peekWide is peek for what is not ASCII.
func (p *parser) peekWide() (token, int) {
	r, size := utf8.DecodeRuneInString(p.text[p.pos:])
	switch {
	case r == '·' || r == '⋅' || r == '∙':
		return tokDot, size
	case r == '×':
		return tokTimes, size
	case r == '−':
		return tokMinus, size
	case superscript(r) != 0:
		return tokSuper, size
	case wideLetter(r):
		return tokName, 0
	}
	return tokOther, size
}

// wideLetter reports whether a character beyond ASCII belongs to a name. All
// letters do, so that a foreign word is reported whole.
func wideLetter(r rune) bool {
	return r == '°' || r == 'µ' || r != utf8.RuneError && unicode.IsLetter(r) && superscript(r) == 0
}

// superscript returns the digit or sign of a superscript, or 0.
func superscript(r rune) byte {
	switch r {
	case '⁰':
		return '0'
	case '¹':
		return '1'
	case '²':
		return '2'
	case '³':
		return '3'
	case '⁻':
		return '-'
	case '⁺':
		return '+'
	}
	if '⁴' <= r && r <= '⁹' {
		return byte('4' + r - '⁴')
	}
	return 0
}

func (p *parser) skipBlanks() { p.pos += blanks(p.text[p.pos:]) }

// blanks returns the length of the white space at the start of text: ASCII
// blanks, and the fixed and thin ones that typeset values have.
func blanks(text string) int {
	for i := 0; i < len(text); {
		switch c := text[i]; {
		case c == ' ' || c == '\t' || c == '\n' || c == '\r':
			i++
			continue
		case c < utf8.RuneSelf:
			return i
		}
		r, size := utf8.DecodeRuneInString(text[i:])
		if r != '\u00a0' && r != '\u2009' && r != '\u202f' {
			return i
		}
		i += size
	}
	return len(text)
}

// trimmed returns the bounds of text without the white space around it.
func trimmed(text string) (start, end int) {
	start = blanks(text)
	end = len(text)
	for end > start {
		r, size := utf8.DecodeLastRuneInString(text[:end])
		if !strings.ContainsRune(" \t\n\r\u00a0\u2009\u202f", r) {
			break
		}
		end -= size
	}
	return start, end
}

// name takes the name that stands next.
func (p *parser) name() string {
	start := p.pos
	for p.pos < len(p.text) {
		c := p.text[p.pos]
		if c == '%' && p.pos == start {
			p.pos++
			break
		}
		if letter(c) || digit(c) {
			p.pos++
			continue
		}
		if c < utf8.RuneSelf {
			break
		}
		r, size := utf8.DecodeRuneInString(p.text[p.pos:])
		if !wideLetter(r) {
			break
		}
		p.pos += size
	}
	return p.text[start:p.pos]
}

// digits takes the digits that stand next and returns how many there are.
func (p *parser) digits() int {
	start := p.pos
	for p.pos < len(p.text) && digit(p.text[p.pos]) {
		p.pos++
	}
	return p.pos - start
}

// at returns the byte i places ahead, or 0.
func (p *parser) at(i int) byte {
	if p.pos+i < len(p.text) {
		return p.text[p.pos+i]
	}
	return 0
}

// plainNumber reports whether text is a number and nothing else.
func plainNumber(text string) bool {
	p := parser{text: text}
	if t, _ := p.peek(); t == tokMinus {
		p.pos++
	}
	if t, _ := p.peek(); t != tokNumber {
		return false
	}
	p.literal()
	return p.fault == nil && p.pos == len(text)
}
