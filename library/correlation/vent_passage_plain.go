package correlation

import "math"

// Plain returns the coefficient [W/(m^2 K)] that the passage's Law returns, from the formula once more.
func (p VentPassage) Plain(omega, tFilm float64) float64 {
	k, nu, pr := p.Air.Plain(tFilm)
	l := p.Length
	if l == 0 {
		l = p.Outer - p.Inner
	}
	inlet := math.Abs(omega) * math.Sqrt((p.Outer-p.Inner)*(p.Outer+p.Inner))
	outlet := inlet * (p.InletWidth * p.Height) / (p.OutletWidth * p.Height)
	width := 0.5*p.InletWidth + 0.5*p.OutletWidth
	d := 4 * width * p.Height / (2*width + 2*p.Height)
	re := 0.5 * (inlet + outlet) * d / nu

	if re < ventRest {
		x := re / ventRest
		return ventLaminar * math.Pow(ventRest*pr*d/l, 1./3) * (8*x*x - 5*x*x*x) / 3 * k / d
	}
	x := max(0, min(math.Log(re/ventBridgeLow)/math.Log(ventBridgeHigh/ventBridgeLow), 1))
	weight := 3*x*x - 2*x*x*x
	laminar := ventLaminar * math.Pow(re*pr*d/l, 1./3)
	turbulent := ventTurbulent * (1 + math.Pow(d/l, ventEntryExponent)) *
		math.Pow(re, ventTurbulentExponent) * math.Pow(pr, ventPrandtlExponent)
	return (laminar*(1-weight) + turbulent*weight) * k / d
}
