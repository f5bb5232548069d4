package sparse

import (
	"errors"
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"
)

// full writes K out, from the triangle the solver reads.
func full(p *Pattern, symmetric bool, a, shift []float64) *mat.Dense {
	k := mat.NewDense(p.N, p.N, nil)
	for i := range p.N {
		for _, c := range p.Row(i) {
			j := int(c)
			v := -a[p.Slot(i, j)]
			if symmetric && j < i {
				v = -a[p.Slot(j, i)]
			}
			if i == j {
				v += shift[i]
			}
			k.Set(i, j, v)
		}
	}
	return k
}

// distance returns the largest difference relative to the largest want.
func distance(got, want []float64) float64 {
	size, worst := 0.0, 0.0
	for i := range want {
		size = max(size, math.Abs(want[i]))
		if d := math.Abs(got[i] - want[i]); !(d <= worst) {
			worst = d
		}
	}
	if worst == 0 {
		return 0
	}
	return worst / size
}

// oracle solves with dense LU and row exchanges (gonum).
func oracle(t interface{ Fatal(...any) }, k *mat.Dense, b []float64) []float64 {
	var lu mat.LU
	lu.Factorize(k)
	x := mat.NewVecDense(len(b), nil)
	if err := lu.SolveVecTo(x, false, mat.NewVecDense(len(b), slices.Clone(b))); err != nil {
		t.Fatal("dense oracle:", err)
	}
	return x.RawVector().Data
}

func ramp(n int) []float64 {
	b := make([]float64, n)
	for i := range b {
		b[i] = 1 + math.Sin(float64(3*i))
	}
	return b
}

// forced makes a solver that tries only the given kernel.
func forced(v *Solver, k kernel) *Solver {
	v.prefer = k
	if k == smallKernel {
		v.small = newSmall(v.s)
	}
	return v
}

func TestEveryKernelAgreesWithDenseLU(t *testing.T) {
	networks := []struct {
		name string
		p    *Pattern
	}{
		{"one unknown", NewPattern(1, nil)}, {"two apart", NewPattern(2, nil)}, {"pair", chainOf(2)},
		{"chain of 3", chainOf(3)}, {"chain of 4", chainOf(4)}, {"chain of 12", chainOf(12)}, {"chain of 41", chainOf(41)},
		{"chains apart", NewPattern(9, [][2]int32{{8, 3}, {3, 5}, {0, 7}, {1, 2}, {2, 4}})},
		{"ring", NewPattern(4, [][2]int32{{0, 1}, {1, 2}, {2, 3}, {3, 0}})},
		{"hub", hub(5, 7)}, {"brake", brakeTwelve()}, {"brakes", brake(5)}, {"grid", grid(7, 9)},
	}
	for _, n := range networks {
		for _, symmetric := range []bool{true, false} {
			a, shift := conduction(n.p, 7, !symmetric)
			b := ramp(n.p.N)
			want := oracle(t, full(n.p, symmetric, a, shift), b)
			for _, k := range []kernel{chainKernel, smallKernel, generalKernel} {
				v := NewSolver(n.p, symmetric)
				if k == chainKernel && v.chain == nil {
					continue
				}
				got := make([]float64, n.p.N)
				v = forced(v, k)
				if err := v.Factor(a, shift); err != nil {
					t.Fatalf("%s, kernel %d: %v", n.name, k, err)
				}
				v.Solve(got, b)
				if d := distance(got, want); d > 1e-14 || v.active != k {
					t.Errorf("%s, symmetric %t, kernel %d (used %d): off by %g, want at most 1e-14", n.name, symmetric, k, v.active, d)
				}
			}
		}
	}
}

func TestSmallKernelEstimatesTheSameLoss(t *testing.T) {
	for _, symmetric := range []bool{true, false} {
		p := brake(5)
		a, shift := conduction(p, 8, !symmetric)
		for i := range shift {
			shift[i] *= 1e-6
		}
		v := NewSolver(p, symmetric)
		if err := v.Factor(a, shift); err != nil || v.active != smallKernel {
			t.Fatalf("kernel %d: %v", v.active, err)
		}
		v.factorGeneral(a, shift)
		for k, want := range v.f.loss {
			if got := v.small.err[k] * v.small.inv[k]; math.Abs(got-want) > 1e-6*want {
				t.Errorf("symmetric %t, place %d: %g roundings, want %g", symmetric, k, got, want)
			}
		}
	}
}

// randomNetwork draws a network of 1 to 60 nodes, connected or not, and about
// one node in four without capacity.
func randomNetwork(t *rapid.T, stream bool) (p *Pattern, a, shift []float64) {
	n := rapid.IntRange(1, 60).Draw(t, "n")
	links := rapid.IntRange(0, 3*n).Draw(t, "links")
	r := rand.New(rand.NewPCG(rapid.Uint64().Draw(t, "seed"), 2))
	pairs := make([][2]int32, links)
	for k := range pairs {
		pairs[k] = [2]int32{r.Int32N(int32(n)), r.Int32N(int32(n))}
	}
	p = NewPattern(n, pairs)
	a, shift = conduction(p, r.Uint64(), stream)
	for i := range shift {
		if r.IntN(4) == 0 && len(p.Row(i)) > 1 {
			shift[i] = 0
		}
	}
	return p, a, shift
}

