package netlist

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"strings"

	"github.com/goccy/go-json/jsontext"

	"workheat/network/diag"
)

// Bounds of what is read. They are far above any sensible netlist and keep time and memory in hand.
const (
	maxBytes = 64 << 20 // of a netlist or a trace file
	maxDepth = 32       // of nested objects and arrays
)

// A value is one JSON value with its place.
type value struct {
	kind       byte // as jsontext.Kind: n f t " 0 { [
	start, end int
	text       string // of a string, or the literal of a number
	members    []member
	items      []value
}

// A member is one name and value of an object.
type member struct {
	key        string
	start, end int
	value      value
}

var kindNames = map[byte]string{
	'n': "null", 't': "true", 'f': "false", '"': "text", '0': "a number", '{': "an object", '[': "a list",
}

// parse reads the whole text into a tree. Faults of syntax are reported, and then the tree is not usable.
func parse(src *diag.Source, list *diag.List) (value, bool) {
	if len(src.Text) > maxBytes {
		list.At(src.Whole(), fmt.Sprintf("the file is too large: %d MiB", len(src.Text)>>20),
			fmt.Sprintf("keep it below %d MiB", maxBytes>>20))
		return value{}, false
	}
	p := &parser{src: src, list: list}
	p.dec = jsontext.NewDecoder(bytes.NewBuffer(src.Text), jsontext.AllowDuplicateNames(true))
	v, err := p.value(0)
	if err == nil {
		_, err = p.dec.ReadToken()
		if errors.Is(err, io.EOF) {
			return v, true
		}
		if err == nil {
			at := int(p.dec.InputOffset())
			list.At(src.Span(at-1, at), "there is more text after the end of the netlist", "remove it, or join it to the object before")
			return value{}, false
		}
	}
	if !errors.Is(err, errDepth) {
		p.syntax(err)
	}
	return value{}, false
}

type parser struct {
	src  *diag.Source
	list *diag.List
	dec  *jsontext.Decoder
}

var errDepth = errors.New("too deep")

// value reads the next value.
func (p *parser) value(depth int) (value, error) {
	if depth > maxDepth {
		at := int(p.dec.InputOffset())
		p.list.At(p.src.Span(at, at+1), fmt.Sprintf("the nesting is deeper than %d levels", maxDepth), "flatten it")
		return value{}, errDepth
	}
	p.dec.PeekKind() // moves past white space, commas and colons
	token, err := p.dec.ReadToken()
	if err != nil {
		return value{}, err
	}
	v := value{kind: byte(token.Kind()), end: int(p.dec.InputOffset())}
	switch v.kind {
	case '{':
		v.start = v.end - 1
		err = p.members(&v, depth)
	case '[':
		v.start = v.end - 1
		for p.dec.PeekKind() != ']' {
			item, err := p.value(depth + 1)
			if err != nil {
				return v, err
			}
			v.items = append(v.items, item)
		}
		_, err = p.dec.ReadToken()
	case '"':
		v.text = token.String()
		v.start = p.back(v.end)
	default:
		v.text = token.String()
		v.start = v.end - len(v.text)
	}
	v.end = int(p.dec.InputOffset())
	return v, err
}

// members reads an object up to its closing brace.
func (p *parser) members(v *value, depth int) error {
	for p.dec.PeekKind() != '}' {
		token, err := p.dec.ReadToken()
		if err != nil {
			return err
		}
		m := member{key: token.String(), end: int(p.dec.InputOffset())}
		m.start = p.back(m.end)
		if m.value, err = p.value(depth + 1); err != nil {
			return err
		}
		v.members = append(v.members, m)
	}
	_, err := p.dec.ReadToken()
	return err
}

// back returns where the string that ends before end begins: its opening quote.
func (p *parser) back(end int) int {
	text := p.src.Text
	for i := end - 2; i >= 0; i-- {
		if text[i] != '"' {
			continue
		}
		slashes := 0
		for j := i - 1; j >= 0 && text[j] == '\\'; j-- {
			slashes++
		}
		if slashes%2 == 0 {
			return i
		}
	}
	return 0
}

// syntax reports an error of the decoder.
func (p *parser) syntax(err error) {
	var bad *jsontext.SyntacticError
	at, text := int(p.dec.InputOffset()), err.Error()
	if errors.As(err, &bad) {
		at = int(bad.ByteOffset)
		text = bad.Err.Error()
	}
	help := "check commas, quotes and brackets near here"
	switch {
	case len(bytes.TrimSpace(p.src.Text)) == 0:
		p.list.At(p.src.Whole(), "the file is empty", `begin with { "workheat": 1, "nodes": { ... } }`)
		return
	case errors.Is(err, io.ErrUnexpectedEOF) || errors.Is(err, io.EOF) || strings.Contains(text, "EOF"):
		at, text = len(p.src.Text), "the text ends before the netlist is complete"
		help = "a closing bracket or quote is missing"
	case at < len(p.src.Text) && (p.src.Text[at] == '}' || p.src.Text[at] == ']'):
		help = "a comma before a closing bracket, or a value missing after a comma or colon?"
	case at+1 < len(p.src.Text) && p.src.Text[at] == '/':
		help = `JSON has no comments: use an "about" key`
	}
	p.list.At(p.src.Span(at, min(at+1, len(p.src.Text))), "this is not JSON: "+clean(text), help)
}

// clean takes the library's own prefix off a message.
func clean(text string) string {
	text = strings.TrimPrefix(text, "jsontext: ")
	if i := strings.Index(text, " (expecting"); i > 0 {
		text = text[:i]
	}
	return text
}

// span returns the place of a value.
func (r *reader) span(v *value) diag.Span { return r.src.Span(v.start, v.end) }

// inside returns the place of the bytes [start, end) of a string value's text, in the source: escapes in
// the source make the two differ.
func (r *reader) inside(v *value, start, end int) diag.Span {
	if v.kind != '"' {
		return r.span(v)
	}
	raw := r.src.Text[v.start+1 : max(v.start+1, v.end-1)]
	if !bytes.ContainsRune(raw, '\\') {
		return r.src.Span(v.start+1+start, v.start+1+end)
	}
	return r.src.Span(v.start+1+rawOffset(raw, start), v.start+1+rawOffset(raw, end))
}

// rawOffset returns where in the raw text of a JSON string the decoded text's byte n comes from.
func rawOffset(raw []byte, n int) int {
	i := 0
	for decoded := 0; i < len(raw) && decoded < n; {
		if raw[i] != '\\' {
			i++
			decoded++
			continue
		}
		if i+1 < len(raw) && raw[i+1] == 'u' {
			var code rune
			fmt.Sscanf(string(raw[min(i+2, len(raw)):min(i+6, len(raw))]), "%x", &code)
			i += 6
			decoded += len(string(code))
			continue
		}
		i += 2
		decoded++
	}
	return min(i, len(raw))
}
