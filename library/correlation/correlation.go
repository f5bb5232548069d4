// Package correlation holds published formulas for heat transfer as pure functions, each with its range
// and source.
//
// Each law comes twice. Coefficient returns the heat-transfer coefficient with its slopes, for inner loops:
// it does not allocate and its values and slopes are continuous everywhere, where need be by a bridge over
// a stated band between two published branches. Plain returns the coefficient alone, written from the
// formula once more for recounting; the two share numbers and no code.
//
// Forced laws fall to zero at rest. Free convection is not part of them and must be added where it matters.
package correlation

import "math"

// power returns x^p and its slope for x at or above start, where 0 < p < 1. Below start it returns the
// cubic that joins in value and slope and comes to rest at zero with zero slope, so that a law of |speed|
// stays smooth when the speed passes through zero.
func power(x, start, p float64) (y, slope float64) {
	if x < start {
		s, top := x/start, raise(start, p)
		return top * s * s * (3 - p + (p-2)*s), top * s * (2*(3-p) + 3*(p-2)*s) / start
	}
	y = raise(x, p)
	return y, p * y / x
}

// raise returns x^p for x > 0 to a few units of the last place; a coefficient takes a tenth to a quarter
// less time with it than with math.Pow.
func raise(x, p float64) float64 {
	if p == 0.5 {
		return math.Sqrt(x)
	}
	return math.Exp(p * math.Log(x))
}

// step returns the weight of the upper of two branches as x goes from low to high, and its slope: the cubic
// step from 0 to 1, level at both ends.
func step(x, low, high float64) (w, slope float64) {
	s := (x - low) / (high - low)
	return s * s * (3 - 2*s), 6 * s * (1 - s) / (high - low)
}
