package library_test

import (
	"math"
	"math/rand/v2"
	"slices"
	"strings"
	"testing"

	"workheat/library"
	"workheat/network/element"
	"workheat/network/unit"
)

// states are random states, with the vehicle and the wind also at rest and creeping.
func states(n int) []*element.State {
	r := rand.New(rand.NewPCG(7, 11))
	list := make([]*element.State, n)
	for i := range list {
		s := &element.State{T: make([]float64, nodes), Signal: make([]float64, signals), Rate: make([]float64, signals)}
		for j := range s.T {
			s.T[j] = 240 + 700*r.Float64()
		}
		v, w := 60*r.Float64(), 30*r.Float64()
		switch i % 8 {
		case 5:
			v, w = 0, 0
		case 6:
			v, w = 1e-3*r.Float64(), 1e-3*r.Float64()
		case 7:
			v, w = 2*r.Float64(), 0.1*r.Float64()
		}
		s.Signal[speed], s.Signal[brakes], s.Signal[heating], s.Signal[wind] = v, 1e5*r.Float64(), 5e3*(r.Float64()-0.5), w
		for j := range s.Rate {
			s.Rate[j] = (r.Float64() - 0.5) * (1 + s.Signal[j])
		}
		list[i] = s
	}
	return list
}

// shifted returns a copy of a state with node j warmer by dT (none if j < 0) and later by dt.
func shifted(s *element.State, j int, dT, dt float64) *element.State {
	c := &element.State{T: append([]float64(nil), s.T...), Signal: append([]float64(nil), s.Signal...), Rate: s.Rate}
	if j >= 0 {
		c.T[j] += dT
	}
	for i := range c.Signal {
		c.Signal[i] += dt * c.Rate[i]
	}
	return c
}

func flows(l loaded, s *element.State) []float64 {
	q := make([]float64, len(l.paths))
	l.Flows(q, s)
	return q
}

// slopes returns the slopes, having filled both slices with rubbish first.
func slopes(l loaded, s *element.State) (dep, rate []float64) {
	dep, rate = make([]float64, len(l.paths)*l.deps), make([]float64, len(l.paths))
	for i := range dep {
		dep[i] = math.NaN()
	}
	for i := range rate {
		rate[i] = math.NaN()
	}
	l.Slopes(dep, rate, s)
	return dep, rate
}

// Slopes by temperature agree with central differences of the flows. The step of 5 mK leaves an error of
// about 1e-9 of the slope by curvature and 1e-10 by rounding.
func TestSlopesByTemperature(t *testing.T) {
	const step, tol = 5e-3, 1e-6
	eachBatch(t, func(t *testing.T, l loaded) {
		for _, s := range states(200) {
			dep, _ := slopes(l, s)
			for p, path := range l.paths {
				if len(path.Deps) != l.deps {
					t.Fatalf("path %d has %d dependencies, the first has %d", p, len(path.Deps), l.deps)
				}
				for i, j := range path.Deps {
					want := (flows(l, shifted(s, j, step, 0))[p] - flows(l, shifted(s, j, -step, 0))[p]) / (2 * step)
					scale := math.Abs(want) + math.Abs(flows(l, s)[p])/s.T[j]
					if got := dep[p*l.deps+i]; !(math.Abs(got-want) <= tol*scale) {
						t.Errorf("path %d by node %d at T %v, speed %g: slope %g, by differences %g", p, j, s.T, s.Signal[speed], got, want)
					}
				}
			}
		}
	})
}

// A flow depends on nothing but its dependencies.
func TestFlowsDependOnTheirDepsAlone(t *testing.T) {
	eachBatch(t, func(t *testing.T, l loaded) {
		for _, s := range states(20) {
			q := flows(l, s)
			for j := range s.T {
				moved := flows(l, shifted(s, j, 10, 0))
				for p, path := range l.paths {
					depends := false
					for _, d := range path.Deps {
						depends = depends || d == j
					}
					if !depends && moved[p] != q[p] {
						t.Errorf("path %d changes with node %d, which is not among %v", p, j, path.Deps)
					}
				}
			}
		}
	})
}

