package record

import (
	"math"

	"workheat/network/element"
)

// A Summary is what a designer asks of a node first. Temperatures are in K, times in s.
type Summary struct {
	Name    string
	Held    bool
	Start   float64
	Highest float64
	When    float64
	Lowest  float64 // after the first peak; NaN if there was no peak before the end
	End     float64
	Limits  []Margin
}

// A Margin is how a node stands to one of its limits.
type Margin struct {
	element.Limit
	Margin float64 // K below the limit at the highest, negative when above
	Above  float64 // s spent above
	First  float64 // s when it was first passed; NaN if never
}

// ripple is the fall from a high point, in K, that makes it a peak: far above the errors of a run, far below what
// a designer calls a peak.
const ripple = 0.01

// Summarise reads the summary of a node from the tape.
func Summarise(t *Tape, n Node) Summary {
	switch {
	case n.State < 0:
		return summariseHeld(t, n)
	case t.Steps() == 0:
		return unrecorded(n)
	}
	_, _, _, first := t.Step(0)
	s := Summary{Name: n.Name, Start: n.Temperature(first[n.State]), Lowest: math.NaN()}
	high, highAt := first[n.State], 0.0
	low := math.Inf(1)
	fallen := false
	see := func(at, y float64) {
		if y > high {
			high, highAt = y, at
		}
		if !fallen && n.Temperature(high)-n.Temperature(y) > ripple {
			fallen = true
		}
		if fallen {
			low = math.Min(low, y)
		}
	}
	for k := 0; k < t.Steps(); k++ {
		start, h, _, coef := t.Step(k)
		see(start, coef[n.State]) // a node without mass may have jumped there
		t.eachTurn(coef, n.State, func(theta float64) { see(start+theta*h, t.Value(coef, n.State, theta)) })
		see(start+h, t.Value(coef, n.State, 1))
	}
	last := t.Steps() - 1
	_, _, _, coef := t.Step(last)
	s.End = n.Temperature(t.Value(coef, n.State, 1))
	s.Highest, s.When = n.Temperature(high), highAt
	if fallen {
		s.Lowest = n.Temperature(low)
	}
	for _, l := range n.Limits {
		s.Limits = append(s.Limits, t.margin(n, l, s.Highest))
	}
	return s
}

// unrecorded is the summary of a node of a run without steps: it is where it started.
func unrecorded(n Node) Summary {
	s := Summary{Name: n.Name, Start: n.Start, Highest: n.Start, Lowest: math.NaN(), End: n.Start}
	for _, l := range n.Limits {
		s.Limits = append(s.Limits, Margin{Limit: l, Margin: l.Temperature - n.Start, First: math.NaN()})
	}
	return s
}

// summariseHeld reads the summary of a held node from its table.
func summariseHeld(t *Tape, n Node) Summary {
	end := t.End()
	s := Summary{Name: n.Name, Held: true, Start: n.Given.At(0), Lowest: math.NaN(), End: n.Given.At(end)}
	s.Highest = s.Start
	for i, x := range n.Given.X {
		if x >= 0 && x <= end && n.Given.Y[i] > s.Highest {
			s.Highest, s.When = n.Given.Y[i], x
		}
	}
	if s.End > s.Highest {
		s.Highest, s.When = s.End, end
	}
	for _, l := range n.Limits {
		m := Margin{Limit: l, Margin: l.Temperature - s.Highest, First: math.NaN()}
		if m.Margin < 0 {
			m.aboveGiven(n, end)
		}
		s.Limits = append(s.Limits, m)
	}
	return s
}

// aboveGiven reads how long a held node is above the limit, piece by piece of its table.
func (m *Margin) aboveGiven(n Node, end float64) {
	corners := append([]float64{0}, n.Given.X...)
	for i, from := range corners {
		to := end
		if i < len(n.Given.X) {
			to = n.Given.X[i]
		}
		from, to = math.Max(from, 0), math.Min(to, end)
		if !(from < to) {
			continue
		}
		mid := 0.5 * (from + to) // away from jumps
		slope := n.Given.Slope(mid)
		a, b := from, to
		over := n.Given.At(mid) - m.Temperature
		switch cross := mid - over/slope; {
		case slope > 0:
			a = math.Max(a, cross)
		case slope < 0:
			b = math.Min(b, cross)
		case !(over > 0):
			continue
		}
		if a < b {
			m.Above += b - a
			if math.IsNaN(m.First) {
				m.First = a
			}
		}
	}
}

// eachTurn calls visit at every θ inside the step at which state i turns round, in order.
func (t *Tape) eachTurn(coef []float64, i int, visit func(theta float64)) {
	const looks = 8 // the slope is a cubic: two turns closer than an eighth of a step are a ripple of it
	first, rest := coef[t.n+i], 0.0
	for k := 2; k <= t.degree; k++ {
		rest += float64(k) * math.Abs(coef[k*t.n+i])
	}
	if rest < math.Abs(first) {
		return // the slope keeps its sign
	}
	a, fa := 0.0, t.Slope(coef, i, 0)
	for j := 1; j <= looks; j++ {
		b := float64(j) / looks
		fb := t.Slope(coef, i, b)
		switch {
		case fb == 0: // at the look itself, or flat throughout
			visit(b)
		case fa*fb < 0:
			visit(bisect(a, b, func(x float64) bool { return t.Slope(coef, i, x)*fa > 0 }))
		}
		a, fa = b, fb
	}
}

// bisect returns where before(x) turns false in [a, b].
func bisect(a, b float64, before func(x float64) bool) float64 {
	for range 52 {
		if m := 0.5 * (a + b); before(m) {
			a = m
		} else {
			b = m
		}
	}
	return b
}

// margin reads how a node stands to a limit.
func (t *Tape) margin(n Node, l element.Limit, highest float64) Margin {
	m := Margin{Limit: l, Margin: l.Temperature - highest, First: math.NaN()}
	if m.Margin >= 0 {
		return m
	}
	level := n.Value(l.Temperature)
	for k := 0; k < t.Steps(); k++ {
		start, h, _, coef := t.Step(k)
		t.above(coef, n.State, level, func(from, to float64) {
			m.Above += (to - from) * h
			if math.IsNaN(m.First) {
				m.First = start + from*h
			}
		})
	}
	return m
}

// above calls visit with every stretch of θ in which state i is above a level.
func (t *Tape) above(coef []float64, i int, level float64, visit func(from, to float64)) {
	turns := []float64{0}
	t.eachTurn(coef, i, func(theta float64) { turns = append(turns, theta) })
	turns = append(turns, 1)
	for j := 1; j < len(turns); j++ {
		a, b := turns[j-1], turns[j]
		ya, yb := t.Value(coef, i, a) > level, t.Value(coef, i, b) > level
		if !ya && !yb {
			continue
		}
		if ya != yb {
			x := bisect(a, b, func(x float64) bool { return (t.Value(coef, i, x) > level) == ya })
			if ya {
				b = x
			} else {
				a = x
			}
		}
		visit(a, b)
	}
}
