package netlist

import (
	"bytes"
	"fmt"
	"strings"

	"workheat/network/diag"
)

// punctuation reports what stands where a comma, a colon, a bracket, a name or a value is due. next is where
// the token begins that could not be read.
func (m *mender) punctuation(next int) bool {
	c := m.text[m.at]
	if len(m.p.open) == 0 {
		m.report(m.at, m.at+1, "a netlist begins with {", `write { "workheat": 1, "nodes": { ... } }`)
		return false
	}
	if m.said("in literal", "start of value") && m.namePlace(next) {
		m.at = next
		return m.bareName()
	}
	switch {
	case c == ',':
		return m.strayComma()
	case m.said("expecting ':'"):
		return m.noColon(c)
	case m.said("after object value", "after array element"):
		return m.noComma(c)
	case m.said("must be a string"):
		return m.badName(c)
	case m.said("in number", "in literal"):
		return m.word(next)
	case c == '\'':
		return m.singleQuotes()
	case m.said("start of value") && c != '}' && c != ']' && c > ' ':
		return m.word(m.at)
	}
	m.report(m.at, m.at+1, "this is not JSON: "+clean(m.cause), "check commas, quotes and brackets near here")
	return false
}

// strayComma reports a comma before a closing bracket, or a second one.
func (m *mender) strayComma() bool {
	rest := bytes.TrimLeft(m.text[m.at+1:], " \t\r\n")
	switch {
	case m.before(m.at) == ':':
		m.at = bytes.LastIndexByte(m.text[:m.at], ':') + 1
		return m.noValue()
	case len(rest) > 0 && (rest[0] == '}' || rest[0] == ']'):
		m.report(m.at, m.at+1, "a comma stands before the closing bracket", "remove it")
	default:
		m.report(m.at, m.at+1, "a comma stands where something else is due", "remove it")
	}
	m.blank(m.at, m.at+1)
	return true
}

// before returns the last byte before a place that is not white space, or zero.
func (m *mender) before(at int) byte {
	if t := bytes.TrimRight(m.text[:at], " \t\r\n"); len(t) > 0 {
		return t[len(t)-1]
	}
	return 0
}

// noColon reports a name that is not followed by a colon.
func (m *mender) noColon(c byte) bool {
	if c == '=' {
		m.report(m.at, m.at+1, "a colon is due after a name, not an equals sign", `write "name": value`)
		m.put(m.at, ":")
		return true
	}
	m.report(int(m.p.lastStart), int(m.p.dec.InputOffset()), "a colon and a value are missing after this name", `write "name": value`)
	if c == '}' || c == ']' || !m.blankBefore() {
		return false
	}
	m.put(m.at-1, ":")
	return true
}

// blankBefore reports whether white space stands just before the fault: a place for a missing sign.
func (m *mender) blankBefore() bool {
	return m.at > 0 && strings.IndexByte(" \t\r\n", m.text[m.at-1]) >= 0
}

// noComma reports what follows a value without a comma.
func (m *mender) noComma(c byte) bool {
	end := int(m.p.dec.InputOffset())
	switch {
	case c == ';':
		m.report(m.at, m.at+1, "a comma is due here, not a semicolon", "")
		m.put(m.at, ",")
		return true
	case c == '}' || c == ']':
		return m.wrongBracket(c)
	case c == '"' || c == '{' || c == '[':
		m.report(end, end, "a comma is missing here", "")
		if !m.blankBefore() {
			return false
		}
		m.put(m.at-1, ",")
		return true
	}
	start := int(m.p.lastStart)
	stop := m.runEnd(m.at)
	switch m.p.lastKind {
	case '0':
		if m.at == end && c >= '0' && c <= '9' {
			return m.leadingZero(start)
		}
		m.report(start, stop, "a value with a unit must stand in quotes", fmt.Sprintf("write %q", m.text[start:stop]))
		return m.guess(start, stop)
	case '"':
		if m.at == end {
			return m.quoteBefore(start)
		}
		m.report(m.at, stop, "this stands outside of the quotes", "put number and unit inside: \"6.2 kg\"; between two entries put a comma")
		m.blank(m.at, stop)
		m.hush = append(m.hush, m.src.Span(start, stop))
		return true
	}
	m.report(m.at, m.at+1, "a comma or a closing bracket is due here", "")
	return false
}

// leadingZero reports a number that begins with zeros it must not have.
func (m *mender) leadingZero(start int) bool {
	digits := start + len(m.text[start:]) - len(bytes.TrimLeft(m.text[start:], "-"))
	zeros := digits
	for zeros+1 < len(m.text) && m.text[zeros] == '0' && m.text[zeros+1] >= '0' && m.text[zeros+1] <= '9' {
		zeros++
	}
	m.report(digits, zeros, "a number must not begin with 0 before another digit", "remove it")
	m.put(start, strings.Repeat(" ", zeros-digits)+string(m.text[start:digits]))
	return true
}

