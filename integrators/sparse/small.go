package sparse

import "math"

// Up to smallLimit unknowns an index fits into a byte, and arrays of that
// many numbers need no bounds checks.
const smallLimit = 256

// smallUpdates bounds the list of update targets to 64 KiB, enough for a grid
// of 16 x 16, where the list still saves a seventh of the time (by trial).
const smallUpdates = 1 << 14

// A small holds what a small system needs on top of its structure: the whole
// elimination written out as a list of targets, so that factoring neither
// searches nor scatters, and flat lists of rows and columns, so that solving
// has no short inner loops.
type small struct {
	s        *structure
	row, col []uint8 // of each entry of L
	target   []int32 // entries changed by elimination, in the order they are
	inEntry  []int32 // entry of L for each entry of K below the diagonal

	// By places: diagonal of K, what is left of it, error in roundings, inverse
	// pivot, right-hand side. Places are masked where the compiler cannot see
	// that they are below smallLimit.
	k, d, err, inv, x [smallLimit]float64
}

// isSmall reports whether the small kernel serves the structure.
func isSmall(s *structure) bool {
	updates := 0
	for j := range s.n {
		c := int(s.colStart[j+1] - s.colStart[j])
		updates += c * (c - 1) / 2
	}
	return s.n <= smallLimit && updates <= smallUpdates
}

func newSmall(s *structure) *small {
	m := &small{s: s, row: make([]uint8, len(s.row)), col: make([]uint8, len(s.row))}
	for j := range s.n {
		for e := s.colStart[j]; e < s.colStart[j+1]; e++ {
			m.row[e], m.col[e] = uint8(s.row[e]), uint8(j)
			for b := s.colStart[j]; b < e; b++ {
				m.target = append(m.target, s.entry(s.row[e], s.row[b]))
			}
		}
	}
	for k := range s.n {
		for _, j := range s.inCol[s.inStart[k]:s.inStart[k+1]] {
			m.inEntry = append(m.inEntry, s.entry(int32(k), j))
		}
	}
	return m
}

// entry returns the entry of L in row i and column j; it must exist.
func (s *structure) entry(i, j int32) int32 {
	for r := s.rowStart[i]; r < s.rowStart[i+1]; r++ {
		if s.rowCol[r] == j {
			return s.rowEntry[r]
		}
	}
	panic("sparse: entry outside the pattern of the factors")
}

// load puts K into place: diagonals and their errors, entries below the
// diagonal, and for unsymmetric K those above it.
func (m *small) load(f *factors, a, shift []float64) {
	s := m.s
	for k := range s.order {
		d, err := s.diagonal(k, a, shift)
		m.k[k&0xff], m.d[k&0xff], m.err[k&0xff] = d, d, err
	}
	clear(f.lower)
	low := s.inLow[:len(m.inEntry)]
	for r, e := range m.inEntry {
		f.lower[e] = -a[low[r]]
	}
	if f.z == nil {
		return
	}
	clear(f.upper)
	up := s.inUp[:len(m.inEntry)]
	for r, e := range m.inEntry {
		f.upper[e] = -a[up[r]]
	}
}

// factor eliminates symmetric K column by column, each updating the columns
// to its right. It reports false as soon as a pivot is doubtful.
func (m *small) factor(f *factors, a, shift []float64) bool {
	m.load(f, a, shift)
	s := m.s
	next := 0
	begin := s.colStart[0]
	for k, end := range s.colStart[1:] {
		d := m.d[k&0xff]
		if !acceptable(d, m.err[k&0xff], m.k[k&0xff]) {
			return false
		}
		r := 1 / d
		m.inv[k&0xff], f.inv[k] = r, r
		loss := 1 + m.err[k&0xff]*math.Abs(r)
		values, rows := f.lower[begin:end], m.row[begin:end]
		rows = rows[:len(values)]
		for e, v := range values {
			targets := m.target[next:][:e]
			for b, at := range targets {
				f.lower[at] -= v * values[b]
			}
			next += e
			l := v * r
			values[e] = l
			m.d[rows[e]] -= l * v
			m.err[rows[e]] += math.Abs(l*v) * loss
		}
		begin = end
	}
	return true
}

// factorLU is factor for unsymmetric values.
func (m *small) factorLU(f *factors, a, shift []float64) bool {
	m.load(f, a, shift)
	s := m.s
	next := 0
	begin := s.colStart[0]
	for k, end := range s.colStart[1:] {
		d := m.d[k&0xff]
		if !acceptable(d, m.err[k&0xff], m.k[k&0xff]) {
			return false
		}
		r := 1 / d
		m.inv[k&0xff], f.inv[k] = r, r
		loss := 1 + m.err[k&0xff]*math.Abs(r)
		lower, upper, rows := f.lower[begin:end], f.upper[begin:end], m.row[begin:end]
		upper, rows = upper[:len(lower)], rows[:len(lower)]
		for e, v := range lower {
			u := upper[e]
			targets := m.target[next:][:e]
			for b, at := range targets {
				f.lower[at] -= v * upper[b]
				f.upper[at] -= u * lower[b]
			}
			next += e
			l := v * r
			lower[e], upper[e] = l, u*r
			m.d[rows[e]] -= l * u
			m.err[rows[e]] += math.Abs(l*u) * loss
		}
		begin = end
	}
	return true
}

// solve writes the solution of L D U x = b to dst, both in the numbering of
// the pattern.
func (m *small) solve(s *structure, f *factors, dst, b []float64) {
	x := &m.x
	if s.natural {
		copy(x[:], b)
	} else {
		for k, i := range s.order {
			x[k&0xff] = b[i]
		}
	}
	m.substitute(x, f.lower, f.upper)
	if s.natural {
		copy(dst, x[:])
		return
	}
	for k, i := range s.order {
		dst[i] = x[k&0xff]
	}
}

// substitute is factors.solve with its forward part flat.
func (m *small) substitute(x *[smallLimit]float64, lower, upper []float64) {
	row, col := m.row[:len(lower)], m.col[:len(lower)]
	for e, l := range lower {
		x[row[e]] -= l * x[col[e]]
	}
	end := len(upper)
	for k := m.s.n - 1; k >= 0; k-- {
		begin := int(m.s.colStart[k])
		rows, values := m.row[begin:end], upper[begin:end]
		values = values[:len(rows)]
		sum := x[k&0xff] * m.inv[k&0xff]
		for e := len(rows) - 1; e >= 0; e-- {
			sum -= values[e] * x[rows[e]]
		}
		x[k&0xff] = sum
		end = begin
	}
}