// Rates by time through the signals agree with central differences, save for what rounding leaves of them.
// At rest, where a power of speed has no slope on both sides, they are zero.
func TestRatesByTime(t *testing.T) {
	eachBatch(t, func(t *testing.T, l loaded) {
		for _, s := range states(200) {
			_, rate := slopes(l, s)
			step := 1e-5
			if s.Signal[wind] < 0.01 {
				step = 1e-9 // the laws bend within a creep of 1e-3 m/s
			}
			q, late, early := flows(l, s), flows(l, shifted(s, -1, 0, step)), flows(l, shifted(s, -1, 0, -step))
			for p := range l.paths {
				want := (late[p] - early[p]) / (2 * step)
				if l.Section == element.Conductances && s.Signal[speed] == 0 {
					want = 0
				}
				if tol := 1e-6*math.Abs(want) + 1e-15*math.Abs(q[p])/step; !(math.Abs(rate[p]-want) <= tol) {
					t.Errorf("path %d at signals %v, rates %v: %g, by differences %g", p, s.Signal, s.Rate, rate[p], want)
				}
			}
		}
	})
}

// The recount gives the flows again; the two differ by rounding only.
func TestRecountAgreesWithFlows(t *testing.T) {
	eachBatch(t, func(t *testing.T, l loaded) {
		for _, s := range states(300) {
			q := flows(l, s)
			dep, _ := slopes(l, s)
			for p, path := range l.paths {
				scale := math.Abs(q[p])
				for i, j := range path.Deps {
					scale += math.Abs(dep[p*l.deps+i]) * s.T[j]
				}
				if got := l.Recount(p, s); !(math.Abs(got-q[p]) <= 1e-13*scale) {
					t.Errorf("path %d at T %v, signals %v: recount %.17g, flow %.17g", p, s.T, s.Signal, got, q[p])
				}
			}
		}
	})
}

// The same state gives the same bits, whatever was asked in between.
func TestFlowsRepeat(t *testing.T) {
	eachBatch(t, func(t *testing.T, l loaded) {
		list := states(40)
		first := make([][]float64, len(list))
		for i, s := range list {
			first[i] = flows(l, s)
		}
		for i := len(list) - 1; i >= 0; i-- {
			slopes(l, list[(i*7)%len(list)])
			for p, q := range flows(l, list[i]) {
				if q != first[i][p] {
					t.Errorf("path %d: first %g, then %g", p, first[i][p], q)
				}
			}
		}
	})
}

func TestInnerLoopDoesNotAllocate(t *testing.T) {
	eachBatch(t, func(t *testing.T, l loaded) {
		list := states(16)
		q, dep, rate := make([]float64, len(l.paths)), make([]float64, len(l.paths)*l.deps), make([]float64, len(l.paths))
		if n := testing.AllocsPerRun(10, func() {
			for _, s := range list {
				l.Flows(q, s)
				l.Slopes(dep, rate, s)
			}
		}); n != 0 {
			t.Errorf("%g allocations", n)
		}
	})
}

// The recount runs at every audited point of a run.
func TestRecountDoesNotAllocate(t *testing.T) {
	eachBatch(t, func(t *testing.T, l loaded) {
		list := states(16)
		if n := testing.AllocsPerRun(10, func() {
			for _, s := range list {
				for p := range l.paths {
					l.Recount(p, s)
				}
			}
		}); n != 0 {
			t.Errorf("%g allocations", n)
		}
	})
}

// A conductance carries the same heat the other way when its ends are swapped, and none between equal
// temperatures.
func TestConductancesTurnRound(t *testing.T) {
	c := library.Catalogue()
	for _, s := range samples {
		if s.section != element.Conductances {
			continue
		}
		turned := s
		turned.nodes = []int{s.nodes[1], s.nodes[0]}
		k, d, _ := declare(t, c, s)
		_, e, _ := declare(t, c, turned)
		there, back := k.Batch(), k.Batch()
		there.Add(d)
		back.Add(e)
		q, r := make([]float64, 1), make([]float64, 1)
		for _, at := range states(50) {
			there.Flows(q, at)
			back.Flows(r, at)
			a, b := at.T[s.nodes[0]], at.T[s.nodes[1]]
			if math.Abs(q[0]+r[0]) > 1e-14*math.Abs(q[0]) {
				t.Errorf("%s: %g one way, %g the other", s.kind, q[0], r[0])
			}
			if q[0]*(a-b) < 0 {
				t.Errorf("%s: %g W from %g K to %g K", s.kind, q[0], a, b)
			}
			at.T[s.nodes[1]] = a
			if there.Flows(q, at); q[0] != 0 {
				t.Errorf("%s: %g W between equal temperatures", s.kind, q[0])
			}
		}
	}
}

