package netlist

import (
	"bytes"
	"errors"
	"fmt"
	"io"

	"github.com/goccy/go-json/jsontext"

	"workheat/network/diag"
)

// Bounds of what is read. They are far above any sensible netlist and keep time and memory in hand: a tree
// of maxValues values takes about 400 MB at worst.
const (
	maxBytes  = 64 << 20 // of a netlist or a trace file
	maxDepth  = 32       // of nested objects and arrays
	maxValues = 4 << 20  // in a netlist
)

// A value is one JSON value with its place.
type value struct {
	kind       byte // as jsontext.Kind: n f t " 0 { [
	start, end int32
	text       string // of a string, or the literal of a number
	in         *inner
}

// An inner is what stands inside an object or a list.
type inner struct {
	members []member
	items   []value
}

// A member is one name and value of an object.
type member struct {
	key        string
	start, end int32 // of the key, quotes included
	twice      bool  // the key stood before: reported, and passed over
	value      value
}

// members returns what stands in an object; of anything else there are none.
func (v *value) members() []member {
	if v.in == nil {
		return nil
	}
	return v.in.members
}

// items returns what stands in a list; of anything else there are none.
func (v *value) items() []value {
	if v.in == nil {
		return nil
	}
	return v.in.items
}

var kindNames = map[byte]string{
	'n': "null", 't': "true", 'f': "false", '"': "text", '0': "a number", '{': "an object", '[': "a list",
}

// parse reads the whole text into a tree. Faults of syntax are reported; those whose cure is plain are
// mended in a copy, so that what follows is read as well. The tree is usable when ok is true. Places where
// a mend had to guess a value are returned in hush: whatever else is wrong with them follows from that.
func parse(src *diag.Source, list *diag.List) (root value, hush []diag.Span, ok bool) {
	if len(src.Text) > maxBytes {
		list.At(src.Whole(), fmt.Sprintf("the file is too large: %d MiB", len(src.Text)>>20),
			fmt.Sprintf("keep it below %d MiB", maxBytes>>20))
		return value{}, nil, false
	}
	m := &mender{src: src, list: list, text: src.Text}
	if !m.encoding() {
		return value{}, nil, false
	}
	for {
		p := &parser{text: m.text, whole: string(m.text)}
		p.dec = jsontext.NewDecoder(bytes.NewBuffer(m.text), jsontext.AllowDuplicateNames(true))
		v, err := p.file()
		if err == nil {
			return v, m.hush, true
		}
		if !m.mend(p, err) {
			return value{}, nil, false
		}
	}
}

type parser struct {
	dec       *jsontext.Decoder
	text      []byte
	whole     string  // the same text: values share its bytes
	open      []int32 // places of the brackets that are open
	count     int     // values read
	lastStart int32   // of the last value or key read
	lastKind  byte
}

var (
	errDepth = errors.New("too deep")
	errMany  = errors.New("too many")
	errMore  = errors.New("text after the end")
)

// file reads one value and the end of the text.
func (p *parser) file() (value, error) {
	v, err := p.value(0)
	if err != nil {
		return v, err
	}
	if p.dec.PeekKind(); p.next() < len(p.text) {
		return v, errMore
	}
	if _, err = p.dec.ReadToken(); !errors.Is(err, io.EOF) {
		return v, errMore
	}
	return v, nil
}

// next returns where the next token begins.
func (p *parser) next() int {
	for i := int(p.dec.InputOffset()); i < len(p.text); i++ {
		switch p.text[i] {
		case ' ', '\t', '\r', '\n', ',', ':':
		default:
			return i
		}
	}
	return len(p.text)
}

// token reads the next token and returns its kind, text and place. The text of a string is decoded.
func (p *parser) token() (kind byte, text string, start, end int32, err error) {
	p.dec.PeekKind() // moves past white space, commas and colons, and reports what is wrong with them
	from := p.next()
	t, err := p.dec.ReadToken()
	if err != nil {
		return 0, "", 0, 0, err
	}
	to := int(p.dec.InputOffset())
	p.lastStart, p.lastKind = int32(from), byte(t.Kind())
	switch kind = byte(t.Kind()); {
	case kind != '"':
		text = p.whole[from:to]
	case bytes.IndexByte(p.text[from:to], '\\') < 0:
		text = p.whole[from+1 : to-1]
	default:
		text = t.String()
	}
	return kind, text, int32(from), int32(to), nil
}

// value reads the next value.
func (p *parser) value(depth int) (value, error) {
	if depth > maxDepth {
		return value{}, errDepth
	}
	if p.count++; p.count > maxValues {
		return value{}, errMany
	}
	var v value
	var err error
	if v.kind, v.text, v.start, v.end, err = p.token(); err != nil {
		return v, err
	}
	switch v.kind {
	case '{':
		err = p.members(&v, depth)
	case '[':
		err = p.items(&v, depth)
	}
	return v, err
}

// items reads a list up to its closing bracket.
func (p *parser) items(v *value, depth int) error {
	p.open = append(p.open, v.start)
	v.in = &inner{}
	for p.dec.PeekKind() != ']' {
		item, err := p.value(depth + 1)
		if err != nil {
			return err
		}
		v.in.items = append(v.in.items, item)
	}
	return p.close(v)
}

// members reads an object up to its closing brace.
func (p *parser) members(v *value, depth int) error {
	p.open = append(p.open, v.start)
	v.in = &inner{}
	for p.dec.PeekKind() != '}' {
		var m member
		var err error
		if _, m.key, m.start, m.end, err = p.token(); err != nil {
			return err
		}
		if m.value, err = p.value(depth + 1); err != nil {
			return err
		}
		v.in.members = append(v.in.members, m)
	}
	return p.close(v)
}

// close reads the closing bracket of v.
func (p *parser) close(v *value) error {
	if _, err := p.dec.ReadToken(); err != nil {
		return err
	}
	p.open = p.open[:len(p.open)-1]
	v.text, v.end = "", int32(p.dec.InputOffset())
	p.lastStart, p.lastKind = v.start, v.kind
	return nil
}
