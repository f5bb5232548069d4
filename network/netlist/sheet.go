package netlist

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"slices"
	"strconv"
	"strings"

	"workheat/network/diag"
	"workheat/network/element"
	"workheat/network/unit"
)

// A sheet is a CSV file: a header with "name [unit]" in each column, then numbers.
type sheet struct {
	src     *diag.Source
	skip    int // bytes of the byte order mark
	head    []string
	columns [][]float64
	bad     []int // by column: the first row that holds no number, or -1
}

// A column is what is looked for in a sheet: the key that may name it, and what it must hold.
type column struct {
	key  string
	want unit.Want
}

// columns reads two columns of a CSV file as a curve. Keys of the object may give their names; without
// them the first and the second column are taken.
func (r *reader) columns(o object, what string, x, y column) (table, bool) {
	file := o.get("file")
	if file.kind != '"' || file.text == "" {
		r.list.At(r.span(file), "the name of a file is due", "")
		return table{}, false
	}
	s, ok := r.sheet(file)
	if !ok {
		return table{}, false
	}
	t := table{see: []diag.Note{{At: r.span(file), Text: "the file is used here"}}}
	xs, first, okX := r.column(s, o, x, 0, t.see)
	ys, second, okY := r.column(s, o, y, 1, t.see)
	if !okX || !okY {
		return table{}, false
	}
	if len(xs) == 0 {
		r.list.At(r.span(file), what+": the file has no rows of numbers", "")
		return table{}, false
	}
	for i := 1; i < len(xs); i++ {
		if xs[i] < xs[i-1] || i > 1 && xs[i] == xs[i-2] {
			r.list.Add(diag.Problem{At: s.cell(i+1, first), Text: fmt.Sprintf("the %s does not rise here", x.want.Name),
				Help: "sort the rows; two rows at one place make a jump, a third has no meaning", See: t.see})
			return table{}, false
		}
	}
	t.curve = element.MustCurve(xs, ys)
	t.place = func(i int) diag.Span { return s.cell(i+1, second) }
	return t, true
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
		r.list.At(r.span(file), fmt.Sprintf("the file %s cannot be read: %s", quote(file.text), diag.Reason(err)),
			"the name is taken from the folder of the netlist")
		return nil, false
	}
	if len(text) > maxBytes {
		r.list.At(r.span(file), fmt.Sprintf("the file is too large: %d MiB", len(text)>>20), fmt.Sprintf("keep it below %d MiB", maxBytes>>20))
		return nil, false
	}
	s := &sheet{src: &diag.Source{Name: file.text, Text: text}}
	if p, ok := s.read(); !ok {
		p.See = []diag.Note{{At: r.span(file), Text: "the file is used here"}}
		r.list.Add(p)
		return nil, false
	}
	r.files[file.text] = s
	return s, true
}

// reader returns a reader of the rows.
func (s *sheet) reader() *csv.Reader {
	if bytes.HasPrefix(s.src.Text, []byte("\xef\xbb\xbf")) {
		s.skip = 3
	}
	c := csv.NewReader(bytes.NewReader(s.src.Text[s.skip:]))
	c.TrimLeadingSpace = true
	c.ReuseRecord = true
	return c
}

// read reads header and rows. When it cannot it returns what is wrong.
func (s *sheet) read() (diag.Problem, bool) {
	if bytes.IndexByte(s.src.Text, 0) >= 0 {
		return diag.Problem{At: s.src.Whole(), Text: "the file is no text in UTF-8", Help: "save it as CSV in UTF-8"}, false
	}
	c := s.reader()
	for row := 0; ; row++ {
		cells, err := c.Read()
		switch {
		case errors.Is(err, io.EOF) && s.head == nil:
			return diag.Problem{At: s.src.Whole(), Text: "the file is empty", Help: `write a header such as "time [s],speed [km/h]"`}, false
		case errors.Is(err, io.EOF):
			return diag.Problem{}, true
		case err != nil:
			return s.broken(err), false
		case s.head == nil:
			if p, ok := s.header(cells); !ok {
				return p, false
			}
			continue
		}
		for i, cell := range cells {
			x, err := strconv.ParseFloat(strings.TrimSpace(cell), 64)
			if s.bad[i] < 0 && (err != nil || x-x != 0) {
				s.bad[i] = row
			}
			s.columns[i] = append(s.columns[i], x)
		}
	}
}

