package assembly_test

import (
	"math"
	"testing"

	"workheat/network/assembly"
	"workheat/network/element"
)

// A law is a kind of these tests: paths whose flow is a function of the state, with its slopes.
type law struct {
	ends     [][2]int
	deps     [][]int
	balanced bool
	flow     func(path int, s *element.State) float64
	slopes   func(path int, s *element.State, dep []float64) (rate float64)
}

func (l *law) Add(*element.Declaration) []element.Path {
	var list []element.Path
	for i, e := range l.ends {
		list = append(list, element.Path{A: e[0], B: e[1], Deps: l.deps[i], Balanced: l.balanced})
	}
	return list
}

func (l *law) Flows(q []float64, s *element.State) {
	for i := range q {
		q[i] = l.flow(i, s)
	}
}

func (l *law) Slopes(dep, rate []float64, s *element.State) {
	n := len(l.deps[0])
	for i := range rate {
		rate[i] = l.slopes(i, s, dep[i*n:(i+1)*n])
	}
}

func (l *law) Recount(path int, s *element.State) float64 { return l.flow(path, s) }

// group makes a group of one element of the law.
func (l *law) group() element.Group {
	return element.Group{Kind: &element.Kind{Batch: func() element.Batch { return l }}, Elements: []*element.Declaration{{Name: "e"}}}
}

// drive gives signal 0 = 300 + 2 t, a held temperature, and signal 1 = 50 - 3 t, a power.
type drive struct{}

func (drive) At(t float64, value, rate []float64) {
	value[0], rate[0] = 300+2*t, 2
	value[1], rate[1] = 50-3*t, -3
}

// bent is a capacity with breaks of slope and a jump.
var bent = element.MustCurve([]float64{280, 320, 400, 400, 450, 600}, []float64{200, 260, 260, 900, 300, 350})

// nodes: two that store (one by a table), one without mass, one that stores and stands alone, one held.
func nodes() []element.Node {
	return []element.Node{
		{Name: "a", Capacity: element.Constant(500), Start: 310},
		{Name: "b", Capacity: bent, Start: 330},
		{Name: "c", Form: element.Massless, Start: 340},
		{Name: "d", Capacity: element.Constant(80), Start: 350},
		{Name: "air", Form: element.Held, Signal: 0},
	}
}

// laws: squares of temperatures between two nodes, a flow that hangs on a third temperature, a balanced
// conductance that the power signal strengthens, and a source.
func laws() []*law {
	return []*law{
		{
			ends: [][2]int{{0, 1}, {1, 4}, {2, 0}}, deps: [][]int{{0, 1}, {1, 4}, {2, 0}},
			flow: func(p int, s *element.State) float64 {
				i := [][2]int{{0, 1}, {1, 4}, {2, 0}}[p]
				return 0.01 * float64(p+1) * (s.T[i[0]]*s.T[i[0]] - s.T[i[1]]*s.T[i[1]])
			},
			slopes: func(p int, s *element.State, dep []float64) float64 {
				i := [][2]int{{0, 1}, {1, 4}, {2, 0}}[p]
				dep[0], dep[1] = 0.02*float64(p+1)*s.T[i[0]], -0.02*float64(p+1)*s.T[i[1]]
				return 0
			},
		},
		{
			ends: [][2]int{{1, 2}}, deps: [][]int{{1, 2, 0}},
			flow: func(_ int, s *element.State) float64 { return 0.003 * s.T[0] * (s.T[1] - s.T[2]) },
			slopes: func(_ int, s *element.State, dep []float64) float64 {
				dep[0], dep[1], dep[2] = 0.003*s.T[0], -0.003*s.T[0], 0.003*(s.T[1]-s.T[2])
				return 0
			},
		},
		{
			ends: [][2]int{{2, 4}}, deps: [][]int{{2, 4}}, balanced: true,
			flow: func(_ int, s *element.State) float64 { return s.Signal[1] * (s.T[2] - s.T[4]) },
			slopes: func(_ int, s *element.State, dep []float64) float64 {
				dep[0], dep[1] = s.Signal[1], -s.Signal[1]
				return s.Rate[1] * (s.T[2] - s.T[4])
			},
		},
		{
			ends: [][2]int{{element.Outside, 3}, {element.Outside, element.Outside}}, deps: [][]int{{}, {}},
			flow:   func(p int, s *element.State) float64 { return float64(p+1) * s.Signal[1] },
			slopes: func(p int, s *element.State, _ []float64) float64 { return float64(p+1) * s.Rate[1] },
		},
	}
}

