package material

import "workheat/network/element"

// steelConductivity returns the thermal conductivity of carbon steel, W/(m K), at theta in degC, for
// 20 <= theta <= 1200. It falls by 0.06 at 800 degC. Outside the range it keeps the end values.
//
// Source: EN 1993-1-2:2005, 3.4.1.3.
func steelConductivity(theta float64) float64 {
	if theta < 800 {
		return 54 - 3.33e-2*max(theta, 20)
	}
	return 27.3
}

// steelBranches is the published specific heat capacity of carbon steel on the parts of its range, J/(kg K) over
// degC. It jumps up by 0.3 at 600 degC and down by 0.4 at 900 degC and has a peak of 5000 at 735 degC, as published.
//
// Source: EN 1993-1-2:2005, 3.4.1.2.
var steelBranches = []branch{
	{20, 600, func(t float64) float64 { return 425 + t*(7.73e-1+t*(-1.69e-3+t*2.22e-6)) }},
	{600, 735, func(t float64) float64 { return 666 + 13002/(738-t) }},
	{735, 900, func(t float64) float64 { return 545 + 17820/(t-731) }},
	{900, 1200, func(float64) float64 { return 650 }},
}

// steelTolerance is how far the chords of the table may be from the formula, relative; chosen by trial so
// that the enthalpy at the peak is within 1e-4 of the formula's.
const steelTolerance = 2e-4

func carbonSteel() *element.Material {
	at, c := sampled(steelTolerance, steelBranches...)
	return &element.Material{
		Name:     "carbon steel",
		About:    "unalloyed and low-alloyed structural steel, with the heat of its change of structure near 735 degC",
		Source:   "EN 1993-1-2:2005, 3.4.1.2 and 3.4.1.3; c tabulated from the formula to 0.02 %",
		Density:  7850,
		Capacity: element.MustCurve(kelvin(at), c),
		Conductivity: element.MustCurve(kelvin([]float64{20, 800, 800, 1200}),
			[]float64{steelConductivity(20), 54 - 3.33e-2*800, 27.3, 27.3}),
		Low:  20 + zeroCelsius,
		High: 1200 + zeroCelsius,
	}
}
