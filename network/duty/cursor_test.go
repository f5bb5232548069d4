package duty

import (
	"math"
	"testing"

	"workheat/network/element"
)

func with(p Phase, set func(p *Phase)) Phase {
	set(&p)
	return p
}

func rest(label string, s float64) Phase {
	return with(Blank(Rest, label), func(p *Phase) { p.For = s })
}

// A stop is a leg as the cursor gave it.
type stop struct {
	label      string
	start, end float64
	round      int
	late       float64
}

// walk goes through a program; end says when a leg really ends.
func walk(p *Program, end func(l *Leg) float64) []stop {
	var list []stop
	c := NewCursor(p)
	for {
		l, ok := c.Next()
		if !ok {
			return list
		}
		at := end(l)
		list = append(list, stop{l.Label, l.Start, at, c.Round(), l.Late})
		c.Done(at)
	}
}

func planned(l *Leg) float64 { return l.End }

func compare(t *testing.T, got, want []stop) {
	t.Helper()
	if len(got) != len(want) {
		t.Fatalf("got %d legs %v, want %d %v", len(got), got, len(want), want)
	}
	for i, w := range want {
		g := got[i]
		if g.label != w.label || g.round != w.round || math.Abs(g.start-w.start) > 1e-9 || math.Abs(g.end-w.end) > 1e-9 || math.Abs(g.late-w.late) > 1e-9 {
			t.Errorf("leg %d: got %+v, want %+v", i, g, w)
		}
	}
}

// A repeat with an interval fills each round up, the last one too; nested repeats count their own rounds.
func TestRepeats(t *testing.T) {
	inner := with(Blank(Repeat, "1.2"), func(p *Phase) { p.Count = 2; p.Phases = []Phase{rest("b", 1)} })
	p := &Program{Phases: []Phase{
		with(Blank(Repeat, "1"), func(p *Phase) { p.Count, p.Every = 2, 10; p.Phases = []Phase{rest("a", 3), inner} }), rest("z", 5)}}
	compare(t, walk(p, planned), []stop{
		{"a", 0, 3, 1, 0}, {"b", 3, 4, 1, 0}, {"b", 4, 5, 2, 0}, {"1, rest of the interval", 5, 10, 1, 0},
		{"a", 10, 13, 2, 0}, {"b", 13, 14, 1, 0}, {"b", 14, 15, 2, 0}, {"1, rest of the interval", 15, 20, 2, 0},
		{"z", 20, 25, 0, 0}})
}

// A round that takes longer than its interval makes the next one late, and says so once.
func TestLateRounds(t *testing.T) {
	p := &Program{Phases: []Phase{with(Blank(Repeat, "1"), func(p *Phase) { p.Count, p.Every = 3, 10; p.Phases = []Phase{rest("a", 4)} }), rest("z", 1)}}
	long := map[float64]float64{10: 23} // the second round ends at 23 s
	end := func(l *Leg) float64 {
		if x, ok := long[l.Start]; ok && l.Label == "a" {
			return x
		}
		return l.End
	}
	compare(t, walk(p, end), []stop{
		{"a", 0, 4, 1, 0}, {"1, rest of the interval", 4, 10, 1, 0}, {"a", 10, 23, 2, 0},
		{"a", 23, 27, 3, 3}, {"1, rest of the interval", 27, 33, 3, 0}, {"z", 33, 34, 0, 0}})
}

// A round as long as its interval, but for rounding, is neither filled nor late.
func TestRoundsThatFit(t *testing.T) {
	p := &Program{Phases: []Phase{with(Blank(Repeat, "1"), func(p *Phase) { p.Count, p.Every = 3, 0.3; p.Phases = []Phase{rest("a", 0.1), rest("b", 0.2)} })}}
	list := walk(p, planned)
	if len(list) != 6 {
		t.Errorf("got %d legs, want 6: %v", len(list), list)
	}
	for _, l := range list {
		if l.late != 0 {
			t.Errorf("late by %g s", l.late)
		}
	}
}

// A phase that ends early is followed from where it ended, in time and in speed.
func TestEarlyEnd(t *testing.T) {
	until := &Until{Node: 0, Falls: true, Temperature: 400}
	p := &Program{Vehicle: &car, Phases: []Phase{
		with(Blank(SpeedUp, "up"), func(p *Phase) { p.From, p.To, p.In = 0, 20, 10 }),
		with(Blank(Hold, "hold"), func(p *Phase) { p.Speed, p.AtMost, p.Until = 20, 100, until }),
		with(Blank(Brake, "brake"), func(p *Phase) { p.To, p.Deceleration = 0, 4 }),
	}}
	c := NewCursor(p)
	l, _ := c.Next()
	near(t, "speed at 5 s", l.Speed(5), 10, 1e-12)
	c.Done(l.End)
	l, _ = c.Next()
	if l.Until != until || l.Start != 10 || l.End != 110 {
		t.Errorf("hold: %+v", l)
	}
	c.Done(37)
	l, _ = c.Next()
	near(t, "start of braking", l.Start, 37, 0)
	near(t, "end of braking", l.End, 42, 1e-12)
	near(t, "speed at the start", l.Speed(37), 20, 0)
	c.Done(40) // interrupted on the way
	if _, ok := c.Next(); ok {
		t.Error("more than three legs")
	}
	near(t, "speed when left", c.speed, 8, 1e-12)
}

