package diag

import (
	"bufio"
	"fmt"
	"io"
	"strings"
	"unicode"
	"unicode/utf8"
)

const (
	shownColumns = 100 // widest piece of a source line that is shown
	leftColumns  = 40  // of these, the most that stand left of the span in a clipped line
	tabColumns   = 4   // a tab is shown as this many blanks
	shownText    = 400 // longest text, cure or name shown, in characters
	margin       = "    "
)

// The terminal colours, used only when the caller asks for them.
const (
	red    = "\x1b[31;1m"
	yellow = "\x1b[33;1m"
	green  = "\x1b[32m"
	plain  = "\x1b[0m"
)

// Render writes the problems in the order given. Each begins with one line
// "file:line:column: text", then the source line with a mark under the span,
// then "cure:" with the help, then "see" with each other place. A problem in no
// file at all is its text alone; one about a whole file has the file name only.
//
// What is shown is bounded: long lines are cut to a window around the span, and
// long texts are cut at their end. Control characters, direction marks and bytes that
// are no UTF-8 are replaced, so nothing in a netlist reaches the terminal as a
// command. With colour the only escapes are our own.
//
// The error is that of w.
func Render(w io.Writer, problems []Problem, colour bool) error {
	out := bufio.NewWriter(w)
	for i := range problems {
		renderOne(out, &problems[i], colour)
	}
	return out.Flush()
}

func renderOne(out *bufio.Writer, p *Problem, colour bool) {
	ink := red
	if p.Warning {
		ink = yellow
	}
	fmt.Fprintln(out, headline(*p))
	if placed(p.At) {
		line, mark := excerpt(p.At)
		fmt.Fprintf(out, "%s%s\n", margin, line)
		fmt.Fprintf(out, "%s%s\n", margin, paint(mark, ink, colour))
	}
	if p.Help != "" {
		fmt.Fprintf(out, "  %s %s\n", paint("cure:", green, colour), safe(p.Help))
	}
	for _, n := range p.See {
		fmt.Fprintf(out, "  see %s%s\n", place(n.At), safe(n.Text))
	}
}

// paint colours text but not the blanks before it.
func paint(text, ink string, colour bool) string {
	if !colour {
		return text
	}
	word := strings.TrimLeft(text, " ")
	return text[:len(text)-len(word)] + ink + word + plain
}

// headline is the first line of a problem.
func headline(p Problem) string {
	if p.Warning {
		return "warning: " + place(p.At) + safe(p.Text)
	}
	return place(p.At) + safe(p.Text)
}

// placed reports whether a span has a line that can be shown.
func placed(at Span) bool {
	return at.Source != nil && (at.Start != 0 || at.End != 0)
}

// place returns the span as "file:line:column: ", or as much of it as there is.
func place(at Span) string {
	if at.Source == nil {
		return ""
	}
	if !placed(at) {
		return safe(at.Source.Name) + ": "
	}
	line, column := at.Source.Position(at.Start)
	return fmt.Sprintf("%s:%d:%d: ", safe(at.Source.Name), line, column)
}

// excerpt returns the part of the source line that is shown for a span, and the
// line of marks that goes under it.
func excerpt(at Span) (line, mark string) {
	s := at.Source
	number, _ := s.Position(at.Start)
	first, last := s.bounds(number)
	start := max(first, min(s.clamp(at.Start), last))
	end := max(start, min(s.clamp(at.End), last))

	from := windowStart(s.Text, first, start, last)
	var shown, under strings.Builder
	if from > first {
		shown.WriteString("…")
		under.WriteByte(' ')
	}
	columns, marked := 0, 0
	for i := from; i < last; {
		r, size := utf8.DecodeRune(s.Text[i:])
		cell, width := show(r, size)
		if columns += width; columns > shownColumns {
			shown.WriteString("…")
			break
		}
		shown.WriteString(cell)
		if i+size <= start {
			under.WriteString(strings.Repeat(" ", width))
		} else if i < end {
			marked += width
		}
		i += size
	}
	return shown.String(), under.String() + marks(marked)
}

// marks is a caret for a point or one character and a wavy line for more.
func marks(width int) string {
	if width < 2 {
		return "^"
	}
	return strings.Repeat("~", width)
}

// windowStart returns the first byte to show of the line from first to last so
// that the span that starts at start is seen.
func windowStart(text []byte, first, start, last int) int {
	if last-first <= utf8.UTFMax*shownColumns && columnsOf(text[first:last]) <= shownColumns {
		return first
	}
	from, columns := start, 0
	for from > first {
		r, size := utf8.DecodeLastRune(text[first:from])
		_, width := show(r, size)
		if columns += width; columns > leftColumns {
			break
		}
		from -= size
	}
	return from
}

func columnsOf(text []byte) int {
	columns := 0
	for i := 0; i < len(text); {
		r, size := utf8.DecodeRune(text[i:])
		_, width := show(r, size)
		columns += width
		i += size
	}
	return columns
}

// show returns how a character of the given size in bytes is put on the
// screen, and how many columns are counted for it.
func show(r rune, size int) (cell string, width int) {
	switch {
	case r == '\t':
		return strings.Repeat(" ", tabColumns), tabColumns
	case r == utf8.RuneError && size <= 1, !unicode.IsPrint(r):
		return "\uFFFD", 1
	}
	return string(r), 1
}

// safe returns text for one line of a terminal: white space becomes a blank,
// whatever cannot be printed a replacement sign, and a long text is cut.
func safe(text string) string {
	var b strings.Builder
	count := 0
	for i := 0; i < len(text); {
		if count++; count > shownText {
			b.WriteString("…")
			break
		}
		r, size := utf8.DecodeRuneInString(text[i:])
		i += size
		if unicode.IsSpace(r) {
			b.WriteByte(' ')
			continue
		}
		cell, _ := show(r, size)
		b.WriteString(cell)
	}
	return b.String()
}
