// Package diag is a problem report with its place in the source, and how it is shown.
//
// Every other room only fills a [Problem]; [Render] is the one function that
// turns problems into text. Nothing here reads a file or prints.
package diag

import (
	"errors"
	"sort"
)

// A Span is a stretch of a source. Start and End are byte offsets into the
// text, End being the first byte after the stretch. Offsets out of range are
// pulled into it, and an End before Start counts as Start: a point.
//
// The zero Span is no place at all. A Span with a Source and both offsets zero
// means the file as a whole, and is shown without line and column.
type Span struct {
	Source     *Source
	Start, End int
}

// A Note is another place that bears on a problem, such as the first of two
// equal names.
type Note struct {
	At   Span
	Text string
}

// A Problem is one thing the author of a netlist must put right or, when
// Warning is set, should look at.
type Problem struct {
	At      Span   // the smallest span that shows the fault
	See     []Note // other places that bear on it
	Text    string // the fault; lower case, no full stop
	Help    string // the cure, or empty
	Warning bool   // worth saying, but the run can go on
}

// Error returns the problem in one line, place first, made safe for a
// terminal, so that a Problem can travel as an error.
func (p Problem) Error() string { return headline(p) }

// Whole returns the span that means the file as a whole.
func (s *Source) Whole() Span { return Span{Source: s} }

// Span returns the stretch of s from byte start up to byte end.
func (s *Source) Span(start, end int) Span { return Span{Source: s, Start: start, End: end} }

// A List collects problems. The zero List is empty and ready. It must not be
// used by two goroutines at a time.
type List struct {
	problems []Problem
	seen     map[key]struct{}
	failed   bool
}

// key is what makes two problems the same problem.
type key struct {
	at      Span
	text    string
	warning bool
}

// Add appends p, unless a problem with the same place and the same text is
// there already. A warning and a problem are never the same.
func (l *List) Add(p Problem) {
	k := key{p.At, p.Text, p.Warning}
	if _, known := l.seen[k]; known {
		return
	}
	if l.seen == nil {
		l.seen = make(map[key]struct{})
	}
	l.seen[k] = struct{}{}
	l.failed = l.failed || !p.Warning
	l.problems = append(l.problems, p)
}

// At adds a problem by its three usual parts; help may be empty.
func (l *List) At(at Span, text, help string) {
	l.Add(Problem{At: at, Text: text, Help: help})
}

// Warn adds a warning; help may be empty.
func (l *List) Warn(at Span, text, help string) {
	l.Add(Problem{At: at, Text: text, Help: help, Warning: true})
}

// Failed reports whether anything but warnings was added.
func (l *List) Failed() bool { return l.failed }

// Len returns the number of problems and warnings kept.
func (l *List) Len() int { return len(l.problems) }

// Problems returns a copy of the list sorted by name of the source, place and
// text; those without a place come first.
func (l *List) Problems() []Problem {
	out := append([]Problem(nil), l.problems...)
	sort.SliceStable(out, func(i, j int) bool { return before(&out[i], &out[j]) })
	return out
}

// Reason returns the innermost text of an error, which names no folder of the machine.
func Reason(err error) string {
	for {
		inner := errors.Unwrap(err)
		if inner == nil {
			return err.Error()
		}
		err = inner
	}
}

func before(a, b *Problem) bool {
	if x, y := a.At.name(), b.At.name(); x != y {
		return x < y
	}
	if a.At.Start != b.At.Start {
		return a.At.Start < b.At.Start
	}
	if a.At.End != b.At.End {
		return a.At.End < b.At.End
	}
	return a.Text < b.Text
}

func (s Span) name() string {
	if s.Source == nil {
		return ""
	}
	return s.Source.Name
}
