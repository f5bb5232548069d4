package library_test

import (
	"math"
	"testing"

	"workheat/library"
	"workheat/network/assembly"
	"workheat/network/element"
)

// Three unlike kinds meet the contract in one network: a wall whose conductivity varies, a rubbing interface
// without heat capacity, and a stream that carries heat one way and is made here for the test.

// stream returns the kind of a stream whose flow depends on the temperature upstream alone.
func stream() *element.Kind {
	return &element.Kind{Section: element.Conductances, Name: "stream", Batch: func() element.Batch { return new(streams) }}
}

type streams struct {
	up []int
	g  []float64 // W/K, mass flow times specific heat
}

func (b *streams) Add(d *element.Declaration) []element.Path {
	up, down := d.Between("between")
	b.up, b.g = append(b.up, up), append(b.g, d.Number("value"))
	return []element.Path{{A: up, B: down, Deps: []int{up}}}
}

func (b *streams) Flows(q []float64, s *element.State) {
	for i, g := range b.g {
		q[i] = g * s.T[b.up[i]]
	}
}

func (b *streams) Slopes(dep, rate []float64, s *element.State) {
	copy(dep, b.g)
	clear(rate)
}

func (b *streams) Recount(path int, s *element.State) float64 { return s.T[b.up[path]] * b.g[path] }

// The nodes of the network: a contact face without capacity, two layers of disc, a pad, oil, and the air.
const (
	face, skin, core, lining, oil, ambient, sump = 0, 1, 2, 3, 4, 5, 6
)

// drive moves the signals of the tests along straight lines; the last two hold the temperatures of the air and
// the sump.
type drive struct{}

func (drive) At(t float64, value, rate []float64) {
	start := []float64{30, 6e4, 100, 5, 293, 330}
	slope := []float64{-3, -6e3, 7, 0.2, 0.5, 0}
	for i := range value {
		value[i], rate[i] = start[i]+slope[i]*t, slope[i]
	}
}

// network assembles a list of samples on the test's nodes.
func network(t *testing.T, elements []sample) *assembly.System {
	c := library.Catalogue()
	c.Kinds = append(c.Kinds, stream())
	iron := c.Material("grey iron").Capacity
	list := []element.Node{
		{Name: "face", Form: element.Massless, Start: 400},
		{Name: "skin", Capacity: iron.Scaled(0.4), Start: 300},
		{Name: "core", Capacity: iron.Scaled(6), Start: 300},
		{Name: "lining", Capacity: element.Constant(700), Start: 300},
		{Name: "oil", Capacity: element.Constant(1500), Start: 310},
		{Name: "ambient", Form: element.Held, Signal: signals},
		{Name: "sump", Form: element.Held, Signal: signals + 1},
	}
	groups := map[*element.Kind]*element.Group{}
	for _, s := range elements {
		var d *element.Declaration
		k := c.Find(s.section, s.kind)
		if s.kind == "stream" {
			d = &element.Declaration{Values: map[string]element.Value{"between": {Nodes: s.nodes}, "value": {Number: 40}}}
		} else {
			_, d, _ = declare(t, c, s)
		}
		if groups[k] == nil {
			groups[k] = &element.Group{Kind: k}
		}
		groups[k].Elements = append(groups[k].Elements, d)
	}
	var ordered []element.Group
	for _, k := range c.Kinds {
		if groups[k] != nil {
			ordered = append(ordered, *groups[k])
		}
	}
	return assembly.New(list, ordered, signals+2, drive{})
}

// The elements of the network, by what they do to the symmetry of its matrix.
var (
	constantWall = sample{element.Conductances, "conduction", map[string]string{"value": "310 W/K"}, []int{face, skin}, nil}
	ironWall     = sample{element.Conductances, "conduction", map[string]string{"area": "0.05 m^2", "length": "10 mm", "material": "grey iron"}, []int{skin, core}, nil}
	toLining     = sample{element.Conductances, "contact", map[string]string{"coefficient": "900 W/(m^2 K)", "area": "0.01 m^2"}, []int{face, lining}, nil}
	toAir        = sample{element.Conductances, "vehicle-rotor convection", map[string]string{"diameter": "280 mm", "area": "0.1 m^2", "speed of": "van"}, []int{core, ambient}, nil}
	glow         = sample{element.Conductances, "radiation", map[string]string{"emissivity": "0.6", "area": "0.1 m^2"}, []int{ambient, core}, nil}
	glowInside   = sample{element.Conductances, "radiation", map[string]string{"emissivity": "0.6", "area": "0.1 m^2"}, []int{core, lining}, nil}
	rubbing      = sample{element.Dissipators, "friction pad", map[string]string{"slows": "van", "part of braking": "0.3"}, []int{face, lining}, []float64{0.9, 0.1}}
	heater       = sample{element.Sources, "given heat", map[string]string{"power": "heating"}, []int{oil}, []float64{1}}
	wetted       = sample{element.Conductances, "contact", map[string]string{"coefficient": "500 W/(m^2 K)", "area": "0.03 m^2"}, []int{lining, oil}, nil}
	inflow       = sample{element.Conductances, "stream", nil, []int{sump, oil}, nil}
	outflow      = sample{element.Conductances, "stream", nil, []int{oil, sump}, nil}
	between      = sample{element.Conductances, "stream", nil, []int{oil, lining}, nil}
)

// point is where the tests look: a time and a state away from every corner of a table.
func point(s *assembly.System) (at float64, y []float64) {
	y = make([]float64, s.States())
	for i, t := range []float64{520, 455, 431, 390, 347}[:s.States()] {
		y[i] = s.Energy(i, t)
	}
	return 1.5, y
}