func TestRandomNetworks(t *testing.T) {
	for _, symmetric := range []bool{true, false} {
		rapid.Check(t, func(t *rapid.T) {
			p, a, shift := randomNetwork(t, !symmetric)
			v := NewSolver(p, symmetric)
			k := full(p, symmetric, a, shift)
			err := v.Factor(a, shift)
			if condition := mat.Cond(k, 1); condition > 1e12 {
				if condition > 1e16 && err == nil {
					t.Fatalf("condition %g: no error", condition)
				}
				return // a part of the network floats
			}
			if err != nil {
				t.Fatal(err)
			}
			b := ramp(p.N)
			x := slices.Clone(b)
			v.Solve(x, x)
			if d := distance(x, oracle(t, k, b)); d > 1e-12*mat.Cond(k, 1) {
				t.Fatalf("off by %g", d)
			}
			if v.fallbacks != 0 {
				t.Fatal("a conduction network needs no row exchanges")
			}
		})
	}
}

func TestResidualsOnLargeNetworks(t *testing.T) {
	for _, c := range benchCases {
		p := c.pattern()
		for _, symmetric := range []bool{true, false} {
			a, shift := conduction(p, 3, !symmetric)
			for i := range shift { // massless but for every tenth node
				if i%10 != 0 {
					shift[i] = 0
				}
			}
			v := NewSolver(p, symmetric)
			if err := v.Factor(a, shift); err != nil {
				t.Fatalf("%s: %v", c.name, err)
			}
			b := ramp(p.N)
			x, r, terms := make([]float64, p.N), make([]float64, p.N), make([]float64, p.N)
			v.Solve(x, b)
			v.residual(r, terms, b, x, a, shift)
			for i := range r {
				if !(math.Abs(r[i]) <= 1e-13*terms[i]) {
					t.Fatalf("%s, symmetric %t: row %d does not balance: %g of %g", c.name, symmetric, i, r[i], terms[i])
				}
			}
			if v.rechecks != 0 || v.fallbacks != 0 {
				t.Errorf("%s, symmetric %t: %d rechecks and %d fallbacks, want none", c.name, symmetric, v.rechecks, v.fallbacks)
			}
		}
	}
}

func TestRefactorGivesTheSameBits(t *testing.T) {
	for _, c := range benchCases[:10] {
		p := c.pattern()
		a, shift := conduction(p, 1, true)
		other, less := conduction(p, 2, true)
		fresh, used := NewSolver(p, false), NewSolver(p, false)
		want, got := make([]float64, p.N), make([]float64, p.N)
		for _, err := range []error{fresh.Factor(a, shift), used.Factor(other, less), used.Factor(a, shift)} {
			if err != nil {
				t.Fatal(c.name, err)
			}
		}
		fresh.Solve(want, shift)
		used.Solve(got, shift)
		if !slices.Equal(got, want) {
			t.Errorf("%s: second factorisation differs from a fresh one", c.name)
		}
	}
}

func TestNaturalOrderNeedsNoPermutation(t *testing.T) {
	for _, base := range []*Pattern{brakeTwelve(), grid(20, 30), chainOf(9)} {
		p := renumbered(base, Order(base))
		order := make([]int32, p.N)
		for i := range order {
			order[i] = int32(i)
		}
		a, shift := conduction(p, 5, true)
		v, w := newSolver(p, false, order), NewSolver(p, false)
		if fill(v) != fill(NewSolver(base, true)) {
			t.Errorf("%d unknowns: fill %d in the order given, %d before", p.N, fill(v), fill(w))
		}
		x, y := make([]float64, p.N), make([]float64, p.N)
		if err := errors.Join(v.Factor(a, shift), w.Factor(a, shift)); err != nil {
			t.Fatal(err)
		}
		v.Solve(x, shift)
		w.Solve(y, shift)
		if d := distance(x, y); d > 1e-14 || !v.s.natural {
			t.Errorf("%d unknowns: off by %g, natural %t", p.N, d, v.s.natural)
		}
	}
}

func TestNoAllocation(t *testing.T) {
	for _, c := range benchCases[:9] {
		p := c.pattern()
		for _, symmetric := range []bool{true, false} {
			a, shift := conduction(p, 1, !symmetric)
			v := NewSolver(p, symmetric)
			x := make([]float64, p.N)
			run := func() {
				if err := v.Factor(a, shift); err != nil {
					t.Fatal(err)
				}
				v.Solve(x, shift)
			}
			if got := testing.AllocsPerRun(5, run); got != 0 {
				t.Errorf("%s, symmetric %t: %g allocations per step, want 0", c.name, symmetric, got)
			}
		}
	}
}
