package netlist

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"strconv"
	"strings"

	"workheat/network/diag"
	"workheat/network/element"
	"workheat/network/unit"
)

// A sheet is a CSV file: a header with "name [unit]" in each column, then numbers.
type sheet struct {
	src  *diag.Source
	head []string
	rows [][]string
	line []int // of each row
}

// columns reads two columns of a CSV file as a curve. The keys xKey and yKey give their names; without
// them the first and the second column are taken.
func (r *reader) columns(o object, what, xKey, yKey string, x, y unit.Want) (*element.Curve, bool) {
	file := o.get("file")
	if file.kind != '"' || file.text == "" {
		r.list.At(r.span(file), "the name of a file is due", "")
		return nil, false
	}
	s, ok := r.sheet(file)
	if !ok {
		return nil, false
	}
	xs, okX := r.column(s, o, xKey, 0, x)
	ys, okY := r.column(s, o, yKey, 1, y)
	if !okX || !okY {
		return nil, false
	}
	if len(xs) == 0 {
		r.list.At(r.span(file), what+": the file has no rows of numbers", "")
		return nil, false
	}
	for i := 1; i < len(xs); i++ {
		if xs[i] < xs[i-1] || i > 1 && xs[i] == xs[i-2] {
			r.list.Add(diag.Problem{At: s.place(s.line[i]), Text: fmt.Sprintf("the %s does not rise here", x.Name),
				Help: "sort the rows; two rows at one place make a jump, a third has no meaning",
				See:  []diag.Note{{At: r.span(file), Text: "the file is used here"}}})
			return nil, false
		}
	}
	return element.MustCurve(xs, ys), true
}

// sheet reads a CSV file once.
func (r *reader) sheet(file *value) (*sheet, bool) {
	if s, ok := r.files[file.text]; ok {
		return s, s != nil
	}
	r.files[file.text] = nil
	if r.open == nil {
		r.list.At(r.span(file), "no other file can be read here", "")
		return nil, false
	}
	text, err := r.open(file.text)
	if err != nil {
		r.list.At(r.span(file), fmt.Sprintf("the file %s cannot be read: %s", quote(file.text), reason(err)),
			"the name is taken from the folder of the netlist")
		return nil, false
	}
	if len(text) > maxBytes {
		r.list.At(r.span(file), fmt.Sprintf("the file is too large: %d MiB", len(text)>>20), fmt.Sprintf("keep it below %d MiB", maxBytes>>20))
		return nil, false
	}
	s := &sheet{src: &diag.Source{Name: file.text, Text: text}}
	if !r.readSheet(s, file) {
		return nil, false
	}
	r.files[file.text] = s
	return s, true
}

// reason returns the innermost text of an error, which names no folder of the machine.
func reason(err error) string {
	for {
		inner := errors.Unwrap(err)
		if inner == nil {
			return err.Error()
		}
		err = inner
	}
}

// readSheet splits the file into its header and rows.
func (r *reader) readSheet(s *sheet, file *value) bool {
	see := []diag.Note{{At: r.span(file), Text: "the file is used here"}}
	c := csv.NewReader(bytes.NewReader(bytes.TrimPrefix(s.src.Text, []byte("\xef\xbb\xbf"))))
	c.TrimLeadingSpace = true
	c.ReuseRecord = false
	for {
		row, err := c.Read()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			line := 1
			var bad *csv.ParseError
			if errors.As(err, &bad) {
				line, err = bad.Line, bad.Err
			}
			r.list.Add(diag.Problem{At: s.place(line), Text: "this is not a row of the table: " + err.Error(),
				Help: "every row needs as many fields as the header, separated by commas", See: see})
			return false
		}
		line, _ := c.FieldPos(0)
		if s.head == nil {
			s.head = append([]string(nil), row...)
			continue
		}
		s.rows, s.line = append(s.rows, append([]string(nil), row...)), append(s.line, line)
	}
	if s.head == nil {
		r.list.Add(diag.Problem{At: s.src.Whole(), Text: "the file is empty", Help: `write a header such as "time [s],speed [km/h]"`, See: see})
		return false
	}
	return true
}

// place returns the span of a line of the file, counted from one.
func (s *sheet) place(line int) diag.Span {
	start := 0
	for i := 1; i < line; i++ {
		next := bytes.IndexByte(s.src.Text[start:], '\n')
		if next < 0 {
			break
		}
		start += next + 1
	}
	end := len(s.src.Text)
	if next := bytes.IndexByte(s.src.Text[start:], '\n'); next >= 0 {
		end = start + next
	}
	return s.src.Span(start, end)
}

// column reads the column that a key names, or the one at a place when the key is not given.
func (r *reader) column(s *sheet, o object, key string, at int, want unit.Want) ([]float64, bool) {
	see := []diag.Note{{At: r.span(o.get("file")), Text: "the file is used here"}}
	names := make([]string, len(s.head))
	for i, h := range s.head {
		names[i], _ = splitHead(h)
	}
	if v := o.get(key); v != nil {
		if at = indexOf(names, v.text); v.kind != '"' || at < 0 {
			r.list.At(r.span(v), fmt.Sprintf("the file has no column %s", quote(v.text)), r.suggest(v.text, names))
			return nil, false
		}
	}
	if at >= len(s.head) {
		r.list.Add(diag.Problem{At: s.place(1), Text: fmt.Sprintf("a column with the %s is missing", want.Name), See: see})
		return nil, false
	}
	_, u := splitHead(s.head[at])
	one, fault := want.Read("1 "+u, nil)
	zero, fault0 := want.Read("0 "+u, nil)
	if fault != nil || fault0 != nil {
		help := fmt.Sprintf("write the unit in brackets after the name: %q", names[at]+" ["+want.Unit+"]")
		r.list.Add(diag.Problem{At: s.place(1), Text: fmt.Sprintf("the header of column %d gives no unit of %s", at+1, want.Name), Help: help, See: see})
		return nil, false
	}
	values := make([]float64, 0, len(s.rows))
	for i, row := range s.rows {
		x, err := strconv.ParseFloat(strings.TrimSpace(row[at]), 64)
		if err != nil || x-x != 0 {
			r.list.Add(diag.Problem{At: s.place(s.line[i]), Text: fmt.Sprintf("column %d holds %s, which is not a number", at+1, quote(row[at])), See: see})
			return nil, false
		}
		values = append(values, zero+(one-zero)*x)
	}
	return values, true
}

func indexOf(list []string, s string) int {
	for i, x := range list {
		if x == s {
			return i
		}
	}
	return -1
}

// splitHead splits "name [unit]" or "name (unit)".
func splitHead(h string) (name, u string) {
	h = strings.TrimSpace(h)
	for _, pair := range [...]string{"[]", "()"} {
		if i := strings.IndexByte(h, pair[0]); i >= 0 && h[len(h)-1] == pair[1] {
			return strings.TrimSpace(h[:i]), strings.TrimSpace(h[i+1 : len(h)-1])
		}
	}
	return h, ""
}
