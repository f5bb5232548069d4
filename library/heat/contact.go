package heat

import (
	"workheat/network/element"
	"workheat/network/unit"
)

// Contact returns the kind of a joint between two solids.
func Contact() *element.Kind {
	return &element.Kind{
		Section: element.Conductances,
		Name:    "contact",
		About:   "Heat through the joint of two solids that touch: pad on backing plate, disc on hub, wheel on drum.",
		Formula: "q = factor * coefficient * area * (T_A - T_B)",
		Source: "definition of the contact coefficient. Published: ground stainless steel 1.9e3 (Holman, example 2-11), " +
			"ground aluminium 1.1e4 and copper on aluminium 4.2e4 W/(m^2 K) (Cengel, examples 3-4 and 3-5); " +
			"it depends on pressure, roughness and what fills the gaps",
		Fields: []element.Field{
			between("the two nodes that touch"),
			notNegative(element.Field{Key: "coefficient", About: "contact coefficient, the inverse of the contact resistance of one unit of area",
				Want: unit.HeatTransferCoefficient}).Must(),
			area("nominal area of the joint").Must(),
			factor(),
		},
		Batch: func() element.Batch { return new(contact) },
	}
}

// contact holds joints.
type contact struct {
	joints []joint
	laws
}

type joint struct {
	link
	g float64 // W/K
}

// Add takes in one element.
func (c *contact) Add(d *element.Declaration) []element.Path {
	l := linkOf(d)
	scale, coefficient, area := d.Number("factor"), d.Number("coefficient"), d.Number("area")
	c.joints = append(c.joints, joint{l, scale * coefficient * area})
	c.again(func(s *element.State) float64 {
		return scale * area * (coefficient*s.T[l.a] - coefficient*s.T[l.b])
	})
	return l.path(true)
}

// Flows writes the flows.
func (c *contact) Flows(q []float64, s *element.State) {
	for i := range c.joints {
		j := &c.joints[i]
		q[i] = j.g * (s.T[j.a] - s.T[j.b])
	}
}

// Slopes writes the slopes; nothing depends on a signal.
func (c *contact) Slopes(dep, rate []float64, s *element.State) {
	clear(rate)
	for i := range c.joints {
		dep[2*i], dep[2*i+1] = c.joints[i].g, -c.joints[i].g
	}
}
