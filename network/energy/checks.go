package energy

import (
	"fmt"
	"math"
	"sort"

	"workheat/network/element"
)

// add adds a gap to a check's sum and remembers where the largest was.
func (c *Check) add(gap float64, where string) {
	if c.Where == "" || abs(gap) > c.largest {
		c.Where, c.largest = where, abs(gap)
	}
	c.Gap += abs(gap)
}

// worst keeps the largest gap.
func (c *Check) worst(gap float64, where string) {
	if !(gap <= c.Gap) { // also when it is not a number, which then stays
		c.Gap, c.Where = gap, where
	}
}

// close tells whether the check has passed.
func (c *Check) close() { c.Passed = c.Gap <= c.Allowed }

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
	c.Allowed = (r.exact() + torqued*r.Rel*r.Torqued) * scale
	c.close()
	return c
}

// exact is the share that quadratures may miss of what is known in closed form: they are exact for the powers of
// steady decelerations. torqued adds to it, in relative tolerances, for the work under a constant torque, whose power
// is no polynomial of time, so that the tolerance alone bounds its error: in 662 random duties it came to 3.7 at the
// most, where much mass met little work.
const torqued = 10

func (r *Run) exact() float64 { return 1e-7 + 1e-3*r.Rel }

// checkGiven compares what each source of given heat gave, by the quadratures, with the area under its
// power.
func checkGiven(r *Run) Check {
	c := Check{Layer: 2, Name: "given", Unit: "J",
		About: "the heat of each source over all nodes that take it against the area under its power"}
	end := r.Tape.End()
	scale := 0.0
	for _, g := range r.Given {
		came := 0.0
		for i := range r.Paths {
			if p := &r.Paths[i]; p.Section == element.Sources && p.Element == g.Element {
				came += p.Total
			}
		}
		power := newStore(g.Power, 0)
		due := g.Factor * (power.enthalpy(end) - power.start)
		for _, y := range power.c {
			scale = math.Max(scale, abs(g.Factor*y)*end)
		}
		c.add(came-due, g.Element)
	}
	c.Allowed = roundOff * scale
	c.close()
	return c
}

// checkBreaks looks whether every jump or slope break of a table or motion, and every jump of a heat capacity, is
// the end of a step.
func checkBreaks(w *witness) Check {
	c := Check{Layer: 2, Name: "breaks",
		About: "jumps and slope breaks of tables and motions, and jumps of heat capacities, that are not the end of a step, as a count"}
	r := w.run
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
	for k := range r.Tape.Steps() {
		w.jumpsWithin(k, func(x float64, node string) {
			c.Gap++
			c.Where = fmt.Sprintf("the heat capacity of %s, in the step from %.6g s", node, x)
		})
	}
	c.close()
	return c
}

// jumpsWithin calls see for every jump of a heat capacity that step k begins on one side and ends on the other, with
// the time at which it begins.
func (w *witness) jumpsWithin(k int, see func(x float64, node string)) {
	start, _, _, coef := w.run.Tape.Step(k)
	for i, s := range w.stores {
		if s == nil || !s.jumpy {
			continue
		}
		n := &w.run.Nodes[i]
		slack := s.landing(w.run.Abs)
		first, last := w.run.Tape.Value(coef, n.State, 0)+s.start, w.run.Tape.Value(coef, n.State, 1)+s.start
		for j, u := range s.h {
			if s.jumps(j) && min(first, last) < u-slack && max(first, last) > u+slack {
				see(start, n.Name)
			}
		}
	}
}
