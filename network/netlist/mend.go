package netlist

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"strings"
	"unicode/utf8"

	"github.com/goccy/go-json/jsontext"

	"workheat/network/diag"
)

// Mending reads the text from the start again each time, so it is bounded: by the number of mends, and for
// large files by the bytes read.
const (
	maxMends   = 60
	mendedText = 64 << 20
)

// A mender reports what is wrong with the syntax, and mends it in a copy of the text where the cure is plain.
// A mend never moves a byte, so that places stay true.
type mender struct {
	src    *diag.Source
	list   *diag.List
	text   []byte // src.Text, or a copy once something was mended
	copied bool
	mends  int
	hush   []diag.Span

	// the fault at hand
	p     *parser
	at    int    // where the decoder stopped
	cause string // what it said
}

// encoding accepts a byte order mark and reports a text that is not UTF-8.
func (m *mender) encoding() bool {
	t := m.text
	switch {
	case len(bytes.TrimSpace(t)) == 0:
		m.list.At(m.src.Whole(), "the file is empty", `begin with { "workheat": 1, "nodes": { ... } }`)
		return false
	case bytes.HasPrefix(t, []byte("\xff\xfe")) || bytes.HasPrefix(t, []byte("\xfe\xff")) || len(t) > 1 && (t[0] == 0 || t[1] == 0):
		m.list.At(m.src.Whole(), "the file is no text in UTF-8", "save it as UTF-8; it looks like UTF-16, which some editors call Unicode")
		return false
	case bytes.HasPrefix(t, []byte("\xef\xbb\xbf")):
		m.blank(0, 3)
	}
	return true
}

// put writes s over the text from a place on.
func (m *mender) put(at int, s string) {
	if !m.copied {
		m.text, m.copied = bytes.Clone(m.text), true
	}
	copy(m.text[at:], s)
}

// blank writes blanks over the text from start to end.
func (m *mender) blank(start, end int) { m.put(start, strings.Repeat(" ", end-start)) }

// report adds a problem.
func (m *mender) report(start, end int, text, help string) {
	m.list.At(m.src.Span(start, end), text, help)
}

// mend reports a fault and returns whether the text was mended and is worth reading again.
func (m *mender) mend(p *parser, err error) bool {
	m.p, m.at, m.cause = p, int(p.dec.InputOffset()), ""
	var bad *jsontext.SyntacticError
	if errors.As(err, &bad) {
		m.at, m.cause = int(bad.ByteOffset), bad.Err.Error()
	}
	m.mends++
	mended := m.sort(err)
	return mended && m.mends <= maxMends && m.mends*len(m.text) <= mendedText
}

// sort finds out what kind of fault it is.
func (m *mender) sort(err error) bool {
	next := m.p.next()
	switch {
	case errors.Is(err, errDepth):
		m.report(next, next+1, fmt.Sprintf("the nesting is deeper than %d levels", maxDepth), "flatten it")
		return false
	case errors.Is(err, errMany):
		m.report(next, next+1, fmt.Sprintf("the file holds more than %d values", maxValues), "put long tables into CSV files")
		return false
	case errors.Is(err, io.ErrUnexpectedEOF) || errors.Is(err, io.EOF) || m.at >= len(m.text):
		m.early()
		return false
	case m.isComment():
		return true
	case errors.Is(err, errMore):
		return m.after()
	case m.said("in string", "escape sequence", "surrogate"):
		return m.inText(next)
	case m.said("UTF-8"):
		return m.foreign()
	case m.said("missing value"):
		return m.noValue()
	}
	return m.punctuation(next)
}

// said reports whether the decoder's words hold one of the pieces.
func (m *mender) said(pieces ...string) bool {
	for _, s := range pieces {
		if strings.Contains(m.cause, s) {
			return true
		}
	}
	return false
}

// early reports a text that ends before it is complete.
func (m *mender) early() {
	end := len(bytes.TrimRight(m.src.Text, " \t\r\n"))
	if next := m.p.next(); next < len(m.text) && m.text[next] == '"' {
		m.report(next, end, "this text has no closing quote, and the netlist ends in it", "")
		return
	}
	problem := diag.Problem{At: m.src.Span(end-1, end), Text: "the netlist ends before it is complete", Help: "a closing bracket is missing"}
	if n := len(m.p.open); n > 0 {
		open := int(m.p.open[n-1])
		problem.See = []diag.Note{{At: m.src.Span(open, open+1), Text: "this bracket is still open"}}
	}
	m.list.Add(problem)
}

// isComment reports a comment, and blanks it and all that follow.
func (m *mender) isComment() bool {
	size := commentSize(m.text[m.at:])
	if size == 0 {
		return false
	}
	m.report(m.at, m.at+size, "JSON has no comments", `use an "about" key: it may stand in any object`)
	inText := false
	for i := m.at; i < len(m.text); i++ {
		switch c := m.text[i]; {
		case inText && c == '\\':
			i++
		case c == '"':
			inText = !inText
		case c == '\n':
			inText = false // no text goes on after its line
		case !inText:
			if n := commentSize(m.text[i:]); n > 0 {
				m.blank(i, i+n)
				i += n - 1
			}
		}
	}
	return true
}

