package sparse

// A structure is where the entries of K and of its factors are, with the
// unknowns in elimination order ("places"). It does not change with values.
//
// K = L D U with L unit lower and U unit upper triangular. The pattern of K
// is symmetric, so the columns of L and the rows of U share one index: entry
// e of column j of L is in row row[e], entry e of row j of U in column row[e].
//
// Method: elimination tree and row patterns as in J. W. H. Liu, The role of
// elimination trees in sparse factorization, SIAM J. Matrix Anal. Appl. 11
// (1990) 134-172, and T. A. Davis, Direct Methods for Sparse Linear Systems,
// SIAM 2006, chapter 4 (both from memory).
type structure struct {
	n       int
	order   []int32 // unknown at a place
	natural bool    // order is 0, 1, 2, ...
	diag    []int32 // slot of the diagonal at a place

	colStart, row []int32 // entries of L by columns, rows ascending

	// The same entries by rows: row k has columns rowCol[r], ascending, at
	// entries rowEntry[r].
	rowStart, rowCol, rowEntry []int32

	// Entries of K left of the diagonal, by rows: column, slot of that entry
	// in the values of A, and slot of its mirror image above the diagonal.
	inStart, inCol, inLow, inUp []int32
}

// analyse finds the structure of the factors of a pattern eliminated in the
// given order. With symmetric values both slots of a coupled pair are the one
// above the diagonal of A, so that the other need not be filled.
func analyse(p *Pattern, order []int32, symmetric bool) *structure {
	n := p.N
	place := inverse(order, n)
	s := &structure{n: n, order: order, natural: true, diag: make([]int32, n)}
	for k, i := range order {
		s.natural = s.natural && int(i) == k
		s.diag[k] = p.Diag[i]
	}
	s.mapInput(p, place, symmetric)
	parent := eliminationTree(p, order, place)
	s.findRows(parent)
	s.findColumns()
	return s
}

// mapInput lists the entries of K below the diagonal.
func (s *structure) mapInput(p *Pattern, place []int32, symmetric bool) {
	half := (p.NNZ() - p.N) / 2
	s.inStart = make([]int32, s.n+1)
	s.inCol, s.inLow, s.inUp = make([]int32, 0, half), make([]int32, 0, half), make([]int32, 0, half)
	mirror := mirrors(p)
	for k, i := range s.order {
		for slot := p.RowStart[i]; slot < p.RowStart[i+1]; slot++ {
			j := p.Col[slot]
			if int(place[j]) >= k {
				continue
			}
			low, up := slot, mirror[slot]
			if symmetric && j < i {
				low = up
			} else if symmetric {
				up = low
			}
			s.inCol = append(s.inCol, place[j])
			s.inLow = append(s.inLow, low)
			s.inUp = append(s.inUp, up)
		}
		s.inStart[k+1] = int32(len(s.inCol))
	}
}

// mirrors returns for each slot the slot of the transposed entry.
func mirrors(p *Pattern) []int32 {
	next := append([]int32(nil), p.RowStart[:p.N]...)
	mirror := make([]int32, len(p.Col))
	for slot, j := range p.Col { // by rows: meets each column in ascending order
		mirror[slot] = next[j]
		next[j]++
	}
	return mirror
}

// eliminationTree returns the parent of each place: the first later place
// whose row its column reaches, or -1.
func eliminationTree(p *Pattern, order, place []int32) []int32 {
	parent := make([]int32, p.N)
	ancestor := make([]int32, p.N)
	for k, i := range order {
		parent[k], ancestor[k] = -1, -1
		for _, j := range p.Row(int(i)) {
			at := place[j]
			for at >= 0 && int(at) < k {
				up := ancestor[at]
				ancestor[at] = int32(k) // shorten the path for later rows
				if up < 0 {
					parent[at] = int32(k)
				}
				at = up
			}
		}
	}
	return parent
}

// findRows counts the columns of L: row k of L holds the places met on the
// way up the tree from the entries of row k of K.
func (s *structure) findRows(parent []int32) {
	s.colStart = make([]int32, s.n+1)
	s.rowStart = make([]int32, s.n+1)
	seen := make([]int32, s.n)
	total := 0
	for k := range s.n {
		seen[k] = int32(k)
		count := int32(0)
		for _, j := range s.inCol[s.inStart[k]:s.inStart[k+1]] {
			for ; int(seen[j]) != k; j = parent[j] {
				seen[j] = int32(k)
				s.colStart[j+1]++
				count++
			}
		}
		s.rowStart[k+1] = s.rowStart[k] + count
		if total += int(count); total > 1<<31-1 {
			panic("sparse: factor has more than 2^31 entries")
		}
	}
	for k := range s.n {
		s.colStart[k+1] += s.colStart[k]
	}
	s.fillColumns(parent, seen, total)
}

// fillColumns writes the row numbers of each column; walking the rows upwards
// makes them ascend.
func (s *structure) fillColumns(parent, seen []int32, total int) {
	s.row = make([]int32, total)
	next := append([]int32(nil), s.colStart[:s.n]...)
	for k := range s.n {
		seen[k] = -1
	}
	for k := range s.n {
		seen[k] = int32(k)
		for _, j := range s.inCol[s.inStart[k]:s.inStart[k+1]] {
			for ; int(seen[j]) != k; j = parent[j] {
				seen[j] = int32(k)
				s.row[next[j]] = int32(k)
				next[j]++
			}
		}
	}
}

// findColumns lists the entries by rows; walking the columns upwards makes
// the columns of each row ascend.
func (s *structure) findColumns() {
	s.rowCol, s.rowEntry = make([]int32, len(s.row)), make([]int32, len(s.row))
	next := append([]int32(nil), s.rowStart[:s.n]...)
	for j := range s.n {
		for e := s.colStart[j]; e < s.colStart[j+1]; e++ {
			k := s.row[e]
			s.rowCol[next[k]] = int32(j)
			s.rowEntry[next[k]] = e
			next[k]++
		}
	}
}
