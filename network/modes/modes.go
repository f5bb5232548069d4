// Package modes finds the time constants of a linearised network.
package modes

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// Most is the largest number of states for which Constants computes; the cost grows with its third power.
const Most = 600

// still is the share of the fastest rate below which a rate is round-off: eigenvalues are found to round-off of the
// largest.
const still = 1e-10

// Constants returns the slowest and the fastest time constant [s] of
//
//	C dT/dt = A T
//
// with C the capacities [J/K] (zero for massless rows) and A the slopes of the balances [W/K], row by row.
// slowest is infinite when a part of the network can lose heat to nowhere. ok is false when there is no
// state with a capacity, or more than Most states, or the numbers fail.
func Constants(capacity []float64, a func(i, j int) float64) (slowest, fastest float64, ok bool) {
	var stored, massless []int
	for i, c := range capacity {
		if c > 0 {
			stored = append(stored, i)
		} else {
			massless = append(massless, i)
		}
	}
	if len(stored) == 0 || len(capacity) > Most {
		return 0, 0, false
	}
	m := block(stored, stored, a)
	if len(massless) > 0 { // massless states follow the others: Schur complement
		var x mat.Dense
		if x.Solve(block(massless, massless, a), block(massless, stored, a)) != nil {
			return 0, 0, false
		}
		var y mat.Dense
		y.Mul(block(stored, massless, a), &x)
		m.Sub(m, &y)
	}
	for r, i := range stored {
		for c := range stored {
			m.Set(r, c, m.At(r, c)/capacity[i])
		}
	}
	var eigen mat.Eigen
	if !eigen.Factorize(m, mat.EigenNone) {
		return 0, 0, false
	}
	slowRate, fastRate := math.Inf(1), 0.0
	for _, v := range eigen.Values(nil) {
		rate := -real(v)
		slowRate, fastRate = math.Min(slowRate, rate), math.Max(fastRate, rate)
	}
	if slowRate < still*fastRate {
		slowRate = 0
	}
	return 1 / slowRate, 1 / fastRate, true
}

func block(rows, cols []int, a func(i, j int) float64) *mat.Dense {
	m := mat.NewDense(len(rows), len(cols), nil)
	for r, i := range rows {
		for c, j := range cols {
			m.Set(r, c, a(i, j))
		}
	}
	return m
}
