// Package xlsx writes a run as a spreadsheet: summary, native chart, samples, energy book, inputs.
//
// Numbers are typed, text stays text whatever it begins with, and there is no formula in the file. The
// chart has its own sheet of thinned data, so that it stays quick however many samples there are.
package xlsx

import (
	"fmt"
	"io"
	"math"

	"github.com/xuri/excelize/v2"

	"workheat/network/export/outcome"
)

// The sheets, in their order.
const (
	summarySheet = "Summary"
	chartSheet   = "Chart"
	tempSheet    = "Temperatures"
	flowSheet    = "Heat flows"
	energySheet  = "Energy book"
	inputSheet   = "Inputs"
	dataSheet    = "Chart data"
)

const (
	headRows = 2          // caution and header above the samples
	mostRows = 1_048_576  // of a sheet, by the file format
	mostCols = 16_384     // the same
	mostText = 32_767 - 1 // characters in a cell, by the file format
)

// A book is the spreadsheet under work.
type book struct {
	*outcome.Run
	file   *excelize.File
	styles map[string]int // look-up only
	drawn  *drawing
}

// Write writes the spreadsheet. It fails before sampling when the samples do not fit into a sheet.
func Write(w io.Writer, o *outcome.Run) error {
	series, err := o.Table(mostRows - headRows)
	if err != nil {
		return fmt.Errorf("writing a spreadsheet: %w", err)
	}
	b := &book{Run: o, file: excelize.NewFile(), styles: map[string]int{}}
	b.drawn = b.drawing()
	b.file.SetZipWriter(newArchive)
	defer b.file.Close()
	if err := b.file.SetSheetName("Sheet1", summarySheet); err != nil {
		return err
	}
	for _, part := range []func() error{
		b.summary,
		b.chart,
		func() error { return b.temperatures(series) },
		func() error { return b.flows(series) },
		b.account,
		b.inputs,
		b.chartData,
	} {
		if err := part(); err != nil {
			return fmt.Errorf("writing a spreadsheet: %w", err)
		}
	}
	if err := b.file.SetDocProps(&excelize.DocProperties{Title: cell(o.Title), Creator: cell(o.Program)}); err != nil {
		return err
	}
	return b.file.Write(w)
}

// A sheet is one sheet under work, written row by row. The first error stays.
type sheet struct {
	*book
	name string
	out  *excelize.StreamWriter
	row  int // rows written
	err  error
}

// open begins a sheet with frozen rows at the top and columns of the given widths and styles (nil: none);
// the last width and style go on to the right.
func (b *book) open(name string, frozen int, widths []float64, styles []string) *sheet {
	s := &sheet{book: b, name: name}
	if name != summarySheet {
		_, s.err = b.file.NewSheet(name)
	}
	s.try(func() error { return b.layOut(name, frozen) })
	s.try(func() (err error) { s.out, err = b.file.NewStreamWriter(name); return err })
	s.try(func() error {
		return s.out.SetPanes(&excelize.Panes{Freeze: true, YSplit: frozen, TopLeftCell: fmt.Sprintf("A%d", frozen+1), ActivePane: "bottomLeft"})
	})
	for i, width := range widths {
		s.try(func() error { return s.out.SetColWidth(i+1, i+1, width) })
	}
	for i, format := range styles {
		if id := b.style(format); id != 0 {
			s.try(func() error { return s.out.SetColStyle(i+1, i+1, id) })
		}
	}
	return s
}

// layOut sets a sheet up for print: landscape A4, one page wide, the frozen rows on every page.
func (b *book) layOut(name string, frozen int) error {
	landscape, a4, wide, high, fit := "landscape", 9, 1, 0, true
	if err := b.file.SetSheetProps(name, &excelize.SheetPropsOptions{FitToPage: &fit}); err != nil {
		return err
	}
	layout := excelize.PageLayoutOptions{Orientation: &landscape, Size: &a4, FitToWidth: &wide, FitToHeight: &high}
	if err := b.file.SetPageLayout(name, &layout); err != nil {
		return err
	}
	footer := excelize.HeaderFooterOptions{OddFooter: "&L&A&RPage &P of &N"}
	if err := b.file.SetHeaderFooter(name, &footer); err != nil || frozen == 0 {
		return err
	}
	return b.file.SetDefinedName(&excelize.DefinedName{
		Name: "_xlnm.Print_Titles", RefersTo: fmt.Sprintf("'%s'!$1:$%d", name, frozen), Scope: name,
	})
}

func (s *sheet) try(f func() error) {
	if s.err == nil {
		s.err = f()
	}
}

// add writes one row. Cells are string, float64, int, excelize.Cell, or nil for none.
func (s *sheet) add(cells ...any) { s.addHigh(0, cells...) }

// addHigh is add with a row of the given height in points; zero leaves it to the reader.
func (s *sheet) addHigh(height float64, cells ...any) {
	s.row++
	s.try(func() error {
		at, err := excelize.CoordinatesToCellName(1, s.row)
		if err != nil {
			return err
		}
		if height > 0 {
			return s.out.SetRow(at, cells, excelize.RowOpts{Height: height})
		}
		return s.out.SetRow(at, cells)
	})
}

// line writes text across the first n columns, wrapped; the height is reckoned from about that many
// characters that go on a line.
func (s *sheet) line(text, style string, n, chars int) {
	lines := max(1, (len([]rune(text))+chars-1)/chars)
	height := 0.0
	if lines > 1 {
		height = math.Min(409, 14.5*float64(lines))
	}
	s.addHigh(height, s.text(text, style))
	s.try(func() error {
		right, err := excelize.CoordinatesToCellName(n, s.row)
		if err != nil {
			return err
		}
		return s.out.MergeCell(fmt.Sprintf("A%d", s.row), right)
	})
}

// notices writes the caution and what a reader must know first, one line each.
func (s *sheet) notices(n, chars int) {
	s.line(s.Caution, styleCaution, n, chars)
	for _, d := range s.Doubts() {
		s.line(d, styleAlarm, n, chars)
	}
}

// notice is the same on one row that does not wrap, for the sheets of samples.
func (s *sheet) notice() {
	text, style := s.Caution, styleAside
	for _, d := range s.Doubts() {
		text, style = d+". "+text, styleAlarmAside
	}
	s.add(s.text(text, style))
}

func (s *sheet) heads(names ...string) {
	cells := make([]any, len(names))
	for i, name := range names {
		cells[i] = s.text(name, styleHead)
	}
	s.addHigh(31, cells...)
}

func (s *sheet) close() error {
	s.try(func() error { return s.out.Flush() })
	return s.err
}

// text is a text cell in a style.
func (b *book) text(text, style string) any {
	return excelize.Cell{StyleID: b.style(style), Value: cell(text)}
}

// number is a number cell in a style or number format, none when it is not finite.
func (b *book) number(v float64, style string) any {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return nil
	}
	return excelize.Cell{StyleID: b.style(style), Value: v}
}

// cell returns text that may stand in a cell.
func cell(text string) string {
	text = outcome.Clean(text)
	if r := []rune(text); len(r) > mostText {
		const mark = " ... (cut)"
		return string(r[:mostText-len(mark)]) + mark
	}
	return text
}
