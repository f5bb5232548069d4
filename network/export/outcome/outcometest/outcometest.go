// Package outcometest makes an invented outcome for tests of writers.
package outcometest

import (
	"fmt"
	"math"

	"workheat/network/element"
	"workheat/network/energy"
	"workheat/network/export/outcome"
	"workheat/network/record"
	"workheat/network/unit"
)

// The invented duty: snubs of so many seconds, the first at FirstSnub, then a long cool-down.
const (
	Rounds    = 15
	Every     = 45.0
	SnubTime  = 5.1234567
	FirstSnub = 0.7654321
)

// Run returns a run of n nodes, the last of them held when there is more than one, that lasts end seconds.
// Temperatures rise linearly in each snub and decay after it, so that each peak is a corner at a known time
// that round sampling intervals miss. All figures are invented.
func Run(n int, end float64) *outcome.Run {
	r := &outcome.Run{
		Title:    "Invented corner, repeated snubs",
		Source:   "corner.json",
		Netlist:  []byte("{\n  \"workheat\": 1,\n  \"title\": \"Invented corner\"\n}\n"),
		Program:  "workheat 0.0.0",
		Caution:  "Invented figures: for tests only.",
		End:      end,
		Settings: [][2]string{{"method", "invented"}, {"relative tolerance", "1e-6"}},
		Warnings: []string{"a correlation was used outside its range for 12 s"},
		Book:     book(n),
	}
	for i := range n {
		r.Summary = append(r.Summary, summary(n, i, end))
	}
	r.Series = func(interval float64) *record.Series { return series(n, end, interval) }
	return r
}

// Name returns the name of node i.
func Name(i int) string { return fmt.Sprintf("node %d", i+1) }

func held(n, i int) bool { return n > 1 && i == n-1 }

// Temperature returns the temperature [K] of node i of n at time t [s].
func Temperature(n, i int, t float64) float64 {
	const start = 293.15
	if held(n, i) {
		return start
	}
	rise, decay := 160/(1+0.5*float64(i)), 60*(1+0.6*float64(i))
	sum := 0.0
	for k := range Rounds {
		s := t - FirstSnub - float64(k)*Every
		switch {
		case s <= 0:
		case s < SnubTime:
			sum += s / SnubTime
		default:
			sum += math.Exp(-(s - SnubTime) / decay)
		}
	}
	return start + rise*sum
}

// Peak returns the highest temperature [K] of node i and when it is [s]; it is at the end of a snub.
func Peak(n, i int, end float64) (highest, when float64) {
	highest = Temperature(n, i, 0)
	for k := range Rounds {
		at := math.Min(end, FirstSnub+float64(k)*Every+SnubTime)
		if v := Temperature(n, i, at); v > highest {
			highest, when = v, at
		}
	}
	return highest, when
}

func limits(i int) []element.Limit {
	switch i {
	case 0:
		return []element.Limit{{Name: "fade", Temperature: 273.15 + 250}}
	case 1:
		return []element.Limit{{Name: "vapour lock", Temperature: 273.15 + 400}, {Name: "paint", Temperature: 273.15 + 5000}}
	}
	return nil
}

func summary(n, i int, end float64) record.Summary {
	s := record.Summary{
		Name: Name(i), Held: held(n, i),
		Start: Temperature(n, i, 0), End: Temperature(n, i, end), Lowest: math.NaN(),
	}
	s.Highest, s.When = Peak(n, i, end)
	for _, l := range limits(i) {
		m := record.Margin{Limit: l, Margin: l.Temperature - s.Highest, First: math.NaN()}
		if m.Margin < 0 {
			m.Above, m.First = 12, 100
		}
		s.Limits = append(s.Limits, m)
	}
	return s
}

func series(n int, end, interval float64) *record.Series {
	s := &record.Series{}
	for k := 0; float64(k)*interval < end-1e-9*interval; k++ {
		s.Time = append(s.Time, float64(k)*interval)
	}
	s.Time = append(s.Time, end)
	add := func(name string, g record.Group, w unit.Want, l []element.Limit, f func(float64) float64) {
		c := record.Column{Name: name, Group: g, Want: w, Limits: l, Values: make([]float64, len(s.Time))}
		for k, t := range s.Time {
			c.Values[k] = f(t)
		}
		s.Columns = append(s.Columns, c)
	}
	for i := range n {
		add(Name(i), record.Temperatures, unit.Temperature, limits(i), func(t float64) float64 { return Temperature(n, i, t) })
	}
	for i := 0; i+1 < n; i++ {
		f := func(t float64) float64 { return 7 * (Temperature(n, i, t) - Temperature(n, i+1, t)) }
		add(Name(i)+" to "+Name(i+1), record.Flows, unit.Power, nil, f)
	}
	add("speed", record.Vehicle, unit.RoadSpeed, nil, func(t float64) float64 { return 20 + 10*math.Sin(t/7) })
	for k := range Rounds {
		at := float64(k) * Every
		s.Segments = append(s.Segments,
			record.Segment{Start: at, End: at + SnubTime, Label: "1.1 brake", Round: k + 1, First: true},
			record.Segment{Start: at + SnubTime, End: at + 20, Label: "1.2 speed up", Round: k + 1, First: true},
			record.Segment{Start: at + 20, End: at + Every, Label: "1.2 speed up, rest of the interval", Round: k + 1, First: true})
	}
	s.Segments = append(s.Segments, record.Segment{Start: Rounds * Every, End: end, Label: "2 rest", First: true})
	return s
}

func book(n int) *energy.Book {
	b := &energy.Book{
		WorkIn: 5.25e6, HeatOut: 4e6, Stored: 1.25e6, Throughput: 5.25e6, LedgerGap: 3e-9, IndependentGap: 2,
		Dissipators: []energy.DissipatorLine{{Name: "pad", Work: 5.25e6, Heat: 5.25e6, Expected: 5.25e6}},
		Vehicle:     &energy.VehicleLine{Name: "van", Distance: 41e3, Drive: 2e7, Rolling: 1e6, Air: 4e6, Brake: 1.5e7, Modelled: 5.25e6},
		Checks: []energy.Check{
			{Layer: 1, Name: "node balances", About: "stored energy against heat by all paths", Gap: 3e-9, Allowed: 5e-6, Unit: "J", Passed: true, Where: Name(0)},
			{Layer: 2, Name: "recount", About: "the same energies from the recorded solution", Gap: 2, Allowed: 50, Unit: "J", Passed: true, Where: Name(0)},
		},
		Closed: true,
	}
	for i := range n {
		b.Nodes = append(b.Nodes, energy.NodeLine{Name: Name(i), Net: 1e5, Stored: 1e5, Held: held(n, i)})
	}
	for i := 0; i+1 < n; i++ {
		b.Paths = append(b.Paths, energy.PathLine{Element: Name(i) + " to " + Name(i+1), Path: "conduction", Kind: "conduction", From: Name(i), To: Name(i + 1), Net: 2e5, Inside: true})
	}
	return b
}
