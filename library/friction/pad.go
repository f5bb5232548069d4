package friction

import (
	"fmt"

	"workheat/network/element"
	"workheat/network/unit"
)

// Pad returns the kind of a brake that takes a fixed part of the braking power of a vehicle.
func Pad() *element.Kind {
	return &element.Kind{
		Section: element.Dissipators,
		Name:    "friction pad",
		About:   "A brake's rubbing pair: it takes its part of the vehicle's braking power and heats the nodes named, each by its share.",
		Formula: "work = part of braking * (braking power of the vehicle); heat to a node = share * work",
		Source:  "conservation of energy; part and shares are the author's",
		Fields: []element.Field{
			element.Field{Key: "slows", About: "the vehicle that it brakes", Type: element.BodyName}.Must(),
			element.Field{Key: "part of braking", About: "its part of the braking work of the whole vehicle", Type: element.Number,
				Want: unit.Number}.From(0, 1).Must(),
			element.Field{Key: "heats", About: "the nodes that take the heat, each with its share; the shares add to one", Type: element.Shares}.Must(),
		},
		Together: checkParts,
		Batch:    func() element.Batch { return new(pads) },
	}
}

// checkParts reports the brake with which the parts of the braking work come to more than the whole.
func checkParts(all []*element.Declaration) {
	sum := 0.0
	for _, d := range all {
		before := sum
		if sum += d.Number("part of braking"); sum > 1+1e-9 && before <= 1+1e-9 {
			d.Report("part of braking", fmt.Sprintf("with this one the brakes take %.6g of the braking work, more than all of it", sum),
				"the parts of all brakes of the vehicle add to 1 at most")
		}
	}
}

// pads holds rubbing pairs. Each has a first path that meters its work and one path for each share.
type pads struct {
	flows []flow
	again []again
}

// A flow is a part of a signal of braking power.
type flow struct {
	brake int32   // signal, W
	part  float64 // of the braking power
}

// An again is what the recount knows of a path: the element's own numbers.
type again struct {
	brake       int
	part, share float64
}

// Add takes in one element.
func (p *pads) Add(d *element.Declaration) []element.Path {
	brake, part := d.Brake(d.Values["slows"].Body), d.Number("part of braking")
	p.flows = append(p.flows, flow{int32(brake), part})
	p.again = append(p.again, again{brake, part, 1})
	paths := []element.Path{{A: element.Outside, B: element.Outside, Name: "work"}}
	heats := d.Values["heats"]
	for i, node := range heats.Nodes {
		p.flows = append(p.flows, flow{int32(brake), part * heats.Shares[i]})
		p.again = append(p.again, again{brake, part, heats.Shares[i]})
		paths = append(paths, element.Path{A: element.Outside, B: node})
	}
	return paths
}

// Flows writes the work and the heats.
func (p *pads) Flows(q []float64, s *element.State) {
	for i := range p.flows {
		q[i] = p.flows[i].part * s.Signal[p.flows[i].brake]
	}
}

// Slopes writes the rates; no flow depends on a temperature.
func (p *pads) Slopes(dep, rate []float64, s *element.State) {
	for i := range p.flows {
		rate[i] = p.flows[i].part * s.Rate[p.flows[i].brake]
	}
}

// Recount returns one of the flows from the element's own numbers.
func (p *pads) Recount(path int, s *element.State) float64 {
	a := p.again[path]
	return a.share * (a.part * s.Signal[a.brake])
}