// commentSize returns the length of the comment with which a text begins, or zero.
func commentSize(t []byte) int {
	switch {
	case bytes.HasPrefix(t, []byte("//")) || t[0] == '#':
		end := bytes.IndexByte(t, '\n')
		if end < 0 {
			end = len(t)
		}
		return len(bytes.TrimRight(t[:end], " \t\r"))
	case bytes.HasPrefix(t, []byte("/*")):
		if end := bytes.Index(t[2:], []byte("*/")); end >= 0 {
			return end + 4
		}
		return len(t)
	}
	return 0
}

// after reports text after the end. Stray brackets do no harm to what was read; anything else may be a part
// of the netlist that was cut off.
func (m *mender) after() bool {
	rest := bytes.TrimLeft(m.text[m.p.dec.InputOffset():], " \t\r\n")
	next := len(m.text) - len(rest)
	if rest[0] == ',' && len(bytes.TrimSpace(rest)) == 1 {
		m.report(next, next+1, "a comma stands after the end of the netlist", "remove it")
		m.blank(next, next+1)
		return true
	}
	if rest[0] == ',' {
		end := int(m.p.dec.InputOffset())
		m.report(end-1, end, "this bracket closes the whole netlist, but more follows", "remove it, or move it to the end")
		return false
	}
	if strings.Trim(string(rest[:min(len(rest), 1000)]), "}] \t\r\n,") == "" && len(rest) <= 1000 {
		m.report(next, next+1, "a bracket is closed that was not opened", "remove it")
		m.blank(next, len(m.text))
		return true
	}
	if rest[0] == '}' || rest[0] == ']' {
		m.report(next, next+1, "a bracket is closed that was not opened", "remove it, or the one too many before it")
		return false
	}
	m.report(next, next+1, "there is more text after the end of the netlist", "the bracket before it closes the whole netlist: move it to the end, or remove what follows")
	return false
}

// inText reports a fault inside a string that begins at start.
func (m *mender) inText(start int) bool {
	c := m.text[m.at]
	switch {
	case c == '\n' || c == '\r':
		return m.openText(start)
	case c == '\\':
		end := min(m.at+2, len(m.text))
		text := fmt.Sprintf("%s is no escape", m.text[m.at:end])
		if end < len(m.text) && m.text[m.at+1] == 'u' {
			text = `\u needs four hexadecimal digits, and a character beyond them a whole pair`
		}
		m.report(m.at, end, text, `write \\ for a backslash; a letter such as µ or ² may stand as it is`)
		m.put(m.at, "/")
		return true
	}
	m.report(m.at, m.at+1, fmt.Sprintf("a control character, code %d, stands inside a text", c), "remove it, or write it as an escape")
	m.blank(m.at, m.at+1)
	return true
}

// openText reports a text that is not closed on its line, and closes it before the brackets and the comma
// that end the line.
func (m *mender) openText(start int) bool {
	body := bytes.TrimRight(m.text[start:m.at], " \t,]}")
	tail := m.text[start+len(body) : m.at]
	end := start + len(body)
	m.report(start, max(end, start+1), "this text has no closing quote on its line", `close it with a quote, or write \n where the text is to break`)
	switch {
	case len(body) == 0:
		return false
	case len(tail) == 0 || tail[0] == ' ' || tail[0] == '\t':
		m.put(end, `"`)
	case string(tail) == ",":
		m.put(end, `",`)
	default:
		return false
	}
	return true
}

// foreign reports bytes that are not UTF-8, all in one.
func (m *mender) foreign() bool {
	m.report(m.at, m.at+1, "a character here is not in UTF-8", "save the file as UTF-8")
	for i := m.at; i < len(m.text); {
		r, size := utf8.DecodeRune(m.text[i:])
		if r == utf8.RuneError && size == 1 {
			m.put(i, "?")
			m.hushText(i)
		}
		i += size
	}
	return true
}

// maxHush bounds the places kept of one file.
const maxHush = 1000

// hushText hushes the text around a byte that was replaced, from quote to quote.
func (m *mender) hushText(at int) {
	if n := len(m.hush); n > 0 && at < m.hush[n-1].End || n > maxHush {
		return
	}
	start, end := bytes.LastIndexByte(m.text[:at], '"'), bytes.IndexByte(m.text[at:], '"')
	if start < 0 || end < 0 || len(m.hush) == maxHush {
		start, end = 0, len(m.text)-at
	}
	m.hush = append(m.hush, m.src.Span(start, at+end))
}

// noValue reports a name without a value.
func (m *mender) noValue() bool {
	m.report(int(m.p.lastStart), m.at, "a value is missing after this name", "")
	return false
}

// guess turns the bytes from start to end into a text that means nothing, so that the reading can go on. What is wrong with
// it has been reported.
func (m *mender) guess(start, end int) bool {
	if end-start < 2 {
		return false
	}
	m.put(start, `"`+strings.Repeat("?", end-start-2)+`"`)
	m.hush = append(m.hush, m.src.Span(start, end))
	return true
}
