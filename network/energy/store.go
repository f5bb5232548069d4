package energy

import (
	"sort"

	"workheat/network/element"
)

// A store is one node's heat capacity as the recount sees it: its own sums, and its own way back from
// energy to temperature.
type store struct {
	x, c  []float64 // corners: K, J/K
	h     []float64 // J from the first corner
	start float64   // J from the first corner to the start temperature
}

func newStore(c *element.Curve, start float64) *store {
	s := &store{x: c.X, c: c.Y, h: make([]float64, len(c.X))}
	for i := 1; i < len(s.x); i++ {
		low, high := s.c[i-1], s.c[i]
		s.h[i] = s.h[i-1] + (s.x[i]-s.x[i-1])*low + (s.x[i]-s.x[i-1])*(high-low)/2
	}
	s.start = s.enthalpy(start)
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
