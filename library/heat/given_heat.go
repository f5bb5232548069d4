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
		About:   "Heat of known power that comes into a node from outside: a heater, a motor's loss, sunshine; negative for cooling.",
		Formula: "q = power",
		Source:  "given by the author",
		Fields: []element.Field{
			element.Field{Key: "into", About: "the node that takes the heat", Type: element.NodeName}.Must(),
			element.Field{Key: "power", About: "heat per time, constant or a table in time; negative takes heat out", Type: element.Signal,
				Want: unit.Power}.Must(),
		},
		Batch: func() element.Batch { return new(given) },
	}
}

// given holds sources.
type given struct {
	signals []int32 // W
	laws
}

// Add takes in one element.
func (g *given) Add(d *element.Declaration) []element.Path {
	power := d.Signal("power")
	g.signals = append(g.signals, int32(power))
	g.again(func(s *element.State) float64 { return s.Signal[power] })
	return []element.Path{{A: element.Outside, B: d.Values["into"].Nodes[0]}}
}

// Flows writes the flows.
func (g *given) Flows(q []float64, s *element.State) {
	for i, signal := range g.signals {
		q[i] = s.Signal[signal]
	}
}

// Slopes writes the rates; no flow depends on a temperature.
func (g *given) Slopes(dep, rate []float64, s *element.State) {
	for i, signal := range g.signals {
		rate[i] = s.Rate[signal]
	}
}