// matrix returns the slopes of the balances as a full matrix, with the capacities and the slopes by time.
func matrix(s *assembly.System) (full [][]float64, d, ft []float64) {
	n := s.States()
	at, y := point(s)
	pattern := s.Pattern()
	a := make([]float64, pattern.NNZ())
	d, ft = make([]float64, n), make([]float64, n)
	s.Rates(make([]float64, n), make([]float64, len(s.Paths)), at, y)
	s.Jacobian(a, d, ft, at, y)
	for i := range n {
		full = append(full, make([]float64, n))
		for _, j := range pattern.Row(i) {
			full[i][j] = a[pattern.Slot(i, int(j))]
		}
	}
	return full, d, ft
}

var all = []sample{constantWall, ironWall, toLining, toAir, glow, glowInside, rubbing, heater, wetted, inflow, outflow, between}

// The assembled slopes agree with central differences of the assembled balances, by state and by time.
func TestAssembledSlopes(t *testing.T) {
	s := network(t, all)
	n := s.States()
	full, d, ft := matrix(s)
	at, y := point(s)
	rates := func(at float64, y []float64) (f, q []float64) {
		f, q = make([]float64, n), make([]float64, len(s.Paths))
		s.Rates(f, q, at, y)
		return f, q
	}
	const step = 1e-2 // K
	for j := range n {
		low, high := append([]float64(nil), y...), append([]float64(nil), y...)
		low[j] -= step * d[j]
		high[j] += step * d[j]
		f0, q0 := rates(at, low)
		f1, q1 := rates(at, high)
		for i := range n {
			near(t, "slope of "+s.Nodes[i].Name+" by "+s.Nodes[j].Name, full[i][j], (f1[i]-f0[i])/(2*step), 2e-5*(1+math.Abs(full[i][j])))
		}
		v, dq := make([]float64, n), make([]float64, len(s.Paths))
		v[j] = 1
		s.AddSlopes(dq, 1, v, 0)
		for p := range dq {
			near(t, "slope of flow by "+s.Nodes[j].Name, dq[p], (q1[p]-q0[p])/(2*step), 2e-5*(1+math.Abs(dq[p])))
		}
	}
	const tick = 1e-4 // s
	f0, q0 := rates(at-tick, y)
	f1, q1 := rates(at+tick, y)
	dq := make([]float64, len(s.Paths))
	s.AddSlopes(dq, 0, make([]float64, n), 1)
	for i := range n {
		near(t, "rate of "+s.Nodes[i].Name, ft[i], (f1[i]-f0[i])/(2*tick), 1e-6*(1+math.Abs(ft[i])))
	}
	for p := range dq {
		near(t, "rate of flow", dq[p], (q1[p]-q0[p])/(2*tick), 1e-6*(1+math.Abs(dq[p])))
	}
}

// What the balances gain is what comes in from outside and through the held nodes; the meter of the work adds
// nothing, and the recount finds every flow again.
func TestAssembledBalance(t *testing.T) {
	s := network(t, all)
	at, y := point(s)
	f, q := make([]float64, s.States()), make([]float64, len(s.Paths))
	s.Rates(f, q, at, y)
	state := s.State(at, y, nil)
	gain, in, through := 0.0, 0.0, 0.0
	for _, x := range f {
		gain += x
	}
	inside := func(i int) bool { return i != element.Outside && i < s.States() }
	for p, path := range s.Paths {
		if inside(path.B) && !inside(path.A) {
			in += q[p]
		}
		if inside(path.A) && !inside(path.B) {
			in -= q[p]
		}
		through += math.Abs(q[p])
		near(t, path.Element, s.Recount(p, state), q[p], 1e-11*math.Abs(q[p]))
	}
	near(t, "gain", gain, in, 1e-14*through)
	value := make([]float64, signals+2)
	drive{}.At(at, value, make([]float64, signals+2))
	work := 0.0
	for p, path := range s.Paths {
		if path.Element == "friction pad" && path.Name == "" {
			work += q[p]
		}
	}
	near(t, "heat of rubbing", work, 0.3*value[brakes], 1e-9)
}

// The matrix is said to be symmetric when and only when the elements make it so.
func TestAssembledSymmetry(t *testing.T) {
	linear := []sample{constantWall, toLining, wetted, rubbing, heater,
		{element.Conductances, "conduction", map[string]string{"value": "900 W/K"}, []int{skin, core}, nil}}
	cases := []struct {
		name string
		more []sample
		want bool
	}{
		{"constant conductances and sources", nil, true},
		{"to held air by film temperature and radiation", []sample{toAir, glow}, true},
		{"inflow from and outflow to a held node", []sample{inflow, outflow}, true},
		{"conductivity that varies between two states", []sample{ironWall}, false},
		{"radiation between two states", []sample{glowInside}, false},
		{"stream between two states", []sample{between}, false},
		{"all", all, false},
	}
	for _, k := range cases {
		s := network(t, append(append([]sample(nil), linear...), k.more...))
		full, _, _ := matrix(s)
		odd := 0.0
		for i := range full {
			for j := range i {
				odd = max(odd, math.Abs(full[i][j]-full[j][i]))
			}
		}
		if got := s.Problem().Symmetric; got != k.want || got != (odd == 0) {
			t.Errorf("%s: said to be symmetric: %t, want %t; entries differ by up to %g", k.name, got, k.want, odd)
		}
	}
}
