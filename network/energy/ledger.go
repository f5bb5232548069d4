package energy

import (
	"math"

	"workheat/network/element"
)

// roundOff is what the ledger may miss, as a share of the book's scale: well above the sum of roundings of a
// run of many thousand steps, and far below any error of a law.
const roundOff = 1e-11

func abs(x float64) float64 { return math.Abs(x) }

// ledger fills the lines and totals of layer 1 from the quadratures.
func (b *Book) ledger(r *Run) {
	states := 0
	for _, n := range r.Nodes {
		line := NodeLine{Name: n.Name, Held: n.State < 0}
		if n.Capacity != nil {
			line.Stored = n.EndState
		}
		if n.State >= 0 {
			states++
		}
		b.Nodes = append(b.Nodes, line)
	}
	for _, p := range r.Paths {
		b.addPath(r, p)
	}
	check := Check{Layer: 1, Name: "ledger", Unit: "J",
		About: "each node's stored energy against all that was carried to it, each dissipator's work against its heat"}
	for i := range b.Nodes {
		n := &b.Nodes[i]
		if n.Held {
			continue
		}
		n.Gap = n.Stored - n.Net
		b.Stored += n.Stored
		check.add(n.Gap, n.Name)
	}
	for i := range b.Dissipators {
		d := &b.Dissipators[i]
		d.Gap = d.Work - d.Heat
		check.add(d.Gap, d.Name)
	}
	b.LedgerGap = check.Gap
	check.Allowed = roundOff * b.scale()
	check.Passed = check.Gap <= check.Allowed
	b.Checks = append(b.Checks, check)
}

// addPath books one path's total.
func (b *Book) addPath(r *Run, p Path) {
	if p.Meter {
		b.dissipator(p.Element).Work += p.Total
		return
	}
	line := PathLine{Element: p.Element, Path: p.Path, Kind: p.Kind, Net: p.Total}
	fromOut, toOut := b.border(p.From), b.border(p.To)
	if p.From != element.Outside {
		line.From = r.Nodes[p.From].Name
		b.Nodes[p.From].Net -= p.Total
	}
	if p.To != element.Outside {
		line.To = r.Nodes[p.To].Name
		b.Nodes[p.To].Net += p.Total
	}
	line.Border, line.Inside = fromOut != toOut, !fromOut && !toOut
	b.Paths = append(b.Paths, line)
	if p.Section == element.Dissipators {
		b.dissipator(p.Element).Heat += p.Total
	}
	if !line.Border {
		return
	}
	in := p.Total // into the network
	if toOut {
		in = -in
	}
	b.Throughput += abs(in)
	switch {
	case p.Section == element.Dissipators:
		b.WorkIn += in
	case in > 0:
		b.HeatIn += in
	default:
		b.HeatOut -= in
	}
}

// scale is the size of the energies that the run moved, against which gaps are judged: the throughput, or what
// one path carried inside on balance if that is more. A network without a border has no throughput at all.
func (b *Book) scale() float64 {
	most := b.Throughput
	for _, p := range b.Paths {
		if p.Inside {
			most = max(most, abs(p.Net))
		}
	}
	return most
}

// border reports whether an end is not inside: held, or the world.
func (b *Book) border(i int) bool { return i == element.Outside || b.Nodes[i].Held }

func (b *Book) dissipator(name string) *DissipatorLine {
	for i := range b.Dissipators {
		if b.Dissipators[i].Name == name {
			return &b.Dissipators[i]
		}
	}
	b.Dissipators = append(b.Dissipators, DissipatorLine{Name: name, Expected: math.NaN()})
	return &b.Dissipators[len(b.Dissipators)-1]
}

// add adds a gap to a check's sum and remembers where the largest was.
func (c *Check) add(gap float64, where string) {
	if c.Where == "" || abs(gap) > c.largest {
		c.Where, c.largest = where, abs(gap)
	}
	c.Gap += abs(gap)
}