func system() *assembly.System {
	var groups []element.Group
	for _, l := range laws() {
		groups = append(groups, l.group())
	}
	return assembly.New(nodes(), groups, 2, drive{})
}

// state returns energies that stand for temperatures about 360 K, with the massless node at 345.
func state(s *assembly.System) []float64 {
	return []float64{s.Energy(0, 361), s.Energy(1, 372), 345, s.Energy(3, 358)}
}

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.15g, want %.15g", what, got, want)
	}
}

// Balances are the flows into a node less those out of it, by the state's temperatures.
func TestRates(t *testing.T) {
	s := system()
	f, q := make([]float64, 4), make([]float64, len(s.Paths))
	s.Rates(f, q, 5, state(s))
	ta, tb, tc, air, power := 361.0, 372.0, 345.0, 310.0, 35.0
	want := []float64{
		0.01 * (ta*ta - tb*tb), 0.02 * (tb*tb - air*air), 0.03 * (tc*tc - ta*ta), 0.003 * ta * (tb - tc), power * (tc - air), power, 2 * power}
	for p, w := range want {
		near(t, "flow", q[p], w, 1e-9)
		st := s.State(5, state(s), nil)
		near(t, "recount", s.Recount(p, st), w, 1e-9)
	}
	near(t, "balance of a", f[0], -want[0]+want[2], 1e-9)
	near(t, "balance of b", f[1], want[0]-want[1]-want[3], 1e-9)
	near(t, "balance of c", f[2], -want[2]+want[3]-want[4], 1e-9)
	near(t, "balance of d", f[3], want[5], 1e-9)
}

// The Jacobian A·D⁻¹ is that of the balances by the state, and ft their slope by time, held node included.
func TestJacobianAgainstDifferences(t *testing.T) {
	s := system()
	n, y, q := 4, state(s), make([]float64, len(s.Paths))
	p := s.Pattern()
	a, d, ft := make([]float64, p.NNZ()), make([]float64, n), make([]float64, n)
	f := make([]float64, n)
	s.Rates(f, q, 5, y)
	s.Jacobian(a, d, ft, 5, y)
	up, down := make([]float64, n), make([]float64, n)
	for j := range n {
		const dT = 1e-3
		z := append([]float64(nil), y...)
		z[j] = y[j] + dT*d[j]
		s.Rates(up, q, 5, z)
		z[j] = y[j] - dT*d[j]
		s.Rates(down, q, 5, z)
		for i := range n {
			want, got := (up[i]-down[i])/(2*dT), 0.0
			if slot := p.Slot(i, j); slot >= 0 {
				got = a[slot]
			}
			near(t, s.Nodes[i].Name+" by "+s.Nodes[j].Name, got, want, 1e-4)
		}
	}
	s.Rates(up, q, 5+1e-4, y)
	s.Rates(down, q, 5-1e-4, y)
	for i := range n {
		near(t, s.Nodes[i].Name+" by time", ft[i], (up[i]-down[i])/2e-4, 1e-5)
	}
	near(t, "capacity of b", d[1], bent.At(372), 1e-9)
	near(t, "scale of c", d[2], 1, 0)
}

