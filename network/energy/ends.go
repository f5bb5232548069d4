package energy

import "math"

// checkEnds looks whether every phase that waits for a temperature ended when it was first passed, and
// whether a phase that was left out had its temperature passed before.
func checkEnds(r *Run) Check {
	c := Check{Layer: 2, Name: "ends", Unit: "K",
		About: "how far the temperature that should end a phase was from its mark at its end, or past it within the phase"}
	w := newWitness(r)
	for _, l := range r.Legs {
		if l.Node < 0 {
			continue
		}
		before, after := w.past(l, l.End)
		if n := &r.Nodes[l.Node]; n.State >= 0 && n.Capacity == nil && !math.IsNaN(l.Seen) {
			after = l.beyond(l.Seen) // what follows may heat it at once
		}
		if l.End > l.Start {
			c.worst(before, l.Label) // beyond its mark
		}
		if l.Ended || !(l.End > l.Start) {
			c.worst(-math.Max(before, after), l.Label) // not yet there
		}
		c.worst(w.furthest(l), l.Label)
	}
	c.Allowed = math.Max(10*r.Abs, alike)
	c.close()
	return c
}

// furthest returns how far past its mark the temperature of a leg ever was within it, less what the
// tolerance lets the dense output stray between the ends of steps.
func (w *witness) furthest(l Leg) float64 {
	worst, rise := 0.0, 0.0
	from := w.run.Nodes[l.Node].Start
	first, _ := w.run.Tape.Find(l.Start)
	for k := first; k < w.run.Tape.Steps(); k++ {
		start, h, _, _ := w.run.Tape.Step(k)
		if start >= l.End {
			break
		}
		if start < l.Start {
			continue
		}
		const looks = 5
		for j := 1; j <= looks; j++ {
			past, _ := w.past(l, start+h*float64(j)/looks)
			worst = math.Max(worst, past)
			rise = math.Max(rise, abs(w.state.T[l.Node]-from))
		}
	}
	return worst - w.run.Rel*rise
}

// past returns how far past its mark the temperature of a leg is at a time; negative: not yet there. At the
// end of a step it also tells how far it is just after.
func (w *witness) past(l Leg, t float64) (before, after float64) {
	tape := w.run.Tape
	k, theta := tape.Find(t)
	start, h, segment, coef := tape.Step(k)
	w.at(start+theta*h, theta, segment, coef)
	before = l.beyond(w.state.T[l.Node])
	if theta < 1-1e-9 {
		return before, before
	}
	return before, l.beyond(w.next(l.Node, k, t))
}

// next returns the temperature of a node just after the end of step k, at time t: a held one may jump there by its
// table, and one without mass with what heats it.
func (w *witness) next(i, k int, t float64) float64 {
	n, tape := &w.run.Nodes[i], w.run.Tape
	switch {
	case n.State < 0:
		return w.tables[n.Signal-w.run.FirstTable].after(t)
	case k+1 < tape.Steps():
		_, _, _, coef := tape.Step(k + 1)
		return w.temperature(i, coef[n.State])
	}
	return w.temperature(i, n.EndState)
}

// beyond returns how far past its mark a temperature is.
func (l *Leg) beyond(t float64) float64 {
	if l.Falls {
		return l.Target - t
	}
	return t - l.Target
}
