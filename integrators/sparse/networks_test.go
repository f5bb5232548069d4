package sparse

import "math/rand/v2"

// networks for tests; all values invented.

func chainOf(n int) *Pattern {
	var pairs [][2]int32
	for i := range int32(n - 1) {
		pairs = append(pairs, [2]int32{i, i + 1})
	}
	return NewPattern(n, pairs)
}

// grid is a rectangle of unknowns coupled to their four neighbours.
func grid(rows, cols int) *Pattern { return NewPattern(rows*cols, gridPairs(rows, cols)) }

func gridPairs(rows, cols int) [][2]int32 {
	var pairs [][2]int32
	for i := range rows {
		for j := range cols {
			at := int32(i*cols + j)
			if j+1 < cols {
				pairs = append(pairs, [2]int32{at, at + 1})
			}
			if i+1 < rows {
				pairs = append(pairs, [2]int32{at, at + int32(cols)})
			}
		}
	}
	return pairs
}

// hub is a node from which chains of equal length go out.
func hub(chains, length int) *Pattern {
	var pairs [][2]int32
	for c := range chains {
		before := int32(0)
		for k := range length {
			at := int32(1 + c*length + k)
			pairs = append(pairs, [2]int32{before, at})
			before = at
		}
	}
	return NewPattern(1+chains*length, pairs)
}

// brakeTwelve is a disc, two pads with backing plates and contact layers,
// caliper, fluid, hub, bearing and knuckle, joined closely enough to make fill.
func brakeTwelve() *Pattern { return NewPattern(12, brakePairs(0)) }

func brakePairs(first int32) [][2]int32 {
	pairs := [][2]int32{{0, 1}, {0, 2}, {1, 3}, {2, 4}, {3, 5}, {4, 5}, {3, 6}, {4, 6}, {5, 6}, {5, 7},
		{0, 8}, {8, 9}, {9, 10}, {7, 10}, {8, 10}, {0, 11}, {5, 11}, {10, 11}, {1, 2}, {7, 6}}
	for k := range pairs {
		pairs[k][0] += first
		pairs[k][1] += first
	}
	return pairs
}

// brake is several such brakes joined at one node each.
func brake(count int) *Pattern {
	var pairs [][2]int32
	for c := range int32(count) {
		pairs = append(pairs, brakePairs(12*c)...)
		pairs = append(pairs, [2]int32{10, 12*c + 10})
	}
	return NewPattern(12*count, pairs)
}

// conduction gives each coupled pair a conductance between 0.1 and 10, each
// node a shift near 1. With stream set, heat also flows one way along the
// pairs, which makes the values unsymmetric.
func conduction(p *Pattern, seed uint64, stream bool) (a, shift []float64) {
	r := rand.New(rand.NewPCG(seed, 1))
	a, shift = make([]float64, p.NNZ()), make([]float64, p.N)
	for i := range p.N {
		shift[i] = 0.5 + r.Float64()
		for _, j := range p.Row(i) {
			if int(j) <= i {
				continue
			}
			g := 0.1 + 9.9*r.Float64()
			low, up, there := p.Slot(int(j), i), p.Slot(i, int(j)), int(p.Diag[j])
			a[low], a[up] = g, g
			a[p.Diag[i]] -= g
			a[there] -= g
			if stream {
				w := 3 * r.Float64()
				a[low] += w
				a[there] -= w
			}
		}
	}
	return a, shift
}

// fill returns the number of entries of L with its diagonal.
func fill(v *Solver) int { return len(v.s.row) + v.s.n }

// renumbered returns the pattern in which unknown order[k] has the number k.
func renumbered(p *Pattern, order []int32) *Pattern {
	place := inverse(order, p.N)
	var pairs [][2]int32
	for i := range p.N {
		for _, j := range p.Row(i) {
			pairs = append(pairs, [2]int32{place[i], place[j]})
		}
	}
	return NewPattern(p.N, pairs)
}
