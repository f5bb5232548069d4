package sparse

import (
	"math/rand/v2"
	"slices"
	"testing"
	"time"

	"pgregory.net/rapid"
)

func TestNewPattern(t *testing.T) {
	p := NewPattern(4, [][2]int32{{2, 0}, {0, 2}, {1, 1}, {3, 2}, {2, 0}})
	if want := []int32{0, 2, 1, 0, 2, 3, 2, 3}; !slices.Equal(p.Col, want) {
		t.Errorf("columns %v, want %v", p.Col, want)
	}
	if want := []int32{0, 2, 3, 6, 8}; !slices.Equal(p.RowStart, want) {
		t.Errorf("row starts %v, want %v", p.RowStart, want)
	}
	if want := []int32{0, 2, 4, 7}; !slices.Equal(p.Diag, want) {
		t.Errorf("diagonals %v, want %v", p.Diag, want)
	}
	if p.NNZ() != 8 || p.Slot(2, 3) != 5 || p.Slot(0, 1) != -1 {
		t.Errorf("%d slots, slot (2,3) = %d, slot (0,1) = %d; want 8, 5, -1", p.NNZ(), p.Slot(2, 3), p.Slot(0, 1))
	}
	if q := NewPattern(0, nil); q.NNZ() != 0 || fill(NewSolver(q, true)) != 0 {
		t.Error("an empty pattern has entries")
	}
}

// randomTree joins node i to an earlier node.
func randomTree(n int, r *rand.Rand) *Pattern {
	names := r.Perm(n)
	pairs := make([][2]int32, 0, n)
	for i := 1; i < n; i++ {
		pairs = append(pairs, [2]int32{int32(names[i]), int32(names[r.IntN(i)])})
	}
	return NewPattern(n, pairs)
}

func TestTreesHaveNoFill(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 1))
	cases := []*Pattern{chainOf(1), chainOf(2), chainOf(100000), hub(1, 1), hub(100000, 1), hub(100, 1000), hub(1000, 100)}
	for range 200 {
		cases = append(cases, randomTree(1+r.IntN(300), r))
	}
	for _, p := range cases {
		if got, want := fill(NewSolver(p, true)), 2*p.N-1; got != want {
			t.Errorf("tree of %d: %d entries, want %d", p.N, got, want)
		}
	}
}

// A ring of n needs one extra entry for each unknown but the last three.
func TestRingFill(t *testing.T) {
	for _, n := range []int{3, 4, 50, 10000} {
		pairs := [][2]int32{{int32(n - 1), 0}}
		for i := range int32(n - 1) {
			pairs = append(pairs, [2]int32{i, i + 1})
		}
		if got, want := fill(NewSolver(NewPattern(n, pairs), true)), n+n+n-3; got != want {
			t.Errorf("ring of %d: %d entries, want %d", n, got, want)
		}
	}
}

// A wheel's hub is far denser than its rim and has to come last.
func TestWheelFill(t *testing.T) {
	n := 5000
	pairs := [][2]int32{{int32(n), 1}}
	for i := range int32(n) {
		pairs = append(pairs, [2]int32{0, i + 1})
		if i > 0 {
			pairs = append(pairs, [2]int32{i, i + 1})
		}
	}
	if got, want := fill(NewSolver(NewPattern(n+1, pairs), true)), 4*n-2; got != want {
		t.Errorf("wheel: %d entries, want %d", got, want)
	}
}

// Two hubs on one rim come last, the sparser before the denser.
func TestDenseUnknownsComeLast(t *testing.T) {
	n := 5000
	var pairs [][2]int32
	for i := range int32(n) {
		pairs = append(pairs, [2]int32{0, i + 2}, [2]int32{i + 2, 2 + (i+1)%int32(n)})
		if i%2 == 0 {
			pairs = append(pairs, [2]int32{1, i + 2})
		}
	}
	order := Order(NewPattern(n+2, pairs))
	if got := order[n:]; got[0] != 1 || got[1] != 0 {
		t.Errorf("last two are %v, want 1 and 0", got)
	}
}

