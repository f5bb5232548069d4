// Package outcome is what a writer may show of a run, sampled and thinned for showing.
//
// Writers see this room, the record and the energy book; they never learn how a run was made.
package outcome

import (
	"fmt"
	"math"
	"strings"
	"unicode"

	"workheat/network/energy"
	"workheat/network/record"
	"workheat/network/unit"
)

// A Run is everything a writer may show of one run. Only Series must be set.
type Run struct {
	Title   string
	Source  string // name of the netlist file
	Netlist []byte // its text
	Program string // name and version

	Summary []record.Summary
	// Series samples the run every interval seconds, ends included; it may return nil when nothing was
	// recorded. Writers call it more than once.
	Series   func(interval float64) *record.Series
	Interval float64 // sampling interval asked for [s]; zero leaves it to the writer
	End      float64 // length of the run [s]

	Book        *energy.Book // nil when none was kept
	Warnings    []string
	Caution     string // one plain line that stands wherever text can stand
	Interrupted bool
	Failure     string      // why the numbers failed before the end; empty: they did not
	Settings    [][2]string // name and value, such as the method and the tolerance
}

// TableRows is the most rows of a table whose interval was not asked for, about as many as a person scrolls.
const TableRows = 2000

// Table samples the run at the interval that was asked for, or else at a round one that gives at most
// TableRows rows. It fails, before sampling, when the table would have more than most rows.
func (r *Run) Table(most int) (*record.Series, error) {
	interval := r.Interval
	if !(interval > 0) {
		interval = r.roundInterval(TableRows)
	}
	if rows := math.Ceil(r.End/interval) + 1; rows > float64(most) {
		return nil, fmt.Errorf("an interval of %g s gives %.0f rows, and the most is %d: ask for an interval of %g s or more",
			interval, rows, most, Step(r.End, most-2))
	}
	return r.sample(interval), nil
}

// sample is Series with an empty series in place of none.
func (r *Run) sample(interval float64) *record.Series {
	if s := r.Series(interval); s != nil {
		return s
	}
	return &record.Series{}
}

// roundInterval returns the smallest 1-2-5 interval [s] that gives at most that many rows, both ends and a
// shorter last step counted.
func (r *Run) roundInterval(rows int) float64 { return Step(r.End, rows-2) }

// Step returns the smallest of ..., 0.1, 0.2, 0.5, 1, 2, 5, 10, ... that covers span in at most that many
// steps; one when span is not positive.
func Step(span float64, most int) float64 {
	if !(span > 0) || math.IsInf(span, 0) {
		return 1
	}
	least := span / float64(max(1, most)) * (1 - 1e-12)
	power := math.Pow10(int(math.Floor(math.Log10(least))))
	for _, m := range [...]float64{1, 2, 5} {
		if m*power >= least {
			return m * power
		}
	}
	return 10 * power
}

// Decimals returns how many decimals the multiples of a step need, six at the most.
func Decimals(step float64) int {
	for d := 0; d < 6; d++ {
		if x := step * math.Pow10(d); math.Abs(x-math.Round(x)) < 1e-6*x {
			return d
		}
	}
	return 6
}

// TimeWant returns seconds, minutes or hours, whichever suits an axis of that many seconds.
func TimeWant(span float64) unit.Want {
	switch {
	case span > 6*3600:
		return unit.NewWant("time", "h")
	case span > 600:
		return unit.NewWant("time", "min")
	}
	return unit.Time
}

// Head returns a name with its unit, such as "disc [degC]".
func Head(name string, w unit.Want) string {
	if w.Unit == "" {
		return name
	}
	return name + " [" + w.Unit + "]"
}

// Clean returns text that any file can hold on one line: invalid bytes and control characters are blanks.
func Clean(text string) string {
	return strings.Map(func(c rune) rune {
		if unicode.IsControl(c) || c == unicode.ReplacementChar || c == '\ufffe' || c == '\uffff' {
			return ' '
		}
		return c
	}, text)
}

// Verdict says in one sentence how the energy book stands; it is empty when there is no book.
func (r *Run) Verdict() string {
	if r.Book == nil {
		return ""
	}
	if r.Book.Closed {
		return fmt.Sprintf("The energy book is closed: %.2g J missing by the ledger and %.2g J by the recount, of %.6g J through the border",
			r.Book.LedgerGap, r.Book.IndependentGap, r.Book.Throughput)
	}
	var failed []string
	for _, c := range r.Book.Checks {
		if !c.Passed {
			failed = append(failed, c.Name)
		}
	}
	text := "THE ENERGY BOOK IS NOT CLOSED: do not rely on these figures"
	if len(failed) > 0 {
		text += "; failed: " + strings.Join(failed, ", ")
	}
	return text
}

// Doubts returns what a reader must know before using any figure: an open energy book, a run that was interrupted
// or failed.
func (r *Run) Doubts() []string {
	var doubts []string
	if r.Interrupted {
		doubts = append(doubts, fmt.Sprintf("the run was interrupted at %.6g s; what was recorded is shown", r.End))
	}
	if r.Failure != "" {
		doubts = append(doubts, fmt.Sprintf("THE NUMBERS FAILED, and only what was recorded until %.6g s is shown: %s", r.End, r.Failure))
	}
	if r.Book != nil && !r.Book.Closed {
		doubts = append(doubts, r.Verdict())
	}
	return doubts
}
