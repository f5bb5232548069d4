package heat

import (
	"workheat/network/element"
	"workheat/network/unit"
)

// GivenHeat returns the kind of a source whose power is known.
func GivenHeat() *element.Kind {
	return &element.Kind{
		Section: element.Sources,
		Name:    "given heat",
		About:   "Heat of known power that comes into one or more nodes from outside: a heater, a motor's loss, sunshine; negative for cooling.",
		Formula: "q = factor * share * power",
		Source:  "given by the author",
		Fields: []element.Field{
			element.Field{Key: "into", About: "the node that takes the heat, or several with their shares, which add to one", Type: element.Shares}.Must(),
			element.Field{Key: "power", About: "heat per time, constant or a table in time; negative takes heat out", Type: element.Signal,
				Want: unit.Power}.Must(),
			factor(),
		},
		Batch: func() element.Batch { return new(given) },
	}
}

// given holds sources, one entry for each node that is heated.
type given struct {
	signals []int32   // W
	part    []float64 // factor times share
	laws
}

// Add takes in one element.
func (g *given) Add(d *element.Declaration) []element.Path {
	power, into := d.Signal("power"), d.Values["into"]
	var paths []element.Path
	for i, node := range into.Nodes {
		share := into.Shares[i]
		g.signals = append(g.signals, int32(power))
		g.part = append(g.part, d.Number("factor")*share)
		scale := d.Number("factor")
		g.again(func(s *element.State) float64 { return s.Signal[power] * scale * share })
		paths = append(paths, element.Path{A: element.Outside, B: node})
	}
	return paths
}

// Flows writes the flows.
func (g *given) Flows(q []float64, s *element.State) {
	part := g.part[:len(g.signals)]
	for i, signal := range g.signals {
		q[i] = part[i] * s.Signal[signal]
	}
}

// Slopes writes the rates; no flow depends on a temperature.
func (g *given) Slopes(dep, rate []float64, s *element.State) {
	for i, signal := range g.signals {
		rate[i] = g.part[i] * s.Rate[signal]
	}
}
