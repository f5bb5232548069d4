package energy

import "testing"

// What explains a gap widens its allowance, but never so far that a book that misses a thousandth is closed.
func TestKnownGapsAreBounded(t *testing.T) {
	cases := []struct {
		name                           string
		strain, bends, rel, scale, get float64
	}{
		{"nothing to explain", 0, 0, 1e-5, 1e6, 0},
		{"a stiff node", 100, 0, 1e-5, 1e6, 2},
		{"corners", 0, 50, 1e-7, 1e6, 30},
		{"corners at a loose tolerance", 0, 1e9, 1e-2, 1e6, 1e3},
		{"both, far too much", 1e9, 1e9, 1e-3, 1e6, 1e3},
	}
	for _, c := range cases {
		if got := known(c.strain, c.bends, c.rel, c.scale); abs(got-c.get) > 1e-9*c.scale {
			t.Errorf("%s: %g J, want %g J", c.name, got, c.get)
		}
	}
}
