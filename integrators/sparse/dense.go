package sparse

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// singularCondition is the condition number, after scaling, from which the
// dense fallback calls a matrix singular.
const singularCondition = lostPivot / rounding

// A dense factors K with row exchanges, for systems whose pivots cannot be
// taken in a fixed order. Rows and columns are scaled by powers of two first,
// so that units do not decide what counts as singular.
type dense struct {
	k        *mat.Dense
	lu       mat.LU
	u        mat.TriDense // the upper factor, taken out to name a singular row
	row, col []float64    // scales
	x        *mat.VecDense
}

func newDense(n int) *dense {
	f := &dense{k: mat.NewDense(n, n, nil), x: mat.NewVecDense(n, nil)}
	f.row, f.col = make([]float64, n), make([]float64, n)
	f.u = *mat.NewTriDense(n, mat.Upper, nil)
	return f
}

// factor returns -1, or the number of an unknown that the others determine
// where K is singular to working accuracy.
func (f *dense) factor(p *Pattern, symmetric bool, a, shift []float64) int {
	f.fill(p, symmetric, a, shift)
	f.scale()
	f.lu.Factorize(f.k)
	if f.lu.Cond() < singularCondition { // false for NaN
		return -1
	}
	f.lu.UTo(&f.u)
	worst := 0
	for k := range p.N {
		if !(math.Abs(f.u.At(k, k)) >= math.Abs(f.u.At(worst, worst))) {
			worst = k
		}
	}
	return worst
}

func (f *dense) fill(p *Pattern, symmetric bool, a, shift []float64) {
	f.k.Zero()
	for i := range p.N {
		for slot := p.RowStart[i]; slot < p.RowStart[i+1]; slot++ {
			j := int(p.Col[slot])
			switch {
			case i == j:
				f.k.Set(i, i, shift[i]-a[slot])
			case !symmetric:
				f.k.Set(i, j, -a[slot])
			case i < j:
				f.k.Set(i, j, -a[slot])
				f.k.Set(j, i, -a[slot])
			}
		}
	}
}

// scale brings the largest entry of every row, then of every column, to
// between a half and one.
func (f *dense) scale() {
	n, _ := f.k.Dims()
	for i := range n {
		f.row[i] = powerOfTwo(mat.Norm(f.k.RowView(i), math.Inf(1)))
		for j := range n {
			f.k.Set(i, j, f.k.At(i, j)*f.row[i])
		}
	}
	for j := range n {
		f.col[j] = powerOfTwo(mat.Norm(f.k.ColView(j), math.Inf(1)))
		for i := range n {
			f.k.Set(i, j, f.k.At(i, j)*f.col[j])
		}
	}
}

// powerOfTwo returns the power of two that brings size to between a half and
// one, or 1 where there is none.
func powerOfTwo(size float64) float64 {
	_, exponent := math.Frexp(size)
	p := math.Ldexp(1, -exponent)
	if size == 0 || math.IsInf(p, 0) || p == 0 {
		return 1
	}
	return p
}

// solve writes the solution of K x = b to dst.
func (f *dense) solve(dst, b []float64) {
	x := f.x.RawVector().Data
	for i, v := range b {
		x[i] = v * f.row[i]
	}
	// The error only repeats what Cond said when K was factored.
	_ = f.lu.SolveVecTo(f.x, false, f.x)
	for i, v := range x {
		dst[i] = v * f.col[i]
	}
}
