package sparse

import "math"

// trialError is the largest backward error with which factors whose terms
// grew are accepted.
const trialError = 1e-10

// residual writes b - K x to dst and the sum of the sizes of the terms of
// each row to terms.
func (v *Solver) residual(dst, terms, b, x, a, shift []float64) {
	s := v.s
	for k, i := range s.order {
		d, t := s.diagonal(k, a, shift)
		dst[i] = b[i] - d*x[i]
		terms[i] = math.Abs(b[i]) + math.Abs(t*x[i])
	}
	for k, i := range s.order {
		for at := s.inStart[k]; at < s.inStart[k+1]; at++ {
			j := s.order[s.inCol[at]]
			low, up := a[s.inLow[at]]*x[j], a[s.inUp[at]]*x[i]
			dst[i] += low
			dst[j] += up
			terms[i] += math.Abs(low)
			terms[j] += math.Abs(up)
		}
	}
}

// trial solves a system whose solution is known, and accepts the factors if
// every row balances.
func (v *Solver) trial(a, shift []float64) bool {
	n := v.s.n
	ones, b, x := make([]float64, n), make([]float64, n), make([]float64, n)
	r, terms := make([]float64, n), make([]float64, n)
	for i := range ones {
		ones[i] = 1
	}
	v.residual(b, terms, x, ones, a, shift)
	v.Solve(x, b)
	v.residual(r, terms, b, x, a, shift)
	for i := range r {
		if !(math.Abs(r[i]) <= trialError*terms[i]) {
			return false
		}
	}
	return true
}

// dominant reports whether the diagonal of K outweighs the rest of every row,
// or that of every column, but for round-off. Then elimination in any order is
// stable.
func (v *Solver) dominant(a, shift []float64) bool {
	s := v.s
	row, col := make([]float64, s.n), make([]float64, s.n)
	for k := range s.n {
		for at := s.inStart[k]; at < s.inStart[k+1]; at++ {
			j, low, up := s.inCol[at], math.Abs(a[s.inLow[at]]), math.Abs(a[s.inUp[at]])
			row[k] += low
			col[j] += low
			row[j] += up
			col[k] += up
		}
	}
	byRows, byColumns := true, true
	for k := range s.n {
		d, err := s.diagonal(k, a, shift)
		limit := math.Abs(d) + 64*rounding*err
		byRows = byRows && row[k] <= limit
		byColumns = byColumns && col[k] <= limit
	}
	return byRows || byColumns
}

// notFinite returns the first row with a value that is not finite, or -1.
func (p *Pattern) notFinite(a, shift []float64) int {
	for i := range p.N {
		sum := shift[i] - shift[i]
		for _, v := range a[p.RowStart[i]:p.RowStart[i+1]] {
			sum += v - v // zero, or not a number
		}
		if sum != 0 {
			return i
		}
	}
	return -1
}
