package energy

import (
	"slices"
	"sort"

	"workheat/network/element"
)

// A store is one node's heat capacity as the recount sees it: its own sums, and its own way back from
// energy to temperature.
type store struct {
	x, c  []float64 // corners: K, J/K
	h     []float64 // J from the first corner
	start float64   // J from the first corner to the start temperature
	jumpy bool      // it jumps somewhere
}

func newStore(c *element.Curve, start float64) *store {
	s := &store{x: c.X, c: c.Y, h: make([]float64, len(c.X))}
	for i := 1; i < len(s.x); i++ {
		low, high := s.c[i-1], s.c[i]
		s.h[i] = s.h[i-1] + (s.x[i]-s.x[i-1])*low + (s.x[i]-s.x[i-1])*(high-low)/2
	}
	s.start = s.enthalpy(start)
	for k := range s.x {
		s.jumpy = s.jumpy || s.jumps(k)
	}
	return s
}

// enthalpy returns the energy from the first corner to t.
func (s *store) enthalpy(t float64) float64 {
	last := len(s.x) - 1
	if t <= s.x[0] {
		return (t - s.x[0]) * s.c[0]
	}
	if t >= s.x[last] {
		return s.h[last] + (t-s.x[last])*s.c[last]
	}
	i := sort.SearchFloat64s(s.x, t) // x[i-1] < t <= x[i]
	w := (t - s.x[i-1]) / (s.x[i] - s.x[i-1])
	mean := s.c[i-1] + (s.c[i]-s.c[i-1])*w/2
	return s.h[i-1] + mean*(t-s.x[i-1])
}

// temperature returns the temperature at an energy above the start, by Newton's iteration on enthalpy
// within the piece that holds it.
func (s *store) temperature(u float64) float64 {
	u += s.start
	last := len(s.x) - 1
	if u <= 0 {
		return s.x[0] + u/s.c[0]
	}
	if u >= s.h[last] {
		return s.x[last] + (u-s.h[last])/s.c[last]
	}
	i := sort.SearchFloat64s(s.h, u) // h[i-1] < u <= h[i]
	e, width := u-s.h[i-1], s.x[i]-s.x[i-1]
	slope := (s.c[i] - s.c[i-1]) / width
	d := width * e / (s.h[i] - s.h[i-1])
	for range 20 {
		step := (e - d*(s.c[i-1]+slope*d/2)) / (s.c[i-1] + slope*d)
		d += step
		if abs(step) <= 1e-15*(s.x[i]) {
			break
		}
	}
	return s.x[i-1] + d
}

// What the dense output makes of a jump, and of a break of slope, of a capacity within its step. Chosen by
// trial: on a latent heat as a step of the table and on the steel of EN 1993-1-2, at tolerances from 1e-3 to
// 1e-9, the gap of the recount came to seven tenths of it at the most.
const (
	atJump  = 1.0 / 32
	atBreak = 1.0 / 200
)

// kink returns by how much dT/du [K/J] changes at corner k for a state that moves by an energy [J] past it:
// at a jump of the capacity at once, at a break of its slope by and by. It is weighted by what the dense
// output makes of either.
func (s *store) kink(k int, moved float64) float64 {
	c := s.c[k]
	if k+1 < len(s.x) && s.x[k+1] == s.x[k] {
		return atJump * abs(1/s.c[k+1]-1/c)
	}
	return atBreak * abs(s.slope(k)-s.slope(k-1)) * moved / (c * c * c)
}

// jumps reports whether the capacity jumps at corner k by a hundredth or more: such a place ends a step.
func (s *store) jumps(k int) bool {
	return k+1 < len(s.x) && s.x[k+1] == s.x[k] && abs(s.c[k+1]-s.c[k]) > 0.01*min(s.c[k], s.c[k+1])
}

// landing returns how far [J] a step that ends at a jump may end from it, with the accuracy [K] of its landing.
func (s *store) landing(accuracy float64) float64 { return 2 * accuracy * slices.Min(s.c) }

// slope returns the slope of the piece from corner k on; zero outside the corners and at a jump.
func (s *store) slope(k int) float64 {
	if k < 0 || k+1 >= len(s.x) || s.x[k+1] == s.x[k] {
		return 0
	}
	return (s.c[k+1] - s.c[k]) / (s.x[k+1] - s.x[k])
}

// value returns the ordinate of the curve at x; at a jump that on the left.
func (s *store) value(x float64) float64 {
	last := len(s.x) - 1
	if x <= s.x[0] {
		return s.c[0]
	}
	if x > s.x[last] {
		return s.c[last]
	}
	i := sort.SearchFloat64s(s.x, x) // x[i-1] < x <= x[i]
	w := (x - s.x[i-1]) / (s.x[i] - s.x[i-1])
	return (1-w)*s.c[i-1] + w*s.c[i]
}

// after returns the ordinate of the curve just past x: at a jump that on the right.
func (s *store) after(x float64) float64 {
	i := sort.Search(len(s.x), func(i int) bool { return s.x[i] > x })
	if i == 0 {
		return s.c[0]
	}
	if i == len(s.x) {
		return s.c[i-1]
	}
	w := (x - s.x[i-1]) / (s.x[i] - s.x[i-1])
	return (1-w)*s.c[i-1] + w*s.c[i]
}