// Speeds at the ends of phases are those that were asked for, to the last bit.
func TestSpeedsAreFreeOfRounding(t *testing.T) {
	p := &Program{Vehicle: &car, Phases: []Phase{with(Blank(Repeat, "1"), func(p *Phase) {
		p.Count = 50
		p.Phases = []Phase{
			with(Blank(SpeedUp, "up"), func(p *Phase) { p.To, p.Acceleration = 110/3.6, 1.7 }),
			with(Blank(Brake, "down"), func(p *Phase) { p.To, p.Deceleration = 0, 3.3 })}
	})}}
	c := NewCursor(p)
	for {
		l, ok := c.Next()
		if !ok {
			break
		}
		c.Done(l.End)
		if want := map[string]float64{"up": 110 / 3.6, "down": 0}[l.Label]; c.speed != want {
			t.Fatalf("after %s: %g m/s, want %g", l.Label, c.speed, want)
		}
	}
}

// Each verb plans the length of its phase by its numbers; the least of several counts.
func TestLengths(t *testing.T) {
	trace := element.MustCurve([]float64{5, 8, 8, 12}, []float64{0, 15, 15, 3})
	for _, c := range []struct {
		name  string
		phase Phase
		speed float64
		want  float64
	}{
		{"brake", with(Blank(Brake, ""), func(p *Phase) { p.To, p.Deceleration = 10, 4 }), 30, 5},
		{"brake by torque, no air", with(Blank(Brake, ""), func(p *Phase) { p.To, p.Torque = 10, 0.3*1500*1.05*2 }), 30, 20 / (2 + 0.011*9.80665/1.05)},
		{"speed up", with(Blank(SpeedUp, ""), func(p *Phase) { p.To, p.Acceleration = 30, 2 }), 10, 10},
		{"speed up in", with(Blank(SpeedUp, ""), func(p *Phase) { p.To, p.In = 30, 7 }), 10, 7},
		{"hold over", with(Blank(Hold, ""), func(p *Phase) { p.Over = 600 }), 30, 20},
		{"hold over or for", with(Blank(Hold, ""), func(p *Phase) { p.Over, p.For, p.AtMost = 600, 50, 15 }), 30, 15},
		{"rest", rest("", 9), 0, 9},
		{"follow", with(Blank(Follow, ""), func(p *Phase) { p.Trace = trace }), 0, 7},
	} {
		v := car
		v.DragArea = 0
		cursor := NewCursor(&Program{Vehicle: &v, Phases: []Phase{c.phase}})
		cursor.speed, cursor.time = c.speed, 100
		l, _ := cursor.Next()
		near(t, c.name, l.End, 100+c.want, 1e-9)
		if n := len(l.Motions); n == 0 || l.Motions[0].T0 != 100 || math.Abs(l.Motions[n-1].T1-l.End) > 1e-9 {
			t.Errorf("%s: the motions do not cover the leg: %+v", c.name, l.Motions)
		}
		for i := 1; i < len(l.Motions); i++ {
			a, b := &l.Motions[i-1], &l.Motions[i]
			if a.T1 != b.T0 || math.Abs(a.Speed(a.T1)-b.Speed(b.T0)) > 1e-9 {
				t.Errorf("%s: motions %d and %d do not join", c.name, i-1, i)
			}
		}
	}
}

// Without a vehicle nothing moves, and a duty begins at the speed that its first phase says.
func TestStartSpeed(t *testing.T) {
	l, _ := NewCursor(&Program{Phases: []Phase{rest("a", 2)}}).Next()
	if len(l.Motions) != 0 || l.Speed(1) != 0 {
		t.Errorf("nothing can move, but %+v", l)
	}
	brake := with(Blank(Brake, ""), func(p *Phase) { p.From, p.To, p.Deceleration = 25, 0, 5 })
	for name, phases := range map[string][]Phase{
		"brake":  {brake},
		"hold":   {with(Blank(Hold, ""), func(p *Phase) { p.Speed, p.For = 25, 3 })},
		"repeat": {with(Blank(Repeat, ""), func(p *Phase) { p.Count = 1; p.Phases = []Phase{brake} })},
		"follow": {with(Blank(Follow, ""), func(p *Phase) { p.Trace = element.MustCurve([]float64{0, 1}, []float64{25, 20}) })},
	} {
		if c := NewCursor(&Program{Vehicle: &car, Phases: phases}); c.speed != 25 {
			t.Errorf("%s: begins at %g m/s, want 25", name, c.speed)
		}
	}
	if NewCursor(&Program{}).speed != 0 {
		t.Error("an empty duty begins in motion")
	}
}
