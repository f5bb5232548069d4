package material

// ironTo700 holds the heat capacity of iron from 298 to 700 K in the Shomate form,
// cp = A + B t + C t^2 + D t^3 + E/t^2 with t = T/1000 K and cp in J/(mol K). NIST Chemistry WebBook, iron
// (solid), after Chase, NIST-JANAF Thermochemical Tables, 4th ed. (1998).
var ironTo700 = [5]float64{18.42868, 24.64301, -8.913720, 9.664706, -0.012643}

// ironAbove700 continues it by the rows that the WebBook prints, K and J/(mol K). Its second set of
// coefficients, for 700 to 1042 K, meets these rows but dips by a fifth between the first two, which iron
// does not; so the rows are joined by straight lines.
var ironAbove700 = [][2]float64{{800, 37.85}, {900, 43.00}, {1000, 54.35}}

const (
	ironBreak     = 700.0    // K
	ironMolarMass = 0.055845 // kg/mol
)

// The range over which the cast irons follow iron: down to -40 degC, 65 K below the range of the formula,
// which there still follows measured iron (Armco iron, 384 at 200 K and 447 J/(kg K) at 300 K, from memory
// of Incropera Table A.1); up to 1000 K, before the peak of iron at 1042 K, which alloying moves.
const (
	ironLow  = zeroCelsius - 40
	ironHigh = 1000.0
)

// ironCapacity returns the specific heat capacity of pure iron, J/(kg K), at temperature t in K, for
// 298 <= t <= 1000. Below it carries the formula on, above it keeps the end value.
//
// Source: NIST Chemistry WebBook, iron, after Chase (1998): Shomate coefficients to 700 K, rows above.
func ironCapacity(t float64) float64 {
	low, c := ironBreak, shomate(ironTo700, min(t, ironBreak))
	for _, row := range ironAbove700 {
		if t <= low {
			break
		}
		c += (row[1] - c) * min((t-low)/(row[0]-low), 1)
		low = row[0]
	}
	return c / ironMolarMass
}

func shomate(s [5]float64, t float64) float64 {
	t /= 1000
	return s[0] + t*(s[1]+t*(s[2]+t*s[3])) + s[4]/(t*t)
}

// likeIron returns the corners of factor times the capacity of iron, over K, to 0.1 %.
func likeIron(factor float64) (x, y []float64) {
	x, y = sampled(1e-3, branch{ironLow, ironBreak, func(t float64) float64 { return factor * ironCapacity(t) }})
	for _, row := range ironAbove700 {
		x, y = append(x, row[0]), append(y, factor*row[1]/ironMolarMass)
	}
	return x, y
}
