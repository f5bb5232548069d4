package modes

import (
	"math"
	"testing"
)

// ladder returns the slopes of n equal lumps in a row, linked by g, with gBegin and gEnd to held nodes at
// its ends.
func ladder(n int, g, gBegin, gEnd float64) func(i, j int) float64 {
	return func(i, j int) float64 {
		if i != j {
			if i-j == 1 || j-i == 1 {
				return g
			}
			return 0
		}
		sum := 0.0
		for _, k := range [2]int{i - 1, i + 1} {
			switch {
			case k < 0:
				sum += gBegin
			case k == n:
				sum += gEnd
			default:
				sum += g
			}
		}
		return -sum
	}
}

// The rates are those of equal ladders, (4G/C) sin² of an angle that depends on the ends: the standard
// result for a chain, computed to 12 digits for n = 5, C = 100 J/K, G = 2 W/K.
func TestLadders(t *testing.T) {
	cases := []struct {
		name             string
		begin, end       float64
		slowest, fastest float64 // rates, 1/s; zero: nowhere to lose heat to
	}{
		{"insulated ends", 0, 0, 0, 0.072360679775},
		{"wall through G", 2, 0, 0.001620281055, 0.073650141313},
		{"wall through a half cell", 4, 0, 0.001957739348, 0.078042260652},
	}
	for _, c := range cases {
		slow, fast, ok := Constants([]float64{100, 100, 100, 100, 100}, ladder(5, 2, c.begin, c.end))
		if !ok {
			t.Fatalf("%s: no constants", c.name)
		}
		if math.Abs(1/slow-c.slowest) > 1e-11 || math.Abs(1/fast-c.fastest) > 1e-11 {
			t.Errorf("%s: rates %.12g and %.12g, want %.12g and %.12g", c.name, 1/slow, 1/fast, c.slowest, c.fastest)
		}
	}
}

// A massless node between two lumps is two conductances in series.
func TestMasslessNode(t *testing.T) {
	a := [][]float64{{-3, 0, 3}, {0, -6 - 1, 6}, {3, 6, -9}}
	slow, fast, ok := Constants([]float64{50, 80, 0}, func(i, j int) float64 { return a[i][j] })
	b := [][]float64{{-2, 2}, {2, -3}} // 3 and 6 in series are 2
	slow2, fast2, _ := Constants([]float64{50, 80}, func(i, j int) float64 { return b[i][j] })
	if !ok || math.Abs(slow/slow2-1) > 1e-12 || math.Abs(fast/fast2-1) > 1e-12 {
		t.Errorf("got %g and %g, want %g and %g", slow, fast, slow2, fast2)
	}
}

func TestNothingToFind(t *testing.T) {
	if _, _, ok := Constants([]float64{0, 0}, func(i, j int) float64 { return -1 }); ok {
		t.Error("massless nodes alone have no time constant")
	}
	if _, _, ok := Constants(make([]float64, Most+1), nil); ok {
		t.Error("a network above the bound must be refused before any work")
	}
	hanging := [][]float64{{-1, 0}, {0, 0}}
	if _, _, ok := Constants([]float64{1, 0}, func(i, j int) float64 { return hanging[i][j] }); ok {
		t.Error("a massless node that nothing holds must be refused")
	}
}
