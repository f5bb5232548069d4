package energy

import (
	"fmt"
	"math"
	"sort"
)

// checkWork compares the work that each dissipator took, by the quadratures, with its part of what the
// vehicle gave up, by the closed forms of its motion.
func checkWork(r *Run, b *Book) Check {
	c := Check{Layer: 2, Name: "work", Unit: "J",
		About: "each dissipator's work against the vehicle's loss of kinetic and potential energy less its resistances"}
	scale := 0.0
	for i := range b.Dissipators {
		d := &b.Dissipators[i]
		expected, ok := r.Expected[d.Name]
		if !ok {
			continue
		}
		d.Expected = expected
		scale += abs(expected)
		c.add(d.Work-expected, d.Name)
	}
	c.Allowed = recountSlack(r) * scale
	c.Passed = c.Gap <= c.Allowed
	return c
}

const (
	slopeLooks = 12   // places of the run at which slopes are tested
	slopeSlack = 1e-4 // share of the largest slope at that place that one may be off
	nudge      = 0.05 // K, for the differences
)

// checkSlopes compares the slopes that the run's equations used with differences of the laws: a wrong
// slope costs accuracy, and the ledger cannot see it.
func checkSlopes(r *Run) Check {
	c := Check{Layer: 2, Name: "slopes", Allowed: slopeSlack,
		About: "slopes of all flows by temperature and time against differences of their laws, as a share of the largest"}
	steps := r.Tape.Steps()
	w := newWitness(r)
	y := make([]float64, r.Tape.States())
	for j := 0; j < min(slopeLooks, steps); j++ {
		k := j * steps / min(slopeLooks, steps)
		start, h, segment, coef := r.Tape.Step(k)
		t := start + 0.5*h
		for i := range y {
			y[i] = r.Tape.Value(coef, i, 0.5)
		}
		dep, rate := r.Slopes(segment, t, y)
		w.at(t, 0.5, segment, coef)
		for p := range r.Paths {
			w.comparePath(&c, p, dep[p], rate[p], segment, t, h)
		}
	}
	c.Passed = c.Gap <= c.Allowed
	return c
}

// comparePath compares the slopes of one path at the witness's state.
func (w *witness) comparePath(c *Check, p int, dep []float64, rate float64, segment int, t, h float64) {
	r := w.run
	name := r.Paths[p].Element
	scale := 0.0
	for _, d := range dep {
		scale = math.Max(scale, abs(d))
	}
	for i, node := range r.Paths[p].Deps {
		old := w.state.T[node]
		w.state.T[node] = old + nudge
		up := r.Flow(p, &w.state)
		w.state.T[node] = old - nudge
		down := r.Flow(p, &w.state)
		w.state.T[node] = old
		c.compare(dep[i], (up-down)/(2*nudge), scale, abs(up)+abs(down), name)
	}
	dt := 1e-3 * h
	flow := func(t float64) float64 {
		r.Signals(segment, t, w.state.Signal, w.state.Rate)
		for i, n := range r.Nodes {
			if n.State < 0 {
				w.state.T[i] = w.state.Signal[n.Signal]
			}
		}
		return r.Flow(p, &w.state)
	}
	up, down := flow(t+dt), flow(t-dt)
	flow(t)
	c.compare(rate, (up-down)/(2*dt), abs(rate), (abs(up)+abs(down))*1e-9/dt, name)
}

// compare takes in one slope; noise is the size of the numbers that the difference was taken of.
func (c *Check) compare(got, want, scale, noise float64, where string) {
	scale = math.Max(scale, math.Max(abs(want), 1e-6*noise))
	if scale == 0 {
		return
	}
	if off := abs(got-want) / scale; !(off <= c.Gap) {
		c.Gap, c.Where = off, where
	}
}

// checkBreaks looks whether every jump or slope break of a table or motion is the end of a step.
func checkBreaks(r *Run) Check {
	c := Check{Layer: 2, Name: "breaks",
		About: "jumps and slope breaks of tables and motions that are not the end of a step, as a count"}
	ends := make([]float64, 0, r.Tape.Steps()+1)
	for k := 0; k < r.Tape.Steps(); k++ {
		start, _, _, _ := r.Tape.Step(k)
		ends = append(ends, start)
	}
	last := r.Tape.End()
	ends = append(ends, last)
	see := func(x float64, what string) {
		slack := 1e-12 * math.Max(1, math.Abs(last))
		if x <= slack || x >= last-slack {
			return
		}
		i := sort.SearchFloat64s(ends, x-slack)
		if i == len(ends) || ends[i] > x+slack {
			c.Gap++
			c.Where = fmt.Sprintf("%s at %.6g s", what, x)
		}
	}
	for _, table := range r.Tables {
		if len(table.X) > 1 {
			for _, x := range table.X {
				see(x, "a table")
			}
		}
	}
	for _, l := range r.Legs {
		for _, x := range l.Corners {
			see(x, l.Label)
		}
	}
	c.Passed = c.Gap == 0
	return c
}

// checkEnds looks whether every phase that waits for a temperature ended when it was first passed.
func checkEnds(r *Run) Check {
	c := Check{Layer: 2, Name: "ends", Unit: "K",
		About: "how far the temperature that should end a phase had gone past its mark within the phase"}
	w := newWitness(r)
	for _, l := range r.Legs {
		if l.Node < 0 || !(l.End > l.Start) {
			continue
		}
		past := w.furthest(l)
		if l.Ended {
			past = math.Max(past, abs(w.past(l, l.End)))
		}
		if past > c.Gap {
			c.Gap, c.Where = past, l.Label
		}
	}
	c.Allowed = math.Max(10*r.Abs, 1e-6)
	c.Passed = c.Gap <= c.Allowed
	return c
}

// furthest returns how far past its mark the temperature of a leg ever was.
func (w *witness) furthest(l Leg) float64 {
	worst := 0.0
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
			worst = math.Max(worst, w.past(l, start+h*float64(j)/looks))
		}
	}
	return worst
}

// past returns how far past its mark the temperature of a leg is at a time; negative: not yet there.
func (w *witness) past(l Leg, t float64) float64 {
	k, theta := w.run.Tape.Find(t)
	start, h, segment, coef := w.run.Tape.Step(k)
	w.at(start+theta*h, theta, segment, coef)
	if l.Falls {
		return l.Target - w.state.T[l.Node]
	}
	return w.state.T[l.Node] - l.Target
}