// quoteBefore reports a text after which the next one begins at once: the quote that seems to close it opens
// the next, and its own is missing before the comma.
func (m *mender) quoteBefore(start int) bool {
	end := int(m.p.dec.InputOffset()) - 1
	body := bytes.TrimRight(m.text[start:end], " \t")
	if len(body) < 3 || start+len(body) == end || body[len(body)-1] != ',' {
		m.report(start, end+1, "a quote is missing in or before this text", "")
		return false
	}
	comma := start + len(body) - 1
	m.report(start, comma, "this text has no closing quote", "")
	m.put(comma, `",`)
	return true
}

// wrongBracket reports a closing bracket that does not match the open one.
func (m *mender) wrongBracket(c byte) bool {
	open := int(m.p.open[len(m.p.open)-1])
	due := "}"
	if m.text[open] == '[' {
		due = "]"
	}
	m.list.Add(diag.Problem{At: m.src.Span(m.at, m.at+1), Text: fmt.Sprintf("%s is due here, not %c", due, c),
		See: []diag.Note{{At: m.src.Span(open, open+1), Text: "it closes this bracket"}}})
	m.put(m.at, due)
	return true
}

// runEnd returns the end of what stands from a place on up to a comma, a bracket, a quote or the line's end.
func (m *mender) runEnd(at int) int {
	end := at
	for end < len(m.text) && strings.IndexByte(",}]\"\r\n", m.text[end]) < 0 {
		end++
	}
	return at + len(bytes.TrimRight(m.text[at:end], " \t"))
}

// badName reports a name that is no text, or the tail of a number with a decimal comma.
func (m *mender) badName(c byte) bool {
	end := int(m.p.dec.InputOffset())
	if m.p.lastKind == '0' && c >= '0' && c <= '9' && m.at == end+1 && m.text[end] == ',' {
		start, stop := int(m.p.lastStart), m.runEnd(m.at)
		m.report(start, stop, "a number cannot have a comma", fmt.Sprintf("write %s.%s", m.text[start:end], m.text[m.at:stop]))
		m.put(end, ".")
		return true
	}
	m.report(m.at, m.runEnd(m.at), "a name in quotes is due here", `write "name": value`)
	return false
}

// namePlace reports whether a name is due at a place and a letter stands there: in an object, after its
// brace or a comma.
func (m *mender) namePlace(at int) bool {
	before := m.before(at)
	c := m.text[min(at, len(m.text)-1)] | 0x20
	return m.text[m.p.open[len(m.p.open)-1]] == '{' && (before == '{' || before == ',') && c >= 'a' && c <= 'z'
}

// bareName reports a name without quotes. Where blanks stand on both sides the quotes fit in.
func (m *mender) bareName() bool {
	colon := bytes.IndexAny(m.text[m.at:], ":\n,{}[]\"")
	if colon <= 0 || m.text[m.at+colon] != ':' {
		m.report(m.at, max(m.at+1, m.runEnd(m.at)), "a name in quotes is due here", `write "name": value`)
		return false
	}
	name := strings.TrimSpace(string(m.text[m.at : m.at+colon]))
	m.report(m.at, m.at+len(name), "a name must stand in quotes", fmt.Sprintf("write %q", name))
	after := m.at + colon + 1
	if !m.blankBefore() || after >= len(m.text) || m.text[after] != ' ' || strings.ContainsAny(name, "\\\t") {
		return false
	}
	m.blank(m.at-1, after+1)
	m.put(m.at-1, `"`+name+`":`)
	return true
}

// singleQuotes reports a text in single quotes.
func (m *mender) singleQuotes() bool {
	end := bytes.IndexByte(m.text[m.at+1:], '\'')
	body := m.text[m.at+1 : m.at+1+max(end, 0)]
	if end < 0 || bytes.ContainsAny(body, "\"\n\\") {
		m.report(m.at, m.at+1, "text must stand in double quotes", "")
		return false
	}
	end += m.at + 1
	m.report(m.at, end+1, "text must stand in double quotes", fmt.Sprintf("write %q", body))
	m.put(m.at, `"`)
	m.put(end, `"`)
	return true
}

// word reports a word or a number that JSON does not know.
func (m *mender) word(start int) bool {
	end := max(start+1, m.runEnd(start))
	word := string(m.text[start:end])
	help := "a quantity or a name stands in quotes"
	if lower := strings.ToLower(word); lower == "true" || lower == "false" || lower == "null" {
		help = "write " + lower
	} else if strings.IndexByte("+-.0123456789", word[0]) >= 0 {
		help = "a number has digits before and after its point, and no plus sign; with a unit it stands in quotes"
	}
	m.report(start, end, quote(word)+" is no value", help)
	switch {
	case word[0] == '+':
		m.blank(start, start+1)
		return true
	case word[0] == '.' && m.text[start-1] == ' ':
		m.put(start-1, "0")
		return true
	}
	return m.guess(start, end)
}

// clean takes what only a programmer wants to know off a message of the decoder.
func clean(text string) string {
	text = strings.TrimPrefix(text, "jsontext: ")
	if i := strings.Index(text, " (expecting"); i > 0 {
		text = text[:i]
	}
	return text
}
