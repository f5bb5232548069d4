package correlation

// Air is air at a pressure. The zero value is air at one standard atmosphere.
type Air struct {
	Pressure float64 // Pa; 0: 101325
}

// Film is what the laws need to know of the air near a surface, each with its slope over temperature.
type Film struct {
	Conductivity, ConductivitySlope float64 // W/(m K), W/(m K^2)
	Viscosity, ViscositySlope       float64 // kinematic, m^2/s, m^2/(s K)
	Prandtl, PrandtlSlope           float64 // -, 1/K
}

// At returns the properties at temperature t in K, 200 <= t <= 1000, by cubics through the rows of the
// table with the slope of the neighbouring rows at each; values and slopes are continuous. Outside the
// range each property levels off within 50 K and then stays; Covers is false there. The viscosity goes
// with 1/pressure; conductivity and Prandtl number do not depend on it.
//
// Source: Incropera, DeWitt, Bergman and Lavine, Table A.4.
func (a Air) At(t float64) Film {
	u := (t - airLow) / airStep
	k, dk := along(&airConductivity, u)
	nu, dnu := along(&airViscosity, u)
	pr, dpr := along(&airPrandtl, u)
	thin := airPressure / a.pressure()
	return Film{k, dk / airStep, nu * thin, dnu * thin / airStep, pr, dpr / airStep}
}

// Covers reports whether the table covers temperature t in K.
func (a Air) Covers(t float64) bool { return airLow <= t && t <= airHigh }

func (a Air) pressure() float64 {
	if a.Pressure == 0 {
		return atmosphere
	}
	return a.Pressure
}

// along returns the value and slope of a column at u rows from its first.
func along(column *[airRows]float64, u float64) (y, slope float64) {
	const last = airRows - 1
	switch {
	case !(u >= 0): // not a number comes here too, and goes through
		x, s := min(-u, 1), tangent(column, 0)
		return column[0] - s*x*(1-x/2), s * (1 - x)
	case u >= last:
		x, s := min(u-last, 1), tangent(column, last)
		return column[last] + s*x*(1-x/2), s * (1 - x)
	}
	i := int(u)
	x, rise := u-float64(i), column[i+1]-column[i]
	s0, s1 := tangent(column, i), tangent(column, i+1)
	c2, c3 := 3*rise-2*s0-s1, s0+s1-2*rise
	return column[i] + x*(s0+x*(c2+x*c3)), s0 + x*(2*c2+3*x*c3)
}

// tangent returns the slope per row at row i: half the way between the neighbours, or that of the parabola
// through the three last rows at an end.
func tangent(column *[airRows]float64, i int) float64 {
	const last = airRows - 1
	switch i {
	case 0:
		return (4*column[1] - 3*column[0] - column[2]) / 2
	case last:
		return (3*column[last] - 4*column[last-1] + column[last-2]) / 2
	}
	return (column[i+1] - column[i-1]) / 2
}
