package correlation

// The film properties of air, one value every 50 K from 200 to 1000 K. Incropera, DeWitt, Bergman and
// Lavine, Fundamentals of Heat and Mass Transfer, Table A.4. The density column of the table belongs to a
// pressure of 1e5 Pa, not to one standard atmosphere.
const (
	airLow      = 200.0 // K, first row
	airStep     = 50.0  // K
	airRows     = 17
	airHigh     = airLow + (airRows-1)*airStep
	airPressure = 1e5    // Pa, to which the viscosities belong
	atmosphere  = 101325 // Pa
)

var airConductivity = [airRows]float64{ // W/(m K)
	18.1e-3, 22.3e-3, 26.3e-3, 30.0e-3, 33.8e-3, 37.3e-3, 40.7e-3, 43.9e-3, 46.9e-3,
	49.7e-3, 52.4e-3, 54.9e-3, 57.3e-3, 59.6e-3, 62.0e-3, 64.3e-3, 66.7e-3,
}

var airViscosity = [airRows]float64{ // kinematic, m^2/s at 1e5 Pa
	7.590e-6, 11.44e-6, 15.89e-6, 20.92e-6, 26.41e-6, 32.39e-6, 38.79e-6, 45.57e-6, 52.69e-6,
	60.21e-6, 68.10e-6, 76.37e-6, 84.93e-6, 93.80e-6, 102.9e-6, 112.2e-6, 121.9e-6,
}

var airPrandtl = [airRows]float64{
	0.737, 0.720, 0.707, 0.700, 0.690, 0.686, 0.684, 0.683, 0.685,
	0.690, 0.695, 0.702, 0.709, 0.716, 0.720, 0.723, 0.726,
}
