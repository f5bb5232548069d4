// Package csv writes the samples of a run as comma-separated values after RFC 4180.
//
// The first row holds the names with their units, every further row one sample; lines end in CR LF, numbers
// have nine significant digits and a decimal point, a value that is no number is left empty. A name that a
// spreadsheet could take for a formula gets an apostrophe in front. There is no place for remarks in such a
// file: only when the figures are in doubt, because the energy book is open or the run was interrupted, a
// last column "note" says so.
package csv

import (
	"io"
	"math"
	"strconv"
	"strings"

	"workheat/network/export/outcome"
	"workheat/network/record"
	"workheat/network/unit"
)

const (
	digits  = 9
	mostRow = 10_000_000 // so that a slip in the interval does not fill the memory
	flush   = 1 << 16    // bytes gathered before they are handed on
)

// Write writes the samples of a run: time, temperatures, flows, vehicle, in the order of its columns.
func Write(w io.Writer, o *outcome.Run) error {
	s, err := o.Table(mostRow)
	if err != nil {
		return err
	}
	notes := o.Doubts()
	if len(notes) > 0 && o.Caution != "" {
		notes = append(notes, o.Caution)
	}
	t := newTable(s)
	buf := t.head(make([]byte, 0, flush+1<<12), len(notes) > 0)
	for i := range s.Time {
		buf = t.row(buf, i)
		if len(notes) > 0 {
			buf = append(buf, ',')
			buf = note(buf, notes, i, i == len(s.Time)-1)
		}
		buf = append(buf, "\r\n"...)
		if len(buf) >= flush {
			if _, err := w.Write(buf); err != nil {
				return err
			}
			buf = buf[:0]
		}
	}
	_, err = w.Write(buf)
	return err
}

// table is the columns of a series, time first, each with its scale.
type table struct {
	heads  []string
	scales []unit.Scale
	values [][]float64
}

func newTable(s *record.Series) *table {
	t := &table{}
	t.add("time", unit.Time, s.Time)
	for i := range s.Columns {
		t.add(s.Columns[i].Name, s.Columns[i].Want, s.Columns[i].Values)
	}
	return t
}

func (t *table) add(name string, w unit.Want, values []float64) {
	t.heads = append(t.heads, outcome.Head(name, w))
	t.scales = append(t.scales, w.Shown())
	t.values = append(t.values, values)
}

func (t *table) head(buf []byte, noted bool) []byte {
	for i, h := range t.heads {
		if i > 0 {
			buf = append(buf, ',')
		}
		buf = text(buf, h)
	}
	if noted {
		buf = append(buf, ",note"...)
	}
	return append(buf, "\r\n"...)
}

func (t *table) row(buf []byte, i int) []byte {
	for k, values := range t.values {
		if k > 0 {
			buf = append(buf, ',')
		}
		buf = number(buf, t.scales[k].Show(values[i]))
	}
	return buf
}

// number appends a value; what is smaller than round-off leaves of a temperature near 0 degC is zero.
func number(buf []byte, v float64) []byte {
	size := math.Abs(v)
	switch {
	case !(size <= math.MaxFloat64):
		return buf
	case size < 1e-10:
		return append(buf, '0')
	case size >= 1e-4 && size < 1e9:
		return plain(buf, v, size)
	}
	return strconv.AppendFloat(buf, v, 'g', digits, 64)
}

// pow10 holds the powers of ten that are exact.
var pow10 = [...]float64{1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13}

// plain appends a value of ordinary size with nine significant digits, trailing zeros left out. It works in
// one multiplication and integers, which is faster than strconv; the product carries round-off of about 1e-7
// of the ninth digit, so only a value that close to a tie may be rounded the other way.
func plain(buf []byte, v, size float64) []byte {
	whole := 0 // digits before the point, negative: zeros after it
	for whole < digits && size >= pow10[whole] {
		whole++
	}
	for x := size; whole <= 0 && x < 0.1; x *= 10 {
		whole--
	}
	decimals := digits - whole
	n := uint64(size*pow10[decimals] + 0.5)
	for decimals > 0 && n%10 == 0 {
		n /= 10
		decimals--
	}
	if v < 0 {
		buf = append(buf, '-')
	}
	scale := uint64(pow10[decimals])
	buf = strconv.AppendUint(buf, n/scale, 10)
	if decimals == 0 {
		return buf
	}
	buf = append(buf, '.')
	for n %= scale; scale > 1; n %= scale {
		scale /= 10
		buf = append(buf, byte('0'+n/scale))
	}
	return buf
}

// text appends a text cell, quoted if need be.
func text(buf []byte, s string) []byte {
	if s != "" && strings.IndexByte("=+-@\t\r", s[0]) >= 0 {
		s = "'" + s
	}
	if !strings.ContainsAny(s, ",\"\r\n") {
		return append(buf, s...)
	}
	buf = append(buf, '"')
	buf = append(buf, strings.ReplaceAll(s, `"`, `""`)...)
	return append(buf, '"')
}

// note appends the note of row i; the last row takes all that are left.
func note(buf []byte, notes []string, i int, last bool) []byte {
	if i >= len(notes) {
		return buf
	}
	if last {
		return text(buf, strings.Join(notes[i:], "; "))
	}
	return text(buf, notes[i])
}
