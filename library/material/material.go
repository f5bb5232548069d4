// Package material holds the property tables of the materials that nodes and conductances are made of,
// each with its source.
package material

import (
	"sync"

	"workheat/network/element"
)

// list has one row for each material, in the order in which they are shown.
var list = []func() *element.Material{
	greyIron,
	nodularIron,
	carbonSteel,
	aluminium,
	organicLining,
	glycolBrakeFluid,
	air,
}

// All returns every material, in the order in which they are shown. The tables are made at the first call
// and shared by all later ones: they are read only. It may be called from several goroutines.
func All() []*element.Material { return all() }

var all = sync.OnceValue(func() []*element.Material {
	made := make([]*element.Material, len(list))
	for i, makeOne := range list {
		made[i] = makeOne()
	}
	return made
})

// zeroCelsius is 0 degC in kelvin: the published tables and formulas here are written in degC.
const zeroCelsius = 273.15

// kelvin turns temperatures from degC to K in place and returns them.
func kelvin(celsius []float64) []float64 {
	for i := range celsius {
		celsius[i] += zeroCelsius
	}
	return celsius
}

// A branch is a published formula on its own part of the temperature range.
type branch struct {
	low, high float64
	formula   func(float64) float64
}

// sampled turns a formula given in branches into corners, keeping each chord within tol of its branch.
// Where two branches meet in different values the corners make a jump.
func sampled(tol float64, branches ...branch) (x, y []float64) {
	for _, b := range branches {
		bx, by := element.Sample(b.formula, b.low, b.high, tol)
		if last := len(x) - 1; last >= 0 && x[last] == bx[0] && y[last] == by[0] {
			bx, by = bx[1:], by[1:]
		}
		x, y = append(x, bx...), append(y, by...)
	}
	return x, y
}
