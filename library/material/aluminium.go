package material

import "workheat/network/element"

// aluminiumCapacity returns the specific heat capacity of aluminium alloys, J/(kg K), at theta in degC,
// for 0 < theta < 500. Outside the range it keeps the end values.
//
// Source: EN 1999-1-2:2007, 3.3.1.
func aluminiumCapacity(theta float64) float64 { return 0.41*min(max(theta, 0), 500) + 903 }

// aluminiumConductivity returns the thermal conductivity of 3xxx and 6xxx aluminium alloys, W/(m K), at
// theta in degC, for 0 < theta < 500. Outside the range it keeps the end values.
//
// Source: EN 1999-1-2:2007, 3.3.1.
func aluminiumConductivity(theta float64) float64 { return 0.07*min(max(theta, 0), 500) + 190 }

func aluminium() *element.Material {
	at := kelvin([]float64{0, 500})
	return &element.Material{
		Name:         "aluminium",
		About:        "wrought aluminium alloys of the 3xxx and 6xxx series",
		Source:       "EN 1999-1-2:2007, 3.3; end values kept above 500 degC by our choice",
		Density:      2700,
		Capacity:     element.MustCurve(at, []float64{aluminiumCapacity(0), aluminiumCapacity(500)}),
		Conductivity: element.MustCurve(at, []float64{aluminiumConductivity(0), aluminiumConductivity(500)}),
		Low:          at[0],
		High:         at[1],
	}
}
