package sparse

import "math"

// Errors of pivots are estimated in roundings, 2^-53 of the size of a term.
// A term made with the factors of an earlier pivot carries that pivot's
// relative error on top of its own rounding. The estimate does not change when
// rows and columns are scaled. Running error analysis in the manner of
// J. H. Wilkinson (see N. J. Higham, Accuracy and Stability of Numerical
// Algorithms, SIAM 2002, section 3.3, from memory); errors of the entries off
// the diagonal are left out.
const rounding = 0x1p-53

// lostPivot is the estimated relative error from which a pivot counts as lost.
// Floating conduction networks of 2 to 100,000 unknowns leave a last pivot
// with an estimate of 0.005 (grid of 316 x 316) to infinity, those of up to 60
// with one of 0.4 or more (chosen by trial).
const lostPivot = 0x1p-8

// growthLimit is the estimated error of a pivot, relative to the diagonal of
// K, from which the factors are tried on a known solution before use. Chains
// of 100,000 conductors almost without capacity reach 5e-10 (by trial).
const growthLimit = 1e-8

// leastPivot is the smallest number whose inverse is finite by a wide margin.
const leastPivot = 0x1p-1022

// factors are the numbers of K = L D U in the places of a structure.
type factors struct {
	lower []float64 // entries of L
	upper []float64 // entries of U; the same slice as lower for symmetric K
	inv   []float64 // 1/D
	loss  []float64 // estimated relative error of D, in roundings
	w, z  []float64 // a row of K being eliminated, a column; zero between uses
}

func newFactors(s *structure, symmetric bool) factors {
	f := factors{lower: make([]float64, len(s.row))}
	f.inv, f.loss, f.w = make([]float64, s.n), make([]float64, s.n), make([]float64, s.n)
	f.upper = f.lower
	if !symmetric {
		f.upper = make([]float64, len(s.row))
		f.z = make([]float64, s.n)
	}
	return f
}

// acceptable reports whether a pivot can be used without a second thought,
// given the estimate of its error in roundings and the diagonal of K it began
// with. Whatever is not finite is not acceptable.
func acceptable(d, err, diagonal float64) bool {
	return math.Abs(d) > err*(rounding/lostPivot)+leastPivot &&
		err <= growthLimit/rounding*math.Abs(diagonal)
}

// setPivot stores pivot d of place k and tells a lost one from one whose terms
// grew; a diagonal of zero says nothing about growth.
func (f *factors) setPivot(k int, d, err, diagonal float64) (lost, grown bool) {
	f.inv[k] = 1 / d
	f.loss[k] = err / math.Abs(d)
	if acceptable(d, err, diagonal) {
		return false, false
	}
	return !(math.Abs(d) > err*(rounding/lostPivot)+leastPivot), diagonal != 0
}

// diagonal returns the diagonal of K at a place and the sum of the sizes of
// the two terms it is formed from, its error in roundings.
func (s *structure) diagonal(k int, a, shift []float64) (value, err float64) {
	c, g := shift[s.order[k]], a[s.diag[k]]
	return c - g, math.Abs(c) + math.Abs(g)
}

// factorLDL computes L and D of symmetric K row by row: each row of L solves
// a triangular system with the rows above it. It stops at the first lost
// pivot and notes the first whose terms grew.
//
// Method: up-looking L D L^T, T. A. Davis, Algorithm 849: a concise sparse
// Cholesky factorization package, ACM TOMS 31 (2005) 587-591 (from memory).
func (f *factors) factorLDL(s *structure, a, shift []float64) (doubt, bad int) {
	doubt = -1
	w := f.w
	for k := range s.n {
		for at := s.inStart[k]; at < s.inStart[k+1]; at++ {
			w[s.inCol[at]] = -a[s.inLow[at]]
		}
		diagonal, err := s.diagonal(k, a, shift)
		d := diagonal
		cols := s.rowCol[s.rowStart[k]:s.rowStart[k+1]]
		entries := s.rowEntry[s.rowStart[k]:s.rowStart[k+1]]
		for r, j := range cols {
			begin, end := s.colStart[j], entries[r]
			wj := w[j]
			w[j] = 0
			rows := s.row[begin:end]
			lower := f.lower[begin:end]
			lower = lower[:len(rows)]
			for e, i := range rows {
				w[i] -= lower[e] * wj
			}
			l := wj * f.inv[j]
			f.lower[end] = l
			d -= l * wj
			err += math.Abs(l*wj) * (1 + f.loss[j])
		}
		lost, grown := f.setPivot(k, d, err, diagonal)
		if lost {
			return doubt, k
		}
		if grown && doubt < 0 {
			doubt = k
		}
	}
	return doubt, -1
}

// factorLU is factorLDL for unsymmetric values: column k of U is found beside
// row k of L, on the same index.
func (f *factors) factorLU(s *structure, a, shift []float64) (doubt, bad int) {
	doubt = -1
	w, z := f.w, f.z
	for k := range s.n {
		for at := s.inStart[k]; at < s.inStart[k+1]; at++ {
			w[s.inCol[at]] = -a[s.inLow[at]]
			z[s.inCol[at]] = -a[s.inUp[at]]
		}
		diagonal, err := s.diagonal(k, a, shift)
		d := diagonal
		cols := s.rowCol[s.rowStart[k]:s.rowStart[k+1]]
		entries := s.rowEntry[s.rowStart[k]:s.rowStart[k+1]]
		for r, j := range cols {
			begin, end := s.colStart[j], entries[r]
			wj, zj := w[j], z[j]
			w[j], z[j] = 0, 0
			rows := s.row[begin:end]
			lower, upper := f.lower[begin:end], f.upper[begin:end]
			lower, upper = lower[:len(rows)], upper[:len(rows)]
			for e, i := range rows {
				w[i] -= upper[e] * wj
				z[i] -= lower[e] * zj
			}
			l, u := wj*f.inv[j], zj*f.inv[j]
			f.lower[end], f.upper[end] = l, u
			d -= l * zj
			err += math.Abs(l*zj) * (1 + f.loss[j])
		}
		lost, grown := f.setPivot(k, d, err, diagonal)
		if lost {
			return doubt, k
		}
		if grown && doubt < 0 {
			doubt = k
		}
	}
	return doubt, -1
}

// solve replaces x, in elimination order, by the solution of L D U x. Forward
// it spreads each unknown over the rows below it, backward it gathers.
func (f *factors) solve(s *structure, x []float64) {
	lower, inv, upper := f.lower, f.inv, f.upper
	for j := range s.n {
		begin, end := s.colStart[j], s.colStart[j+1]
		rows := s.row[begin:end]
		values := lower[begin:end]
		values = values[:len(rows)]
		xj := x[j]
		for e, i := range rows {
			x[i] -= values[e] * xj
		}
	}
	for j := s.n - 1; j >= 0; j-- {
		begin, end := s.colStart[j], s.colStart[j+1]
		rows := s.row[begin:end]
		values := upper[begin:end]
		values = values[:len(rows)]
		p, q := x[j]*inv[j], 0.0 // two sums: neither waits for the other
		for len(rows) >= 2 && len(values) >= 2 {
			p -= values[0] * x[rows[0]]
			q -= values[1] * x[rows[1]]
			rows, values = rows[2:], values[2:]
		}
		if len(rows) > 0 && len(values) > 0 {
			p -= values[0] * x[rows[0]]
		}
		x[j] = p + q
	}
}
