package sparse

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"testing"
)

func TestFloatingNetworkIsNamed(t *testing.T) {
	cases := []struct {
		name  string
		p     *Pattern
		first int // rows from here on float: no shift
		mesh  bool
	}{
		{"pair", chainOf(2), 0, false}, {"chain", chainOf(12), 0, false}, {"long chain", chainOf(1000), 0, false},
		{"brake", brakeTwelve(), 0, false}, {"brakes", brake(5), 0, false}, {"hub", hub(10, 50), 0, false},
		{"longest chain", chainOf(100000), 0, true}, {"grid", grid(30, 30), 0, true}, {"large grid", grid(316, 316), 0, true},
		{"lone node", NewPattern(3, [][2]int32{{0, 1}}), 2, false},
		{"second of two chains", NewPattern(7, [][2]int32{{0, 1}, {1, 2}, {3, 4}, {4, 5}, {5, 6}}), 3, false},
		{"second of two large brakes", NewPattern(436, append(gridPairs(20, 20), brakePairs(424)...)), 424, false},
	}
	for _, c := range cases {
		for _, symmetric := range []bool{true, false} {
			a, shift := conduction(c.p, 11, !symmetric)
			clear(shift[c.first:])
			if c.name == "second of two large brakes" {
				shift = append(shift[:400:400], slices.Repeat([]float64{1}, 24)...)
				shift = append(shift, make([]float64, 12)...)
			}
			v := NewSolver(c.p, symmetric)
			err := v.Factor(a, shift)
			var f *FactorError
			if err == nil && c.mesh && !symmetric { // hidden by round-off, as Factor says
				continue
			}
			if !errors.Is(err, ErrSingular) || !errors.As(err, &f) || f.Row < c.first {
				t.Errorf("%s, symmetric %t: got %v, want a singular row from %d on", c.name, symmetric, err, c.first)
			}
		}
	}
}

// Streams amplify round-off on the way to the last pivot, whichever way they
// run and whether rows or columns of K sum to nothing.
func TestFloatingStreamsAreNamed(t *testing.T) {
	for _, p := range []*Pattern{chainOf(60), chainOf(1000), hub(4, 25), hub(10, 100)} {
		a, shift := conduction(p, 11, true)
		clear(shift)
		turned := slices.Clone(a)
		for i := range p.N {
			for _, j := range p.Row(i) {
				turned[p.Slot(i, int(j))] = a[p.Slot(int(j), i)]
			}
		}
		forward := Order(p)
		backward := slices.Clone(forward)
		if len(p.Row(0)) == 2 { // a chain, from its other end
			slices.Reverse(backward)
		}
		for _, order := range [][]int32{forward, backward} {
			for k, values := range [][]float64{a, turned} {
				if err := newSolver(p, false, order).Factor(values, shift); !errors.Is(err, ErrSingular) {
					t.Errorf("%d unknowns from %d, turned %d: got %v, want singular", p.N, order[0], k, err)
				}
			}
		}
	}
}

func TestScalingDoesNotDecideWhatIsSingular(t *testing.T) {
	p := brakeTwelve()
	a, shift := conduction(p, 4, true)
	for i := range p.N {
		f := math.Ldexp(1, 40*(i%3)-40)
		shift[i] *= f
		for s := p.RowStart[i]; s < p.RowStart[i+1]; s++ {
			a[s] *= f
		}
	}
	v := NewSolver(p, false)
	if err := v.Factor(a, shift); err != nil || v.rechecks != 0 {
		t.Errorf("scaled rows: %v after %d rechecks", err, v.rechecks)
	}
	clear(shift)
	if err := v.Factor(a, shift); !errors.Is(err, ErrSingular) {
		t.Errorf("scaled rows, no shift: got %v, want singular", err)
	}
}

func TestNotFiniteIsNamed(t *testing.T) {
	for _, p := range []*Pattern{chainOf(12), brakeTwelve(), grid(20, 20)} {
		for _, bad := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
			a, shift := conduction(p, 1, false)
			a[p.Slot(5, int(p.Row(5)[1]))] = bad
			v := NewSolver(p, false)
			var f *FactorError
			if err := v.Factor(a, shift); !errors.Is(err, ErrNotFinite) || !errors.As(err, &f) || f.Row != 5 {
				t.Errorf("%d unknowns with %g: got %v, want row 5 not finite", p.N, bad, err)
			}
			a, shift = conduction(p, 1, false)
			if err := v.Factor(a, shift); err != nil {
				t.Errorf("%d unknowns: no recovery after %g: %v", p.N, bad, err)
			}
		}
	}
}

// oscillators has no capacity on the diagonal: pairs (i, i+half) are joined by
// a strong skew coupling, as position and speed are.
func oscillators(n int) (p *Pattern, a, shift []float64) {
	var pairs [][2]int32
	for i := range int32(n / 2) {
		pairs = append(pairs, [2]int32{i, i + int32(n/2)})
		if i > 0 {
			pairs = append(pairs, [2]int32{i, i - 1})
		}
	}
	p = NewPattern(n, pairs)
	a, shift = make([]float64, p.NNZ()), make([]float64, n)
	for i := range n / 2 {
		a[p.Slot(i, i+n/2)], a[p.Slot(i+n/2, i)] = -3, 2
		shift[i] = 1e-14
		if i > 0 {
			a[p.Slot(i, i-1)], a[p.Slot(i-1, i)] = 1, 0.5
		}
	}
	return p, a, shift
}

// scaleBadly multiplies rows and columns by powers of two far apart.
func scaleBadly(p *Pattern, a, shift []float64) {
	for i := range p.N {
		row := math.Ldexp(1, 9*(i%4))
		shift[i] *= row * math.Ldexp(1, 5*(i%3))
		for s := p.RowStart[i]; s < p.RowStart[i+1]; s++ {
			a[s] *= row * math.Ldexp(1, 5*int(p.Col[s]%3))
		}
	}
}