// header takes in the first row.
func (s *sheet) header(cells []string) (diag.Problem, bool) {
	if len(cells) == 1 {
		for _, mark := range []string{";", "\t"} {
			if strings.Contains(cells[0], mark) {
				return diag.Problem{At: s.place(1), Text: "the columns are not separated by commas",
					Help: "save it with commas between the columns and a point as decimal sign"}, false
			}
		}
	}
	s.head = append([]string(nil), cells...)
	s.columns = make([][]float64, len(cells))
	s.bad = make([]int, len(cells))
	for i := range s.bad {
		s.bad[i] = -1
	}
	return diag.Problem{}, true
}

// broken words an error of the CSV reader.
func (s *sheet) broken(err error) diag.Problem {
	line := 1
	var bad *csv.ParseError
	if errors.As(err, &bad) {
		line, err = bad.Line, bad.Err
	}
	p := diag.Problem{At: s.place(line), Text: "this row of the table cannot be read: " + err.Error()}
	switch {
	case errors.Is(err, csv.ErrFieldCount):
		p.Text = fmt.Sprintf("this row does not have as many fields as the header, which has %d", len(s.head))
		p.Help = "the decimal sign is a point; fields are separated by commas"
	case errors.Is(err, csv.ErrQuote) || errors.Is(err, csv.ErrBareQuote):
		p.Text = "a quote in this row has no partner"
	}
	return p
}

// place returns the span of a line of the file, counted from one.
func (s *sheet) place(line int) diag.Span {
	start := s.skip
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

// cell returns the place of a cell; row zero is the header. It reads the file again, since places of cells
// are not kept.
func (s *sheet) cell(row, column int) diag.Span {
	c := s.reader()
	for range row {
		c.Read()
	}
	cells, err := c.Read()
	if err != nil || column >= len(cells) {
		return s.place(1)
	}
	line, col := c.FieldPos(column)
	at := s.place(line)
	start := at.Start + col - 1
	if start < len(s.src.Text) && s.src.Text[start] == '"' {
		return s.src.Span(start, min(at.End, start+len(cells[column])+2))
	}
	return s.src.Span(start, min(at.End, start+max(1, len(strings.TrimRight(cells[column], " \t\r")))))
}

// column returns the values of the column that a key names, or of the one at a place when the key is not
// given, in SI, and where the column stands.
func (r *reader) column(s *sheet, o object, c column, at int, see []diag.Note) ([]float64, int, bool) {
	report := func(where diag.Span, text, help string) ([]float64, int, bool) {
		r.list.Add(diag.Problem{At: where, Text: text, Help: help, See: see})
		return nil, 0, false
	}
	names := make([]string, len(s.head))
	for i, h := range s.head {
		names[i], _ = splitHead(h)
	}
	if v := o.get(c.key); v != nil {
		name, ok := r.text(v, "a column")
		if !ok {
			return nil, 0, false
		}
		if at = slices.Index(names, name); at < 0 {
			_, help := r.suggest(name, names)
			r.list.At(r.span(v), fmt.Sprintf("the file has no column %s", quote(name)), help)
			return nil, 0, false
		}
	}
	if at >= len(s.head) {
		return report(s.place(1), "a column with "+c.want.Phrase()+" is missing", "")
	}
	_, u := splitHead(s.head[at])
	if u == "" && c.want.Unit != "" {
		return report(s.cell(0, at), fmt.Sprintf("the header of column %d gives no unit", at+1), fmt.Sprintf("write the unit in brackets after the name: %q", names[at]+" ["+c.want.Unit+"]"))
	}
	scale, fault := c.want.Scale(u)
	if fault != nil {
		return report(s.cell(0, at), fmt.Sprintf("the unit of column %d does not fit: %s", at+1, fault.Text), fault.Help)
	}
	if row := s.bad[at]; row >= 0 {
		where := s.cell(row, at)
		text := string(s.src.Text[where.Start:where.End])
		return report(where, fmt.Sprintf("%s in column %d is not a number", quote(text), at+1), "write plain numbers, with a point as decimal sign; the unit stands in the header")
	}
	values := make([]float64, len(s.columns[at]))
	for i, x := range s.columns[at] {
		values[i] = scale.SI(x)
		fault := bounded(values[i], 0)
		if fault == nil && c.want.Level && values[i] < 0 {
			fault = &unit.Fault{Text: "a temperature level lies below absolute zero"}
		}
		if fault != nil {
			return report(s.cell(i+1, at), fault.Text, fault.Help)
		}
	}
	return values, at, true
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
