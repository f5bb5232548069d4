package netlist

import (
	"bytes"
	"strconv"
	"unicode/utf16"
	"unicode/utf8"

	"workheat/network/diag"
)

// span returns the place of a value.
func (r *reader) span(v *value) diag.Span { return r.src.Span(int(v.start), int(v.end)) }

// keySpan returns the place of a member's key.
func (r *reader) keySpan(m *member) diag.Span { return r.src.Span(int(m.start), int(m.end)) }

// keyOf returns the place of a key of an object, or of the object's opening brace.
func (r *reader) keyOf(o object, key string) diag.Span {
	if m := o.member(key); m != nil {
		return r.keySpan(m)
	}
	return r.brace(o)
}

// brace returns the place of the opening brace of an object.
func (r *reader) brace(o object) diag.Span {
	return r.src.Span(int(o.value.start), int(o.value.start)+1)
}

// inside returns the place of the bytes [start, end) of a string's text, in the source: escapes in the
// source make the two differ.
func (r *reader) inside(v *value, start, end int) diag.Span {
	if v.kind != '"' {
		return r.span(v)
	}
	from := int(v.start) + 1
	raw := r.src.Text[from:max(from, int(v.end)-1)]
	if bytes.IndexByte(raw, '\\') < 0 {
		return r.src.Span(from+start, from+end)
	}
	return r.src.Span(from+rawOffset(raw, start), from+rawOffset(raw, end))
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
		taken, made := escape(raw[i:])
		i += taken
		decoded += made
	}
	return min(i, len(raw))
}

// escape returns how many raw bytes the escape at the start of raw takes, and how many bytes it stands for.
func escape(raw []byte) (taken, made int) {
	c, ok := escaped(raw)
	if !ok {
		return 2, 1
	}
	if low, ok := escaped(raw[min(6, len(raw)):]); ok && utf16.IsSurrogate(c) {
		return 12, utf8.RuneLen(utf16.DecodeRune(c, low))
	}
	if utf16.IsSurrogate(c) {
		return 6, 3
	}
	return 6, utf8.RuneLen(c)
}

// escaped reads an escape of the form \u with four hexadecimal digits.
func escaped(raw []byte) (rune, bool) {
	if len(raw) < 6 || raw[0] != '\\' || raw[1] != 'u' {
		return 0, false
	}
	c, err := strconv.ParseUint(string(raw[2:6]), 16, 16)
	return rune(c), err == nil
}
