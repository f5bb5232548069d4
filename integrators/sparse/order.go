package sparse

import (
	"cmp"
	"math"
	"slices"
)

// Unknowns coupled to more than denseFactor·√n others are eliminated last and
// kept out of the search: they end up dense anyway and make every degree
// costly. The value is the one Amestoy, Davis and Duff use (from memory).
const denseFactor = 10

// Order returns an elimination order for the pattern: order[k] is the unknown
// to be eliminated k-th. Disjoint chains come out end to end; leaves of any
// other network are stripped first, which costs no fill at all; what is left
// is ordered by approximate minimum degree, which takes unknowns in series
// next. The result depends on the pattern alone.
func Order(p *Pattern) []int32 {
	if order, ok := chainOrder(p); ok {
		return order
	}
	order := stripLeaves(p)
	return append(order, coreOrder(p, order)...)
}

// chainOrder walks every chain of the network from its lower-numbered end.
// It reports false if the network is anything but separate chains.
func chainOrder(p *Pattern) (order []int32, ok bool) {
	for i := range p.N {
		if len(p.Row(i)) > 3 {
			return nil, false
		}
	}
	order = make([]int32, 0, p.N)
	placed := make([]bool, p.N)
	for end := range p.N {
		if placed[end] || len(p.Row(end)) == 3 {
			continue
		}
		for i := int32(end); i >= 0; {
			placed[i] = true
			order = append(order, i)
			next := int32(-1)
			for _, j := range p.Row(int(i)) {
				if !placed[j] {
					next = j
				}
			}
			i = next
		}
	}
	return order, len(order) == p.N // what is left lies on rings
}

// stripLeaves removes unknowns with at most one neighbour until none is left
// and returns them in that order: all of a tree, nothing of a grid. First
// come, first served, so a tree is eaten from all its ends at once and the
// columns of neighbouring rank do not wait for each other.
func stripLeaves(p *Pattern) []int32 {
	n := p.N
	degree := make([]int32, n)
	left := make([]int32, n) // exclusive-or of the neighbours that remain
	order := make([]int32, 0, n)
	for i := range n {
		for _, j := range p.Row(i) {
			if int(j) != i {
				degree[i]++
				left[i] ^= j
			}
		}
		if degree[i] <= 1 {
			order = append(order, int32(i))
		}
	}
	for k := 0; k < len(order); k++ {
		i := order[k]
		if degree[i] == 0 {
			continue
		}
		j := left[i]
		left[j] ^= i
		degree[j]--
		if degree[j] == 1 {
			order = append(order, j)
		}
	}
	return order
}

// coreOrder orders the unknowns that are not in stripped, densest last.
func coreOrder(p *Pattern, stripped []int32) []int32 {
	n := p.N - len(stripped)
	limit := max(16, int(denseFactor*math.Sqrt(float64(n))))
	local := make([]int32, p.N) // number within the core, -1 outside
	for _, i := range stripped {
		local[i] = -1
	}
	core := make([]int32, 0, n)
	var dense []int32
	for i := range p.N {
		switch {
		case local[i] < 0:
		case len(p.Row(i))-1 > limit:
			local[i] = -1
			dense = append(dense, int32(i))
		default:
			local[i] = int32(len(core))
			core = append(core, int32(i))
		}
	}
	slices.SortStableFunc(dense, func(i, j int32) int {
		return cmp.Compare(len(p.Row(int(i))), len(p.Row(int(j))))
	})
	order := minimumDegree(coreGraph(p, core, local))
	for k, i := range order {
		order[k] = core[i]
	}
	return append(order, dense...)
}

// coreGraph lists the neighbours of each core unknown in core numbers,
// without the unknown itself.
func coreGraph(p *Pattern, core, local []int32) (start, neighbour []int32) {
	start = make([]int32, len(core)+1)
	neighbour = make([]int32, 0, p.NNZ())
	for k, i := range core {
		for _, j := range p.Row(int(i)) {
			if local[j] >= 0 && j != i {
				neighbour = append(neighbour, local[j])
			}
		}
		start[k+1] = int32(len(neighbour))
	}
	return start, neighbour
}
