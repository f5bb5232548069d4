package correlation

import "math"

// Plain returns the coefficient [W/(m^2 K)] that Coefficient returns, from the formula once more: the
// laminar core inside rc and the turbulent ring outside it, averaged over the face.
func (d RotatingDisc) Plain(omega, tFilm float64) float64 {
	k, nu, _ := d.Air.Plain(tFilm)
	r := d.Radius
	re := math.Abs(omega) * r * r / nu
	laminar := discLaminar * math.Sqrt(re)
	if re < discRest {
		x := re / discRest
		laminar = discLaminar * math.Sqrt(discRest) * (2.5*x*x - 1.5*x*x*x)
	}
	weight := 0.0
	mixed := 0.0
	if re > discBridgeLow {
		x := min((re-discBridgeLow)/(discBridgeHigh-discBridgeLow), 1)
		weight = 3*x*x - 2*x*x*x
		core := math.Sqrt(discTransition / re) // rc/r
		mixed = discLaminar*math.Sqrt(re)*core*core + discTurbulent*math.Pow(re, 0.8)*(1-math.Pow(core, 2.6))
	}
	return (laminar*(1-weight) + mixed*weight) * k / r
}
