package xlsx

import (
	"fmt"
	"math"

	"workheat/network/export/outcome"
	"workheat/network/record"
	"workheat/network/unit"
)

// lineChars is about how many characters go on a line across the summary.
const lineChars = 150

// summary writes what a designer asks first: peaks, margins, the verdict, the warnings.
func (b *book) summary() error {
	heads := []string{
		"Node",
		outcome.Head("Start", unit.Temperature),
		outcome.Head("Highest", unit.Temperature),
		outcome.Head("When", unit.Time),
		outcome.Head("Lowest after first peak", unit.Temperature),
		outcome.Head("End", unit.Temperature),
		"Limit",
		outcome.Head("Limit at", unit.Temperature),
		outcome.Head("Margin", unit.TemperatureDifference),
		outcome.Head("Time above", unit.Time),
		outcome.Head("First above", unit.Time),
	}
	widths := []float64{b.nodeWidth(), 11, 11, 11, 19, 11, 30, 11, 11, 12, 12}
	frozen := 4 + len(b.Doubts())
	if b.Book != nil && b.Book.Closed {
		frozen++
	}
	out := b.open(summarySheet, frozen, widths, nil)
	n := len(heads)
	out.line(b.Title, styleTitle, n, lineChars)
	out.notices(n, lineChars)
	if b.Book != nil && b.Book.Closed {
		out.line(b.Verdict(), styleGood, n, lineChars)
	}
	out.line(fmt.Sprintf("Netlist %s, %.6g s, by %s", b.Source, b.End, b.Program), styleAside, n, lineChars)
	out.heads(heads...)
	for i := range b.Summary {
		b.summaryRows(out, &b.Summary[i])
	}
	out.add()
	out.line(fmt.Sprintf("Warnings: %d", len(b.Warnings)), styleSection, n, lineChars)
	for _, w := range b.Warnings {
		out.line(w, styleWrapped, n, lineChars)
	}
	return out.close()
}

func (b *book) nodeWidth() float64 {
	width := 14.0
	for i := range b.Summary {
		width = math.Max(width, math.Min(40, 3+float64(len([]rune(b.Summary[i].Name)))))
	}
	return width
}

// summaryRows writes a node, one row for each of its limits.
func (b *book) summaryRows(out *sheet, s *record.Summary) {
	level := unit.Temperature.Shown()
	name := s.Name
	if s.Held {
		name += " (held)"
	}
	node := func() []any {
		return []any{
			b.text(name, styleNone),
			b.number(level.Show(s.Start), formatTenth),
			b.number(level.Show(s.Highest), formatTenth),
			b.number(s.When, formatTenth),
			b.number(level.Show(s.Lowest), formatTenth),
			b.number(level.Show(s.End), formatTenth),
		}
	}
	if len(s.Limits) == 0 {
		out.add(node()...)
		return
	}
	for i := range s.Limits {
		m := &s.Limits[i]
		style := formatTenth
		if m.Margin < 0 {
			style = styleExceeded
		}
		out.add(append(node(),
			b.text(m.Name, styleIndented),
			b.number(level.Show(m.Temperature), formatTenth),
			b.number(m.Margin, style),
			b.number(m.Above, formatTenth),
			b.number(m.First, formatTenth))...)
	}
}
