package sparse

import "math"

// trialError is the largest backward error with which factors whose terms
// grew are accepted.
const trialError = 1e-10

// conditionSweeps bounds the condition estimate; Higham finds that it hardly
// ever needs more.
const conditionSweeps = 5

// residual writes b - K x to dst and the sum of the sizes of the terms of
// each row to terms. Neither may overlap x or b.
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

// workspace returns two arrays of n numbers, made on first use.
func (v *Solver) workspace() (p, q []float64) {
	n := v.s.n
	if v.spare == nil {
		v.spare = make([]float64, 2*n)
	}
	return v.spare[:n], v.spare[n:]
}

// Refine improves x, a solution of K x = b, by one step of iterative
// refinement with the present factors, and returns the largest correction
// relative to the largest unknown: an estimate of the error x had, zero where
// nothing changed. The factors
// may be of a slightly different matrix than a and shift describe. x and b
// must not overlap. It allocates on first use only.
func (v *Solver) Refine(x, b, a, shift []float64) float64 {
	r, terms := v.workspace()
	v.residual(r, terms, b, x, a, shift)
	v.Solve(r, r)
	largest, correction := 0.0, 0.0
	for i, d := range r {
		x[i] += d
		largest = max(largest, math.Abs(x[i]))
		correction = max(correction, math.Abs(d))
	}
	if correction == 0 {
		return 0
	}
	return correction / largest
}

// trial solves a system whose solution is known, and accepts the factors if
// every row balances.
func (v *Solver) trial(a, shift []float64) bool {
	n := v.s.n
	ones, b, x := make([]float64, n), make([]float64, n), make([]float64, n)
	r, terms := v.workspace()
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

// ReciprocalCondition estimates 1/(‖K‖·‖K⁻¹‖) in the 1-norm, with the values
// that the present factors are of. The estimate is never too small but for
// round-off, and hardly ever more than three times too large. It takes up to
// eleven solves and allocates; it is meant for messages.
//
// Method: W. W. Hager, SIAM J. Sci. Stat. Comput. 5 (1984) 311-316, as
// improved by N. J. Higham, ACM TOMS 14 (1988) 381-396 (from memory).
func (v *Solver) ReciprocalCondition(a, shift []float64) float64 {
	if v.s.n == 0 {
		return 1
	}
	return 1 / v.norm(a, shift) / v.inverseNorm()
}

// norm returns the largest sum of sizes over a column of K.
func (v *Solver) norm(a, shift []float64) float64 {
	s := v.s
	sum := make([]float64, s.n)
	for k := range s.n {
		d, _ := s.diagonal(k, a, shift)
		sum[k] += math.Abs(d)
		for at := s.inStart[k]; at < s.inStart[k+1]; at++ {
			sum[s.inCol[at]] += math.Abs(a[s.inLow[at]])
			sum[k] += math.Abs(a[s.inUp[at]])
		}
	}
	largest := 0.0
	for _, t := range sum {
		largest = max(largest, t)
	}
	return largest
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

// inverseNorm climbs to a column of the inverse with a large sum of sizes.
func (v *Solver) inverseNorm() float64 {
	n := v.s.n
	x, y, z := make([]float64, n), make([]float64, n), make([]float64, n)
	for i := range x {
		x[i] = 1 / float64(n)
	}
	best := 0.0
	for sweep := range conditionSweeps {
		v.Solve(y, x)
		sum := sumOfSizes(y)
		if sweep > 0 && !(sum > best) {
			break
		}
		best = sum
		for i := range y {
			y[i] = math.Copysign(1, y[i])
		}
		v.solveTransposed(z, y)
		steepest, along := 0, 0.0
		for i := range z {
			along += z[i] * x[i]
			if math.Abs(z[i]) > math.Abs(z[steepest]) {
				steepest = i
			}
		}
		if math.Abs(z[steepest]) <= along {
			break
		}
		clear(x)
		x[steepest] = 1
	}
	for i := range x { // a vector that defeats cancellation in the climb
		x[i] = 1 + float64(i)/float64(max(n-1, 1))
		if i%2 == 1 {
			x[i] = -x[i]
		}
	}
	v.Solve(y, x)
	return max(best, 2*sumOfSizes(y)/(3*float64(n)))
}

func sumOfSizes(x []float64) float64 {
	sum := 0.0
	for _, v := range x {
		sum += math.Abs(v)
	}
	return sum
}

// solveTransposed is Solve for the transpose of K.
func (v *Solver) solveTransposed(dst, b []float64) {
	v.stats.Solves++
	if v.active == denseKernel {
		v.dense.solve(dst, b, true)
		return
	}
	gather(v.x, b, v.s.order)
	if v.active == chainKernel {
		v.chain.solveTransposed(v.x)
	} else {
		v.f.solveTransposed(v.s, v.x)
	}
	scatter(dst, v.x, v.s.order)
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
