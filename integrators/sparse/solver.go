package sparse

import (
	"errors"
	"fmt"
)

// Kinds of failed factorisation, for errors.Is.
var (
	ErrSingular  = errors.New("matrix is singular to working accuracy")
	ErrNotFinite = errors.New("matrix has an entry that is not finite")
	ErrPivot     = errors.New("pivot is lost in round-off: matrix is singular, or needs row exchanges and is too large for them")
)

// A FactorError says which row stopped a factorisation.
type FactorError struct {
	Row  int   // in the numbering of the pattern
	Kind error // ErrSingular, ErrNotFinite or ErrPivot
}

func (e *FactorError) Error() string { return fmt.Sprintf("row %d: %v", e.Row, e.Kind) }

// Unwrap returns the kind.
func (e *FactorError) Unwrap() error { return e.Kind }

// denseLimit is the largest system that may fall back to dense LU with row
// exchanges: 400 unknowns cost about 10 ms, still bearable for a step.
const denseLimit = 400

// A kernel is a way of factoring and solving; all give the same answer up to
// round-off.
type kernel uint8

const (
	noFactor kernel = iota
	chainKernel
	smallKernel
	generalKernel
	denseKernel
)

// A Solver factors K = diag(shift) - A for one pattern and solves with the
// factors. It is not safe for concurrent use; make one for each goroutine.
type Solver struct {
	pattern   *Pattern
	symmetric bool
	prefer    kernel // what Factor tries first
	active    kernel // what the present factors are for
	s         *structure
	f         factors
	chain     *chain
	small     *small
	dense     *dense
	x         []float64 // right-hand side in elimination order

	// For tests: factorisations that were repeated or tested because a pivot looked doubtful, and such as went
	// to dense LU with row exchanges.
	rechecks, fallbacks int
}

// NewSolver orders and analyses the pattern and allocates everything that
// later calls need. With symmetric true only the values of A above the
// diagonal (row number smaller than column number) are read; those below are
// taken to be equal.
func NewSolver(p *Pattern, symmetric bool) *Solver {
	return newSolver(p, symmetric, Order(p))
}

// newSolver is NewSolver with the elimination order given: order[k] is the
// unknown eliminated k-th. An order that is not a permutation panics.
func newSolver(p *Pattern, symmetric bool, order []int32) *Solver {
	s := analyse(p, order, symmetric)
	v := &Solver{pattern: p, symmetric: symmetric, s: s, prefer: generalKernel}
	v.f = newFactors(s, symmetric)
	v.x = make([]float64, p.N)
	switch {
	case isChain(s):
		v.prefer, v.chain = chainKernel, newChain(s, symmetric)
	case isSmall(s):
		v.prefer, v.small = smallKernel, newSmall(s)
	}
	return v
}

// Factor computes the factors of K = diag(shift) - A, with A given in the
// slots of the pattern. Neither slice is kept. A zero shift is allowed.
//
// Pivots are taken in the elimination order without exchanges, which is safe
// when K is diagonally dominant or positive definite. Where a pivot is lost
// in round-off or the factors grow, up to 400 unknowns fall back to dense LU
// with row exchanges. An error is a [*FactorError]; no Solve is allowed after
// one. Factor allocates only for a doubtful pivot, a fallback or an error.
//
// A floating network, coupled to nothing with a given value, is reported as
// singular at one of its rows. Round-off can hide this on meshes of about a
// hundred unknowns and more that have no shift at all and streams one way
// throughout.
func (v *Solver) Factor(a, shift []float64) error {
	if len(a) != v.pattern.NNZ() || len(shift) != v.pattern.N {
		panic("sparse: lengths of values and shift are not those of the pattern")
	}
	v.active = noFactor
	if v.factorFast(a, shift) {
		v.active = v.prefer
		return nil
	}
	return v.factorCarefully(a, shift)
}

// factorFast tries the kernels that give up at the first doubt.
func (v *Solver) factorFast(a, shift []float64) bool {
	switch {
	case v.prefer == chainKernel:
		return v.chain.factor(a, shift)
	case v.prefer == smallKernel && v.symmetric:
		return v.small.factor(&v.f, a, shift)
	case v.prefer == smallKernel:
		return v.small.factorLU(&v.f, a, shift)
	}
	doubt, bad := v.factorGeneral(a, shift)
	return bad < 0 && doubt < 0
}

// factorGeneral runs the general kernel: the first place of a doubtful and of
// a lost pivot, or -1.
func (v *Solver) factorGeneral(a, shift []float64) (doubt, bad int) {
	if v.symmetric {
		return v.f.factorLDL(v.s, a, shift)
	}
	return v.f.factorLU(v.s, a, shift)
}

// factorCarefully handles what a fast kernel did not accept.
func (v *Solver) factorCarefully(a, shift []float64) error {
	if row := v.pattern.notFinite(a, shift); row >= 0 {
		return &FactorError{Row: row, Kind: ErrNotFinite}
	}
	v.rechecks++
	doubt, bad := v.factorGeneral(a, shift)
	if bad < 0 {
		v.active = generalKernel
		if doubt < 0 || v.trial(a, shift) {
			return nil
		}
		v.active = noFactor
	}
	if v.pattern.N <= denseLimit {
		return v.fallBack(a, shift)
	}
	at, kind := bad, ErrPivot
	if bad < 0 {
		at = doubt
	} else if v.dominant(a, shift) {
		kind = ErrSingular // row exchanges would not help
	}
	return &FactorError{Row: int(v.s.order[at]), Kind: kind}
}

// fallBack factors with row exchanges.
func (v *Solver) fallBack(a, shift []float64) error {
	v.fallbacks++
	if v.dense == nil {
		v.dense = newDense(v.pattern.N)
	}
	if worst := v.dense.factor(v.pattern, v.symmetric, a, shift); worst >= 0 {
		return &FactorError{Row: worst, Kind: ErrSingular}
	}
	v.active = denseKernel
	return nil
}

// Solve writes the solution of K x = b to dst; dst and b may be the same
// slice. It panics when the last Factor failed or there was none.
func (v *Solver) Solve(dst, b []float64) {
	n := v.s.n
	if len(dst) != n || len(b) != n {
		panic("sparse: length of dst or b is not the number of unknowns")
	}
	switch v.active {
	case smallKernel:
		v.small.solve(v.s, &v.f, dst, b)
	case denseKernel:
		v.dense.solve(dst, b)
	case noFactor:
		panic("sparse: Solve without factors")
	default:
		v.solveInPlace(dst, b)
	}
}

// solveInPlace solves with the kernels that work in one array, on dst itself
// where the unknowns already are in elimination order.
func (v *Solver) solveInPlace(dst, b []float64) {
	x := dst
	if v.s.natural {
		copy(x, b)
	} else {
		x = v.x
		gather(x, b, v.s.order)
	}
	if v.active == chainKernel {
		v.chain.solve(x)
	} else {
		v.f.solve(v.s, x)
	}
	if !v.s.natural {
		scatter(dst, x, v.s.order)
	}
}

func gather(dst, b []float64, order []int32) {
	dst = dst[:len(order)]
	for k, i := range order {
		dst[k] = b[i]
	}
}

func scatter(dst, x []float64, order []int32) {
	x = x[:len(order)]
	for k, i := range order {
		dst[i] = x[k]
	}
}