// A path says that it is balanced if and only if its slopes are equal and opposite at every state.
func TestBalancedPaths(t *testing.T) {
	eachBatch(t, func(t *testing.T, l loaded) {
		for p, path := range l.paths {
			if l.deps != 2 {
				if path.Balanced {
					t.Errorf("path %d has %d dependencies and cannot be balanced", p, l.deps)
				}
				continue
			}
			balanced := path.Deps[0] == path.A && path.Deps[1] == path.B
			for _, s := range states(50) {
				dep, _ := slopes(l, s)
				balanced = balanced && dep[2*p] == -dep[2*p+1]
			}
			if balanced != path.Balanced {
				t.Errorf("path %d: balanced is %t, its slopes say %t", p, path.Balanced, balanced)
			}
		}
	})
}

func TestDissipatorsGiveAllTheirWork(t *testing.T) {
	c := library.Catalogue()
	for _, s := range samples {
		if s.section != element.Dissipators {
			continue
		}
		k, d, _ := declare(t, c, s)
		b := k.Batch()
		paths := b.Add(d)
		q := make([]float64, len(paths))
		for _, at := range states(20) {
			b.Flows(q, at)
			heat := 0.0
			for i, p := range paths[1:] {
				if p.A != element.Outside || p.B != s.nodes[i] {
					t.Errorf("%s: heat goes from %d to %d, want from outside to %d", s.kind, p.A, p.B, s.nodes[i])
				}
				heat += q[i+1]
			}
			if paths[0].Name != "work" || paths[0].A != element.Outside || paths[0].B != element.Outside {
				t.Errorf("%s: the first path is not the meter of its work", s.kind)
			}
			if want := d.Number("part of braking") * at.Signal[brakes]; math.Abs(q[0]-want) > 1e-15*want || math.Abs(heat-q[0]) > 1e-15*want {
				t.Errorf("%s: work %g, heat %g, want %g", s.kind, q[0], heat, want)
			}
		}
	}
}

func TestKindsAreDocumented(t *testing.T) {
	seen := map[string]bool{}
	for _, k := range library.Catalogue().Kinds {
		id := string(k.Section) + "/" + k.Name
		if seen[id] {
			t.Errorf("%s stands twice in the catalogue", id)
		}
		seen[id] = true
		if !slices.Contains(element.Sections, k.Section) || k.Name == "" || !strings.HasSuffix(k.About, ".") || k.Formula == "" || k.Source == "" {
			t.Errorf("%s: a part of its description is missing", id)
		}
		if body := k.Section == element.Bodies; body != (k.Batch == nil) || body != (k.Vehicle != nil) {
			t.Errorf("%s: a body makes a vehicle, all else a batch", id)
		}
		keys := map[string]bool{"kind": true, "about": true}
		for _, f := range k.Fields {
			if keys[f.Key] || f.Key != strings.ToLower(f.Key) || f.About == "" {
				t.Errorf("%s: field %q is double, reserved, not in small letters or without description", id, f.Key)
			}
			keys[f.Key] = true
			checkField(t, id, f)
		}
	}
}

// checkField looks at the want, the range and the default of a field.
func checkField(t *testing.T, id string, f element.Field) {
	valued := f.Type == element.Quantity || f.Type == element.Number || f.Type == element.Signal
	switch {
	case valued != (f.Want.Name != ""):
		t.Errorf("%s: %s has the want %q", id, f.Key, f.Want.Name)
	case f.Type == element.Number && f.Want != unit.Number:
		t.Errorf("%s: %s is a number with a unit", id, f.Key)
	case f.Type == element.Quantity && f.Want.Unit == "":
		t.Errorf("%s: %s is a quantity without unit", id, f.Key)
	case f.Type != element.Signal && valued && !f.Bounded:
		t.Errorf("%s: %s has no range", id, f.Key)
	case f.Required && f.Default != "":
		t.Errorf("%s: %s is required and has a default", id, f.Key)
	}
	if f.Default == "" {
		return
	}
	x, fault := f.Want.Read(f.Default, nil)
	if fault != nil || x < f.Min || x > f.Max || f.Open && x == f.Min {
		t.Errorf("%s: the default %q of %s is not in its range: %v", id, f.Default, f.Key, fault)
	}
}
