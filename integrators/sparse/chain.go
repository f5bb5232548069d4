package sparse

import "math"

// A chain holds the factors of a tridiagonal matrix eliminated from both ends
// to the middle: two independent recurrences keep the processor busy where
// one would wait for each result. Separate chains lie end to end with links
// of value zero.
//
// Link i joins places i and i+1. Unknowns left of the middle are eliminated
// into their right neighbour, those right of it into their left one. Fused
// multiply-add halves the wait and gives the same bits on every processor.
type chain struct {
	s    *structure
	mid  int
	inv  []float64 // 1/pivot
	fore []float64 // of each link: factor of the elimination
	back []float64 // of each link: factor of the back substitution; fore for symmetric K
	low  []int32   // slot of the entry below the diagonal of each link, -1 between chains
	up   []int32   // slot of its mirror image
}

// isChain reports whether the structure is tridiagonal and long enough for
// two ends.
func isChain(s *structure) bool {
	if s.n < 3 {
		return false
	}
	for k := range s.n {
		for _, j := range s.inCol[s.inStart[k]:s.inStart[k+1]] {
			if int(j) != k-1 {
				return false
			}
		}
	}
	return true
}

func newChain(s *structure, symmetric bool) *chain {
	n := s.n
	c := &chain{s: s, mid: n / 2, inv: make([]float64, n), fore: make([]float64, n-1)}
	c.low, c.up = make([]int32, n-1), make([]int32, n-1)
	c.back = c.fore
	if !symmetric {
		c.back = make([]float64, n-1)
	}
	for k := 1; k < n; k++ {
		at := s.inStart[k]
		if at == s.inStart[k+1] {
			c.low[k-1], c.up[k-1] = -1, -1
			continue
		}
		c.low[k-1], c.up[k-1] = s.inLow[at], s.inUp[at]
	}
	return c
}

// link returns the entries of K below and above the diagonal at link i.
func (c *chain) link(i int, a []float64) (below, above float64) {
	if c.low[i] < 0 {
		return 0, 0
	}
	return -a[c.low[i]], -a[c.up[i]]
}

// factor eliminates K from both ends. It reports false as soon as a pivot is
// doubtful.
func (c *chain) factor(a, shift []float64) bool {
	n, mid := c.s.n, c.mid
	p, pe := c.s.diagonal(0, a, shift) // pivot and its error in roundings
	q, qe := c.s.diagonal(n-1, a, shift)
	pk, qk := p, q // diagonals of K the pivots came from
	for i, j := 0, n-1; i < mid; i, j = i+1, j-1 {
		if !acceptable(p, pe, pk) {
			return false
		}
		below, above := c.link(i, a)
		r := 1 / p
		l := below * r
		c.inv[i], c.fore[i], c.back[i] = r, l, above*r
		loss := 1 + pe*math.Abs(r)
		pk, pe = c.s.diagonal(i+1, a, shift)
		p = pk - l*above
		pe += math.Abs(l*above) * loss
		if j == mid {
			break // an even number of unknowns: one more on the left
		}
		if !acceptable(q, qe, qk) {
			return false
		}
		below, above = c.link(j-1, a)
		r = 1 / q
		u := above * r
		c.inv[j], c.fore[j-1], c.back[j-1] = r, u, below*r
		loss = 1 + qe*math.Abs(r)
		qk, qe = c.s.diagonal(j-1, a, shift)
		q = qk - u*below
		qe += math.Abs(u*below) * loss
	}
	return c.meet(p, pe, q, qe, a, shift)
}

// meet forms the pivot of the middle, from which both ends have taken.
func (c *chain) meet(p, pe, q, qe float64, a, shift []float64) bool {
	k, ke := c.s.diagonal(c.mid, a, shift)
	d := p + (q - k)
	c.inv[c.mid] = 1 / d
	return acceptable(d, pe+(qe-ke), k)
}

// solve replaces x, in elimination order, by the solution: both recurrences
// run to the middle and back out.
func (c *chain) solve(x []float64) {
	n, mid := c.s.n, c.mid
	x = x[:n]
	inv, fore, back := c.inv[:n], c.fore[:n-1], c.back[:n-1]
	f, g := x[0], x[n-1]
	i, j := 1, n-2
	for ; i < mid && j > mid; i, j = i+1, j-1 {
		f = math.FMA(-fore[i-1], f, x[i])
		g = math.FMA(-fore[j], g, x[j])
		x[i], x[j] = f, g
	}
	if i < mid { // an even number of unknowns: one more on the left
		f = math.FMA(-fore[i-1], f, x[i])
		x[i] = f
	}
	m := math.FMA(-fore[mid-1], f, x[mid])
	if mid+1 < n {
		m = math.FMA(-fore[mid], g, m)
	}
	m *= inv[mid]
	x[mid] = m
	f, g = m, m
	i, j = mid-1, mid+1
	for ; i >= 0 && j < n; i, j = i-1, j+1 {
		f = math.FMA(-back[i], f, x[i]*inv[i])
		g = math.FMA(-back[j-1], g, x[j]*inv[j])
		x[i], x[j] = f, g
	}
	if i >= 0 {
		f = math.FMA(-back[i], f, x[i]*inv[i])
		x[i] = f
	}
}
