package correlation

import "math"

// Plain returns the coefficient [W/(m^2 K)] that Coefficient returns, from the formula once more.
func (r VehicleRotor) Plain(speed, tFilm float64) float64 {
	k, nu, _ := r.Air.Plain(tFilm)
	re := math.Abs(speed) * r.Diameter / nu
	if re < rotorRest {
		x := re / rotorRest
		const p = rotorLaminarExponent
		return rotorLaminar * math.Pow(rotorRest, p) * ((3-p)*x*x - (2-p)*x*x*x) * k / r.Diameter
	}
	x := max(0, min((re-rotorBridgeLow)/(rotorBridgeHigh-rotorBridgeLow), 1))
	weight := 3*x*x - 2*x*x*x
	laminar := rotorLaminar * math.Pow(re, rotorLaminarExponent)
	turbulent := rotorTurbulent * math.Pow(re, rotorTurbulentExponent)
	return (laminar*(1-weight) + turbulent*weight) * k / r.Diameter
}
