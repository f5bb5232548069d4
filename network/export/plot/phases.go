package plot

import (
	"fmt"
	"strings"

	"workheat/network/export/outcome"
	"workheat/network/record"
)

// A block is a stretch of the run that is labelled as one: a phase, or all rounds of a repeat.
type block struct {
	start, end float64 // s
	text       string
}

// A leg is a run of segments that make one phase once.
type leg struct {
	start, end  float64
	entry, what string // "2" and "brake" of the label "2.1 brake"
	round       int
}

// blocksOf returns the blocks of the run and the starts of its legs.
func blocksOf(o *outcome.Run) (blocks []block, marks []float64) {
	s := o.Series(outcome.Step(o.End, 1))
	if s == nil {
		return nil, nil
	}
	legs := legsOf(s.Segments)
	for i := 0; i < len(legs); {
		j := i
		for j < len(legs) && legs[j].entry == legs[i].entry && (j == i || legs[i].round > 0) {
			marks = append(marks, legs[j].start)
			j++
		}
		blocks = append(blocks, blockOf(legs[i:j]))
		i = j
	}
	return blocks, marks
}

func legsOf(segments []record.Segment) []leg {
	var legs []leg
	for i, s := range segments {
		if k := len(legs); k > 0 && !s.First && s.Label == segments[i-1].Label && s.Round == segments[i-1].Round {
			legs[k-1].end = s.End
			continue
		}
		place, what, found := strings.Cut(s.Label, " ")
		if !found || strings.Trim(place, "0123456789.") != "" {
			place, what = s.Label, s.Label
		}
		entry, _, _ := strings.Cut(place, ".")
		what, _, _ = strings.Cut(what, ", ")
		legs = append(legs, leg{s.Start, s.End, entry, what, s.Round})
	}
	return legs
}

// blockOf labels some legs of one entry: "15 x brake, speed up".
func blockOf(legs []leg) block {
	const most = 3
	var names []string
	rounds, last := 0, -1
	for _, l := range legs {
		if l.round != last {
			rounds, last = rounds+1, l.round
		}
		known := false
		for _, n := range names {
			known = known || n == l.what
		}
		if !known {
			names = append(names, l.what)
		}
	}
	if len(names) > most {
		names = append(names[:most], "...")
	}
	text := outcome.Clean(strings.Join(names, ", "))
	if rounds > 1 {
		text = fmt.Sprintf("%d × %s", rounds, text)
	}
	return block{legs[0].start, legs[len(legs)-1].end, text}
}