// Entries of L with diagonal under approximate minimum degree, measured with
// SuiteSparse AMD 5.12 in C; ours may have a tenth more.
func TestGridFill(t *testing.T) {
	cases := []struct {
		name string
		p    *Pattern
		amd  float64
	}{
		{"32 x 32", grid(32, 32), 1.2e4},
		{"100 x 100", grid(100, 100), 2.06e5},
		{"316 x 316", grid(316, 316), 3.28e6},
		{"10 x 10 x 10", block(10), 3.2e4},
		{"22 x 22 x 22", block(22), 1.27e6},
	}
	for _, c := range cases {
		got := fill(NewSolver(c.p, true))
		t.Logf("%s: %d entries, AMD %g", c.name, got, c.amd)
		if float64(got) > 1.1*c.amd {
			t.Errorf("%s: %d entries, more than a tenth above %g", c.name, got, c.amd)
		}
	}
}

// block is a cube of unknowns coupled to their six neighbours.
func block(k int) *Pattern {
	var pairs [][2]int32
	for layer := range k {
		base := int32(layer * k * k)
		for _, e := range gridPairs(k, k) {
			pairs = append(pairs, [2]int32{base + e[0], base + e[1]})
		}
		for i := range int32(k * k) {
			if layer > 0 {
				pairs = append(pairs, [2]int32{base + i, base + i - int32(k*k)})
			}
		}
	}
	return NewPattern(k*k*k, pairs)
}

// Times are far above what is measured (2 ms, 3 ms and 30 ms), so that only a
// lost order of growth fails.
func TestOrderIsFast(t *testing.T) {
	for _, c := range []struct {
		name  string
		p     *Pattern
		limit time.Duration
	}{
		{"chain of 1e5", chainOf(100000), 300 * time.Millisecond},
		{"star of 1e5", hub(100000, 1), 300 * time.Millisecond},
		{"grid 100 x 100", grid(100, 100), 200 * time.Millisecond},
		{"grid 316 x 316", grid(316, 316), 2 * time.Second},
	} {
		best := time.Hour
		for range 3 {
			begin := time.Now()
			Order(c.p)
			best = min(best, time.Since(begin))
		}
		if best > c.limit {
			t.Errorf("%s: ordered in %v, limit %v", c.name, best, c.limit)
		}
	}
}

func TestOrderIsAPermutationAndRepeats(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p, _, _ := randomNetwork(t, false)
		order := Order(p)
		inverse(order, p.N) // panics unless a permutation
		if !slices.Equal(order, Order(p)) {
			t.Fatal("two orders of one pattern differ")
		}
	})
}

// The rows of L found by analyse against elimination carried out on sets.
func TestStructureAgainstElimination(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p, _, _ := randomNetwork(t, false)
		s := analyse(p, Order(p), false)
		below := make([]map[int32]bool, p.N)
		for k := range below {
			below[k] = map[int32]bool{}
		}
		for k := range p.N {
			for _, j := range s.inCol[s.inStart[k]:s.inStart[k+1]] {
				below[j][int32(k)] = true
			}
		}
		for j := range p.N {
			rows := s.row[s.colStart[j]:s.colStart[j+1]]
			if len(rows) != len(below[j]) || !slices.IsSorted(rows) {
				t.Fatalf("column %d has rows %v, want %v", j, rows, below[j])
			}
			for b, i := range rows {
				if !below[j][i] {
					t.Fatalf("column %d: row %d should not be there", j, i)
				}
				for _, k := range rows[b+1:] {
					below[i][k] = true
				}
			}
		}
	})
}

func TestRenumbered(t *testing.T) {
	p := brakeTwelve()
	order := Order(p)
	q := renumbered(p, order)
	for k := range q.N {
		for m := range q.N {
			if there := p.Slot(int(order[k]), int(order[m])) >= 0; there != (q.Slot(k, m) >= 0) {
				t.Errorf("entry (%d,%d) is %t before, %t after", k, m, there, !there)
			}
		}
	}
}