// AddSlopes adds the slopes of all flows along a change of the temperatures, and their rates.
func TestAddSlopesAgainstDifferences(t *testing.T) {
	s := system()
	n, y, paths := 4, state(s), len(s.Paths)
	q := make([]float64, paths)
	a, d, ft, f := make([]float64, s.Pattern().NNZ()), make([]float64, n), make([]float64, n), make([]float64, n)
	s.Rates(f, q, 5, y)
	s.Jacobian(a, d, ft, 5, y)
	v, dq := []float64{0.7, -1.1, 0.4, 2}, make([]float64, paths)
	for i := range dq {
		dq[i] = float64(i)
	}
	s.AddSlopes(dq, 3, v, 0.5)
	along := func(e float64) []float64 {
		z := append([]float64(nil), y...)
		for i := range z {
			z[i] += e * d[i] * v[i]
		}
		q := make([]float64, paths)
		s.Rates(f, q, 5, z)
		return q
	}
	up, down := along(1e-3), along(-1e-3)
	later, sooner := make([]float64, paths), make([]float64, paths)
	s.Rates(f, later, 5+1e-4, y)
	s.Rates(f, sooner, 5-1e-4, y)
	for i := range dq {
		want := float64(i) + 3*(up[i]-down[i])/2e-3 + 0.5*(later[i]-sooner[i])/2e-4
		near(t, "path", dq[i], want, 1e-3)
	}
	dep, rate := s.PathSlopes(5, y)
	for p := range dep {
		sum := 0.0
		for j, i := range s.Paths[p].Deps {
			if i < n {
				sum += dep[p][j] * v[i]
			}
		}
		near(t, "path slopes", float64(p)+3*sum+0.5*rate[p], dq[p], 1e-9)
	}
}

// The pattern holds every pair of nodes with a state that some flow couples, and no others; nodes without
// mass have a zero on the diagonal of the mass.
func TestPattern(t *testing.T) {
	s := system()
	p := s.Problem()
	want := map[[2]int]bool{{0, 1}: true, {0, 2}: true, {1, 2}: true}
	for i := range 4 {
		for j := range 4 {
			coupled := i == j || want[[2]int{min(i, j), max(i, j)}]
			if got := p.Pattern.Slot(i, j) >= 0; got != coupled {
				t.Errorf("place (%d, %d): in the pattern %t, want %t", i, j, got, coupled)
			}
		}
	}
	if p.N != 4 || p.NQ != 7 || p.Symmetric {
		t.Errorf("N %d, NQ %d, symmetric %t; want 4, 7, false", p.N, p.NQ, p.Symmetric)
	}
	for i, m := range []float64{1, 1, 0, 1} {
		if p.Mass[i] != m {
			t.Errorf("mass of %s: %g, want %g", p.Name(i), p.Mass[i], m)
		}
	}
}

// Only balanced paths, or such as reach one state alone, keep the matrix symmetric.
func TestSymmetry(t *testing.T) {
	link := func(balanced bool, ends [2]int, deps []int) bool {
		l := laws()[2]
		l.ends, l.deps, l.balanced = [][2]int{ends}, [][]int{deps}, balanced
		return assembly.New(nodes(), []element.Group{l.group()}, 2, drive{}).Problem().Symmetric
	}
	for _, c := range []struct {
		name     string
		balanced bool
		ends     [2]int
		deps     []int
		want     bool
	}{
		{"balanced", true, [2]int{0, 1}, []int{0, 1}, true},
		{"unbalanced", false, [2]int{0, 1}, []int{0, 1}, false},
		{"unbalanced to a held node", false, [2]int{0, 4}, []int{0, 4}, true},
		{"to a held node, by a third", false, [2]int{0, 4}, []int{1, 4}, false},
		{"from outside, by itself", false, [2]int{element.Outside, 1}, []int{1, 4}, true},
	} {
		if got := link(c.balanced, c.ends, c.deps); got != c.want {
			t.Errorf("%s: symmetric %t, want %t", c.name, got, c.want)
		}
	}
}

// Held nodes in front of others are our own mistake.
func TestHeldNodesComeLast(t *testing.T) {
	defer func() {
		if recover() == nil {
			t.Error("no panic")
		}
	}()
	list := nodes()
	list[0], list[4] = list[4], list[0]
	assembly.New(list, nil, 2, drive{})
}
