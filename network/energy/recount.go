package energy

import (
	"math"

	"workheat/network/element"
)

// Gauss-Legendre points and weights on [0, 1], four of them: exact to degree 7, while the dense output
// has degree 4. Abramowitz and Stegun, Handbook of Mathematical Functions, table 25.4, halved.
var (
	gaussPoint  = [4]float64{0.06943184420297371, 0.33000947820757187, 0.6699905217924281, 0.9305681557970263}
	gaussWeight = [4]float64{0.17392742256872692, 0.32607257743127307, 0.32607257743127307, 0.17392742256872692}
)

// A count is what the recount found.
type count struct {
	paths   []tally   // by path
	highest []float64 // K by node, the highest seen at any point
	bends   float64   // J, of the witness
}

// A tally adds up one path.
type tally struct {
	net, comp      float64 // J
	size           float64 // J, the same without sign
	forth, reverse bool    // the flow was seen with either sign
}

// add adds an energy with Kahan's compensated sum.
func (y *tally) add(e float64) {
	x := e - y.comp
	sum := y.net + x
	y.comp = (sum - y.net) - x
	y.net = sum
	y.size += abs(e)
	y.forth, y.reverse = y.forth || e > 0, y.reverse || e < 0
}

// recount returns the energy that each path carried by Gauss quadrature of its law over the dense output.
func (w *witness) recount() *count {
	r := w.run
	c := &count{paths: make([]tally, len(r.Paths)), highest: make([]float64, len(r.Nodes))}
	for i := range c.highest {
		c.highest[i] = math.Inf(-1)
	}
	for k := range r.Tape.Steps() {
		start, h, segment, coef := r.Tape.Step(k)
		cuts := w.split(coef, h)
		for j := 1; j < len(cuts); j++ {
			width := cuts[j] - cuts[j-1]
			for g, x := range gaussPoint {
				theta := cuts[j-1] + x*width
				w.at(start+theta*h, theta, segment, coef)
				for p := range c.paths {
					c.paths[p].add(gaussWeight[g] * width * h * r.Flow(p, &w.state))
				}
				for i, x := range w.state.T {
					c.highest[i] = max(c.highest[i], x)
				}
			}
		}
	}
	c.bends = w.bends
	return c
}

// takeRecount books layer 2: for each node, the energy that its reported end temperature says it has
// gained, against the recounted flows. The gaps are summed without sign, so that the sum is a bound for
// the gap of any part of the network, be it one node or the whole, and nothing cancels.
func (b *Book) takeRecount(r *Run, c *count, s *survey) {
	check := Check{Layer: 2, Name: "recount", Unit: "J",
		About: "each node's gain by its end temperature and material table against flows counted again from the " +
			"recorded temperatures"}
	net := make([]float64, len(r.Nodes))
	for i, p := range r.Paths {
		if p.Meter {
			continue
		}
		if p.From != element.Outside {
			net[p.From] -= c.paths[i].net
		}
		if p.To != element.Outside {
			net[p.To] += c.paths[i].net
		}
	}
	for i, n := range r.Nodes {
		if n.State < 0 {
			continue
		}
		gain := 0.0
		if n.Capacity != nil {
			store := newStore(n.Capacity, n.Start)
			gain = store.enthalpy(n.Reported(n.EndState)) - store.start
		}
		b.Nodes[i].Recount = gain - net[i]
		check.add(b.Nodes[i].Recount, n.Name)
	}
	b.IndependentGap = check.Gap
	check.Allowed = recountRel*r.Rel*b.scale(s) + recountAbs*r.Abs*s.softness + s.rounding
	check.Allowed += known(s.strain, c.bends, r.Rel, b.scale(s))
	check.close()
	b.Checks = append(b.Checks, check)
}

// known returns the gap [J] that stiff nodes (strain, J) and corners of capacities (bends, J) explain, for a run that
// moved energies of the given scale [J].
func known(strain, bends, rel, scale float64) float64 {
	return math.Min(strained*strain+math.Min(bends, bendsMost*rel*scale), knownMost*scale)
}

const (
	recountRel = 10 // relative tolerances by which the recount may miss the energy moved
	recountAbs = 10 // absolute tolerances by which every node's temperature may be off

	// Where a node follows its neighbours at once, its temperature between the ends of steps is of a lower order than
	// at the ends: the part of the strain that this may come to. Chosen by trial.
	strained = 0.02

	// Corners of a capacity within steps add what they may have bent the solution by, up to so many relative
	// tolerances. Jumps end steps and add nothing: it is for steep tables, as the peak of steel near 735 degC.
	bendsMost = 300

	// However well a gap is explained by the two above, a book that misses a thousandth of the energy for it is open.
	knownMost = 1e-3
)

// checkPeaks looks whether the highest temperatures reported are those of the recorded solution: that none
// was higher, and that each was there at its time.
func (c *count) checkPeaks(w *witness) Check {
	check := Check{Layer: 2, Name: "peaks", Unit: "K", Allowed: alike,
		About: "the highest temperatures reported against those of the recorded solution, at their times and at all others"}
	r := w.run
	for i, n := range r.Nodes {
		if n.State < 0 {
			continue
		}
		check.worst(c.highest[i]-n.Highest, n.Name)
		k, theta := r.Tape.Find(n.When)
		_, _, _, coef := r.Tape.Step(k)
		off := abs(w.temperature(i, r.Tape.Value(coef, n.State, theta)) - n.Highest)
		if theta > 1-1e-9 && k+1 < r.Tape.Steps() { // it may have jumped there
			_, _, _, coef = r.Tape.Step(k + 1)
			off = math.Min(off, abs(w.temperature(i, coef[n.State])-n.Highest))
		}
		check.worst(off, n.Name)
	}
	check.close()
	return check
}
