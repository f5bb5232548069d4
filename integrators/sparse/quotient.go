package sparse

// A quotient is the graph of a partly eliminated matrix. Eliminated unknowns
// are kept as elements: an element stands for the clique among the variables
// in its list, so the graph never grows beyond one list per elimination.
// Variables with equal neighbours are merged and eliminated together.
//
// Method: P. R. Amestoy, T. A. Davis, I. S. Duff, An approximate minimum
// degree ordering algorithm, SIAM J. Matrix Anal. Appl. 17 (1996) 886-905
// (from memory).
type quotient struct {
	n, left int // nodes; unknowns not yet eliminated

	// The list of node i is list[start[i]:][:length[i]]. For a variable its
	// first elements[i] members are elements, the others variables.
	list, start, length, elements []int32

	weight  []int32 // unknowns a variable stands for; 0 once merged or eliminated; negative inside the new element
	degree  []int32 // of a variable: bound on unknowns around it; of an element: unknowns in its list
	parent  []int32 // node this one was merged into, -1 if none
	dead    []bool  // element swallowed by a later one
	outside []int   // tag + unknowns of an element outside the new one
	mark    []int   // stamp for comparing two lists
	tag     int

	head, next, prev []int32 // variables by degree, as doubly linked lists
	lowest           int     // no variable has a lower degree

	hashHead, hashNext []int32 // variables of the new element by hash
	hash               []int32
}

// minimumDegree returns an elimination order of a graph given by neighbour
// lists without self reference.
func minimumDegree(start, neighbour []int32) []int32 {
	q := newQuotient(start, neighbour)
	pivots := make([]int32, 0, q.n)
	for q.left > 0 {
		p := q.takeLowest()
		pivots = append(pivots, p)
		q.formElement(p)
		q.countOutside(p)
		q.updateDegrees(p)
		q.mergeTwins(p)
		q.closeElement(p)
	}
	return q.unfold(pivots)
}

func newQuotient(start, neighbour []int32) *quotient {
	n := len(start) - 1
	q := &quotient{n: n, left: n, tag: 1}
	q.list = append(make([]int32, 0, 2*len(neighbour)), neighbour...)
	block := make([]int32, 12*n)
	take := func() []int32 { part := block[:n:n]; block = block[n:]; return part }
	q.start, q.length, q.elements = take(), take(), take()
	q.weight, q.degree, q.parent = take(), take(), take()
	q.head, q.next, q.prev = take(), take(), take()
	q.hashHead, q.hashNext, q.hash = take(), take(), take()
	q.dead, q.outside, q.mark = make([]bool, n), make([]int, n), make([]int, n)
	for i := range n {
		q.start[i], q.length[i] = start[i], start[i+1]-start[i]
		q.weight[i], q.degree[i] = 1, q.length[i]
		q.parent[i], q.head[i], q.hashHead[i] = -1, -1, -1
	}
	for i := n - 1; i >= 0; i-- {
		q.enlist(int32(i))
	}
	return q
}

func (q *quotient) enlist(i int32) {
	d := q.degree[i]
	q.next[i], q.prev[i] = q.head[d], -1
	if q.head[d] >= 0 {
		q.prev[q.head[d]] = i
	}
	q.head[d] = i
	q.lowest = min(q.lowest, int(d))
}

func (q *quotient) delist(i int32) {
	if q.prev[i] >= 0 {
		q.next[q.prev[i]] = q.next[i]
	} else {
		q.head[q.degree[i]] = q.next[i]
	}
	if q.next[i] >= 0 {
		q.prev[q.next[i]] = q.prev[i]
	}
}

// takeLowest removes a variable of lowest degree from the lists.
func (q *quotient) takeLowest() int32 {
	for q.head[q.lowest] < 0 {
		q.lowest++
	}
	p := q.head[q.lowest]
	q.delist(p)
	return p
}

// formElement turns variable p into an element: its list becomes every live
// variable around it, and the elements it was in are swallowed.
func (q *quotient) formElement(p int32) {
	begin := len(q.list)
	q.left -= int(q.weight[p])
	q.weight[p] = -q.weight[p]
	size := int32(0)
	gather := func(lo, hi int32) {
		for at := lo; at < hi; at++ {
			i := q.list[at]
			if w := q.weight[i]; w > 0 {
				size += w
				q.weight[i] = -w
				q.delist(i)
				q.list = append(q.list, i)
			}
		}
	}
	lo, mid, hi := q.start[p], q.start[p]+q.elements[p], q.start[p]+q.length[p]
	for at := lo; at < mid; at++ {
		if e := q.list[at]; !q.dead[e] {
			gather(q.start[e], q.start[e]+q.length[e])
			q.dead[e] = true
		}
	}
	gather(mid, hi)
	q.start[p], q.length[p] = int32(begin), int32(len(q.list)-begin)
	q.degree[p] = size
}

// members returns the list of node i.
func (q *quotient) members(i int32) []int32 { return q.list[q.start[i]:][:q.length[i]] }

