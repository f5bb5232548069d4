// Package sparse solves square systems of symmetric pattern again and again:
// it orders and analyses the pattern once, then refactors and solves without
// allocating.
//
// The matrix is K = diag(shift) - A, as implicit integrators need it. A lives
// in the slots of a [Pattern]; a [Solver] is made once for a pattern.
package sparse

import "slices"

// A Pattern is the structure of a square matrix whose pattern is symmetric
// and whose diagonal is always present. Row i owns the slots
// RowStart[i] ≤ s < RowStart[i+1]; Col[s] is the column of slot s, ascending
// in each row; Diag[i] is the slot of the diagonal of row i. Values of a
// matrix are a slice of NNZ numbers in slot order. A Pattern is read only
// once made.
type Pattern struct {
	N        int
	RowStart []int32
	Col      []int32
	Diag     []int32
}

// NewPattern returns the pattern of n unknowns in which the two unknowns of
// every pair are coupled both ways. The diagonal is added, repeated pairs are
// merged, a pair of equal numbers adds nothing. Work and memory are linear in
// n and the number of pairs. An index outside 0..n-1 panics.
func NewPattern(n int, pairs [][2]int32) *Pattern {
	if n < 0 {
		panic("sparse: negative number of unknowns")
	}
	start := make([]int32, n+1)
	for _, e := range pairs {
		if e[0] < 0 || e[1] < 0 || int(e[0]) >= n || int(e[1]) >= n {
			panic("sparse: pair names an unknown outside the pattern")
		}
		if e[0] != e[1] {
			start[e[0]+1]++
			start[e[1]+1]++
		}
	}
	for i := range n {
		start[i+1] += start[i] + 1
	}
	col := make([]int32, start[n])
	next := slices.Clone(start[:n])
	put := func(i, j int32) { col[next[i]] = j; next[i]++ }
	for i := range int32(n) {
		put(i, i)
	}
	for _, e := range pairs {
		if e[0] != e[1] {
			put(e[0], e[1])
			put(e[1], e[0])
		}
	}
	return merged(n, start, transposed(start, col))
}

// transposed returns the columns of the transpose of a structure in which
// every row has as many entries as the column of the same number. Each row of
// the result ascends: for a symmetric structure it is the sorted structure.
func transposed(start, col []int32) []int32 {
	n := len(start) - 1
	next := slices.Clone(start[:n])
	out := make([]int32, len(col))
	for i := range n {
		for _, j := range col[start[i]:start[i+1]] {
			out[next[j]] = int32(i)
			next[j]++
		}
	}
	return out
}

// merged drops repeated columns from sorted rows, in place, and notes where
// the diagonal is.
func merged(n int, start, col []int32) *Pattern {
	p := &Pattern{N: n, RowStart: make([]int32, n+1), Diag: make([]int32, n)}
	kept := int32(0)
	for i := range n {
		last := int32(-1)
		for _, j := range col[start[i]:start[i+1]] {
			if j == last {
				continue
			}
			if int(j) == i {
				p.Diag[i] = kept
			}
			col[kept] = j
			kept++
			last = j
		}
		p.RowStart[i+1] = kept
	}
	p.Col = col[:kept:kept]
	return p
}

// NNZ returns the number of slots: two for each coupled pair, one for each
// diagonal.
func (p *Pattern) NNZ() int { return len(p.Col) }

// Row returns the columns of row i, ascending, the diagonal among them. The
// result is part of the pattern and must not be changed.
func (p *Pattern) Row(i int) []int32 { return p.Col[p.RowStart[i]:p.RowStart[i+1]] }

// Slot returns the slot of the entry in row i and column j, or -1 where the
// pattern has none. It searches: meant for set-up, not for steps.
func (p *Pattern) Slot(i, j int) int {
	k, found := slices.BinarySearch(p.Row(i), int32(j))
	if !found {
		return -1
	}
	return int(p.RowStart[i]) + k
}

// inverse returns place with place[order[k]] = k.
func inverse(order []int32, n int) []int32 {
	if len(order) != n {
		panic("sparse: length of order is not the number of unknowns")
	}
	place := make([]int32, n)
	for i := range place {
		place[i] = -1
	}
	for k, i := range order {
		if i < 0 || int(i) >= n || place[i] >= 0 {
			panic("sparse: order is not a permutation")
		}
		place[i] = int32(k)
	}
	return place
}
