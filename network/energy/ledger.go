package energy

import (
	"math"

	"workheat/network/element"
)

func abs(x float64) float64 { return math.Abs(x) }

// ledger fills the lines and totals of layer 1 from the quadratures.
func (b *Book) ledger(r *Run, c *count, s *survey) {
	for _, n := range r.Nodes {
		line := NodeLine{Name: n.Name, Held: n.State < 0}
		if n.Capacity != nil {
			line.Stored = n.EndState
		}
		b.Nodes = append(b.Nodes, line)
	}
	for i, p := range r.Paths {
		b.addPath(r, p, &c.paths[i])
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
	check.Allowed = roundOff*b.scale(s) + s.flowing
	check.close()
	b.Checks = append(b.Checks, check)
}

// scale is the energy [J] that was moved, which gaps are measured against: through the border, or, where
// less than that passed it, within the network.
func (b *Book) scale(s *survey) float64 { return math.Max(b.Throughput, s.swing) }

// addPath books one path's total.
func (b *Book) addPath(r *Run, p Path, y *tally) {
	if p.Meter {
		b.dissipator(p.Element).Work += p.Total
		return
	}
	line := PathLine{Element: p.Element, Path: p.Path, Kind: p.Kind, Net: p.Total, Work: p.Section == element.Dissipators}
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
	if line.Border {
		line.In = p.Total
		if toOut {
			line.In = -p.Total
		}
		b.through(&line, y)
	}
	if line.Work {
		b.dissipator(p.Element).Heat += p.Total
	}
	b.Paths = append(b.Paths, line)
}

// through adds a path across the border to the totals. Its part of the throughput is its total without sign, or,
// when the flow went to and fro, what the recount found of it.
func (b *Book) through(line *PathLine, y *tally) {
	if y.forth && y.reverse {
		b.Throughput += math.Max(abs(line.In), y.size)
	} else {
		b.Throughput += abs(line.In)
	}
	switch {
	case line.Work:
		b.WorkIn += line.In
	case line.In > 0:
		b.HeatIn += line.In
	default:
		b.HeatOut -= line.In
	}
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