func TestFallbackExchangesRows(t *testing.T) {
	p, a, shift := oscillators(20)
	scaleBadly(p, a, shift)
	v := NewSolver(p, false)
	if err := v.Factor(a, shift); err != nil {
		t.Fatal(err)
	}
	if v.fallbacks != 1 || v.active != denseKernel {
		t.Fatalf("%d fallbacks, kernel %d: want the dense kernel", v.fallbacks, v.active)
	}
	k, b := full(p, false, a, shift), ramp(20)
	x := make([]float64, 20)
	v.Solve(x, b)
	if d := distance(x, oracle(t, k, b)); d > 1e-14 {
		t.Errorf("off by %g", d)
	}
	b, regular := conduction(p, 1, true)
	if err := v.Factor(b, regular); err != nil || v.active == denseKernel {
		t.Errorf("no return to fixed pivots: %v", err)
	}
}

// weakPairs is count systems {{1e-11, 1}, {1, 1}}: eliminating the weak
// unknown first loses eleven digits of the other pivot's own term.
func weakPairs(count int) (v *Solver, a, shift []float64) {
	var pairs [][2]int32
	order := make([]int32, 2*count)
	for i := range 2 * count {
		order[i] = int32(i)
		if i%2 == 1 {
			pairs = append(pairs, [2]int32{int32(i - 1), int32(i)})
		}
	}
	p := NewPattern(2*count, pairs)
	a, shift = make([]float64, p.NNZ()), make([]float64, p.N)
	for i := range p.N {
		shift[i] = 1
		if i%2 == 0 {
			shift[i] = 1e-11
			a[p.Slot(i, i+1)] = -1
		}
	}
	return newSolver(p, true, order), a, shift
}

func TestHarmfulGrowthIsRefused(t *testing.T) {
	v, a, shift := weakPairs(3)
	if err := v.Factor(a, shift); err != nil || v.fallbacks != 1 {
		t.Fatalf("%v after %d fallbacks, want one", err, v.fallbacks)
	}
	b := ramp(6)
	x := make([]float64, 6)
	v.Solve(x, b)
	if d := distance(x, oracle(t, full(v.pattern, true, a, shift), b)); d > 1e-15 {
		t.Errorf("off by %g", d)
	}
	v, a, shift = weakPairs(denseLimit)
	var f *FactorError
	if err := v.Factor(a, shift); !errors.Is(err, ErrPivot) || !errors.As(err, &f) || f.Row != 1 {
		t.Errorf("large system: got %v, want the pivot of row 1", err)
	}
}

func TestLargeSystemThatNeedsExchanges(t *testing.T) {
	p, a, shift := oscillators(2 * denseLimit)
	clear(shift)
	err := NewSolver(p, false).Factor(a, shift)
	var f *FactorError
	if !errors.As(err, &f) || !errors.Is(err, ErrPivot) {
		t.Fatalf("got %v, want a row with a lost pivot", err)
	}
	if want := fmt.Sprintf("row %d: %v", f.Row, ErrPivot); err.Error() != want {
		t.Errorf("message %q, want %q", err, want)
	}
}

// A weak diagonal lets the factors grow, but harmlessly: the trial accepts.
func TestHarmlessGrowthIsAccepted(t *testing.T) {
	p := chainOf(500)
	a, shift := make([]float64, p.NNZ()), make([]float64, p.N)
	for i := range p.N {
		shift[i] = 1
		if i%2 == 1 {
			shift[i] = 1e-11
		}
		if i > 0 {
			a[p.Slot(i-1, i)] = 0.5
		}
	}
	v := NewSolver(p, true)
	if err := v.Factor(a, shift); err != nil || v.rechecks != 1 {
		t.Fatalf("%v after %d rechecks, want one", err, v.rechecks)
	}
	b := ramp(p.N)
	x, r, terms := make([]float64, p.N), make([]float64, p.N), make([]float64, p.N)
	v.Solve(x, b)
	v.residual(r, terms, b, x, a, shift)
	for i := range r {
		if math.Abs(r[i]) > trialError*terms[i] {
			t.Fatalf("row %d: residual %g of %g", i, r[i], terms[i])
		}
	}
}

func TestIndefiniteSymmetricMatrix(t *testing.T) {
	p := brakeTwelve()
	a, shift := conduction(p, 9, false)
	for i := range shift {
		if i%3 == 0 {
			shift[i] = -60
		}
	}
	v := NewSolver(p, true)
	if err := v.Factor(a, shift); err != nil {
		t.Fatal(err)
	}
	b := ramp(p.N)
	x := make([]float64, p.N)
	v.Solve(x, b)
	if d := distance(x, oracle(t, full(p, true, a, shift), b)); d > 1e-13 {
		t.Errorf("off by %g", d)
	}
}

func TestMisusePanics(t *testing.T) {
	p := chainOf(3)
	v := NewSolver(p, true)
	three := make([]float64, 3)
	for name, f := range map[string]func(){
		"no factors":        func() { v.Solve(three, three) },
		"wrong length":      func() { v.Solve(three[:2], three) },
		"wrong values":      func() { _ = v.Factor(three, three) },
		"index too large":   func() { NewPattern(2, [][2]int32{{0, 2}}) },
		"negative size":     func() { NewPattern(-1, nil) },
		"short order":       func() { newSolver(p, true, []int32{0, 1}) },
		"not a permutation": func() { newSolver(p, true, []int32{0, 1, 1}) },
	} {
		func() {
			defer func() {
				if recover() == nil {
					t.Errorf("%s: no panic", name)
				}
			}()
			f()
		}()
	}
}