// countOutside finds, for every element touching element p, how many of its
// unknowns lie outside p.
func (q *quotient) countOutside(p int32) {
	q.tag += q.n + 1
	for _, i := range q.members(p) {
		w := int(-q.weight[i])
		for _, e := range q.list[q.start[i]:][:q.elements[i]] {
			switch {
			case q.dead[e]:
			case q.outside[e] < q.tag:
				q.outside[e] = q.tag + int(q.degree[e]) - w
			default:
				q.outside[e] -= w
			}
		}
	}
}

// updateDegrees cleans the lists of all variables of element p, puts p among
// their elements, and bounds what they touch outside p. A variable that
// touches nothing else is eliminated together with p.
func (q *quotient) updateDegrees(p int32) {
	for _, i := range q.members(p) {
		begin := q.start[i]
		list := q.list[begin:][:q.length[i]]
		kept, touched, hash := 0, 0, uint32(p)
		for _, e := range list[:q.elements[i]] {
			if q.dead[e] {
				continue
			}
			out := q.outside[e] - q.tag
			if out == 0 { // all of e lies in p: swallow it too
				q.dead[e] = true
				continue
			}
			list[kept] = e
			kept++
			touched += out
			hash += uint32(e)
		}
		variables := list[q.elements[i]:]
		first := kept
		for _, j := range variables {
			if q.weight[j] > 0 {
				list[kept] = j
				kept++
				touched += int(q.weight[j])
				hash += uint32(j)
			}
		}
		if touched == 0 {
			q.eliminateWith(i, p)
			continue
		}
		// At least one member went away: p itself or an element it swallowed.
		if kept > first {
			list[kept] = list[first]
		}
		list[first] = p
		q.elements[i], q.length[i] = int32(first+1), int32(kept+1)
		q.degree[i] = min(q.degree[i], int32(min(touched, q.n)))
		q.file(i, hash)
	}
}

// eliminateWith eliminates variable i together with p.
func (q *quotient) eliminateWith(i, p int32) {
	w := -q.weight[i]
	q.weight[i] = 0
	q.parent[i] = p
	q.degree[p] -= w
	q.left -= int(w)
}

// file puts variable i into its hash chain.
func (q *quotient) file(i int32, hash uint32) {
	h := int32(hash % uint32(q.n))
	q.hash[i] = h
	q.hashNext[i] = q.hashHead[h]
	q.hashHead[h] = i
}

// mergeTwins merges the variables of element p whose lists are equal.
func (q *quotient) mergeTwins(p int32) {
	for _, v := range q.members(p) {
		if q.weight[v] == 0 {
			continue
		}
		h := q.hash[v]
		i := q.hashHead[h]
		q.hashHead[h] = -1
		for ; i >= 0; i = q.hashNext[i] {
			q.mergeInto(i)
		}
	}
}

// mergeInto merges into variable i those after it in its hash chain that have
// the same list.
func (q *quotient) mergeInto(i int32) {
	if q.hashNext[i] < 0 {
		return
	}
	q.tag++
	for _, m := range q.members(i) {
		q.mark[m] = q.tag
	}
	last := i
	for j := q.hashNext[i]; j >= 0; j = q.hashNext[j] {
		if !q.sameList(i, j) {
			last = j
			continue
		}
		q.weight[i] += q.weight[j]
		q.weight[j] = 0
		q.parent[j] = i
		q.hashNext[last] = q.hashNext[j]
	}
}

// sameList reports whether j has the members marked for i.
func (q *quotient) sameList(i, j int32) bool {
	if q.length[i] != q.length[j] || q.elements[i] != q.elements[j] {
		return false
	}
	for _, m := range q.members(j) {
		if q.mark[m] != q.tag {
			return false
		}
	}
	return true
}

// closeElement enlists the variables of element p under their new degree and
// drops from its list those that are gone.
func (q *quotient) closeElement(p int32) {
	list := q.members(p)
	kept := 0
	for _, i := range list {
		w := -q.weight[i]
		if w == 0 {
			continue
		}
		q.weight[i] = w
		q.degree[i] = min(q.degree[i]+q.degree[p]-w, int32(q.left)-w)
		q.enlist(i)
		list[kept] = i
		kept++
	}
	q.weight[p] = 0
	q.length[p] = int32(kept)
	q.dead[p] = kept == 0
}

// unfold lists each pivot followed by the unknowns merged into it.
func (q *quotient) unfold(pivots []int32) []int32 {
	first, sibling := q.hashHead, q.hashNext
	for i := range first {
		first[i] = -1
	}
	for i := q.n - 1; i >= 0; i-- {
		root := q.parent[i]
		if root < 0 {
			continue
		}
		for q.parent[root] >= 0 {
			root = q.parent[root]
		}
		sibling[i] = first[root]
		first[root] = int32(i)
	}
	order := make([]int32, 0, q.n)
	for _, p := range pivots {
		order = append(order, p)
		for i := first[p]; i >= 0; i = sibling[i] {
			order = append(order, i)
		}
	}
	return order
}
