package heat

import (
	"fmt"

	"workheat/network/element"
	"workheat/network/unit"
)

// Conduction returns the kind of a solid path between two nodes.
func Conduction() *element.Kind {
	return &element.Kind{
		Section: element.Conductances,
		Name:    "conduction",
		About:   "Heat conducted through solid material from one node to another.",
		Formula: "q = factor * value * (T_A - T_B), where value = conductivity * area / length; with a material, " +
			"q = factor * area / length * (integral of its k over T from T_B to T_A)",
		Source: "Fourier's law for a bar or plane wall, steady within the path; exact for a k that varies with temperature",
		Fields: []element.Field{
			between("the two nodes; the flow counts positive from the first to the second"),
			element.Field{Key: "value", About: "conductance of the whole path; leave out when area and length are given", Want: unit.Conductance}.Positive(),
			area("cross-section that the heat passes"),
			element.Field{Key: "length", About: "length of the path, from node centre to node centre", Want: unit.Length}.Positive(),
			element.Field{Key: "conductivity", About: "thermal conductivity when it is one number", Want: unit.Conductivity}.Positive(),
			{Key: "material", About: "material of the path, for its conductivity over temperature", Type: element.MaterialOf},
			factor(),
		},
		Check: checkConduction,
		Batch: func() element.Batch { return new(conduction) },
	}
}

// checkConduction asks for the value, or for area, length and one of conductivity and material.
func checkConduction(d *element.Declaration) {
	if d.Has("value") {
		for _, key := range []string{"area", "length", "conductivity", "material"} {
			if d.Has(key) {
				d.Report(key, fmt.Sprintf("%q and \"value\" both set the conductance", key), "keep the value, or area, length and conductivity")
			}
		}
		return
	}
	for _, key := range []string{"area", "length"} {
		if !d.Has(key) {
			d.Report("", fmt.Sprintf("neither \"value\" nor %q is given", key),
				"give \"value\" in W/K, or \"area\", \"length\" and \"conductivity\" or \"material\"")
			return
		}
	}
	m := d.Values["material"].Material
	switch {
	case d.Has("conductivity") && d.Has("material"):
		d.Report("conductivity", "\"conductivity\" and \"material\" both set the conductivity", "keep one of them")
	case !d.Has("conductivity") && !d.Has("material"):
		d.Report("", "the conductivity is not given", "add \"conductivity\" in W/(m K), or \"material\"")
	case m != nil && m.Conductivity == nil:
		d.Report("material", fmt.Sprintf("the conductivity of %s is not known", m.Name), "give \"conductivity\" in W/(m K) instead")
	}
}

// conduction holds paths of fixed conductance and paths whose conductivity varies.
type conduction struct {
	fixed   []fixedPath
	varying []varyingPath
	laws
}

type fixedPath struct {
	link
	path int32
	g    float64 // W/K
}

type varyingPath struct {
	link
	path  int32
	shape float64 // factor * area / length, m
	k     *element.Curve
	of    *element.Material
	text  string // what to say when a temperature leaves the range of the material
}

// Add takes in one element.
func (c *conduction) Add(d *element.Declaration) []element.Path {
	l, path, m := linkOf(d), int32(len(c.laws)), d.Values["material"].Material
	c.again(conductionLaw(d))
	g := d.Number("value")
	shape := d.Number("area") / d.Number("length")
	switch {
	case d.Has("value"):
	case m == nil:
		g = shape * d.Number("conductivity")
	case m.Conductivity.IsConstant():
		g = shape * m.Conductivity.Y[0]
	default:
		c.varying = append(c.varying, varyingPath{l, path, d.Number("factor") * shape, m.Conductivity, m, beyond(m)})
		return l.path(false)
	}
	c.fixed = append(c.fixed, fixedPath{l, path, d.Number("factor") * g})
	return l.path(true)
}

// Flows writes the flows.
func (c *conduction) Flows(q []float64, s *element.State) {
	for i := range c.fixed {
		p := &c.fixed[i]
		q[p.path] = p.g * (s.T[p.a] - s.T[p.b])
	}
	for i := range c.varying {
		p := &c.varying[i]
		q[p.path] = p.shape * (p.k.Integral(s.T[p.a]) - p.k.Integral(s.T[p.b]))
	}
}

// Slopes writes the slopes; nothing depends on a signal.
func (c *conduction) Slopes(dep, rate []float64, s *element.State) {
	clear(rate)
	for i := range c.fixed {
		p := &c.fixed[i]
		dep[2*p.path], dep[2*p.path+1] = p.g, -p.g
	}
	for i := range c.varying {
		p := &c.varying[i]
		dep[2*p.path] = p.shape * p.k.At(s.T[p.a])
		dep[2*p.path+1] = -p.shape * p.k.At(s.T[p.b])
	}
}

// Range reports paths with an end outside the range that the source of their material covers.
func (c *conduction) Range(s *element.State, report func(path int, text string)) {
	for i := range c.varying {
		p := &c.varying[i]
		ta, tb := s.T[p.a], s.T[p.b]
		if min(ta, tb) < p.of.Low || max(ta, tb) > p.of.High {
			report(int(p.path), p.text)
		}
	}
}

// beyond words the fault of leaving a material's range.
func beyond(m *element.Material) string {
	return fmt.Sprintf("a temperature is outside the range of %s, %s to %s", m.Name,
		unit.Temperature.Format(m.Low, 4), unit.Temperature.Format(m.High, 4))
}

// conductionLaw returns the law of one path.
func conductionLaw(d *element.Declaration) func(s *element.State) float64 {
	a, b := d.Between("between")
	scale, value, area, length := d.Number("factor"), d.Number("value"), d.Number("area"), d.Number("length")
	if d.Has("value") {
		return func(s *element.State) float64 { return scale * value * (s.T[a] - s.T[b]) }
	}
	if m := d.Values["material"].Material; m != nil {
		return func(s *element.State) float64 {
			return scale * conducted(m.Conductivity, s.T[a], s.T[b]) * area / length
		}
	}
	k := d.Number("conductivity")
	return func(s *element.State) float64 { return scale * (k * area * (s.T[a] - s.T[b]) / length) }
}

// conducted returns the integral of k from temperature cold to hot, piece by piece from its middle; it is
// negative when cold is above hot.
func conducted(k *element.Curve, hot, cold float64) float64 {
	if hot < cold {
		return -conducted(k, cold, hot)
	}
	x, y, last := k.X, k.Y, len(k.X)-1
	sum := y[0]*max(0, min(hot, x[0])-cold) + y[last]*max(0, hot-max(cold, x[last]))
	for i := range last {
		from, to := max(cold, x[i]), min(hot, x[i+1])
		if from < to {
			w := ((from+to)/2 - x[i]) / (x[i+1] - x[i])
			sum += (to - from) * ((1-w)*y[i] + w*y[i+1])
		}
	}
	return sum
}
